/**
 * Householder QR with column pivoting of a dense m × n matrix, A·P = Q·R.
 *
 * Matrices are column-major: element (i, j) of an m-row matrix is `a[j * m + i]`.
 * Source: Golub & Van Loan, Matrix Computations, section 5.4 (column pivoting) and 5.1
 * (reflectors), from memory.
 */
export interface Qr {
  readonly rows: number;
  readonly columns: number;
  /** R in the upper triangle; the reflectors below it, each with first element 1 implied. */
  readonly factors: Float64Array;
  readonly betas: Float64Array;
  /** Column j of R belongs to column `pivots[j]` of the matrix. */
  readonly pivots: Int32Array;
  /** Columns whose pivot exceeds `tolerance` times the largest. */
  readonly rank: number;
}

/** Relative: pivots below it, against the first, count as zero. 2^-42 leaves room for scaling. */
const rankTolerance = 2 ** -42;

export function factorise(
  a: Float64Array,
  rows: number,
  columns: number,
  tolerance = rankTolerance,
): Qr {
  const q = Float64Array.from(a);
  const betas = new Float64Array(Math.min(rows, columns));
  const pivots = Int32Array.from({ length: columns }, (_, j) => j);
  const norms = Float64Array.from({ length: columns }, (_, j) => columnNorm(q, rows, j, 0));
  let rank = 0;
  let first = 0;
  for (let k = 0; k < betas.length; k++) {
    let best = k;
    for (let j = k + 1; j < columns; j++) if (norms[j] > norms[best]) best = j;
    if (best !== k) swapColumns(q, rows, k, best, norms, pivots);
    const norm = columnNorm(q, rows, k, k);
    if (k === 0) first = norm;
    if (norm > tolerance * first) rank = k + 1;
    if (norm === 0) break;
    reflect(q, rows, columns, k, norm, betas);
    for (let j = k + 1; j < columns; j++) norms[j] = columnNorm(q, rows, j, k + 1);
  }
  return { rows, columns, factors: q, betas, pivots, rank };
}

function columnNorm(a: Float64Array, rows: number, column: number, from: number): number {
  let largest = 0;
  const end = column * rows + rows;
  for (let i = column * rows + from; i < end; i++) largest = Math.max(largest, Math.abs(a[i]));
  if (largest === 0 || !Number.isFinite(largest)) return largest;
  let sum = 0;
  for (let i = column * rows + from; i < end; i++) sum += (a[i] / largest) ** 2;
  return largest * Math.sqrt(sum);
}

function swapColumns(
  a: Float64Array,
  rows: number,
  j: number,
  k: number,
  norms: Float64Array,
  pivots: Int32Array,
): void {
  const held = a.slice(j * rows, (j + 1) * rows);
  a.copyWithin(j * rows, k * rows, (k + 1) * rows);
  a.set(held, k * rows);
  norms[k] = norms[j];
  [pivots[j], pivots[k]] = [pivots[k], pivots[j]];
}

function reflect(
  a: Float64Array,
  rows: number,
  columns: number,
  k: number,
  norm: number,
  betas: Float64Array,
): void {
  const at = k * rows;
  const diagonal = a[at + k] > 0 ? -norm : norm;
  const head = a[at + k] - diagonal;
  for (let i = k + 1; i < rows; i++) a[at + i] /= head;
  betas[k] = -head / diagonal;
  a[at + k] = diagonal;
  for (let j = k + 1; j < columns; j++) applyReflector(a, rows, at, k, betas[k], a, j * rows);
}

function applyReflector(
  factors: Float64Array,
  rows: number,
  at: number,
  k: number,
  beta: number,
  target: Float64Array,
  offset: number,
): void {
  let sum = target[offset + k];
  for (let i = k + 1; i < rows; i++) sum += factors[at + i] * target[offset + i];
  sum *= beta;
  target[offset + k] -= sum;
  for (let i = k + 1; i < rows; i++) target[offset + i] -= sum * factors[at + i];
}

/** Qᵀ·b, in a new array. */
export function applyTransposed(qr: Qr, b: Float64Array): Float64Array {
  const result = Float64Array.from(b);
  for (let k = 0; k < qr.betas.length; k++)
    if (qr.betas[k] !== 0)
      applyReflector(qr.factors, qr.rows, k * qr.rows, k, qr.betas[k], result, 0);
  return result;
}

/** Q·b, in a new array. */
export function apply(qr: Qr, b: Float64Array): Float64Array {
  const result = Float64Array.from(b);
  for (let k = qr.betas.length - 1; k >= 0; k--)
    if (qr.betas[k] !== 0)
      applyReflector(qr.factors, qr.rows, k * qr.rows, k, qr.betas[k], result, 0);
  return result;
}

/** Least-squares solution of A·x ≈ b; columns beyond the rank get 0. */
export function solve(qr: Qr, b: Float64Array): Float64Array {
  const y = applyTransposed(qr, b);
  const x = new Float64Array(qr.columns);
  for (let k = qr.rank - 1; k >= 0; k--) {
    let sum = y[k];
    for (let j = k + 1; j < qr.rank; j++) sum -= qr.factors[j * qr.rows + k] * x[qr.pivots[j]];
    x[qr.pivots[k]] = sum / qr.factors[k * qr.rows + k];
  }
  return x;
}

/** R⁻¹ with its rows in the order of the unpivoted columns: A·result has orthonormal columns. */
export function inverseFactor(qr: Qr): Float64Array {
  const n = qr.columns;
  const result = new Float64Array(n * n);
  for (let c = 0; c < n; c++)
    for (let k = c; k >= 0; k--) {
      let sum = k === c ? 1 : 0;
      for (let j = k + 1; j <= c; j++)
        sum -= qr.factors[j * qr.rows + k] * result[c * n + qr.pivots[j]];
      result[c * n + qr.pivots[k]] = sum / qr.factors[k * qr.rows + k];
    }
  return result;
}

/** (AᵀA)⁻¹ of a matrix of full column rank, n × n. */
export function inverseNormal(qr: Qr): Float64Array {
  return timesTransposed(inverseFactor(qr), qr.columns, qr.columns);
}

/** A·Aᵀ of a rows × columns matrix. */
export function timesTransposed(a: Float64Array, rows: number, columns: number): Float64Array {
  const result = new Float64Array(rows * rows);
  for (let i = 0; i < rows; i++)
    for (let j = 0; j <= i; j++) {
      let sum = 0;
      for (let k = 0; k < columns; k++) sum += a[k * rows + i] * a[k * rows + j];
      result[i * rows + j] = sum;
      result[j * rows + i] = sum;
    }
  return result;
}

/** A·B of an m × n and an n × p matrix. */
export function multiply(
  a: Float64Array,
  b: Float64Array,
  m: number,
  n: number,
  p: number,
): Float64Array {
  const result = new Float64Array(m * p);
  for (let j = 0; j < p; j++)
    for (let k = 0; k < n; k++) {
      const factor = b[j * n + k];
      if (factor !== 0) for (let i = 0; i < m; i++) result[j * m + i] += a[k * m + i] * factor;
    }
  return result;
}
