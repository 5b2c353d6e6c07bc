import type { PosePoint, PosePointReference, PoseProblem } from '../documents/pose-problem';
import { add, dot, rotate, turnLeft, unit, type Pose, type Vector } from '../geometry/vector';

/**
 * The unknowns of a pose fit in one array: x, y and heading of each body, then the uncertain
 * dimensions. All are lengths in m (a heading is multiplied by the size of its body), and scene
 * positions are taken from the middle of the scene, so that the numbers are of like size.
 */
export interface Layout {
  readonly size: number;
  readonly centre: Vector;
  readonly bodies: ReadonlyMap<string, BodySlot>;
}

export interface BodySlot {
  readonly id: string;
  /** Place of x in the array; y and heading follow. */
  readonly index: number;
  /** Length that a heading is multiplied by, m. */
  readonly arm: number;
  readonly points: ReadonlyMap<string, PointSlot>;
}

export interface PointSlot {
  readonly at: Vector;
  readonly sigma: Vector;
  /** Places of the coordinates in the array; null where the dimension is exact. */
  readonly index: readonly [number | null, number | null];
}

/** Place and standard uncertainties of a body point, in either way of writing it. */
export function dimension(point: PosePoint): { at: Vector; sigma: Vector } {
  if (Array.isArray(point)) return { at: point, sigma: [0, 0] };
  return { at: point.at, sigma: point.sigma ?? [0, 0] };
}

export function layOut(problem: PoseProblem): Layout {
  let size = 3 * problem.bodies.length;
  const slot = (sigma: number): number | null => (sigma > 0 ? size++ : null);
  const bodies = new Map<string, BodySlot>();
  problem.bodies.forEach((body, i) => {
    const points = new Map<string, PointSlot>();
    let square = 0;
    for (const [name, given] of Object.entries(body.points)) {
      const { at, sigma } = dimension(given);
      points.set(name, { at, sigma, index: [slot(sigma[0]), slot(sigma[1])] });
      square = Math.max(square, dot(at, at));
    }
    bodies.set(body.id, { id: body.id, index: 3 * i, arm: Math.sqrt(square) || 1, points });
  });
  return { size, centre: middle(problem), bodies };
}

function middle(problem: PoseProblem): Vector {
  const places: Vector[] = problem.marks.map((mark) => mark.at);
  for (const joint of problem.joints) if ('at' in joint && joint.at) places.push(joint.at);
  for (const { stated } of problem.bodies)
    if (stated?.x && stated.y) places.push([stated.x.value, stated.y.value]);
  const n = places.length || 1;
  const sum = places.reduce<Vector>((total, place) => add(total, place), [0, 0]);
  return [sum[0] / n, sum[1] / n];
}

/** Unknowns with the given poses (null: the middle, heading 0) and the dimensions as given. */
export function unknownsFrom(layout: Layout, poses: ReadonlyMap<string, Pose>): Float64Array {
  const x = new Float64Array(layout.size);
  for (const slot of layout.bodies.values()) {
    const pose = poses.get(slot.id);
    if (pose !== undefined) {
      x[slot.index] = pose.x - layout.centre[0];
      x[slot.index + 1] = pose.y - layout.centre[1];
      x[slot.index + 2] = pose.heading * slot.arm;
    }
    for (const point of slot.points.values())
      point.index.forEach((index, k) => {
        if (index !== null) x[index] = point.at[k];
      });
  }
  return x;
}

export function poseFrom(layout: Layout, slot: BodySlot, x: Float64Array): Pose {
  return {
    x: x[slot.index] + layout.centre[0],
    y: x[slot.index + 1] + layout.centre[1],
    heading: x[slot.index + 2] / slot.arm,
  };
}

/** A body point where the unknowns put it, and how it moves with them. */
export interface Place {
  readonly slot: BodySlot;
  readonly heading: number;
  /** From the middle of the scene, m. */
  readonly at: Vector;
  /** Adds the derivative of a scalar whose gradient by this point's place is `gradient`. */
  spread(into: Float64Array, gradient: Vector): void;
  /** Adds the derivative of a scalar whose derivative by the body's heading is `slope`. */
  turn(into: Float64Array, slope: number): void;
}

export function bodySlot(layout: Layout, id: string): BodySlot {
  const slot = layout.bodies.get(id);
  if (slot === undefined) throw new RangeError(`no body ${id}`);
  return slot;
}

export function place(layout: Layout, x: Float64Array, ref: PosePointReference): Place {
  const slot = bodySlot(layout, ref.body);
  const point = slot.points.get(ref.point);
  if (point === undefined) throw new RangeError(`no point ${ref.body}.${ref.point}`);
  const [ix, iy] = point.index;
  const b: Vector = [ix === null ? point.at[0] : x[ix], iy === null ? point.at[1] : x[iy]];
  return placeOf(slot, x, b, point.index);
}

export function placeOf(
  slot: BodySlot,
  x: Float64Array,
  b: Vector,
  index: PointSlot['index'] = [null, null],
): Place {
  const heading = x[slot.index + 2] / slot.arm;
  const arm = rotate(heading, b);
  const forward = unit(heading);
  return {
    slot,
    heading,
    at: [x[slot.index] + arm[0], x[slot.index + 1] + arm[1]],
    spread: (into, gradient) => {
      into[slot.index] += gradient[0];
      into[slot.index + 1] += gradient[1];
      into[slot.index + 2] += dot(gradient, turnLeft(arm)) / slot.arm;
      if (index[0] !== null) into[index[0]] += dot(gradient, forward);
      if (index[1] !== null) into[index[1]] += dot(gradient, turnLeft(forward));
    },
    turn: (into, slope) => {
      into[slot.index + 2] += slope / slot.arm;
    },
  };
}
