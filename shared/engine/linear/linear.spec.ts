import { describe, expect, it } from '@jest/globals';
import * as fc from 'fast-check';
import { EigenvalueDecomposition, Matrix, SingularValueDecomposition, solve } from 'ml-matrix';
import { bandedZeros, factorBanded, solveBanded, solveBandedTransposed } from './banded';
import { cholesky, solveCholesky } from './cholesky';
import { condition2, inverseNorm1, singularValues } from './condition';
import { fromRows, multiply, toRows, transpose } from './dense';
import { factor, inverse, solveFactored } from './lu';
import { bandOrder } from './ordering';
import { nullSpace, pivotedQr, solveLeastSquares } from './pivoted-qr';

/** Algebra held against ml-matrix, an independent library. */
const runs = { seed: 20261201, numRuns: 100 };
const entry = fc.integer({ min: -1000, max: 1000 }).map((v) => v / 100);
const matrixOf = (rows: number, columns: number) =>
  fc.array(fc.array(entry, { minLength: columns, maxLength: columns }), {
    minLength: rows,
    maxLength: rows,
  });

const expectNear = (got: ArrayLike<number>, want: ArrayLike<number>, tolerance = 1e-9): void => {
  expect(got).toHaveLength(want.length);
  const size = Math.max(1, ...Array.from(want, Math.abs));
  for (let i = 0; i < want.length; i++)
    expect(Math.abs(got[i] - want[i])).toBeLessThanOrEqual(tolerance * size);
};

/** A square matrix whose solutions do not magnify rounding beyond the tolerance. */
const solvable = (rows: number[][]): boolean => (condition2(fromRows(rows)) ?? Infinity) < 1e5;

const bandOf = (rows: number[][], lower: number, upper: number) => {
  const band = bandedZeros(rows.length, lower, upper);
  rows.forEach((row, i) =>
    row.forEach((v, j) => {
      if (j >= i - lower && j <= i + upper) band.values[i * band.width + j - i + lower] = v;
    }),
  );
  return band;
};

const cut = (rows: number[][], lower: number, upper: number): number[][] =>
  rows.map((row, i) => row.map((v, j) => (j >= i - lower && j <= i + upper ? v : 0)));

describe('banded LU', () => {
  it('solves with the matrix and with its transpose', () => {
    fc.assert(
      fc.property(
        matrixOf(9, 9),
        fc.array(entry, { minLength: 9, maxLength: 9 }),
        fc.integer({ min: 0, max: 8 }),
        fc.integer({ min: 0, max: 8 }),
        (rows, b, lower, upper) => {
          const banded = cut(rows, lower, upper);
          if (!solvable(banded)) return;
          const factors = factorBanded(bandOf(banded, lower, upper));
          const x = Float64Array.from(b);
          solveBanded(factors, x);
          const column = Matrix.columnVector(b);
          expectNear(x, solve(new Matrix(banded), column).to1DArray());
          const y = Float64Array.from(b);
          solveBandedTransposed(factors, y);
          expectNear(y, solve(new Matrix(banded).transpose(), column).to1DArray());
        },
      ),
      runs,
    );
  });

  it('says that a singular matrix is one', () => {
    const factors = factorBanded(
      bandOf(
        [
          [1, 2],
          [2, 4],
        ],
        1,
        1,
      ),
    );
    expect(factors.pivotRatio).toBe(0);
  });

  it('estimates the norm of the inverse from below, and most often exactly', () => {
    const ratios: number[] = [];
    fc.assert(
      fc.property(matrixOf(8, 8), (rows) => {
        if (!solvable(rows)) return;
        const estimate = inverseNorm1(factorBanded(bandOf(rows, 7, 7)));
        const exact = inverse(factor(fromRows(rows)));
        const sums = toRows(transpose(exact)).map((c) => c.reduce((s, v) => s + Math.abs(v), 0));
        const norm = Math.max(...sums);
        expect(estimate).toBeLessThanOrEqual(norm * (1 + 1e-9));
        ratios.push(estimate / norm);
      }),
      runs,
    );
    expect(ratios.reduce((sum, r) => sum + r, 0) / ratios.length).toBeGreaterThan(0.9);
  });
});

describe('dense LU', () => {
  it('solves, and inverts', () => {
    fc.assert(
      fc.property(matrixOf(6, 6), fc.array(entry, { minLength: 6, maxLength: 6 }), (rows, b) => {
        if (!solvable(rows)) return;
        const factors = factor(fromRows(rows));
        const want = solve(new Matrix(rows), Matrix.columnVector(b)).to1DArray();
        expectNear(solveFactored(factors, Float64Array.from(b)), want);
        const product = multiply(inverse(factors), fromRows(rows));
        expectNear(product.values, Matrix.eye(6).to1DArray(), 1e-8);
      }),
      runs,
    );
  });
});

describe('Cholesky', () => {
  it('reproduces a positive semi-definite matrix of any rank, and solves a definite one', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 5 }), matrixOf(5, 5), (rank, rows) => {
        const root = fromRows(rows.map((r) => r.slice(0, rank)));
        const a = multiply(root, transpose(root));
        const l = cholesky(a, 1e-8);
        expect(l).not.toBeNull();
        if (l === null) return;
        expectNear(multiply(l, transpose(l)).values, a.values, 1e-6);
        if (rank < 5 || !solvable(rows)) return;
        const b = [1, -2, 3, 0.5, 1];
        const want = solve(new Matrix(toRows(a)), Matrix.columnVector(b)).to1DArray();
        expectNear(solveCholesky(l, b), want, 1e-5);
      }),
      runs,
    );
  });

  it('refuses a matrix with a negative eigenvalue', () => {
    const rows = [
      [1, 2],
      [2, 1],
    ];
    expect(Math.min(...new EigenvalueDecomposition(new Matrix(rows)).realEigenvalues)).toBeLessThan(
      0,
    );
    expect(cholesky(fromRows(rows))).toBeNull();
  });
});

describe('QR with column pivoting', () => {
  it('gives the least-squares solution of ml-matrix', () => {
    fc.assert(
      fc.property(matrixOf(8, 4), fc.array(entry, { minLength: 8, maxLength: 8 }), (rows, b) => {
        if (!solvable(rows)) return;
        const want = solve(new Matrix(rows), Matrix.columnVector(b), true).to1DArray();
        expectNear(solveLeastSquares(pivotedQr(fromRows(rows)), b), want, 1e-8);
      }),
      runs,
    );
  });

  it('finds the rank of a product, and a basis of its null space', () => {
    fc.assert(
      fc.property(matrixOf(6, 3), matrixOf(3, 5), fc.integer({ min: 1, max: 3 }), (p, q, rank) => {
        const left = fromRows(p.map((r) => r.slice(0, rank)));
        const right = fromRows(q.slice(0, rank));
        if (!solvable(toRows(left)) || !solvable(toRows(right))) return;
        const a = multiply(left, right);
        const qr = pivotedQr(a, 1e-9);
        expect(qr.rank).toBe(new SingularValueDecomposition(new Matrix(toRows(a))).rank);
        const basis = nullSpace(qr);
        expect(basis).toHaveLength(5 - qr.rank);
        for (const z of basis)
          expectNear(
            multiply(a, { rows: 5, columns: 1, values: z }).values,
            new Array(6).fill(0),
            1e-6,
          );
      }),
      runs,
    );
  });
});

it('singular values are those of ml-matrix, largest first', () => {
  const rows = [
    [3, 0, 1],
    [0, 2, 0],
  ];
  expectNear(singularValues(fromRows(rows)), [Math.sqrt(10), 2]);
});

describe('reverse Cuthill–McKee', () => {
  it('orders a shuffled chain so that neighbours stand together', () => {
    fc.assert(
      fc.property(fc.shuffledSubarray([...Array(30).keys()], { minLength: 30 }), (names) => {
        const neighbours: number[][] = names.map(() => []);
        for (let k = 1; k < names.length; k++) {
          neighbours[names[k]].push(names[k - 1]);
          neighbours[names[k - 1]].push(names[k]);
        }
        const place = new Map(Array.from(bandOrder(neighbours), (v, k) => [v, k]));
        expect(place.size).toBe(30);
        neighbours.forEach((list, v) =>
          list.forEach((u) =>
            expect(Math.abs((place.get(u) ?? NaN) - (place.get(v) ?? NaN))).toBe(1),
          ),
        );
      }),
      { ...runs, numRuns: 20 },
    );
  });

  it('keeps every vertex of a graph in pieces', () => {
    expect(Array.from(bandOrder([[1], [0], [], [4], [3]])).sort()).toEqual([0, 1, 2, 3, 4]);
  });
});
