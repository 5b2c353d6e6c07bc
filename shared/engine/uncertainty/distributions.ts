import chiSquareCdf from '@stdlib/stats-base-dists-chisquare-cdf';
import standardNormalCdf from '@stdlib/stats-base-dists-normal-cdf';
import standardNormalQuantile from '@stdlib/stats-base-dists-normal-quantile';
import studentCdf from '@stdlib/stats-base-dists-t-cdf';

/** P(Z ≤ z) of the standard normal distribution. */
export const normalCdf = (z: number): number => standardNormalCdf(z, 0, 1);
/** z with P(Z ≤ z) = p, 0 < p < 1. */
export const normalQuantile = (p: number): number => standardNormalQuantile(p, 0, 1);

/** P(T ≤ t) of Student's t with `dof` degrees of freedom; infinite ones give the normal. */
export const tCdf = (t: number, dof: number): number =>
  Number.isFinite(dof) ? studentCdf(t, dof) : normalCdf(t);
/** t with P(T ≤ t) = p. */
export function tQuantile(p: number, dof: number): number {
  if (!Number.isFinite(dof)) return normalQuantile(p);
  if (p === 0.5) return 0;
  return p < 0.5 ? -tQuantile(1 - p, dof) : invert((t) => studentCdf(t, dof), p, 1);
}

/** P(X ≤ x) of χ² with `dof` degrees of freedom. */
export const chiSquaredCdf = (x: number, dof: number): number => chiSquareCdf(x, dof);
/** x with P(X ≤ x) = p, 0 < p < 1. */
export function chiSquaredQuantile(p: number, dof: number): number {
  if (dof === 1) return normalQuantile((1 + p) / 2) ** 2;
  if (dof === 2) return -2 * Math.log1p(-p);
  return invert((x) => chiSquareCdf(x, dof), p, dof);
}

/**
 * The x ≥ 0 at which a distribution function reaches p, by the Illinois form of false position. (The
 * library's own inverses bring a logger along that no single-file program can hold.)
 * Source: M. Dowell and P. Jarratt, BIT 11 (1971) 168, from memory.
 */
function invert(cdf: (x: number) => number, p: number, typical: number): number {
  let low = 0;
  let below = cdf(0) - p;
  let high = typical;
  while (cdf(high) < p) high *= 2;
  let above = cdf(high) - p;
  let side = 0;
  for (let i = 0; i < 200 && high - low > 2 * Number.EPSILON * high; i++) {
    const x = high - (above * (high - low)) / (above - below);
    const off = cdf(x) - p;
    if (off === 0) return x;
    if (off > 0) {
      [high, above] = [x, off];
      if (side === 1) below /= 2;
      side = 1;
    } else {
      [low, below] = [x, off];
      if (side === -1) above /= 2;
      side = -1;
    }
  }
  return (low + high) / 2;
}

/** P(X > x): the p-value of a fit; null where nothing is redundant. */
export const chiSquaredPValue = (x: number, dof: number): number | null =>
  dof > 0 ? Math.max(0, 1 - chiSquareCdf(x, dof)) : null;

/**
 * The normal deviate whose two-sided probability equals that of a χ² statistic with `dof` degrees
 * of freedom: tests of different dimension can then be held against one critical value. For one
 * degree of freedom it is √x. Beyond p ≈ 1e-15 the double-precision probability is exhausted, and
 * √(x − dof + 1) continues it.
 */
export const equivalentDeviate = (x: number, dof: number): number => {
  if (dof === 1) return Math.sqrt(x);
  const p = dof === 2 ? Math.exp(-x / 2) : 1 - chiSquareCdf(x, dof);
  return p > 1e-13 ? -normalQuantile(p / 2) : Math.sqrt(x - dof + 1);
};

/** Critical value of Baarda's test of one observation at α₀ = 0.1 % (two-sided). */
export const criticalDeviate = normalQuantile(0.9995);

/**
 * Non-centrality λ₀ = (z_{1−α₀/2} + z_γ)² at which a test of level α₀ finds an error with power γ.
 * Source: Baarda, Publications on Geodesy 2(5), Netherlands Geodetic Commission, 1968; λ₀ = 17.07
 * for α₀ = 0.1 % and γ = 80 %.
 */
export const nonCentrality = (alpha = 0.001, power = 0.8): number =>
  (normalQuantile(1 - alpha / 2) + normalQuantile(power)) ** 2;
