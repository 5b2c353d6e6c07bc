import { applyTransposed, factorise, inverseNormal, solve } from './qr';

/** c₀ + c₁·t + c₂·t² …, fitted with weights 1/σ². */
export interface Polynomial {
  readonly coefficients: Float64Array;
  /** Covariance of the coefficients, n × n, from the given σ (not scaled by the fit). */
  readonly covariance: Float64Array;
  readonly chiSquared: number;
  readonly redundancy: number;
}

/**
 * Weighted least-squares polynomial of the given degree through (t, y ± σ), by QR.
 * Takes at least degree + 1 different t; with fewer the covariance is not finite.
 */
export function fitPolynomial(
  t: ArrayLike<number>,
  y: ArrayLike<number>,
  sigma: ArrayLike<number>,
  degree: number,
): Polynomial {
  const m = t.length;
  const n = degree + 1;
  const design = new Float64Array(m * n);
  const right = new Float64Array(m);
  for (let i = 0; i < m; i++) {
    let power = 1 / sigma[i];
    right[i] = y[i] / sigma[i];
    for (let j = 0; j < n; j++, power *= t[i]) design[j * m + i] = power;
  }
  const qr = factorise(design, m, n, 0);
  const rest = applyTransposed(qr, right).subarray(n);
  return {
    coefficients: solve(qr, right),
    covariance: inverseNormal(qr),
    chiSquared: rest.reduce((sum, value) => sum + value * value, 0),
    redundancy: m - n,
  };
}

/** The polynomial's k-th derivatives at t, k = 0 … 2, and their covariance. */
export function derivativesAt(
  fit: Polynomial,
  t: number,
): { values: readonly [number, number, number]; covariance: readonly (readonly number[])[] } {
  const n = fit.coefficients.length;
  const functionals = [0, 1, 2].map((order) =>
    Float64Array.from({ length: n }, (_, j) => {
      let factor = 1;
      for (let k = 0; k < order; k++) factor *= j - k;
      return j < order ? 0 : factor * t ** (j - order);
    }),
  );
  const dot = (a: Float64Array, b: Float64Array): number => a.reduce((s, v, i) => s + v * b[i], 0);
  const through = functionals.map((functional) =>
    Float64Array.from({ length: n }, (_, i) =>
      dot(fit.covariance.subarray(i * n, (i + 1) * n), functional),
    ),
  );
  const [value, slope, bend] = functionals.map((functional) => dot(functional, fit.coefficients));
  return {
    values: [value, slope, bend],
    covariance: functionals.map((a) => through.map((b) => dot(a, b))),
  };
}
