import { factorise, inverseNormal } from './qr';

/**
 * (JᵀJ)⁻¹ of an m × n Jacobian of full column rank (column-major), n × n: the covariance of the
 * parameters when each residual has unit variance. Columns are scaled first, so that parameters of
 * very different size do not hide each other.
 */
export function covarianceOf(jacobian: Float64Array, m: number, n: number): Float64Array {
  const { scaled, lengths } = unitColumns(jacobian, m, n);
  const inverse = inverseNormal(factorise(scaled, m, n, 0));
  return inverse.map((value, k) => value / (lengths[Math.floor(k / n)] * lengths[k % n]));
}

/** The matrix with every column divided by its length; zero columns are left. */
export function unitColumns(
  a: Float64Array,
  m: number,
  n: number,
): { scaled: Float64Array; lengths: Float64Array } {
  const scaled = Float64Array.from(a);
  const lengths = new Float64Array(n);
  for (let j = 0; j < n; j++) {
    let square = 0;
    for (let i = j * m; i < (j + 1) * m; i++) square += a[i] * a[i];
    lengths[j] = Math.sqrt(square) || 1;
    for (let i = j * m; i < (j + 1) * m; i++) scaled[i] /= lengths[j];
  }
  return { scaled, lengths };
}
