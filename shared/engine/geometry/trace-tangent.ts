import { EngineError } from '../errors';
import { derivativesAt, fitPolynomial, type Polynomial } from '../least-squares/polynomial';
import { chiSquaredPValue } from '../uncertainty/distributions';
import type { Covariance2 } from './error-ellipse';
import {
  add,
  direction,
  dot,
  norm,
  rotate,
  scale,
  subtract,
  turnLeft,
  unit,
  wrap,
  type Vector,
} from './vector';

/** A measured point of a trace, in the order along it. */
export interface TracePoint {
  readonly at: Vector;
  readonly covariance: Covariance2;
}

export interface TraceTangent {
  /** Nearest point of the fitted curve, m. */
  readonly foot: Vector;
  /** In the trace's order, rad in (−π, π]. */
  readonly direction: number;
  /** Standard uncertainty of the direction, rad. */
  readonly sigma: number;
  /** 1/m, positive where the trace bends left; null from fewer than three points. */
  readonly curvature: number | null;
  readonly curvatureSigma: number | null;
  /** Measured points that the fit used. */
  readonly used: number;
  readonly chiSquared: number;
  readonly pValue: number | null;
  readonly redundancy: number;
}

export interface TraceOptions {
  /** Most points that the local fit takes, nearest to the foot. */
  readonly window?: number;
  /** False: exactly so many points, whether a parabola follows them or not. */
  readonly shrinks?: boolean;
}

const usualWindow = 9;
const leastWindow = 3;
/** p-value under which a curve of second degree does not follow the points. */
const bends = 0.01;
const rounds = 20;

/**
 * Direction and curvature of a trace at a foot, with their uncertainty.
 *
 * A polynomial of second degree (a straight line through two points) is fitted to the points
 * nearest to the foot, in axes along the tangent there, so that the answer does not depend on the
 * scene's axes. Each point is weighted by its variance across the curve. The window begins at
 * `window` points and shrinks while the fit fails its χ² test at 1 %, since a curve that bends
 * further would turn the tangent.
 *
 * `points` in order along the trace, m and m²; `foot` a scene point, usually one of them. Throws
 * EngineError `not-enough-marks` and `coincident-points`, field `trace`.
 *
 * Sources: local polynomial regression, Fan & Gijbels, Local Polynomial Modelling and Its
 * Applications, Chapman & Hall 1996; variance across the curve ("effective variance"), J. Orear,
 * Am. J. Phys. 50 (1982) 912; both from memory.
 */
export function traceTangent(
  points: readonly TracePoint[],
  foot: Vector,
  options: TraceOptions = {},
): TraceTangent {
  if (points.length < 2)
    throw new EngineError(
      'not-enough-marks',
      'trace',
      'A direction takes at least two measured points of the trace.',
    );
  let count = Math.min(points.length, Math.max(2, options.window ?? usualWindow));
  for (;;) {
    const fit = fitWindow(nearest(points, foot, count), foot);
    const smaller = Math.max(leastWindow, count - 2);
    const fits = fit.pValue === null || fit.pValue >= bends;
    if (options.shrinks === false || fits || smaller >= count) return fit;
    count = smaller;
  }
}

/** The unbroken run of `count` points around the foot that reaches least far. */
function nearest(
  points: readonly TracePoint[],
  foot: Vector,
  count: number,
): readonly TracePoint[] {
  const away = points.map(({ at }) => norm(subtract(at, foot)));
  let best = 0;
  let least = Infinity;
  for (let from = 0; from + count <= points.length; from++) {
    const reach = Math.max(away[from], away[from + count - 1]);
    if (reach < least) [least, best] = [reach, from];
  }
  return points.slice(best, best + count);
}

function fitWindow(points: readonly TracePoint[], foot: Vector): TraceTangent {
  const chord = subtract(points[points.length - 1].at, points[0].at);
  if (norm(chord) < 1e-9)
    throw new EngineError(
      'coincident-points',
      'trace',
      'The measured points of the trace are at one place: they have no direction.',
    );
  const degree = points.length > 2 ? 2 : 1;
  let heading = direction(chord);
  let origin = foot;
  let slope = 0;
  let fit: Polynomial | null = null;
  let local: ReturnType<typeof derivativesAt> | null = null;
  for (let round = 0; round < rounds; round++) {
    fit = fitAcross(points, origin, heading, degree, fit);
    local = derivativesAt(fit, 0);
    slope = local.values[1];
    origin = add(origin, rotate(heading, [0, local.values[0]]));
    heading += Math.atan(slope);
    origin = add(origin, scale(dot(subtract(foot, origin), unit(heading)), unit(heading)));
    if (round > 0 && Math.abs(slope) < 1e-14) break;
  }
  if (fit === null || local === null) throw new RangeError('no round was made');
  const across = local.covariance;
  return {
    foot: origin,
    direction: wrap(heading),
    sigma: Math.sqrt(across[1][1]),
    curvature: degree === 2 ? local.values[2] : null,
    curvatureSigma: degree === 2 ? Math.sqrt(across[2][2]) : null,
    used: points.length,
    chiSquared: fit.chiSquared,
    pValue: chiSquaredPValue(fit.chiSquared, fit.redundancy),
    redundancy: fit.redundancy,
  };
}

/** Offsets across the axis through `origin`, as a polynomial of the place along it. */
function fitAcross(
  points: readonly TracePoint[],
  origin: Vector,
  heading: number,
  degree: number,
  before: Polynomial | null,
): Polynomial {
  const local = points.map(({ at }) => rotate(-heading, subtract(at, origin)));
  const sigma = points.map(({ covariance }, i) => {
    const slope = before === null ? 0 : 2 * (before.coefficients[2] ?? 0) * local[i][0];
    const normal = turnLeft(unit(heading + Math.atan(slope)));
    const variance =
      normal[0] ** 2 * covariance[0][0] +
      2 * normal[0] * normal[1] * covariance[0][1] +
      normal[1] ** 2 * covariance[1][1];
    // the offset is taken across the axis, the variance across the curve
    return Math.sqrt(variance * (1 + slope * slope));
  });
  return fitPolynomial(
    local.map(([along]) => along),
    local.map(([, off]) => off),
    sigma,
    degree,
  );
}
