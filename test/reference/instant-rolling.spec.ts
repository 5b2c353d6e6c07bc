import { describe, expect, it } from '@jest/globals';
import { solveInstant } from '#shared/engine/instant/index';
import { caseFile, nameOf } from './case-file';
import {
  at,
  bodyAt,
  expectCase,
  moving,
  pinned,
  problemOf,
  quantitiesOf,
  radians,
  turning,
} from './instant-cases';

const named = (id: string): string => nameOf(caseFile(id));

describe('wheels at one instant', () => {
  it(named('A06_rolling_wheel'), () => {
    const rim: [number, number] = [0.32 * Math.cos(radians(30)), 0.32 * Math.sin(radians(30))];
    const problem = problemOf(
      [bodyAt('wheel', [0, 0.32], 0, { C: [0, 0], P: rim, contact: [0, -0.32] })],
      [{ id: 'road', kind: 'roll', a: at('wheel', 'C'), radius: 0.32, surface: 0 }],
      [
        { id: 'v', quantity: 'slide-rate', joint: 'road', value: 15 },
        { id: 'a', quantity: 'slide-acceleration', joint: 'road', value: -6 },
      ],
    );
    const solution = expectCase('A06_rolling_wheel', problem, (found) => {
      const q = quantitiesOf(found);
      return {
        w: q['w.wheel'],
        al: q['al.wheel'],
        'x.IC_from_centre': q['x.IC_wheel'],
        'y.IC_from_centre': q['y.IC_wheel'] - 0.32,
      };
    });
    expect(
      Math.hypot(...(solution.branches[0].points['wheel.contact'].velocity ?? [])),
    ).toBeLessThan(1e-12);
  });

  it(named('A06b_wheel_with_slip'), () => {
    const problem = problemOf(
      [bodyAt('wheel', [0, 0], 0, { C: [0, 0], contact: [0, -0.32] })],
      [],
      [...moving('v', 'wheel', 'C', [15, 0], [0, 0]), ...turning('w', 'wheel', -35, 0)],
    );
    expectCase('A06b_wheel_with_slip', problem, (solution) => {
      const q = quantitiesOf(solution);
      return {
        'y.IC_from_centre': q['y.IC_wheel'],
        'slip_ratio_SAE_(wR/v-1)': (-q['w.wheel'] * 0.32) / q['vx.C'] - 1,
      };
    });
  });

  it(named('A06c_rolling_cylinder_printed'), () => {
    const problem = problemOf(
      [bodyAt('cylinder', [0, 1], 0, { C: [0, 0], top: [0, 1], side: [1, 0] })],
      [{ id: 'floor', kind: 'roll', a: at('cylinder', 'C'), radius: 1, surface: 0 }],
      [{ id: 'v', quantity: 'slide-rate', joint: 'floor', value: 20 }],
    );
    expectCase('A06c_rolling_cylinder_printed', problem, ({ branches: [b] }) => ({
      v_top: b.points['cylinder.top'].speed ?? NaN,
      v_side: b.points['cylinder.side'].speed ?? NaN,
    }));
  });

  it(named('A07_wheel_inside_track'), () => {
    const q = radians(-60);
    const [c, s] = [Math.cos(q), Math.sin(q)];
    const points: Record<string, [number, number]> = {
      C: [0, 0],
      T: [-0.3 * c, -0.3 * s],
      contact: [0.3 * c, 0.3 * s],
    };
    const problem = problemOf(
      [bodyAt('wheel', [1.7 * c, 1.7 * s], 0, points)],
      [
        {
          id: 'track',
          kind: 'roll',
          a: at('wheel', 'C'),
          radius: 0.3,
          surface: q + Math.PI / 2,
          surfaceRadius: 2,
        },
      ],
      [
        { id: 'v', quantity: 'slide-rate', joint: 'track', value: 1.7 * 1.5 },
        { id: 'a', quantity: 'slide-acceleration', joint: 'track', value: 1.7 * -0.4 },
      ],
    );
    expectCase('A07_wheel_inside_track', problem, (solution) => ({
      w: quantitiesOf(solution)['w.wheel'],
      al: quantitiesOf(solution)['al.wheel'],
    }));
  });

  it(`${named('A07_wheel_inside_track')}, the track as a ring that stands still`, () => {
    const q = radians(-60);
    const [c, s] = [Math.cos(q), Math.sin(q)];
    const problem = problemOf(
      [
        bodyAt('wheel', [1.7 * c, 1.7 * s], 0, {
          C: [0, 0],
          T: [-0.3 * c, -0.3 * s],
          contact: [0.3 * c, 0.3 * s],
        }),
        bodyAt('ring', [0, 0], 0, { O: [0, 0] }),
      ],
      [
        { id: 'fixed', kind: 'weld', a: at('ring', 'O'), ground: true },
        {
          id: 'track',
          kind: 'roll',
          a: at('wheel', 'C'),
          b: at('ring', 'O'),
          radius: 0.3,
          otherRadius: -2,
        },
      ],
      turning('w', 'wheel', (-1.7 * 1.5) / 0.3, (1.7 * 0.4) / 0.3),
    );
    expectCase('A07_wheel_inside_track', problem, (solution) => ({
      w: quantitiesOf(solution)['w.wheel'],
      al: quantitiesOf(solution)['al.wheel'],
    }));
  });
});

describe('articulated vehicles at one instant', () => {
  it(named('A13_trailer_from_kingpin'), () => {
    const heading = radians(12);
    const problem = problemOf(
      [bodyAt('trailer', [0, 0], heading, { K: [0, 0], axle: [-8.1, 0] })],
      [{ id: 'wheels', kind: 'wheel', a: at('trailer', 'axle') }],
      moving('kingpin', 'trailer', 'K', [7.4, 2.1], [-0.8, 1.3]),
    );
    expectCase('A13_trailer_from_kingpin', problem, (solution) => {
      const q = quantitiesOf(solution);
      return {
        v_axle_longitudinal: solution.branches[0].joints['wheels'].slideRate ?? NaN,
        'x.IC_from_kingpin': q['x.IC_trailer'],
        'y.IC_from_kingpin': q['y.IC_trailer'],
        radius_axle_to_IC: Math.hypot(
          q['x.axle'] - q['x.IC_trailer'],
          q['y.axle'] - q['y.IC_trailer'],
        ),
      };
    });
  });

  it(named('A14_tractor_trailer_chain'), () => {
    const problem = problemOf(
      [
        bodyAt('tractor', [0, 0], 0, { rear: [0, 0], front: [3.8, 0], K: [0.6, 0] }),
        bodyAt('trailer', [0.6, 0], radians(-9), { K: [0, 0], X: [-8.1, 0] }),
      ],
      [
        { id: 'rear', kind: 'wheel', a: at('tractor', 'rear') },
        {
          id: 'front',
          kind: 'wheel',
          a: at('tractor', 'front'),
          steer: radians(14),
          steerRate: 0.2,
        },
        pinned('kingpin', 'tractor', 'trailer', 'K'),
        { id: 'axle', kind: 'wheel', a: at('trailer', 'X') },
      ],
      [
        { id: 'v', quantity: 'slide-rate', joint: 'rear', value: 6 },
        { id: 'a', quantity: 'slide-acceleration', joint: 'rear', value: -1.5 },
      ],
    );
    const solution = expectCase('A14_tractor_trailer_chain', problem, (found) => {
      const q = quantitiesOf(found);
      return { articulation_rate: q['w.tractor'] - q['w.trailer'] };
    });
    expect(solution.status).toBe('determined');
  });

  it(named('A20_vehicle_in_yaw'), () => {
    const check = caseFile<{ wheels_body_xy: Record<string, [number, number]> }, unknown>(
      'A20_vehicle_in_yaw',
    );
    const heading = radians(20);
    const points: Record<string, [number, number]> = { G: [0, 0], ...check.inputs.wheels_body_xy };
    const problem = problemOf(
      [bodyAt('car', [0, 0], heading, points)],
      [],
      [
        ...moving('g', 'car', 'G', [17.2, 4.9], [-5.1, -3.4]),
        ...turning('yaw', 'car', -0.62, 0.35),
      ],
    );
    expectCase('A20_vehicle_in_yaw', problem, (solution) => {
      const q = quantitiesOf(solution);
      const slip = (point: string): number => {
        const direction = solution.branches[0].points[`car.${point}`].direction ?? NaN;
        return ((direction - heading) * 180) / Math.PI;
      };
      return {
        'x.IC_from_G': q['x.IC_car'],
        'y.IC_from_G': q['y.IC_car'],
        body_sideslip_deg: slip('G'),
        ...Object.fromEntries(
          Object.keys(check.inputs.wheels_body_xy).map((w) => [`slip_angle_deg.${w}`, slip(w)]),
        ),
      };
    });
    expect(solveInstant(problem).redundancy).toBe(0);
  });
});
