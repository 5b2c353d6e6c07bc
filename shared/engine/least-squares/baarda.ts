import { symmetricEigen } from './symmetric-eigen';
import { equivalentDeviate } from '../uncertainty/distributions';

/** Relative to the whole: less redundancy than this is none, the rest being rounding. */
export const noRedundancy = 1e-9;

export interface BlunderTest {
  /** Normal deviate of the test; null where nothing checks the observation. */
  readonly w: number | null;
  /** Mean share of the observation's information that the fit itself uses, 0 to 1. */
  readonly leverage: number;
  /** Cofactors of the residuals, I − H for this observation; its trace is its redundancy. */
  readonly remaining: readonly (readonly number[])[];
}

/**
 * Baarda's test for a blunder in one observation (data snooping), of one or more components.
 *
 * `residuals` and their derivatives by the parameters, `gradients`, are divided by the standard
 * uncertainty (or whitened); `covariance` is that of the parameters, n × n; `weight` is what a
 * robust loss left the observation. With e the residuals and Q = I − H their cofactors,
 * T = eᵀ·Q⁺·e is χ² with rank(Q) degrees of freedom when there is no blunder; `w` is the normal
 * deviate of the same probability, for one component |e|/√Q.
 * Source: W. Baarda, Publications on Geodesy 2(5), Netherlands Geodetic Commission, 1968.
 */
export function testForBlunder(
  residuals: readonly number[],
  gradients: readonly Float64Array[],
  covariance: Float64Array,
  weight = 1,
): BlunderTest {
  const hat = gradients.map((a) => {
    const n = a.length;
    const through = new Float64Array(n);
    for (let i = 0; i < n; i++)
      for (let j = 0; j < n; j++) through[i] += covariance[i * n + j] * a[j];
    return gradients.map((b) => weight * b.reduce((sum, value, i) => sum + value * through[i], 0));
  });
  const remaining = hat.map((row, i) => row.map((h, j) => (i === j ? 1 - h : -h)));
  const { values, vectors } = symmetricEigen(remaining);
  let statistic = 0;
  let rank = 0;
  values.forEach((value, k) => {
    if (value <= noRedundancy) return;
    rank++;
    statistic += vectors[k].reduce((sum, v, i) => sum + v * residuals[i], 0) ** 2 / value;
  });
  const used = hat.reduce((sum, row, i) => sum + row[i], 0);
  return {
    w: rank === 0 ? null : equivalentDeviate(statistic, rank),
    leverage: Math.min(1, Math.max(0, used / hat.length)),
    remaining,
  };
}
