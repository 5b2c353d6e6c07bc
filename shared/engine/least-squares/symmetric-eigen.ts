/**
 * Eigenvalues and eigenvectors of a small symmetric matrix, by cyclic Jacobi rotations: exact to
 * rounding also where eigenvalues coincide or are tiny.
 * Source: Golub & Van Loan, Matrix Computations, section 8.5 (Jacobi methods), from memory.
 */
export interface SymmetricEigen {
  /** Ascending. */
  readonly values: readonly number[];
  /** `vectors[k]` belongs to `values[k]`, unit length. */
  readonly vectors: readonly (readonly number[])[];
}

const mostSweeps = 60;

export function symmetricEigen(matrix: readonly (readonly number[])[]): SymmetricEigen {
  const n = matrix.length;
  const a = matrix.map((row) => [...row]);
  const v = matrix.map((_, i) => matrix.map((__, j) => (i === j ? 1 : 0)));
  for (let sweep = 0; sweep < mostSweeps && offDiagonal(a) > 0; sweep++)
    for (let p = 0; p < n - 1; p++) for (let q = p + 1; q < n; q++) rotate(a, v, p, q);
  const order = a.map((_, i) => i).sort((i, j) => a[i][i] - a[j][j]);
  return { values: order.map((i) => a[i][i]), vectors: order.map((i) => v.map((row) => row[i])) };
}

/** Largest off-diagonal element that is not negligible against its diagonal. */
function offDiagonal(a: readonly (readonly number[])[]): number {
  let largest = 0;
  for (let i = 0; i < a.length; i++)
    for (let j = i + 1; j < a.length; j++) {
      const size = Math.abs(a[i][j]);
      const beside = Math.sqrt(Math.abs(a[i][i] * a[j][j]));
      if (size > 1e-17 * beside && size > 1e-300) largest = Math.max(largest, size);
    }
  return largest;
}

function rotate(a: number[][], v: number[][], p: number, q: number): void {
  if (a[p][q] === 0) return;
  const theta = (a[q][q] - a[p][p]) / (2 * a[p][q]);
  const t = (theta >= 0 ? 1 : -1) / (Math.abs(theta) + Math.hypot(1, theta));
  const c = 1 / Math.hypot(1, t);
  const s = t * c;
  const off = a[p][q];
  a[p][p] -= t * off;
  a[q][q] += t * off;
  a[p][q] = 0;
  a[q][p] = 0;
  for (let k = 0; k < a.length; k++) {
    if (k !== p && k !== q) {
      const kp = a[k][p];
      const kq = a[k][q];
      a[k][p] = a[p][k] = c * kp - s * kq;
      a[k][q] = a[q][k] = s * kp + c * kq;
    }
    const vp = v[k][p];
    v[k][p] = c * vp - s * v[k][q];
    v[k][q] = s * vp + c * v[k][q];
  }
}
