import type { PoseJoint } from '../documents/pose-problem';
import {
  add,
  dot,
  norm,
  rotate,
  scale,
  subtract,
  turnLeft,
  unit,
  wrap,
  type Vector,
} from '../geometry/vector';
import type { Row } from './equations';
import { place, type Layout, type Place } from './layout';

export interface JointRow {
  readonly of: string;
  readonly sigma: number;
  readonly evaluate: (x: Float64Array) => readonly Row[];
}

type Share = readonly [place: Place, gradient: Vector];

function row(layout: Layout, value: number, shares: readonly Share[]): Row {
  const gradient = new Float64Array(layout.size);
  for (const [where, by] of shares) where.spread(gradient, by);
  return { value, gradient };
}

const axes: readonly Vector[] = [
  [1, 0],
  [0, 1],
];

/** The scalar equations of a joint, each zero where the joint is closed. */
export function jointRows(layout: Layout, joint: PoseJoint): readonly JointRow[] {
  const of = `joints.${joint.id}`;
  const sigma = joint.sigma ?? 0;
  const { a } = joint;
  const one = (evaluate: (x: Float64Array) => Row): JointRow[] => [
    { of, sigma, evaluate: (x) => [evaluate(x)] },
  ];
  switch (joint.kind) {
    case 'pin':
      if (joint.b !== undefined) return coincidence(layout, of, sigma, a, joint.b);
      return axes.map((axis, k) => ({
        of,
        sigma,
        evaluate: (x) => {
          const where = place(layout, x, a);
          const at = (joint.at ?? layout.centre)[k] - layout.centre[k];
          return [row(layout, at - where.at[k], [[where, scale(-1, axis)]])];
        },
      }));
    case 'weld': {
      const rows = coincidence(layout, of, sigma, a, joint.b);
      const { angle } = joint;
      if (angle === undefined) return rows;
      return [
        ...rows,
        {
          of,
          sigma: joint.angleSigma ?? 0,
          evaluate: (x) => {
            const first = place(layout, x, a);
            const second = place(layout, x, joint.b);
            const gradient = new Float64Array(layout.size);
            first.turn(gradient, 1);
            second.turn(gradient, -1);
            return [{ value: wrap(angle - second.heading + first.heading), gradient }];
          },
        },
      ];
    }
    case 'guide': {
      const through = subtract(joint.at, layout.centre);
      const left = turnLeft(unit(joint.direction));
      return one((x) => {
        const where = place(layout, x, a);
        const path = pathRow(where.at, through, left, joint.radius ?? null);
        return row(layout, path.value, [[where, path.byPoint]]);
      });
    }
    case 'slot':
      return one((x) => {
        const pin = place(layout, x, a);
        const slot = place(layout, x, joint.b);
        const left = rotate(slot.heading, turnLeft(unit(joint.direction)));
        const path = pathRow(pin.at, slot.at, left, joint.radius ?? null);
        const result = row(layout, path.value, [
          [pin, path.byPoint],
          [slot, scale(-1, path.byPoint)],
        ]);
        slot.turn(result.gradient, dot(path.byLeft, turnLeft(left)));
        return result;
      });
    case 'link':
      return one((x) => {
        const first = place(layout, x, a);
        const second = place(layout, x, joint.b);
        const between = subtract(second.at, first.at);
        const length = norm(between);
        const along: Vector = length > 0 ? scale(1 / length, between) : [1, 0];
        return row(layout, joint.length - length, [
          [first, along],
          [second, scale(-1, along)],
        ]);
      });
  }
}

function coincidence(
  layout: Layout,
  of: string,
  sigma: number,
  a: PoseJoint['a'],
  b: PoseJoint['a'],
): readonly JointRow[] {
  return axes.map((axis, k) => ({
    of,
    sigma,
    evaluate: (x) => {
      const first = place(layout, x, a);
      const second = place(layout, x, b);
      return [
        row(layout, second.at[k] - first.at[k], [
          [first, scale(-1, axis)],
          [second, axis],
        ]),
      ];
    },
  }));
}

/** Distance of a point from a straight or circular path, and its derivatives. */
function pathRow(
  point: Vector,
  through: Vector,
  left: Vector,
  radius: number | null,
): { value: number; byPoint: Vector; byLeft: Vector } {
  if (radius === null) {
    const off = subtract(through, point);
    return { value: dot(left, off), byPoint: scale(-1, left), byLeft: off };
  }
  const fromCentre = subtract(point, add(through, scale(radius, left)));
  const distance = norm(fromCentre);
  const out: Vector = distance > 0 ? scale(1 / distance, fromCentre) : [1, 0];
  return {
    value: Math.abs(radius) - distance,
    byPoint: scale(-1, out),
    byLeft: scale(radius, out),
  };
}
