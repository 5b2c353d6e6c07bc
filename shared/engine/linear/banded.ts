/**
 * LU factors of a banded matrix with partial pivoting by rows (LAPACK's gbtrf, unblocked).
 *
 * A matrix of `size` rows with `lower` diagonals below and `upper` above the main one is kept by
 * rows: element (i, j) lies at `values[i * width + j - i + lower]`, `width = 2 * lower + upper + 1`,
 * of which the last `lower` places of a row are room for fill-in. Cost grows with size × lower ×
 * (lower + upper). Source: Golub and Van Loan, Matrix Computations, 4th ed., 4.3.5.
 */
export interface Banded {
  readonly size: number;
  readonly lower: number;
  readonly upper: number;
  readonly width: number;
  readonly values: Float64Array;
}

export interface BandedFactors extends Banded {
  readonly pivots: Int32Array;
  /** The smallest pivot over the largest; 0 when the matrix is singular. */
  readonly pivotRatio: number;
}

export const bandedZeros = (size: number, lower: number, upper: number): Banded => {
  const width = 2 * lower + upper + 1;
  return { size, lower, upper, width, values: new Float64Array(size * width) };
};

/** Factors the matrix in its own storage; the given object must not be read as a matrix again. */
export const factorBanded = (
  matrix: Banded,
  pivots: Int32Array = new Int32Array(matrix.size),
): BandedFactors => {
  const { size, lower, upper, width, values } = matrix;
  let smallest = Infinity;
  let largest = 0;
  for (let k = 0; k < size; k++) {
    const lastRow = k + lower < size ? k + lower : size - 1;
    const lastColumn = k + lower + upper < size ? k + lower + upper : size - 1;
    let pivot = k;
    let most = Math.abs(values[k * width + lower]);
    for (let i = k + 1; i <= lastRow; i++) {
      const candidate = Math.abs(values[i * width + k - i + lower]);
      if (candidate > most) {
        most = candidate;
        pivot = i;
      }
    }
    pivots[k] = pivot;
    if (most < smallest) smallest = most;
    if (most > largest) largest = most;
    if (most === 0) continue;
    const start = k * width + lower;
    if (pivot !== k) {
      const other = pivot * width + k - pivot + lower;
      for (let j = 0; j <= lastColumn - k; j++) {
        const swap = values[start + j];
        values[start + j] = values[other + j];
        values[other + j] = swap;
      }
    }
    const inverse = 1 / values[start];
    for (let i = k + 1; i <= lastRow; i++) {
      const row = i * width + k - i + lower;
      if (values[row] === 0) continue;
      const factor = values[row] * inverse;
      values[row] = factor;
      for (let j = 1; j <= lastColumn - k; j++) values[row + j] -= factor * values[start + j];
    }
  }
  const pivotRatio = largest === 0 ? 0 : smallest / largest;
  return { size, lower, upper, width, values, pivots, pivotRatio };
};

/** Solves A x = b in place of b, from `offset` on. */
export const solveBanded = (factors: BandedFactors, b: Float64Array, offset = 0): void => {
  const { size, lower, upper, width, values, pivots } = factors;
  for (let k = 0; k < size; k++) {
    const p = pivots[k];
    const x = b[offset + p];
    if (p !== k) {
      b[offset + p] = b[offset + k];
      b[offset + k] = x;
    }
    if (x === 0) continue;
    const last = k + lower < size ? k + lower : size - 1;
    for (let i = k + 1; i <= last; i++) b[offset + i] -= values[i * width + k - i + lower] * x;
  }
  for (let k = size - 1; k >= 0; k--) {
    const row = k * width + lower;
    const last = k + lower + upper < size ? lower + upper : size - 1 - k;
    let sum = b[offset + k];
    for (let j = 1; j <= last; j++) sum -= values[row + j] * b[offset + k + j];
    b[offset + k] = sum / values[row];
  }
};

/** Solves Aᵀ x = b in place of b. */
export const solveBandedTransposed = (factors: BandedFactors, b: Float64Array): void => {
  const { size, lower, upper, width, values, pivots } = factors;
  for (let k = 0; k < size; k++) {
    const x = b[k] / values[k * width + lower];
    b[k] = x;
    if (x === 0) continue;
    const last = k + lower + upper < size ? lower + upper : size - 1 - k;
    for (let j = 1; j <= last; j++) b[k + j] -= values[k * width + lower + j] * x;
  }
  for (let k = size - 1; k >= 0; k--) {
    const last = k + lower < size ? k + lower : size - 1;
    let sum = b[k];
    for (let i = k + 1; i <= last; i++) sum -= values[i * width + k - i + lower] * b[i];
    b[k] = sum;
    const p = pivots[k];
    if (p !== k) {
      const swap = b[k];
      b[k] = b[p];
      b[p] = swap;
    }
  }
};
