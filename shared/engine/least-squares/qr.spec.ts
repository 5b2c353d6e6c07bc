import { describe, expect, it } from '@jest/globals';
import fc from 'fast-check';
import { covarianceOf } from './covariance';
import { apply, applyTransposed, factorise, inverseNormal, multiply, solve } from './qr';
import { symmetricEigen } from './symmetric-eigen';

const entry = fc.double({ min: -10, max: 10, noNaN: true });
const matrix = (rows: number, columns: number) =>
  fc
    .array(entry, { minLength: rows * columns, maxLength: rows * columns })
    .map((values) => Float64Array.from(values));

const largest = (a: ArrayLike<number>): number =>
  Array.from(a).reduce((most, value) => Math.max(most, Math.abs(value)), 0);
const less = (a: Float64Array, b: Float64Array): Float64Array => a.map((v, i) => v - b[i]);

describe('QR with column pivoting', () => {
  it('keeps lengths, and its reflections undo themselves', () => {
    fc.assert(
      fc.property(matrix(6, 4), matrix(6, 1), (a, b) => {
        const qr = factorise(a, 6, 4);
        const turned = applyTransposed(qr, b);
        expect(Math.hypot(...turned)).toBeCloseTo(Math.hypot(...b), 10);
        expect(largest(less(apply(qr, turned), b))).toBeLessThan(1e-12 * (1 + largest(b)));
      }),
      { numRuns: 100, seed: 5 },
    );
  });

  it('leaves residuals orthogonal to every column', () => {
    fc.assert(
      fc.property(matrix(7, 3), matrix(7, 1), (a, b) => {
        const x = solve(factorise(a, 7, 3), b);
        const residual = less(b, multiply(a, x, 7, 3, 1));
        for (let j = 0; j < 3; j++) {
          const column = a.subarray(7 * j, 7 * j + 7);
          const dot = column.reduce((sum, v, i) => sum + v * residual[i], 0);
          expect(Math.abs(dot)).toBeLessThan(1e-9 * (1 + largest(a) * largest(b)));
        }
      }),
      { numRuns: 100, seed: 6 },
    );
  });

  it('counts the columns that say something of their own', () => {
    const one = [1, 2, 3, 4];
    const two = [0, 1, 0, 2];
    const both = one.map((v, i) => 2 * v - 3 * two[i]);
    expect(factorise(Float64Array.from([...one, ...two, ...both]), 4, 3).rank).toBe(2);
    expect(factorise(new Float64Array(8), 4, 2).rank).toBe(0);
  });

  it('gives the inverse of the normal matrix, also for columns of very different size', () => {
    const a = Float64Array.from([1e6, 2e6, 5e6, 1e-6, -1e-6, 3e-6]);
    const covariance = covarianceOf(a, 3, 2);
    // the 2 × 2 inverse written out
    const [p, q, r] = [30e12, 14, 11e-12];
    const determinant = p * r - q * q;
    const exact = [r / determinant, -q / determinant, -q / determinant, p / determinant];
    exact.forEach((value, i) => expect(covariance[i] / value).toBeCloseTo(1, 10));
    const plain = inverseNormal(factorise(Float64Array.from([2, 0, 0, 4]), 2, 2));
    expect(Array.from(plain)).toEqual([0.25, 0, 0, 0.0625]);
  });
});

describe('eigenvalues of a symmetric matrix', () => {
  it('rebuild the matrix from orthonormal vectors', () => {
    fc.assert(
      fc.property(matrix(3, 3), (values) => {
        const a = [0, 1, 2].map((i) =>
          [0, 1, 2].map((j) => values[3 * Math.min(i, j) + Math.max(i, j)]),
        );
        const { values: eigen, vectors } = symmetricEigen(a);
        expect([...eigen].sort((x, y) => x - y)).toEqual(eigen);
        a.forEach((row, i) =>
          row.forEach((value, j) => {
            const rebuilt = eigen.reduce((sum, e, k) => sum + e * vectors[k][i] * vectors[k][j], 0);
            expect(Math.abs(rebuilt - value)).toBeLessThan(1e-12 * (1 + largest(values)));
          }),
        );
      }),
      { numRuns: 100, seed: 7 },
    );
  });
});
