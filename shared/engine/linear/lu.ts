import type { Dense } from './dense';

/** Dense LU factors with partial pivoting by rows. Source: Golub and Van Loan, 4th ed., 3.4. */
export interface Factors {
  readonly size: number;
  readonly values: Float64Array;
  readonly order: Int32Array;
  /** The smallest pivot over the largest; 0 when the matrix is singular. */
  readonly pivotRatio: number;
}

/** Factors a square matrix in its own storage. */
export const factor = ({ rows: size, values }: Dense): Factors => {
  const order = Int32Array.from({ length: size }, (_, i) => i);
  let smallest = Infinity;
  let largest = 0;
  for (let k = 0; k < size; k++) {
    let pivot = k;
    for (let i = k + 1; i < size; i++)
      if (Math.abs(values[i * size + k]) > Math.abs(values[pivot * size + k])) pivot = i;
    const most = Math.abs(values[pivot * size + k]);
    if (most < smallest) smallest = most;
    if (most > largest) largest = most;
    if (most === 0) continue;
    if (pivot !== k) {
      for (let j = 0; j < size; j++) {
        const swap = values[k * size + j];
        values[k * size + j] = values[pivot * size + j];
        values[pivot * size + j] = swap;
      }
      const swap = order[k];
      order[k] = order[pivot];
      order[pivot] = swap;
    }
    const inverse = 1 / values[k * size + k];
    for (let i = k + 1; i < size; i++) {
      if (values[i * size + k] === 0) continue;
      const multiplier = values[i * size + k] * inverse;
      values[i * size + k] = multiplier;
      for (let j = k + 1; j < size; j++) values[i * size + j] -= multiplier * values[k * size + j];
    }
  }
  return { size, values, order, pivotRatio: largest === 0 ? 0 : smallest / largest };
};

export const solveFactored = ({ size, values, order }: Factors, b: Float64Array): Float64Array => {
  const x = new Float64Array(size);
  for (let i = 0; i < size; i++) {
    let sum = b[order[i]];
    for (let j = 0; j < i; j++) sum -= values[i * size + j] * x[j];
    x[i] = sum;
  }
  for (let i = size - 1; i >= 0; i--) {
    let sum = x[i];
    for (let j = i + 1; j < size; j++) sum -= values[i * size + j] * x[j];
    x[i] = sum / values[i * size + i];
  }
  return x;
};

export const inverse = (factors: Factors): Dense => {
  const { size } = factors;
  const values = new Float64Array(size * size);
  const unit = new Float64Array(size);
  for (let j = 0; j < size; j++) {
    unit[j] = 1;
    const column = solveFactored(factors, unit);
    unit[j] = 0;
    for (let i = 0; i < size; i++) values[i * size + j] = column[i];
  }
  return { rows: size, columns: size, values };
};
