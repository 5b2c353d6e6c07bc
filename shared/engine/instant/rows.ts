import type { State } from './model';

/**
 * Scalar equations that are linear in the motion of at most two bodies:
 * coefficients · (v_x, v_y, ω of the first, of the second) = right.
 */
export interface Rows {
  readonly count: number;
  readonly first: Int32Array;
  readonly second: Int32Array;
  /** Six to a row. */
  readonly coefficients: Float64Array;
  readonly right: Float64Array;
}

export const rowsFor = (count: number): Rows => ({
  count,
  first: new Int32Array(count),
  second: new Int32Array(count),
  coefficients: new Float64Array(6 * count),
  right: new Float64Array(count),
});

/**
 * Begins row k: c · v_P of the point at arm (rx, ry) from the centroid of a body. At acceleration
 * level the term −ω² c · r goes to the right side.
 */
export const pointTerm = (
  rows: Rows,
  k: number,
  body: number,
  cx: number,
  cy: number,
  rx: number,
  ry: number,
): void => {
  rows.first[k] = body;
  const o = 6 * k;
  rows.coefficients[o] = cx;
  rows.coefficients[o + 1] = cy;
  rows.coefficients[o + 2] = rx * cy - ry * cx;
};

/** The same for the second body of row k. */
export const otherTerm = (
  rows: Rows,
  k: number,
  body: number,
  cx: number,
  cy: number,
  rx: number,
  ry: number,
): void => {
  rows.second[k] = body;
  const o = 6 * k + 3;
  rows.coefficients[o] = cx;
  rows.coefficients[o + 1] = cy;
  rows.coefficients[o + 2] = rx * cy - ry * cx;
};

export const noOther = (rows: Rows, k: number, ground: number): void => {
  rows.second[k] = ground;
  rows.coefficients.fill(0, 6 * k + 3, 6 * k + 6);
};

/** ω² c · r of a body, the part of c · a_P that velocities fix, with its sign turned. */
export const centripetal = (
  s: State,
  body: number,
  cx: number,
  cy: number,
  rx: number,
  ry: number,
): number => {
  const omega = s.velocity[3 * body + 2];
  return omega * omega * (cx * rx + cy * ry);
};

/** Left side less right side of row k for a motion q. */
export const rowResidual = (rows: Rows, k: number, q: Float64Array): number => {
  const c = rows.coefficients;
  const o = 6 * k;
  const a = 3 * rows.first[k];
  const b = 3 * rows.second[k];
  return (
    c[o] * q[a] +
    c[o + 1] * q[a + 1] +
    c[o + 2] * q[a + 2] +
    c[o + 3] * q[b] +
    c[o + 4] * q[b + 1] +
    c[o + 5] * q[b + 2] -
    rows.right[k]
  );
};
