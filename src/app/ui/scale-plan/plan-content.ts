import type { MarkKind } from '#shared/contracts/survey';

/** A point of the scene: metres, x and y of the scene frame. */
export type PlanPoint = readonly [number, number];

/** A measured mark; the contract's `Mark` fits as it is. */
export interface PlanMark {
  readonly id: string;
  readonly label: string;
  readonly kind: MarkKind;
  readonly at: PlanPoint;
  /** m²; null where it is not known, then no ellipse is drawn. */
  readonly covariance: readonly [PlanPoint, PlanPoint] | null;
  readonly trace: string | null;
  readonly order: number | null;
}

/** A mark that is a line: its points in order. `tracesOf` makes them from marks. */
export interface PlanTrace {
  readonly id: string;
  readonly label: string;
  readonly path: readonly PlanPoint[];
  /** A line of the ground (road edge, line marking), not of the incident. */
  readonly ground?: boolean;
}

/** A body where it stands: its outline is given in scene coordinates, not in the body frame. */
export interface PlanBody {
  readonly id: string;
  readonly label: string;
  readonly outline: readonly PlanPoint[];
  /** Body points that are shown by name, in scene coordinates. */
  readonly points: readonly { readonly label: string; readonly at: PlanPoint }[];
  /** A ghost is the same body at another station: dashed, not filled. */
  readonly ghost: boolean;
}

export type PlanVectorKind = 'velocity' | 'relative' | 'acceleration';

/** A vector at the point where it acts. The plan chooses the scale of each kind and states it. */
export interface PlanVector {
  readonly id: string;
  readonly kind: PlanVectorKind;
  readonly from: PlanPoint;
  /** Components along scene x and y: m/s, or m/s² for an acceleration. */
  readonly value: PlanPoint;
  readonly label: string;
}

/** An instantaneous centre; a dotted line joins it with `of`, a point of its body. */
export interface PlanCentre {
  readonly id: string;
  readonly label: string;
  readonly at: PlanPoint;
  readonly of: PlanPoint | null;
}

/** The path along which a point is guided, or any other line of construction. */
export interface PlanGuide {
  readonly id: string;
  readonly label: string;
  readonly path: readonly PlanPoint[];
}

export interface PlanJoint {
  readonly id: string;
  readonly kind: 'pin' | 'ground-pin' | 'weld' | 'slot' | 'wheel' | 'roll';
  readonly at: PlanPoint;
  readonly label: string;
}

/** A mark that is being dragged; `settled` is true when it is let go. */
export interface PlanMove {
  readonly markId: string;
  readonly at: PlanPoint;
  readonly settled: boolean;
}

/*
 * The plan, `ui-scale-plan` (class ScalePlan in ./scale-plan):
 *
 *   <ui-scale-plan
 *     label="Plan of the marks"          what it shows, for those who do not see it; required
 *     [marks]="marks()" [traces]="tracesOf(marks())" [bodies] [vectors] [centres] [guides] [joints]
 *     [(selected)]="markId"              id of the selected mark or null
 *     [highlighted]="ids"                ids of marks that are ringed besides
 *     [xAxisBearing]="file.xAxisBearing" bearing of +x in rad, clockwise from north, for the north arrow;
 *                                        null (machines): the axes are shown instead
 *     [feet]="true"                      a scale bar in feet beside the one in metres
 *     [ellipseScale]="1"                 exaggeration of the 95 % ellipses; 0 hides them
 *     [largest]="{ velocity: 20 }"       magnitudes to come, m/s and m/s²: one scale while a motion plays
 *     [movable]="true" (moved)="…"       marks may be dragged: PlanMove
 *     (pointed)="…"                      an empty place was clicked: PlanPoint
 *   />
 *
 * Content that is empty may be left out. `fit()` shows everything.
 */

/**
 * The traces that the marks form, each in its order. Where some marks of a trace have a place in it,
 * the others lie somewhere on the line and do not draw it; where none has, list order is taken.
 */
export function tracesOf(marks: readonly PlanMark[]): PlanTrace[] {
  const traces = new Map<string, PlanMark[]>();
  for (const mark of marks) {
    if (mark.trace === null) continue;
    const members = traces.get(mark.trace);
    if (members) members.push(mark);
    else traces.set(mark.trace, [mark]);
  }
  return [...traces].map(([name, members]) => {
    const placed = members.filter((mark) => mark.order !== null);
    const path = placed.length > 0 ? placed.sort(byOrder) : members;
    return {
      id: name,
      label: name,
      path: path.map((mark) => mark.at),
      ground: members.every(({ kind }) => kind === 'road edge' || kind === 'line marking'),
    };
  });
}

const byOrder = (a: PlanMark, b: PlanMark): number => (a.order ?? 0) - (b.order ?? 0);
