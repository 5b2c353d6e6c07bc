import type { Dense } from './dense';
import { zeros } from './dense';

/**
 * Lower factor L of a symmetric positive semi-definite matrix, A = L Lᵀ; columns of directions
 * without variance are zero. Returns null when A is not positive semi-definite: `tolerance`,
 * relative to each diagonal element, is how far rounding may have pushed a zero below zero.
 */
export const cholesky = (a: Dense, tolerance = 1e-10): Dense | null => {
  const n = a.rows;
  const factor = zeros(n, n);
  const l = factor.values;
  for (let j = 0; j < n; j++) {
    const diagonal = a.values[j * n + j];
    if (!(diagonal >= 0)) return null;
    let rest = diagonal;
    for (let k = 0; k < j; k++) rest -= l[j * n + k] ** 2;
    if (rest < -tolerance * diagonal) return null;
    const root = rest > 1e-13 * diagonal ? Math.sqrt(rest) : 0;
    l[j * n + j] = root;
    for (let i = j + 1; i < n; i++) {
      let sum = a.values[i * n + j];
      for (let k = 0; k < j; k++) sum -= l[i * n + k] * l[j * n + k];
      if (root > 0) l[i * n + j] = sum / root;
      else if (Math.abs(sum) > Math.sqrt(tolerance * diagonal * a.values[i * n + i])) return null;
    }
  }
  return factor;
};

/** Solves A x = b from the factor of a positive definite A. */
export const solveCholesky = (
  { rows: n, values: l }: Dense,
  b: ArrayLike<number>,
): Float64Array => {
  const x = Float64Array.from(b);
  for (let i = 0; i < n; i++) {
    let sum = x[i];
    for (let k = 0; k < i; k++) sum -= l[i * n + k] * x[k];
    x[i] = sum / l[i * n + i];
  }
  for (let i = n - 1; i >= 0; i--) {
    let sum = x[i];
    for (let k = i + 1; k < n; k++) sum -= l[k * n + i] * x[k];
    x[i] = sum / l[i * n + i];
  }
  return x;
};
