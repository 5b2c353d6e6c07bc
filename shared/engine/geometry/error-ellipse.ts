import { chiSquaredQuantile } from '../uncertainty/distributions';
import type { Vector } from './vector';

export type Covariance2 = readonly [Vector, Vector];

export interface ErrorEllipse {
  /** Semi-axes of the standard ellipse (k = 1), m; the larger first. */
  readonly semiAxes: readonly [major: number, minor: number];
  /** Direction of the larger axis, rad in (−π/2, π/2]. */
  readonly direction: number;
  /** Probability that the true point lies in the ellipse below. */
  readonly coverage: number;
  /** Semi-axes of the ellipse of that coverage, m. */
  readonly coverageAxes: readonly [major: number, minor: number];
}

/**
 * Error ellipse of a point from its 2 × 2 covariance (m²).
 *
 * The ellipse of coverage p has the axes k·σ with k² the p-quantile of χ² with two degrees of
 * freedom (k = 2.448 for 95 %). Source: JCGM 102:2011, clause 6.5.
 */
export function errorEllipse(covariance: Covariance2, coverage = 0.95): ErrorEllipse {
  const [[a, b], [, d]] = covariance;
  const mean = (a + d) / 2;
  const spread = Math.hypot((a - d) / 2, b);
  const major = Math.sqrt(mean + spread);
  // det/major² keeps its digits where mean − spread would cancel
  const minor = mean + spread > 0 ? Math.sqrt(Math.max(0, (a * d - b * b) / (mean + spread))) : 0;
  const direction = spread === 0 ? 0 : Math.atan2(b, (a - d) / 2) / 2;
  const k = Math.sqrt(chiSquaredQuantile(coverage, 2));
  return {
    semiAxes: [major, minor],
    direction,
    coverage,
    coverageAxes: [k * major, k * minor],
  };
}
