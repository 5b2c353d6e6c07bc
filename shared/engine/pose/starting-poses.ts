import type { PoseProblem } from '../documents/pose-problem';
import { add, norm, rotate, subtract, type Pose, type Vector } from '../geometry/vector';
import { bodySlot, type Layout } from './layout';
import { rigidFit } from './rigid-fit';

/** A body point and where in the scene it is known to have stood. */
interface Pair {
  readonly b: Vector;
  readonly at: Vector;
  readonly weight: number;
}

/** Headings tried for a body whose heading nothing gives at once, and sets tried in all. */
const headingsTried = 8;
const mostStarts = 64;

/**
 * Sets of poses to start the fit from. Where marks, stated poses and the pins between bodies give
 * every pose, there is one; a body that they leave open is tried at several headings.
 */
export function startingPoses(
  problem: PoseProblem,
  layout: Layout,
): readonly ReadonlyMap<string, Pose>[] {
  const first = spreadOut(problem, layout, () => null);
  if (first.open.length === 0) return [first.poses];
  const starts: ReadonlyMap<string, Pose>[] = [];
  const perBody = Math.max(
    2,
    Math.min(headingsTried, Math.floor(mostStarts ** (1 / first.open.length))),
  );
  const count = Math.min(mostStarts, perBody ** first.open.length);
  for (let k = 0; k < count; k++) {
    const turns = new Map(
      first.open.map((id, i) => [
        id,
        (2 * Math.PI * ((Math.floor(k / perBody ** i) + 0.37) % perBody)) / perBody,
      ]),
    );
    starts.push(spreadOut(problem, layout, (id) => turns.get(id) ?? 0).poses);
  }
  return starts;
}

/** Poses one after the other: each body from what is known when its turn comes. */
function spreadOut(
  problem: PoseProblem,
  layout: Layout,
  headingOf: (body: string) => number | null,
): { poses: Map<string, Pose>; open: string[] } {
  const poses = new Map<string, Pose>();
  const open: string[] = [];
  const waiting = new Set(problem.bodies.map((body) => body.id));
  while (waiting.size > 0) {
    const ranked = [...waiting]
      .map((id) => ({ id, ...evidence(problem, layout, poses, id) }))
      .sort((a, b) => b.rank - a.rank);
    const [next] = ranked;
    waiting.delete(next.id);
    if (next.rank < 2) open.push(next.id);
    const pose = poseOf(next, headingOf(next.id) ?? next.heading ?? 0, layout);
    poses.set(next.id, pose);
  }
  return { poses, open };
}

interface Evidence {
  readonly pairs: readonly Pair[];
  readonly heading: number | null;
  /** 2 and more: the pose follows. 1: only a place or a heading. 0: nothing. */
  readonly rank: number;
}

function evidence(
  problem: PoseProblem,
  layout: Layout,
  poses: ReadonlyMap<string, Pose>,
  id: string,
): Evidence {
  const slot = bodySlot(layout, id);
  const at = (point: string): Vector => slot.points.get(point)?.at ?? [0, 0];
  const pairs: Pair[] = [];
  let heading: number | null = null;
  for (const mark of problem.marks) {
    if (mark.body !== id) continue;
    const weight = 1 / (mark.covariance[0][0] + mark.covariance[1][1]);
    if (mark.line === undefined) pairs.push({ b: at(mark.point), at: mark.at, weight });
    if (mark.tangent !== undefined && mark.tangent.line !== true)
      heading = mark.tangent.direction - (mark.tangent.along ?? 0);
  }
  const stated = problem.bodies.find((body) => body.id === id)?.stated;
  if (stated?.x && stated.y)
    pairs.push({ b: [0, 0], at: [stated.x.value, stated.y.value], weight: 1 });
  if (stated?.heading) heading = stated.heading.value;
  const weight = pairs.reduce((most, pair) => Math.max(most, pair.weight), 1);
  for (const joint of problem.joints) {
    if (joint.kind !== 'pin' && joint.kind !== 'weld') continue;
    if (joint.a.body === id && joint.kind === 'pin' && joint.at !== undefined)
      pairs.push({ b: at(joint.a.point), at: joint.at, weight });
    if (joint.b === undefined) continue;
    for (const [own, other, sense] of [
      [joint.a, joint.b, -1],
      [joint.b, joint.a, 1],
    ] as const) {
      const known = poses.get(other.body);
      if (own.body !== id || known === undefined) continue;
      const there = bodySlot(layout, other.body).points.get(other.point)?.at ?? [0, 0];
      const where = add([known.x, known.y], rotate(known.heading, there));
      pairs.push({ b: at(own.point), at: where, weight });
      if (joint.kind === 'weld' && joint.angle !== undefined)
        heading = known.heading + sense * joint.angle;
    }
  }
  return { pairs, heading, rank: rankOf(pairs, heading) };
}

function rankOf(pairs: readonly Pair[], heading: number | null): number {
  if (pairs.length === 0) return heading === null ? 0 : 1;
  const apart = pairs.some(({ b }) => norm(subtract(b, pairs[0].b)) > 1e-6);
  if (apart) return 1 + pairs.length;
  return heading === null ? 1 : 2;
}

function poseOf(known: Evidence & { id: string }, heading: number, layout: Layout): Pose {
  const { pairs } = known;
  if (pairs.length === 0) return { x: layout.centre[0], y: layout.centre[1], heading };
  if (known.rank > 2) {
    const fit = rigidFit(
      Float64Array.from(pairs.flatMap(({ b }) => b)),
      Float64Array.from(pairs.flatMap(({ at }) => at)),
      Float64Array.from(pairs, ({ weight }) => weight),
    );
    return { x: fit.x, y: fit.y, heading: fit.heading };
  }
  const [x, y] = subtract(pairs[0].at, rotate(heading, pairs[0].b));
  return { x, y, heading };
}
