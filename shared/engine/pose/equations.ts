import type { PoseMark, PoseProblem } from '../documents/pose-problem';
import { dot, subtract, turnLeft, unit, wrap, type Vector } from '../geometry/vector';
import { bodySlot, place, placeOf, type Layout } from './layout';
import { jointRows } from './joint-rows';

/** What is given less what the unknowns say, with its derivative by every unknown. */
export interface Row {
  readonly value: number;
  readonly gradient: Float64Array;
}

export interface Equation {
  /** Path of the field that it came from. */
  readonly of: string;
  readonly evaluate: (x: Float64Array) => readonly Row[];
}

/** An equation that holds within an uncertainty. */
export interface Observation extends Equation {
  readonly kind: 'mark' | 'prior';
  /** Id of the mark, or the path. */
  readonly id: string;
  /** Lower triangle W with W·C·Wᵀ = 1 for the covariance C of the rows. */
  readonly whitening: readonly (readonly number[])[];
}

export interface Equations {
  readonly observations: readonly Observation[];
  /** Equations that hold exactly. */
  readonly constraints: readonly Equation[];
}

const emptyRow = (layout: Layout): Float64Array => new Float64Array(layout.size);

export function equationsOf(problem: PoseProblem, layout: Layout): Equations {
  const observations: Observation[] = problem.marks.map((mark) => markObservation(layout, mark));
  const constraints: Equation[] = [];
  const addScalar = (of: string, sigma: number, evaluate: Equation['evaluate']): void => {
    if (sigma > 0)
      observations.push({ kind: 'prior', id: of, of, whitening: [[1 / sigma]], evaluate });
    else constraints.push({ of, evaluate });
  };
  for (const body of problem.bodies) {
    const slot = bodySlot(layout, body.id);
    const { x, y, heading } = body.stated ?? {};
    [x, y].forEach((given, k) => {
      if (given === undefined) return;
      const of = `bodies.${body.id}.stated.${k === 0 ? 'x' : 'y'}`;
      addScalar(of, given.sigma ?? 0, (u) => {
        const gradient = emptyRow(layout);
        gradient[slot.index + k] = -1;
        return [{ value: given.value - layout.centre[k] - u[slot.index + k], gradient }];
      });
    });
    if (heading !== undefined)
      addScalar(`bodies.${body.id}.stated.heading`, heading.sigma ?? 0, (u) => {
        const gradient = emptyRow(layout);
        const origin = placeOf(slot, u, [0, 0]);
        origin.turn(gradient, -1);
        return [{ value: wrap(heading.value - origin.heading), gradient }];
      });
    for (const [name, point] of slot.points)
      point.index.forEach((index, k) => {
        if (index === null) return;
        const of = `bodies.${body.id}.points.${name}.${k === 0 ? 'x' : 'y'}`;
        addScalar(of, point.sigma[k], (u) => {
          const gradient = emptyRow(layout);
          gradient[index] = -1;
          return [{ value: point.at[k] - u[index], gradient }];
        });
      });
  }
  for (const joint of problem.joints)
    for (const { of, sigma, evaluate } of jointRows(layout, joint)) addScalar(of, sigma, evaluate);
  return { observations, constraints };
}

function markObservation(layout: Layout, mark: PoseMark): Observation {
  const { tangent, line, covariance } = mark;
  const target = subtract(mark.at, layout.centre);
  const normal = line === undefined ? null : turnLeft(unit(line.direction));
  const whitening: number[][] =
    normal === null ? whiten2(covariance) : [[1 / Math.sqrt(variance(covariance, normal))]];
  if (tangent !== undefined) {
    const row = whitening.length;
    whitening.push([...new Array<number>(row).fill(0), 1 / tangent.sigma]);
  }
  return {
    kind: 'mark',
    id: mark.id,
    of: `marks.${mark.id}`,
    whitening,
    evaluate: (x) => {
      const point = place(layout, x, mark);
      const off = subtract(target, point.at);
      const axes: Vector[] =
        normal === null
          ? [
              [1, 0],
              [0, 1],
            ]
          : [normal];
      const rows: Row[] = axes.map((axis) => {
        const gradient = emptyRow(layout);
        point.spread(gradient, [-axis[0], -axis[1]]);
        return { value: dot(axis, off), gradient };
      });
      if (tangent !== undefined) {
        const gradient = emptyRow(layout);
        point.turn(gradient, -1);
        const turned = wrap(tangent.direction - point.heading - (tangent.along ?? 0));
        rows.push({ value: tangent.line === true ? wrap(2 * turned) / 2 : turned, gradient });
      }
      return rows;
    },
  };
}

const variance = (c: PoseMark['covariance'], n: Vector): number =>
  n[0] * n[0] * c[0][0] + 2 * n[0] * n[1] * c[0][1] + n[1] * n[1] * c[1][1];

/** Inverse of the Cholesky factor of a 2 × 2 covariance. */
function whiten2([[a, b], [, d]]: PoseMark['covariance']): number[][] {
  const l11 = Math.sqrt(a);
  const l21 = b / l11;
  const l22 = Math.sqrt(d - l21 * l21);
  return [[1 / l11], [-l21 / (l11 * l22), 1 / l22]];
}
