import { describe, expect, it } from '@jest/globals';
import type { MotionProblem } from '../documents/motion-problem';
import { solveInstant } from './index';

/**
 * Directions alone never fix a speed (common practice): every velocity may be multiplied by one
 * number and all directions stay. With more uncertain directions than the shape of the motion needs,
 * the equations at the *measured* directions have full rank by their noise; judged at the *adjusted*
 * directions they have not. A speed reported here would be invented.
 */
const turn = 0.4;
const places: Record<string, [number, number]> = {
  LF: [1.2, 0.75],
  RF: [1.2, -0.75],
  LR: [-1.4, 0.75],
  RR: [-1.4, -0.75],
};
const errors = [0.004, -0.006, 0.003, 0.005];

/** Directions of a car that turns about a pole, each with a small error. */
function directionsOnly(names: readonly string[]): MotionProblem {
  return {
    format: 'centrode.motion-problem/1',
    bodies: [{ id: 'car', pose: { x: 3, y: 2, heading: turn }, points: { G: [0, 0], ...places } }],
    joints: [],
    knowns: names.map((point, i) => {
      const [x, y] = places[point];
      const [c, s] = [Math.cos(turn), Math.sin(turn)];
      const r = [c * x - s * y, s * x + c * y];
      const velocity = [12 - 1.1 * r[1], 3 + 1.1 * r[0]];
      return {
        id: `k${i}`,
        quantity: 'velocity',
        at: { body: 'car', point },
        direction: Math.atan2(velocity[1], velocity[0]) + errors[i],
        sigma: { direction: 0.01 },
      };
    }),
  };
}

describe('directions alone', () => {
  it.each([[['LF', 'RF']], [['LF', 'RF', 'LR']], [['LF', 'RF', 'LR', 'RR']]])(
    'never fix a speed: %j',
    (names) => {
      const solution = solveInstant(directionsOnly(names));
      expect(solution.status).toBe('under-determined');
      for (const branch of solution.branches) {
        expect(branch.points['car.G'].speed).toBeNull();
        expect(branch.bodies['car'].omega).toBeNull();
      }
      expect(solution.free.length).toBeGreaterThan(0);
      expect(solution.helps.join(' ')).toMatch(/magnitude|angular/);
    },
  );

  it('fix the pole, and test each other when there are more than two', () => {
    const solution = solveInstant(directionsOnly(['LF', 'RF', 'LR', 'RR']));
    // The pole of v = (12, 3), ω = 1.1 about the origin at (3, 2): closed form.
    const [x, y] = solution.branches[0].bodies['car'].pole ?? [NaN, NaN];
    const [[varX], [, varY]] = solution.branches[0].bodies['car'].covariance.pole ?? [
      [NaN, 0],
      [0, NaN],
    ];
    expect(Math.abs(x - (3 - 3 / 1.1))).toBeLessThan(4 * Math.sqrt(varX));
    expect(Math.abs(y - (2 + 12 / 1.1))).toBeLessThan(4 * Math.sqrt(varY));
    expect(solution.redundancy).toBe(2);
  });

  it('leave one body free while another is fixed by a speed', () => {
    const car = directionsOnly(['LF', 'RF', 'LR', 'RR']);
    const problem: MotionProblem = {
      ...car,
      bodies: [
        ...car.bodies,
        { id: 'van', pose: { x: 20, y: 0, heading: 0 }, points: { G: [0, 0] } },
      ],
      knowns: [
        ...car.knowns,
        { id: 'w', quantity: 'angular-velocity', body: 'van', value: 0, sigma: 0.01 },
        {
          id: 'v',
          quantity: 'velocity',
          at: { body: 'van', point: 'G' },
          magnitude: 9,
          direction: 0,
          sigma: { magnitude: 0.2, direction: 0.01 },
        },
      ],
    };
    const solution = solveInstant(problem);
    expect(solution.branches[0].points['car.G'].speed).toBeNull();
    expect(solution.branches[0].points['van.G'].speed).toBeCloseTo(9, 6);
  });

  it('never fix a speed of two pinned bodies either', () => {
    // Tractor and trailer with the pin at K; five directions for four ratios of motion.
    const motions = { tractor: [6, 1.5, 0.9], trailer: [6, 1.5, 0.1] } as const;
    const headings = { tractor: 0.7, trailer: 0.2 } as const;
    const points = {
      tractor: { K: [0, 0], DL: [-0.3, 0.9], DR: [-0.3, -0.9], SR: [3.4, -1] },
      trailer: { K: [0, 0], AL: [-7.6, 1], AR: [-7.6, -1] },
    } as const;
    const asked = [
      ['tractor', 'DL'],
      ['tractor', 'DR'],
      ['tractor', 'SR'],
      ['trailer', 'AL'],
      ['trailer', 'AR'],
    ] as const;
    const noise = [0.004, -0.007, 0.006, 0.003, -0.005];
    const solution = solveInstant({
      format: 'centrode.motion-problem/1',
      bodies: (['tractor', 'trailer'] as const).map((id) => ({
        id,
        pose: { x: 5, y: 1, heading: headings[id] },
        points: Object.fromEntries(
          Object.entries(points[id]).map(([name, [x, y]]) => [name, [x, y] as [number, number]]),
        ),
      })),
      joints: [
        {
          id: 'pin',
          kind: 'pin',
          a: { body: 'tractor', point: 'K' },
          b: { body: 'trailer', point: 'K' },
        },
      ],
      knowns: asked.map(([body, point], i) => {
        const [x, y] = (points[body] as Record<string, readonly [number, number]>)[point];
        const [c, s] = [Math.cos(headings[body]), Math.sin(headings[body])];
        const [vx, vy, omega] = motions[body];
        const velocity = [vx - omega * (s * x + c * y), vy + omega * (c * x - s * y)];
        return {
          id: `d${i}`,
          quantity: 'velocity',
          at: { body, point },
          direction: Math.atan2(velocity[1], velocity[0]) + noise[i],
          sigma: { direction: 0.01 },
        };
      }),
    });
    expect(solution.status).toBe('under-determined');
    expect(solution.branches[0]?.points['tractor.K'].speed ?? null).toBeNull();
    expect(solution.helps.join(' ')).toMatch(/magnitude|angular/);
  });
});
