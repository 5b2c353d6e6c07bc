import { describe, expect, it } from '@jest/globals';
import { solveInstant } from '#shared/engine/instant/index';
import { singularValues } from '#shared/engine/linear/condition';
import { fromRows } from '#shared/engine/linear/dense';
import { caseFile, expectClose, nameOf } from './case-file';
import {
  at,
  bar,
  bodyAt,
  degrees,
  expectCase,
  grounded,
  pinned,
  problemOf,
  quantitiesOf,
  radians,
  turning,
} from './instant-cases';

const named = (id: string): string => nameOf(caseFile(id));

interface SliderCrank {
  readonly crank: number;
  readonly rod: number;
  readonly offset?: number;
  readonly theta: number;
  readonly omega: number;
  readonly alpha: number;
  readonly more?: Record<string, number>;
}

/** Crank about the origin, rod to a slider that moves along x at the offset. */
const sliderCrank = (m: SliderCrank) => {
  const y = m.offset ?? 0;
  const pin: [number, number] = [m.crank * Math.cos(m.theta), m.crank * Math.sin(m.theta)];
  const slider: [number, number] = [pin[0] + Math.sqrt(m.rod ** 2 - (pin[1] - y) ** 2), y];
  return problemOf(
    [bar('crank', ['O', [0, 0]], ['A', pin]), bar('rod', ['A', pin], ['B', slider], m.more ?? {})],
    [
      grounded('o', 'crank', 'O'),
      pinned('a', 'crank', 'rod', 'A'),
      { id: 'b', kind: 'guide', a: at('rod', 'B'), direction: 0 },
    ],
    turning('drive', 'crank', m.omega, m.alpha),
  );
};

describe('mechanisms at one instant', () => {
  it(named('A02_coupled_rods_slider'), () => {
    const problem = problemOf(
      [bar('1', ['O', [0, 0]], ['P', [3, 3]]), bar('2', ['P', [3, 3]], ['Q', [7, 0]])],
      [
        grounded('o', '1', 'O'),
        pinned('p', '1', '2', 'P'),
        { id: 'q', kind: 'guide', a: at('2', 'Q'), direction: 0 },
      ],
      turning('drive', '1', 4, 0),
    );
    expect(expectCase('A02_coupled_rods_slider', problem).status).toBe('determined');
  });

  it(named('A03_slider_crank_inline'), () => {
    const theta = radians(40);
    const problem = sliderCrank({
      crank: 0.15,
      rod: 0.5,
      theta,
      omega: 30,
      alpha: 0,
      more: { G: 0.2 },
    });
    expectCase('A03_slider_crank_inline', problem, () => ({
      rod_angle_deg: degrees(problem.bodies[1].pose.heading),
    }));
  });

  it(named('A03p_slider_crank_printed_graphical'), () => {
    const omega = (600 * 2 * Math.PI) / 60;
    const problem = sliderCrank({
      crank: 0.125,
      rod: 0.5,
      theta: radians(45),
      omega,
      alpha: 0,
      more: { G: 0.225 },
    });
    expectCase('A03p_slider_crank_printed_graphical', problem, ({ branches: [b] }) => ({
      '|v_slider|': b.points['rod.B'].speed ?? NaN,
      '|v_G|': b.points['rod.G'].speed ?? NaN,
      '|w_rod|': Math.abs(b.bodies['rod'].omega ?? NaN),
    }));
  });

  it(named('A04_slider_crank_offset'), () => {
    const problem = sliderCrank({
      crank: 0.1,
      rod: 0.35,
      offset: 0.03,
      theta: radians(65),
      omega: -12,
      alpha: 4,
      more: { G: 0.175 },
    });
    expectCase('A04_slider_crank_offset', problem, () => ({
      rod_angle_deg: degrees(problem.bodies[1].pose.heading),
    }));
  });

  it(named('A08_ladder'), () => {
    const problem = problemOf(
      [bar('ladder', ['F', [3, 0]], ['T', [0, 4]], { M: 2.5 })],
      [
        { id: 'floor', kind: 'guide', a: at('ladder', 'F'), direction: 0 },
        { id: 'wall', kind: 'guide', a: at('ladder', 'T'), direction: Math.PI / 2 },
      ],
      [
        { id: 'foot', quantity: 'slide-rate', joint: 'floor', value: 0.6 },
        { id: 'foot-rate', quantity: 'slide-acceleration', joint: 'floor', value: 0.25 },
      ],
    );
    expectCase('A08_ladder', problem, (solution) => {
      const q = quantitiesOf(solution);
      return {
        w: q['w.ladder'],
        al: q['al.ladder'],
        'x.IC': q['x.IC_ladder'],
        'y.IC': q['y.IC_ladder'],
      };
    });
  });

  it(named('A09_two_link_arm_forward'), () => {
    const [one, two] = [radians(25), radians(75)];
    const elbow: [number, number] = [1.2 * Math.cos(one), 1.2 * Math.sin(one)];
    const hand: [number, number] = [elbow[0] + 0.9 * Math.cos(two), elbow[1] + 0.9 * Math.sin(two)];
    const problem = problemOf(
      [bar('1', ['S', [0, 0]], ['E', elbow]), bar('2', ['E', elbow], ['H', hand])],
      [grounded('s', '1', 'S'), pinned('e', '1', '2', 'E')],
      [...turning('upper', '1', 0.8, 0.5), ...turning('fore', '2', -0.9, 2.5)],
    );
    expectCase('A09_two_link_arm_forward', problem, (solution) => ({
      'x.IC2': quantitiesOf(solution)['x.IC_2'],
      'y.IC2': quantitiesOf(solution)['y.IC_2'],
    }));
  });

  it(named('A10_crank_slotted_lever'), () => {
    const theta = radians(20);
    const pin: [number, number] = [0.12 * Math.cos(theta), 0.3 + 0.12 * Math.sin(theta)];
    const angle = Math.atan2(pin[1], pin[0]);
    const problem = problemOf(
      [
        bar('crank', ['O2', [0, 0.3]], ['A', pin]),
        bodyAt('lever', [0, 0], angle, { O4: [0, 0], E: [0.65, 0] }),
      ],
      [
        grounded('o2', 'crank', 'O2'),
        grounded('o4', 'lever', 'O4'),
        { id: 'slot', kind: 'slot', a: at('crank', 'A'), b: at('lever', 'O4'), direction: 0 },
      ],
      turning('drive', 'crank', 8, 3),
    );
    expectCase('A10_crank_slotted_lever', problem, ({ branches: [b] }) => ({
      lever_angle_deg: degrees(angle),
      rho: Math.hypot(...pin),
      slip_speed: b.joints['slot'].slideRate ?? NaN,
      slip_accel: b.joints['slot'].slideAcceleration ?? NaN,
      coriolis_magnitude: Math.abs(
        2 * (b.bodies['lever'].omega ?? NaN) * (b.joints['slot'].slideRate ?? NaN),
      ),
    }));
  });

  it(`${named('A10b_quick_return_ratio')}: the lever stands still at the ends of its swing`, () => {
    const check = caseFile<unknown, Record<string, number>>('A10b_quick_return_ratio');
    const half = radians(check.expected['lever_half_swing_deg']);
    const ends = [1, -1].map((side) => {
      // Where the lever is tangent to the crank circle.
      const theta = side > 0 ? -half : Math.PI + half;
      const pin: [number, number] = [0.12 * Math.cos(theta), 0.3 + 0.12 * Math.sin(theta)];
      const angle = Math.atan2(pin[1], pin[0]);
      expectClose(Math.abs(degrees(angle) - 90), degrees(half), { rel: 1e-9 });
      const solution = solveInstant(
        problemOf(
          [
            bar('crank', ['O2', [0, 0.3]], ['A', pin]),
            bodyAt('lever', [0, 0], angle, { O4: [0, 0] }),
          ],
          [
            grounded('o2', 'crank', 'O2'),
            grounded('o4', 'lever', 'O4'),
            { id: 'slot', kind: 'slot', a: at('crank', 'A'), b: at('lever', 'O4'), direction: 0 },
          ],
          turning('drive', 'crank', 8, 0),
        ),
      );
      expectClose(solution.branches[0].bodies['lever'].omega, 0, { abs: 1e-9 });
      return theta;
    });
    // The crank sweeps over the top for cutting, and the rest for the return.
    const cutting = ends[1] - ends[0];
    expectClose(cutting / (2 * Math.PI - cutting), check.expected['time_ratio'], check.tolerance);
  });

  it(named('A11_geneva'), () => {
    const radius = 0.1 * Math.sin(Math.PI / 4);
    const theta = radians(30);
    const pin: [number, number] = [radius * Math.cos(theta), radius * Math.sin(theta)];
    const problem = problemOf(
      [
        bar('crank', ['O', [0, 0]], ['A', pin]),
        bodyAt('wheel', [0.1, 0], Math.atan2(pin[1], pin[0] - 0.1), { C: [0, 0], R: [0.08, 0] }),
      ],
      [
        grounded('o', 'crank', 'O'),
        grounded('c', 'wheel', 'C'),
        { id: 'slot', kind: 'slot', a: at('crank', 'A'), b: at('wheel', 'C'), direction: 0 },
      ],
      turning('drive', 'crank', 6, 0),
    );
    expectCase('A11_geneva', problem, ({ branches: [b] }) => ({
      slip_speed: b.joints['slot'].slideRate ?? NaN,
      slip_accel: b.joints['slot'].slideAcceleration ?? NaN,
    }));
  });

  it(named('A16_planetary'), () => {
    const centre = { O: [0, 0] as [number, number] };
    const problem = problemOf(
      [
        bodyAt('sun', [0, 0], 0, centre),
        bodyAt('ring', [0, 0], 0, centre),
        bodyAt('carrier', [0, 0], 0.3, { O: [0, 0], C: [0.09, 0] }),
        bodyAt('planet', [0.09 * Math.cos(0.3), 0.09 * Math.sin(0.3)], 0, { C: [0, 0] }),
      ],
      [
        grounded('s', 'sun', 'O'),
        grounded('r', 'ring', 'O'),
        grounded('c', 'carrier', 'O'),
        pinned('p', 'carrier', 'planet', 'C'),
        {
          id: 'inner',
          kind: 'roll',
          a: at('planet', 'C'),
          b: at('sun', 'O'),
          radius: 0.03,
          otherRadius: 0.06,
        },
        {
          id: 'outer',
          kind: 'roll',
          a: at('planet', 'C'),
          b: at('ring', 'O'),
          radius: 0.03,
          otherRadius: -0.12,
        },
      ],
      [
        { id: 'sun', quantity: 'angular-velocity', body: 'sun', value: 40 },
        { id: 'ring', quantity: 'angular-velocity', body: 'ring', value: -5 },
      ],
    );
    const solution = expectCase('A16_planetary', problem);
    // The contacts repeat, along their normals, what the pins say.
    expect(solution.status).toBe('determined');
    expect(solution.levels.velocity).toMatchObject({ unknowns: 12, equations: 14, rank: 12 });
  });

  it(named('A18_three_link_chain'), () => {
    const check = caseFile<unknown, Record<string, number>>('A18_three_link_chain');
    const place = (from: [number, number], length: number, angle: number): [number, number] => [
      from[0] + length * Math.cos(angle),
      from[1] + length * Math.sin(angle),
    ];
    const a = place([0, 0], 0.8, radians(70));
    const b = place(a, 0.6, radians(10));
    // The end D on the line through (1.2, 0.25) at −20°, 0.7 m from B: the larger root s.
    const u: [number, number] = [Math.cos(radians(-20)), Math.sin(radians(-20))];
    const from = [1.2 - b[0], 0.25 - b[1]];
    const along = from[0] * u[0] + from[1] * u[1];
    const s = -along + Math.sqrt(along ** 2 - (from[0] ** 2 + from[1] ** 2) + 0.7 ** 2);
    const d: [number, number] = [1.2 + s * u[0], 0.25 + s * u[1]];
    const problem = problemOf(
      [
        bar('1', ['O', [0, 0]], ['A', a]),
        bar('2', ['A', a], ['B', b]),
        bar('3', ['B', b], ['D', d]),
      ],
      [
        grounded('o', '1', 'O'),
        pinned('a', '1', '2', 'A'),
        pinned('b', '2', '3', 'B'),
        {
          id: 'd',
          kind: 'guide',
          a: at('3', 'D'),
          direction: radians(-20),
          through: [1.2, 0.25],
        },
      ],
      [...turning('first', '1', 2, -1), ...turning('second', '2', -3, 4)],
    );
    expectClose(s, check.expected['s'], { rel: 1e-9, abs: 1e-12 });
    expectCase('A18_three_link_chain', problem, (solution) => ({
      s,
      link3_angle_deg: degrees(problem.bodies[2].pose.heading),
      sdot: solution.branches[0].joints['d'].slideRate ?? NaN,
      sddot: solution.branches[0].joints['d'].slideAcceleration ?? NaN,
      'x.IC3': quantitiesOf(solution)['x.IC_3'],
      'y.IC3': quantitiesOf(solution)['y.IC_3'],
    }));
  });

  describe(named('A25_dead_centre_singularity'), () => {
    const check = caseFile<unknown, Record<string, number>>('A25_dead_centre_singularity');
    const drivenBySlider = (theta: number, speed: number) => {
      const driven = sliderCrank({ crank: 0.15, rod: 0.5, theta, omega: 0, alpha: 0 });
      return {
        ...driven,
        knowns: [{ id: 'slider', quantity: 'slide-rate' as const, joint: 'b', value: speed }],
      };
    };

    it.each([40, 5, 1])('%d° from the dead centre, the crank rate is that of the case', (theta) => {
      const solution = solveInstant(drivenBySlider(radians(theta), -0.5));
      expectClose(
        solution.branches[0].bodies['crank'].omega,
        check.expected[`w_crank_theta_${theta}deg_slider_-0.5`],
        check.tolerance,
      );
    });

    it.each([40, 5, 1, 0])(
      '%d° from the dead centre, the Jacobian is that of the case',
      (theta) => {
        const matrices = caseFile<unknown, Record<string, number[]>>('A25_dead_centre_singularity');
        // Columns: velocity of the rod's end when crank or rod alone turns at 1 rad/s.
        const open = sliderCrank({
          crank: 0.15,
          rod: 0.5,
          theta: radians(theta),
          omega: 0,
          alpha: 0,
        });
        const columns = [
          [1, 0],
          [0, 1],
        ].map(
          ([crank, rod]) =>
            solveInstant({
              ...open,
              joints: open.joints.filter((j) => j.id !== 'b'),
              knowns: [...turning('c', 'crank', crank, 0), ...turning('r', 'rod', rod, 0)],
            }).branches[0].points['rod.B'].velocity ?? [NaN, NaN],
        );
        const [a, b] = columns;
        const values = singularValues(
          fromRows([
            [a[0], b[0]],
            [a[1], b[1]],
          ]),
        );
        const tolerance = { rel: 1e-9, abs: 1e-12 };
        expectClose(values, matrices.expected[`singular_values_theta_${theta}deg`], tolerance);
        const determinant = a[0] * b[1] - a[1] * b[0];
        expectClose(determinant, check.expected[`det_theta_${theta}deg`], tolerance);
      },
    );

    it('at the dead centre a moving slider contradicts, and no number is given', () => {
      const solution = solveInstant(drivenBySlider(0, -0.5));
      expect(solution.status).toBe('singular');
      expect(solution.branches).toEqual([]);
      expect(solution.clash).toContain('slider');
    });

    it('at the dead centre a slider at rest leaves the crank free, with the null vector of the case', () => {
      const solution = solveInstant(drivenBySlider(0, 0));
      expect(solution.status).toBe('singular');
      expect(solution.branches[0].bodies['crank'].omega).toBeNull();
      expect(solution.branches[0].points['rod.B'].velocity?.map(Math.abs)).toEqual([0, 0]);
      const { bodies } = solution.free[0];
      const vector = check.expected['null_vector_at_0deg_[w_crank,w_rod]'];
      expectClose([bodies['crank'][2], bodies['rod'][2]], vector, check.tolerance);
    });
  });
});

describe(named('A29_mobility_counts'), () => {
  const check = caseFile<unknown, Record<string, number>>('A29_mobility_counts');
  const mobility = (problem: Parameters<typeof solveInstant>[0]): number => {
    const { unknowns, rank } = solveInstant({ ...problem, knowns: [] }).levels.velocity;
    return unknowns - rank;
  };
  const fourth: [number, number] = [0.9, 0];

  it('slider-crank', () => {
    const problem = sliderCrank({ crank: 0.15, rod: 0.5, theta: 0.7, omega: 0, alpha: 0 });
    expect(mobility(problem)).toBe(check.expected['slider_crank(n=4,j1=4)']);
  });

  it('four-bar', () => {
    const problem = problemOf(
      [
        bar('1', ['O', [0, 0]], ['A', [0.1, 0.3]]),
        bar('2', ['A', [0.1, 0.3]], ['B', [0.8, 0.5]]),
        bar('3', ['B', [0.8, 0.5]], ['C', fourth]),
      ],
      [
        grounded('o', '1', 'O'),
        pinned('a', '1', '2', 'A'),
        pinned('b', '2', '3', 'B'),
        grounded('c', '3', 'C'),
      ],
      [],
    );
    expect(mobility(problem)).toBe(check.expected['four_bar(n=4,j1=4)']);
  });

  it('five-bar', () => {
    const problem = problemOf(
      [
        bar('1', ['O', [0, 0]], ['A', [0.1, 0.3]]),
        bar('2', ['A', [0.1, 0.3]], ['B', [0.5, 0.6]]),
        bar('3', ['B', [0.5, 0.6]], ['C', [0.8, 0.4]]),
        bar('4', ['C', [0.8, 0.4]], ['D', fourth]),
      ],
      [
        grounded('o', '1', 'O'),
        pinned('a', '1', '2', 'A'),
        pinned('b', '2', '3', 'B'),
        pinned('c', '3', '4', 'C'),
        grounded('d', '4', 'D'),
      ],
      [],
    );
    expect(mobility(problem)).toBe(check.expected['five_bar(n=5,j1=5)']);
  });

  it('three links to a slider', () => {
    const problem = problemOf(
      [
        bar('1', ['O', [0, 0]], ['A', [0.1, 0.3]]),
        bar('2', ['A', [0.1, 0.3]], ['B', [0.5, 0.6]]),
        bar('3', ['B', [0.5, 0.6]], ['C', [0.8, 0.4]]),
      ],
      [
        grounded('o', '1', 'O'),
        pinned('a', '1', '2', 'A'),
        pinned('b', '2', '3', 'B'),
        { id: 'c', kind: 'guide', a: at('3', 'C'), direction: 0.4 },
      ],
      [],
    );
    expect(mobility(problem)).toBe(check.expected['three_link_to_slider(n=5,j1=5)']);
  });

  it('crank and slotted lever, and Geneva wheel', () => {
    const problem = problemOf(
      [
        bar('crank', ['O', [0, 0]], ['A', [0.1, 0.05]]),
        bodyAt('lever', [0, -0.3], Math.atan2(0.35, 0.1), { C: [0, 0], E: [0.5, 0] }),
      ],
      [
        grounded('o', 'crank', 'O'),
        grounded('c', 'lever', 'C'),
        { id: 's', kind: 'slot', a: at('crank', 'A'), b: at('lever', 'C'), direction: 0 },
      ],
      [],
    );
    expect(mobility(problem)).toBe(check.expected['crank_slotted_lever(n=4,j1=4)']);
    expect(mobility(problem)).toBe(check.expected['geneva(n=3,j1=2,j2=1)']);
  });

  it('boom with a cylinder', () => {
    // Barrel and rod share an axis, from the barrel's foot to the rod's eye on the boom: two points
    // of the rod run in the barrel.
    const eye: [number, number] = [Math.cos(0.2), Math.sin(0.2)];
    const axis = Math.atan2(eye[1] + 0.9, eye[0] - 0.4);
    const problem = problemOf(
      [
        bodyAt('boom', [0, 0], 0.2, { O: [0, 0], P: [1, 0] }),
        bodyAt('barrel', [0.4, -0.9], axis, { C: [0, 0], F: [0.6, 0] }),
        bodyAt('rod', eye, axis, { P: [0, 0], Q: [-0.5, 0] }),
      ],
      [
        grounded('o', 'boom', 'O'),
        grounded('c', 'barrel', 'C'),
        pinned('p', 'boom', 'rod', 'P'),
        { id: 's1', kind: 'slot', a: at('rod', 'P'), b: at('barrel', 'C'), direction: 0 },
        { id: 's2', kind: 'slot', a: at('rod', 'Q'), b: at('barrel', 'C'), direction: 0 },
      ],
      [],
    );
    expect(mobility(problem)).toBe(check.expected['boom_with_cylinder(n=4,j1=4)']);
  });

  it('pinion between two racks: one constraint repeats another', () => {
    const expected = caseFile<unknown, Record<string, Record<string, number>>>(
      'A29_mobility_counts',
    ).expected['rack_pair_pinion'];
    const problem = problemOf(
      [
        bodyAt('lower', [0, 0], 0, { A: [-1, 0], B: [1, 0] }),
        bodyAt('upper', [0, 0.4], 0, { A: [-1, 0], B: [1, 0] }),
        bodyAt('pinion', [0.1, 0.2], 0.3, { C: [0, 0] }),
      ],
      [
        ...['lower', 'upper'].flatMap((rack) =>
          ['A', 'B'].map((end) => ({
            id: `${rack}-${end}`,
            kind: 'guide' as const,
            a: at(rack, end),
            direction: 0,
          })),
        ),
        {
          id: 'below',
          kind: 'roll',
          a: at('pinion', 'C'),
          b: at('lower', 'A'),
          radius: 0.2,
          surface: 0,
        },
        {
          id: 'above',
          kind: 'roll',
          a: at('pinion', 'C'),
          b: at('upper', 'A'),
          radius: 0.2,
          surface: Math.PI,
        },
      ],
      [],
    );
    const { unknowns, equations, rank } = solveInstant(problem).levels.velocity;
    expect(unknowns - rank).toBe(expected['true_mobility']);
    expect(equations - rank).toBe(expected['redundant_constraints']);
    expect(unknowns - equations).toBe(expected['naive_mobility']);
    expect(solveInstant(problem).status).toBe('under-determined');
  });
});
