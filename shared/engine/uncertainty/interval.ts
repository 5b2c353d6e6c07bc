import { normalQuantile, tQuantile } from './distributions';

export interface CoverageInterval {
  readonly low: number;
  readonly high: number;
  /** Probability that it holds the value. */
  readonly coverage: number;
}

/** Factor k of the expanded uncertainty U = k·u (JCGM 100:2008, 6.2 and annex G). */
export const coverageFactor = (coverage = 0.95, degreesOfFreedom = Infinity): number =>
  Number.isFinite(degreesOfFreedom)
    ? tQuantile((1 + coverage) / 2, degreesOfFreedom)
    : normalQuantile((1 + coverage) / 2);

/**
 * The interval value ± k·u. `least` is a bound that the quantity cannot pass, such as 0 for a
 * speed.
 */
export function coverageInterval(
  value: number,
  sigma: number,
  { coverage = 0.95, degreesOfFreedom = Infinity, least = -Infinity } = {},
): CoverageInterval {
  const half = coverageFactor(coverage, degreesOfFreedom) * sigma;
  return { low: Math.max(least, value - half), high: value + half, coverage };
}
