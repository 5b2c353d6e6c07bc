import type { PlanMark, PlanPoint } from './plan-content';

/**
 * χ² with two degrees of freedom has the closed form F(q) = 1 − exp(−q/2); so the region that holds
 * a two-dimensional normal point with probability 0.95 has q = −2 ln 0.05 = 5.991.
 */
const q95 = -2 * Math.log(0.05);

export interface Ellipse {
  /** Half axes, m. */
  readonly major: number;
  readonly minor: number;
  /** Direction of the major axis, rad from +x, counter-clockwise. */
  readonly direction: number;
}

/** The ellipse that covers a mark's true place with probability 0.95. */
export function ellipse95([[xx, xy], [, yy]]: NonNullable<PlanMark['covariance']>): Ellipse {
  const mean = (xx + yy) / 2;
  const spread = Math.hypot((xx - yy) / 2, xy);
  return {
    major: Math.sqrt(q95 * (mean + spread)),
    minor: Math.sqrt(q95 * Math.max(0, mean - spread)),
    direction: Math.atan2(2 * xy, xx - yy) / 2,
  };
}

const corners = 40;

/** The ellipse as a closed ring of scene points, its axes multiplied by `scale`. */
export function ellipseRing(at: PlanPoint, ellipse: Ellipse, scale: number): [number, number][] {
  const cos = Math.cos(ellipse.direction);
  const sin = Math.sin(ellipse.direction);
  return Array.from({ length: corners + 1 }, (_, i) => {
    const angle = (2 * Math.PI * (i % corners)) / corners;
    const u = scale * ellipse.major * Math.cos(angle);
    const v = scale * ellipse.minor * Math.sin(angle);
    return [at[0] + cos * u - sin * v, at[1] + sin * u + cos * v];
  });
}
