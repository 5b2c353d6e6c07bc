import type { Dense } from './dense';

/**
 * Householder QR with column pivoting, A P = Q R. Source: Golub and Van Loan, 4th ed., 5.4.2.
 *
 * R stands in the upper triangle of `values`; the reflectors below it and in `beta`. The rank is
 * the number of diagonal elements of R above `tolerance` times the first.
 */
export interface PivotedQr {
  readonly rows: number;
  readonly columns: number;
  readonly values: Float64Array;
  readonly beta: Float64Array;
  /** `order[k]` is the column of A that stands at place k. */
  readonly order: Int32Array;
  readonly rank: number;
}

export const pivotedQr = (a: Dense, tolerance = 1e-10): PivotedQr => {
  const { rows, columns } = a;
  const values = Float64Array.from(a.values);
  const steps = Math.min(rows, columns);
  const beta = new Float64Array(steps);
  const order = Int32Array.from({ length: columns }, (_, j) => j);
  const norms = new Float64Array(columns);
  const refresh = (j: number, from: number): void => {
    let sum = 0;
    for (let i = from; i < rows; i++) sum += values[i * columns + j] ** 2;
    norms[j] = sum;
  };
  let rank = 0;
  let first = 0;
  for (let k = 0; k < steps; k++) {
    for (let j = k; j < columns; j++) refresh(j, k);
    let pivot = k;
    // Ties go to the column that came first, so that the basis does not depend on rounding.
    for (let j = k + 1; j < columns; j++) if (norms[j] > norms[pivot] * (1 + 1e-12)) pivot = j;
    const length = Math.sqrt(norms[pivot]);
    if (k === 0) first = length;
    if (length === 0 || length <= tolerance * first) break;
    rank++;
    if (pivot !== k) {
      for (let i = 0; i < rows; i++) {
        const swap = values[i * columns + k];
        values[i * columns + k] = values[i * columns + pivot];
        values[i * columns + pivot] = swap;
      }
      const swap = order[k];
      order[k] = order[pivot];
      order[pivot] = swap;
    }
    const head = values[k * columns + k];
    const alpha = head > 0 ? -length : length;
    // Reflector v = (1, v₁ …) with v₀ normalised to 1, stored below the diagonal.
    const v0 = head - alpha;
    beta[k] = -v0 / alpha;
    for (let i = k + 1; i < rows; i++) values[i * columns + k] /= v0;
    values[k * columns + k] = alpha;
    for (let j = k + 1; j < columns; j++) {
      let sum = values[k * columns + j];
      for (let i = k + 1; i < rows; i++) sum += values[i * columns + k] * values[i * columns + j];
      sum *= beta[k];
      values[k * columns + j] -= sum;
      for (let i = k + 1; i < rows; i++) values[i * columns + j] -= sum * values[i * columns + k];
    }
  }
  return { rows, columns, values, beta, order, rank };
};

/** Qᵀ b, in place of b. */
export const applyQTransposed = (qr: PivotedQr, b: Float64Array): Float64Array => {
  const { rows, columns, values, beta, rank } = qr;
  for (let k = 0; k < rank; k++) {
    let sum = b[k];
    for (let i = k + 1; i < rows; i++) sum += values[i * columns + k] * b[i];
    sum *= beta[k];
    b[k] -= sum;
    for (let i = k + 1; i < rows; i++) b[i] -= sum * values[i * columns + k];
  }
  return b;
};

const backSubstitute = (qr: PivotedQr, b: Float64Array): void => {
  const { columns, values, rank } = qr;
  for (let i = rank - 1; i >= 0; i--) {
    let sum = b[i];
    for (let j = i + 1; j < rank; j++) sum -= values[i * columns + j] * b[j];
    b[i] = sum / values[i * columns + i];
  }
};

/** The basic least-squares solution of A x ≈ b: unknowns that A leaves free are 0. */
export const solveLeastSquares = (qr: PivotedQr, b: ArrayLike<number>): Float64Array => {
  const c = applyQTransposed(qr, Float64Array.from(b));
  backSubstitute(qr, c);
  const x = new Float64Array(qr.columns);
  for (let k = 0; k < qr.rank; k++) x[qr.order[k]] = c[k];
  return x;
};

/**
 * A basis of {x : A x = 0}, one array per vector: for each dependent column, the combination of
 * independent columns that cancels it. No vector involves more unknowns than it must.
 */
export const nullSpace = (qr: PivotedQr): Float64Array[] => {
  const { columns, values, order, rank } = qr;
  return Array.from({ length: columns - rank }, (_, f) => {
    const c = new Float64Array(rank);
    for (let i = 0; i < rank; i++) c[i] = -values[i * columns + rank + f];
    backSubstitute(qr, c);
    const x = new Float64Array(columns);
    x[order[rank + f]] = 1;
    const most = c.reduce((m, v) => Math.max(m, Math.abs(v)), 1);
    for (let k = 0; k < rank; k++) if (Math.abs(c[k]) > 1e-11 * most) x[order[k]] = c[k];
    return x;
  });
};
