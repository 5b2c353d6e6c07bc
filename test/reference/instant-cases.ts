import type { MotionProblem } from '#shared/engine/documents/motion-problem';
import type { MotionSolution } from '#shared/engine/documents/motion-solution';
import { solveInstant } from '#shared/engine/instant/index';
import { caseFile, expectClose } from './case-file';

/** Builders of motion problems for the check cases; lengths in m, angles in degrees. */
type Body = MotionProblem['bodies'][number];
type Pair = [number, number];

export const radians = (degrees: number): number => (degrees * Math.PI) / 180;
export const degrees = (angle: number): number => (angle * 180) / Math.PI;

export const problemOf = (
  bodies: MotionProblem['bodies'],
  joints: MotionProblem['joints'],
  knowns: MotionProblem['knowns'],
): MotionProblem => ({ format: 'centrode.motion-problem/1', bodies, joints, knowns });

export const bodyAt = (id: string, at: Pair, heading: number, points: Body['points']): Body => ({
  id,
  pose: { x: at[0], y: at[1], heading },
  points,
});

/** A bar with its ends and, at will, further points at a distance from the first end. */
export const bar = (
  id: string,
  from: readonly [string, Pair],
  to: readonly [string, Pair],
  more: Record<string, number> = {},
): Body => {
  const [[first, a], [last, b]] = [from, to];
  const heading = Math.atan2(b[1] - a[1], b[0] - a[0]);
  const points: Body['points'] = {
    [first]: [0, 0],
    [last]: [Math.hypot(b[0] - a[0], b[1] - a[1]), 0],
  };
  for (const [name, distance] of Object.entries(more)) points[name] = [distance, 0];
  return bodyAt(id, a, heading, points);
};

export const at = (body: string, point: string) => ({ body, point });

export const grounded = (id: string, body: string, point: string) =>
  ({ id, kind: 'pin', a: at(body, point), ground: true }) as const;

export const pinned = (id: string, first: string, second: string, point: string) =>
  ({ id, kind: 'pin', a: at(first, point), b: at(second, point) }) as const;

export const turning = (id: string, body: string, omega: number, alpha: number) => [
  { id, quantity: 'angular-velocity' as const, body, value: omega },
  { id: `${id}-rate`, quantity: 'angular-acceleration' as const, body, value: alpha },
];

export const moving = (id: string, body: string, point: string, v: Pair, a: Pair) => [
  { id, quantity: 'velocity' as const, at: at(body, point), components: v },
  { id: `${id}-rate`, quantity: 'acceleration' as const, at: at(body, point), components: a },
];

/** The only branch, with the quantities under the names that the case files use. */
export const quantitiesOf = (solution: MotionSolution): Record<string, number> => {
  const [branch] = solution.branches;
  const found: Record<string, number> = {};
  const put = (name: string, value: number | null | undefined): void => {
    if (value !== null && value !== undefined) found[name] = value;
  };
  for (const [id, b] of Object.entries(branch.bodies)) {
    put(`w.${id}`, b.omega);
    put(`al.${id}`, b.alpha);
    put(`x.IC_${id}`, b.pole?.[0]);
    put(`y.IC_${id}`, b.pole?.[1]);
  }
  for (const [id, p] of Object.entries(branch.points)) {
    const name = id.slice(id.indexOf('.') + 1);
    put(`vx.${name}`, p.velocity?.[0]);
    put(`vy.${name}`, p.velocity?.[1]);
    put(`ax.${name}`, p.acceleration?.[0]);
    put(`ay.${name}`, p.acceleration?.[1]);
    put(`x.${name}`, p.position[0]);
    put(`y.${name}`, p.position[1]);
  }
  return found;
};

/** Solves, and holds every expected value of that name, or of its name in `also`, to the case. */
export const expectCase = (
  id: string,
  problem: MotionProblem,
  also: (solution: MotionSolution) => Record<string, number> = () => ({}),
): MotionSolution => {
  const check = caseFile<unknown, Record<string, number>>(id);
  const solution = solveInstant(problem);
  const found = { ...quantitiesOf(solution), ...also(solution) };
  for (const [name, value] of Object.entries(check.expected)) {
    if (!(name in found)) throw new Error(`${id} expects ${name}, which the test does not compute`);
    expectClose(found[name], value, check.tolerance);
  }
  return solution;
};
