import type {
  PlanBody,
  PlanCentre,
  PlanGuide,
  PlanJoint,
  PlanMark,
  PlanPoint,
} from './plan-content';

export type Extent = readonly [left: number, bottom: number, right: number, top: number];

/** What may be shown whole. */
export interface Extended {
  readonly marks: readonly PlanMark[];
  readonly bodies: readonly PlanBody[];
  readonly guides: readonly PlanGuide[];
  readonly joints: readonly PlanJoint[];
  readonly centres: readonly PlanCentre[];
}

/** The rectangle that holds everything, or null when there is nothing. */
export function extentOf({ marks, bodies, guides, joints, centres }: Extended): Extent | null {
  const extent = around([
    ...marks.map((mark) => mark.at),
    ...bodies.flatMap((body) => [...body.outline, ...body.points.map((point) => point.at)]),
    ...guides.flatMap((guide) => guide.path),
    ...joints.map((joint) => joint.at),
  ]);
  if (extent === null) return around(centres.map((centre) => centre.at));
  // An instantaneous centre may lie kilometres away; then it would shrink the scene to a dot.
  const [left, bottom, right, top] = extent;
  const size = Math.max(right - left, top - bottom);
  const near = centres
    .map((centre) => centre.at)
    .filter(([x, y]) => x > left - size && x < right + size && y > bottom - size && y < top + size);
  return around([[left, bottom], [right, top], ...near]);
}

function around(points: readonly PlanPoint[]): Extent | null {
  if (points.length === 0) return null;
  let [left, bottom, right, top] = [Infinity, Infinity, -Infinity, -Infinity];
  for (const [x, y] of points) {
    left = Math.min(left, x);
    right = Math.max(right, x);
    bottom = Math.min(bottom, y);
    top = Math.max(top, y);
  }
  return [left, bottom, right, top];
}
