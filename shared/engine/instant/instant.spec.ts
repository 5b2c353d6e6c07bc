import { describe, expect, it } from '@jest/globals';
import * as fc from 'fast-check';
import { motionProblem } from '../documents/motion-problem';
import type { MotionProblem } from '../documents/motion-problem';
import type { MotionSolution } from '../documents/motion-solution';
import { motionSolution } from '../documents/motion-solution';
import { rotate } from '../geometry/vector';
import { solveInstant, velocityOf } from './index';
import type { Linkage } from './testing/random-linkage';
import { derivatives, drawFrom, randomLinkage } from './testing/random-linkage';

/** Seeded, so that a failure repeats. */
const runs = { seed: 20261201, numRuns: 150 };

const drawn = fc.record({ seed: fc.integer(), count: fc.integer({ min: 1, max: 5 }) });

const linkageOf = ({ seed, count }: { seed: number; count: number }): Linkage =>
  randomLinkage(drawFrom(seed), count);

/** Positions in which rounding is not magnified beyond what a comparison can bear. */
const isFair = (solution: MotionSolution): boolean =>
  solution.branches.length > 0 && (solution.condition ?? Infinity) < 300;

const close = (got: number | null, want: number, size: number): void => {
  expect(Math.abs((got ?? NaN) - want)).toBeLessThanOrEqual(2e-6 * Math.max(1, size));
};

const solveFair = (problem: MotionProblem): MotionSolution | null => {
  const solution = solveInstant(problem);
  return isFair(solution) ? solution : null;
};

describe('the instant of random linkages with all joints', () => {
  it('has the velocities and accelerations of the motion that the joints were taken from', () => {
    let fair = 0;
    fc.assert(
      fc.property(drawn, (drawing) => {
        const { problem, motions } = linkageOf(drawing);
        const solution = solveFair(problem);
        if (solution === null) return;
        fair++;
        expect(solution.status).toBe('determined');
        const [branch] = solution.branches;
        for (const [id, motion] of motions) {
          const body = branch.bodies[id];
          const [vx, ax] = derivatives((t) => motion(t).x);
          const [vy, ay] = derivatives((t) => motion(t).y);
          const [omega, alpha] = derivatives((t) => motion(t).heading);
          const speeds = Math.max(...[vx, vy, omega].map(Math.abs));
          const changes = Math.max(...[ax, ay, alpha].map(Math.abs), speeds ** 2);
          close(body.omega, omega, speeds);
          close(body.velocity?.[0] ?? null, vx, speeds);
          close(body.velocity?.[1] ?? null, vy, speeds);
          close(body.alpha, alpha, 100 * changes);
          close(body.acceleration?.[0] ?? null, ax, 100 * changes);
          close(body.acceleration?.[1] ?? null, ay, 100 * changes);
        }
      }),
      runs,
    );
    expect(fair).toBeGreaterThan(runs.numRuns / 2);
  });

  it('has poles without velocity, and acceleration poles without acceleration', () => {
    fc.assert(
      fc.property(drawn, (drawing) => {
        const { problem } = linkageOf(drawing);
        const solution = solveFair(problem);
        if (solution === null) return;
        for (const { id, pose } of problem.bodies) {
          const body = solution.branches[0].bodies[id];
          const at = (pole: [number, number] | null) => {
            if (pole === null) return null;
            const point = rotate(-pose.heading, [pole[0] - pose.x, pole[1] - pose.y]);
            return velocityOf(problem, solution, 0, { body: id, point });
          };
          const still = at(body.pole);
          const speed = Math.hypot(...(body.velocity ?? [0, 0]));
          if (still !== null) {
            const left = Math.hypot(...(still.velocity ?? [NaN]));
            expect(left).toBeLessThan(1e-9 * Math.max(1, speed));
          }
          const steady = at(body.accelerationPole);
          const size = Math.hypot(...(body.acceleration ?? [0, 0]));
          if (steady !== null) {
            const left = Math.hypot(...(steady.acceleration ?? [NaN]));
            expect(left).toBeLessThan(1e-8 * Math.max(1, size));
          }
        }
      }),
      runs,
    );
  });

  it('keeps the distance of points of one body: relative velocity is across their line', () => {
    fc.assert(
      fc.property(drawn, (drawing) => {
        const { problem } = linkageOf(drawing);
        const solution = solveFair(problem);
        if (solution === null) return;
        const { points } = solution.branches[0];
        for (const { id, points: own } of problem.bodies) {
          const [a, b] = Object.keys(own).map((name) => points[`${id}.${name}`]);
          if (b === undefined || a.velocity === null || b.velocity === null) continue;
          const r = [b.position[0] - a.position[0], b.position[1] - a.position[1]];
          const v = [b.velocity[0] - a.velocity[0], b.velocity[1] - a.velocity[1]];
          const along = r[0] * v[0] + r[1] * v[1];
          expect(Math.abs(along)).toBeLessThan(1e-9 * (1 + Math.hypot(...v) * Math.hypot(...r)));
        }
      }),
      runs,
    );
  });

  it('does not depend on the scene frame, the order of bodies and joints, or the unit of length', () => {
    fc.assert(
      fc.property(drawn, fc.double({ min: -3, max: 3, noNaN: true }), (drawing, turn) => {
        const { problem } = linkageOf(drawing);
        const solution = solveFair(problem);
        if (solution === null) return;
        const moved = solveInstant(changeFrame(problem, turn, [3e4, -7e4], 1e3));
        const [before, after] = [solution.branches[0], moved.branches[0]];
        for (const { id } of problem.bodies) {
          const [a, b] = [before.bodies[id], after.bodies[id]];
          const [x, y] = rotate(turn, a.velocity ?? [NaN, NaN]);
          const rate = 1 + Math.abs(a.omega ?? 0) + Math.hypot(x, y);
          const change = 1e4 * (rate ** 2 + Math.abs(a.alpha ?? 0));
          close(b.omega, a.omega ?? NaN, 1e-2 * rate);
          close(b.alpha, a.alpha ?? NaN, 1e-2 * change);
          close((b.velocity?.[0] ?? NaN) / 1e3, x, 1e-2 * rate);
          close((b.velocity?.[1] ?? NaN) / 1e3, y, 1e-2 * rate);
        }
      }),
      { ...runs, numRuns: 80 },
    );
  });

  it('is written as documents that their schemas accept', () => {
    fc.assert(
      fc.property(drawn, (drawing) => {
        const { problem } = linkageOf(drawing);
        motionProblem.parse(problem);
        motionSolution.parse(solveInstant(problem));
      }),
      { ...runs, numRuns: 40 },
    );
  });
});

/** The same scene turned, shifted and in another unit of length, with everything in reverse order. */
const changeFrame = (
  problem: MotionProblem,
  turn: number,
  shift: [number, number],
  unit: number,
): MotionProblem => {
  const place = (p: readonly [number, number]): [number, number] => {
    const [x, y] = rotate(turn, p);
    return [unit * x + shift[0], unit * y + shift[1]];
  };
  const bodies = problem.bodies.map((b) => {
    const [x, y] = place([b.pose.x, b.pose.y]);
    const points = Object.entries(b.points).map(([name, p]) => {
      const at = Array.isArray(p) ? p : p.at;
      return [name, [unit * at[0], unit * at[1]]];
    });
    return {
      ...b,
      pose: { x, y, heading: b.pose.heading + turn },
      points: Object.fromEntries(points),
    };
  });
  const length = (v: number | null | undefined) => (typeof v === 'number' ? unit * v : v);
  const joints = problem.joints.map((j) => {
    if (j.kind === 'guide')
      return { ...j, direction: j.direction + turn, radius: length(j.radius) };
    if (j.kind === 'slot') return { ...j, radius: length(j.radius) };
    if (j.kind === 'link') {
      const rates = { rate: length(j.rate), rateChange: length(j.rateChange) };
      const end = j.groundPoint === undefined ? {} : { groundPoint: place(j.groundPoint) };
      return { ...j, ...rates, ...end };
    }
    if (j.kind !== 'roll') return j;
    const surface = j.surface === undefined ? {} : { surface: j.surface + turn };
    const other = j.otherRadius === undefined ? {} : { otherRadius: unit * j.otherRadius };
    const radii = { radius: unit * j.radius, surfaceRadius: length(j.surfaceRadius) };
    return { ...j, ...surface, ...other, ...radii };
  });
  const knowns = problem.knowns.map((k) => {
    if (k.quantity !== 'velocity' && k.quantity !== 'acceleration') return k;
    const turned = k.direction === undefined ? {} : { direction: k.direction + turn };
    const bent =
      'curvature' in k && k.curvature !== undefined
        ? { curvature: { value: k.curvature.value / unit } }
        : {};
    if (k.components === undefined) return { ...k, ...turned, ...bent };
    const [x, y] = rotate(turn, k.components);
    return { ...k, components: [unit * x, unit * y] as [number, number] };
  });
  return {
    ...problem,
    closureTolerance: 1,
    bodies: bodies.reverse(),
    joints: joints.reverse(),
    knowns: knowns.reverse(),
  };
};
