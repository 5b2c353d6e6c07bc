import { EngineError } from '../errors';
import { covarianceOf } from '../least-squares/covariance';
import { minimise } from '../least-squares/levenberg-marquardt';
import { chiSquaredPValue } from '../uncertainty/distributions';
import type { TracePoint } from './trace-tangent';
import { norm, subtract, type Vector } from './vector';

export interface Circle {
  readonly centre: Vector;
  readonly radius: number;
}

export interface CircleFit extends Circle {
  /** Over centre x, centre y, radius; from the given uncertainties. */
  readonly covariance: readonly (readonly number[])[];
  readonly chiSquared: number;
  readonly redundancy: number;
  readonly pValue: number | null;
}

/**
 * Algebraic circle fits, without iteration to speak of. `kasa` is biased to small radii on short
 * arcs (too low a speed from a yaw mark) and serves as a comparison only; `pratt` and `taubin` are
 * nearly unbiased; `hyper` has no bias of second order.
 *
 * Points in m. Throws EngineError `not-enough-marks` under three points and `coincident-points`
 * when the points are on a straight line.
 * Sources: I. Kåsa, IEEE Trans. Instrum. Meas. 25 (1976) 8; V. Pratt, Computer Graphics 21 (1987)
 * 145; G. Taubin, IEEE Trans. Pattern Anal. Mach. Intell. 13 (1991) 1115; A. Al-Sharadqah and
 * N. Chernov, Electron. J. Stat. 3 (2009) 886.
 */
export function algebraicCircle(
  points: readonly Vector[],
  method: 'kasa' | 'pratt' | 'taubin' | 'hyper',
): Circle {
  if (points.length < 3)
    throw new EngineError('not-enough-marks', 'points', 'A circle takes at least three points.');
  const n = points.length;
  const middle: Vector = [
    points.reduce((sum, [x]) => sum + x, 0) / n,
    points.reduce((sum, [, y]) => sum + y, 0) / n,
  ];
  let [xx, yy, xy, xz, yz, zz] = [0, 0, 0, 0, 0, 0];
  for (const point of points) {
    const [x, y] = subtract(point, middle);
    const z = x * x + y * y;
    xx += (x * x) / n;
    yy += (y * y) / n;
    xy += (x * y) / n;
    xz += (x * z) / n;
    yz += (y * z) / n;
    zz += (z * z) / n;
  }
  const z = xx + yy;
  const spread = xx * yy - xy * xy;
  if (!(spread > 1e-14 * z * z))
    throw new EngineError('coincident-points', 'points', 'The points are on a straight line.');
  const variance = zz - z * z;
  const a0 = xz * (xz * yy - yz * xy) + yz * (yz * xx - xz * xy) - variance * spread;
  const a1 = variance * z + 4 * spread * z - xz * xz - yz * yz;
  const polynomial: Record<typeof method, readonly number[]> = {
    kasa: [],
    taubin: [a0, a1, -3 * z * z - zz, 4 * z],
    pratt: [a0, a1, 4 * spread - 3 * z * z - zz, 0, 4],
    hyper: [a0, a1, 4 * spread - 3 * z * z - zz, 0, 4],
  };
  const eta = method === 'kasa' ? 0 : leastRoot(polynomial[method]);
  const det = eta * eta - eta * z + spread;
  const centre: Vector = [
    (xz * (yy - eta) - yz * xy) / det / 2,
    (yz * (xx - eta) - xz * xy) / det / 2,
  ];
  const share = { kasa: 0, taubin: 0, pratt: 2, hyper: -2 }[method];
  return {
    centre: [centre[0] + middle[0], centre[1] + middle[1]],
    radius: Math.sqrt(centre[0] ** 2 + centre[1] ** 2 + z + share * eta),
  };
}

/** Newton's iteration from 0, which meets the least non-negative root from below. */
function leastRoot(coefficients: readonly number[]): number {
  let x = 0;
  for (let i = 0; i < 100; i++) {
    let value = 0;
    let slope = 0;
    for (let k = coefficients.length - 1; k >= 0; k--) {
      slope = slope * x + value;
      value = value * x + coefficients[k];
    }
    const next = x - value / slope;
    if (!Number.isFinite(next) || Math.abs(next - x) <= 1e-16 * Math.abs(next)) break;
    x = next;
  }
  return x;
}

/**
 * The circle of least squares of the distances from it, each over its standard uncertainty across
 * the circle: the maximum-likelihood fit. Starts from Pratt's.
 * Source: W. Gander, G. H. Golub and R. Strebel, BIT 34 (1994) 558.
 */
export function fitCircle(points: readonly TracePoint[]): CircleFit {
  const start = algebraicCircle(
    points.map(({ at }) => at),
    'pratt',
  );
  const m = points.length;
  const result = minimise(
    { freedom: 3, evaluate: (u) => radialResiduals(points, u, start.centre) },
    Float64Array.of(0, 0, start.radius),
  );
  const [dx, dy, radius] = result.x;
  const covariance = covarianceOf(result.jacobian, m, 3);
  return {
    centre: [start.centre[0] + dx, start.centre[1] + dy],
    radius,
    covariance: [0, 1, 2].map((i) => [0, 1, 2].map((j) => covariance[3 * i + j])),
    chiSquared: result.sumOfSquares,
    redundancy: m - 3,
    pValue: chiSquaredPValue(result.sumOfSquares, m - 3),
  };
}

function radialResiduals(points: readonly TracePoint[], u: Float64Array, origin: Vector) {
  const m = points.length;
  const centre: Vector = [origin[0] + u[0], origin[1] + u[1]];
  const rays = points.map(({ at, covariance }) => {
    const ray = subtract(at, centre);
    const distance = norm(ray);
    const out: Vector = [ray[0] / distance, ray[1] / distance];
    const variance =
      out[0] ** 2 * covariance[0][0] +
      2 * out[0] * out[1] * covariance[0][1] +
      out[1] ** 2 * covariance[1][1];
    return { distance, out, sigma: Math.sqrt(variance) };
  });
  return {
    residuals: Float64Array.from(rays, ({ distance, sigma }) => (distance - u[2]) / sigma),
    jacobian: () => {
      const columns = new Float64Array(3 * m);
      rays.forEach(({ out, sigma }, i) => {
        columns[i] = -out[0] / sigma;
        columns[m + i] = -out[1] / sigma;
        columns[2 * m + i] = -1 / sigma;
      });
      return columns;
    },
  };
}
