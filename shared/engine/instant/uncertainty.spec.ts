import { describe, expect, it } from '@jest/globals';
import * as fc from 'fast-check';
import type { MotionProblem } from '../documents/motion-problem';
import type { MotionSolution } from '../documents/motion-solution';
import { relativeMotion, solveInstant, velocityOf } from './index';
import { drawFrom, randomLinkage } from './testing/random-linkage';

type Change = (problem: MotionProblem, by: number) => void;

/** Everything of a problem that may be uncertain: how to state it, and how to change it. */
interface Input {
  readonly state: (problem: MotionProblem, sigma: number) => void;
  readonly change: Change;
}

const copy = (problem: MotionProblem): MotionProblem => structuredClone(problem);

/** One uncertain heading, one uncertain point of it, and one uncertain number of each joint and known. */
const inputsOf = (problem: MotionProblem): Input[] => {
  const inputs: Input[] = [];
  problem.bodies.forEach((body, b) => {
    inputs.push({
      state: (p, sigma) => {
        p.bodies[b].poseCovariance = [
          [0, 0, 0],
          [0, 0, 0],
          [0, 0, sigma ** 2],
        ];
      },
      change: (p, by) => {
        p.bodies[b].pose.heading += by;
      },
    });
    const [name] = Object.keys(body.points);
    if (name === undefined) return;
    const place = (p: MotionProblem): [number, number] => {
      const point = p.bodies[b].points[name];
      return Array.isArray(point) ? point : point.at;
    };
    inputs.push({
      state: (p, sigma) => {
        p.bodies[b].points[name] = { at: place(p), sigma: [0, sigma] };
      },
      change: (p, by) => {
        const [x, y] = place(p);
        p.bodies[b].points[name] = [x, y + by];
      },
    });
  });
  problem.joints.forEach((joint, j) => {
    const at = (p: MotionProblem) => p.joints[j];
    const fields: Partial<Record<typeof joint.kind, readonly string[]>> = {
      guide: ['direction'],
      slot: ['direction'],
      link: ['rate', 'rateChange'],
      wheel: ['steer', 'steerRate'],
    };
    for (const field of fields[joint.kind] ?? [])
      inputs.push({
        state: (p, sigma) => {
          const given = at(p);
          Object.assign(given, {
            sigma: { ...('sigma' in given ? given.sigma : {}), [field]: sigma },
          });
        },
        change: (p, by) => {
          const given: Record<string, unknown> = at(p);
          given[field] = Number(given[field]) + by;
        },
      });
  });
  problem.knowns.forEach((known, k) => {
    inputs.push({
      state: (p, sigma) => {
        const given = p.knowns[k];
        if (known.quantity === 'velocity' || known.quantity === 'acceleration')
          Object.assign(given, {
            sigma: known.direction === undefined ? [sigma, 0] : { direction: sigma },
          });
        else Object.assign(given, { sigma });
      },
      change: (p, by) => {
        const given = p.knowns[k];
        if ('value' in given) given.value += by;
        else if (given.components !== undefined)
          given.components = [given.components[0] + by, given.components[1]];
        else given.direction = (given.direction ?? 0) + by;
      },
    });
  });
  return inputs;
};

const figuresOf = (solution: MotionSolution): number[] => {
  const [branch] = solution.branches;
  return Object.values(branch.points).flatMap((p) => [
    ...(p.velocity ?? [NaN, NaN]),
    ...(p.acceleration ?? [NaN, NaN]),
  ]);
};

const sigmasOf = (solution: MotionSolution): number[] => {
  const [branch] = solution.branches;
  return Object.values(branch.points).flatMap(({ covariance: { velocity, acceleration } }) =>
    [velocity, acceleration].flatMap((c) => [0, 1].map((i) => Math.sqrt(c?.[i][i] ?? NaN))),
  );
};

describe('uncertainty of an instant', () => {
  it('of every input equals the difference of solutions with the input changed', () => {
    let compared = 0;
    const drawn = fc.record({ seed: fc.integer(), count: fc.integer({ min: 1, max: 4 }) });
    fc.assert(
      fc.property(drawn, ({ seed, count }) => {
        const { problem } = randomLinkage(drawFrom(seed), count);
        // Inputs are changed one at a time, so the parts no longer meet exactly.
        problem.closureTolerance = 1;
        const first = solveInstant(problem);
        if (first.status !== 'determined' || (first.condition ?? Infinity) > 50) return;
        for (const input of inputsOf(problem)) {
          const stated = copy(problem);
          input.state(stated, 1e-4);
          const sigmas = sigmasOf(solveInstant(stated));
          const h = 1e-5;
          const [up, down] = [h, -h].map((by) => {
            const changed = copy(problem);
            input.change(changed, by);
            return figuresOf(solveInstant(changed));
          });
          const size = Math.max(...figuresOf(first).map(Math.abs));
          sigmas.forEach((sigma, i) => {
            const expected = (1e-4 * Math.abs(up[i] - down[i])) / (2 * h);
            expect(Math.abs(sigma - expected)).toBeLessThan(2e-4 * expected + 1e-9 * (1 + size));
          });
          compared++;
        }
      }),
      { seed: 11, numRuns: 25 },
    );
    expect(compared).toBeGreaterThan(60);
  });

  const tractor = (): MotionProblem => ({
    format: 'centrode.motion-problem/1',
    bodies: [
      {
        id: 'tractor',
        pose: { x: 0, y: 0, heading: 0.1 },
        points: { rear: [0, 0], K: [0.6, 0] },
      },
      {
        id: 'trailer',
        pose: { x: 0.6 * Math.cos(0.1), y: 0.6 * Math.sin(0.1), heading: -0.2 },
        points: { K: [0, 0], axle: [-8, 0] },
      },
    ],
    joints: [
      {
        id: 'K',
        kind: 'pin',
        a: { body: 'tractor', point: 'K' },
        b: { body: 'trailer', point: 'K' },
      },
      { id: 'rear', kind: 'wheel', a: { body: 'tractor', point: 'rear' } },
      { id: 'axle', kind: 'wheel', a: { body: 'trailer', point: 'axle' } },
    ],
    knowns: [
      { id: 'speed', quantity: 'slide-rate', joint: 'rear', value: 6, sigma: 0.2 },
      { id: 'yaw', quantity: 'angular-velocity', body: 'tractor', value: 0.3, sigma: 0.02 },
    ],
  });

  it('of headings that were fitted together takes their correlation into account', () => {
    // The trailer turns by sin(γ) of its kingpin's speed: only the difference of headings matters.
    const together = (correlation: number): number => {
      const problem = tractor();
      const c = correlation * 0.01 ** 2;
      const matrix = Array.from({ length: 6 }, () => [0, 0, 0, 0, 0, 0]);
      matrix[2][2] = matrix[5][5] = 0.01 ** 2;
      matrix[2][5] = matrix[5][2] = c;
      problem.poseCovariance = { bodies: ['tractor', 'trailer'], matrix };
      problem.knowns.forEach((k) => Object.assign(k, { sigma: 0 }));
      return solveInstant(problem).branches[0].bodies['trailer'].sigma.omega ?? NaN;
    };
    expect(together(1)).toBeLessThan(1e-9);
    expect(together(0)).toBeGreaterThan(1e-3);
    expect(together(-1)).toBeCloseTo(Math.SQRT2 * together(0), 12);
  });

  it('of the relative motion of two points falls where they share their uncertainty', () => {
    const problem = tractor();
    const solution = solveInstant(problem);
    const a = { body: 'tractor', point: 'K' };
    const b = { body: 'trailer', point: 'K' };
    const pinned = relativeMotion(problem, solution, 0, a, b, 0.3);
    expect(Math.abs(pinned.closing ?? NaN)).toBeLessThan(1e-12);
    expect(Math.sqrt(pinned.covariance[0][0])).toBeLessThan(1e-12);

    const end = { body: 'trailer', point: 'axle' };
    const forth = relativeMotion(problem, solution, 0, a, end, 0.3);
    const back = relativeMotion(problem, solution, 0, end, a, 0.3);
    expect(back.closing).toBeCloseTo(-(forth.closing ?? NaN), 12);
    expect(back.sliding).toBeCloseTo(-(forth.sliding ?? NaN), 12);
    // Along the line of two points of a rigid body nothing closes.
    const rigid = relativeMotion(problem, solution, 0, { body: 'trailer', point: 'K' }, end);
    expect(Math.abs(rigid.closing ?? NaN)).toBeLessThan(1e-12);
    expect(() => relativeMotion(problem, solution, 0, a, b)).toThrow(
      expect.objectContaining({ code: 'coincident-points', field: 'normal' }),
    );
  });

  it('is the same for a named point and for its coordinates, also of a solution read from a file', () => {
    const problem = tractor();
    const solution = solveInstant(problem);
    const named = velocityOf(problem, solution, 0, { body: 'trailer', point: 'axle' });
    const { velocity, covariance } = solution.branches[0].points['trailer.axle'];
    expect(named.velocity).toEqual(velocity);
    expect(named.covariance.slice(0, 2).map((r) => r.slice(0, 2))).toEqual(covariance.velocity);
    const read: MotionSolution = JSON.parse(JSON.stringify(solution));
    const unnamed = velocityOf(problem, read, 0, { body: 'trailer', point: [-8, 0] });
    named.velocity?.forEach((v, i) => expect(unnamed.velocity?.[i]).toBeCloseTo(v, 12));
    // Accelerations were not asked for: they are not given.
    expect(unnamed.acceleration).toBeNull();
  });

  it('refuses a covariance that is none, and one for a pose that follows', () => {
    const faulty = tractor();
    faulty.bodies[0].poseCovariance = [
      [1, 2, 0],
      [2, 1, 0],
      [0, 0, 1],
    ];
    expect(() => solveInstant(faulty)).toThrow(
      expect.objectContaining({
        code: 'not-a-covariance',
        field: 'bodies.tractor.poseCovariance',
      }),
    );
    const following = tractor();
    following.bodies[1].poseFollows = true;
    following.bodies[1].poseCovariance = [
      [0, 0, 0],
      [0, 0, 0],
      [0, 0, 1e-4],
    ];
    expect(() => solveInstant(following)).toThrow(
      expect.objectContaining({ code: 'unsupported', field: 'bodies.trailer.poseCovariance' }),
    );
  });
});
