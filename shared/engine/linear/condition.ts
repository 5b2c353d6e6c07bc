import { Matrix, SingularValueDecomposition } from 'ml-matrix';
import type { BandedFactors } from './banded';
import { solveBanded, solveBandedTransposed } from './banded';
import type { Dense } from './dense';

/**
 * Estimate of ‖A⁻¹‖₁ from the factors of A, a lower bound that most often is exact.
 * Source: Hager (1984), SIAM J. Sci. Stat. Comput. 5(2); Higham, Accuracy and Stability of
 * Numerical Algorithms, 2nd ed., algorithm 15.1.
 */
export const inverseNorm1 = (factors: BandedFactors): number => {
  const n = factors.size;
  const x = new Float64Array(n).fill(1 / n);
  let estimate = 0;
  for (let round = 0; round < 5; round++) {
    solveBanded(factors, x);
    let norm = 0;
    for (let i = 0; i < n; i++) norm += Math.abs(x[i]);
    if (round > 0 && norm <= estimate) break;
    estimate = norm;
    for (let i = 0; i < n; i++) x[i] = x[i] < 0 ? -1 : 1;
    solveBandedTransposed(factors, x);
    let largest = 0;
    for (let i = 1; i < n; i++) if (Math.abs(x[i]) > Math.abs(x[largest])) largest = i;
    x.fill(0);
    x[largest] = 1;
  }
  return estimate;
};

/** Singular values of a matrix, largest first. */
export const singularValues = (a: Dense): number[] =>
  new SingularValueDecomposition(Matrix.from1DArray(a.rows, a.columns, a.values), {
    computeLeftSingularVectors: false,
    computeRightSingularVectors: false,
    autoTranspose: true,
  }).diagonal;

/** The largest singular value over the smallest; null when that is zero. */
export const condition2 = (a: Dense): number | null => {
  const values = singularValues(a);
  const smallest = values[values.length - 1];
  return smallest > 0 ? values[0] / smallest : null;
};
