import type { Dense } from '../linear/dense';
import { multiply, transpose, zeros } from '../linear/dense';
import { factor, inverse } from '../linear/lu';
import { nullSpace, pivotedQr } from '../linear/pivoted-qr';

/**
 * One step of a least-squares adjustment with exact and uncertain equations together.
 *
 * The equations are w + A x + B n = 0: x the unknowns (columns scaled), n independent causes of
 * unit variance. Sought is the n of least square sum that lets them all hold (general model of
 * adjustment, "Gauss–Helmert"). With Σ = B Bᵀ, which is singular where equations are exact,
 *   | Σ  A | | μ |   | −w |
 *   | Aᵀ 0 | | x | = |  0 |,   n = Bᵀ μ,
 * and the inverse of that matrix holds all that is asked of the adjustment: x = −K w, μ = −P w.
 * Source: Teunissen, Adjustment Theory (TU Delft); Björck, Numerical Methods for Least Squares
 * Problems, 4.3 (augmented system), *from memory*.
 */
export interface Adjustment {
  readonly x: Float64Array;
  readonly n: Float64Array;
  /** x = −K w, unknowns × equations. */
  readonly gain: Dense;
  /** Bᵀ P B: covariance of n as adjusted. */
  readonly control: Dense;
  readonly chiSquared: number;
}

export interface Structure {
  /** Equations that do not follow from others. */
  readonly kept: readonly number[];
  /** Equations that follow from others, and how: each is the given combination of `kept`. */
  readonly dependent: readonly { readonly row: number; readonly weights: Float64Array }[];
  /** Unknowns that the equations fix once the others are chosen. */
  readonly basic: readonly number[];
  /** Basis of the motions that the equations leave free. */
  readonly free: readonly Float64Array[];
}

/** Largest absolute value. */
const largest = (values: Float64Array): number => {
  let most = 0;
  for (const v of values) if (Math.abs(v) > most) most = Math.abs(v);
  return most;
};

/** Finds which equations and unknowns count; `tolerance` is relative to rows of unit norm. */
export const structureOf = (a: Dense, b: Dense, tolerance: number): Structure => {
  const spread = largest(b.values);
  const joined = zeros(a.columns + b.columns, a.rows);
  for (let r = 0; r < a.rows; r++) {
    for (let j = 0; j < a.columns; j++) joined.values[j * a.rows + r] = a.values[r * a.columns + j];
    for (let j = 0; j < b.columns; j++)
      joined.values[(a.columns + j) * a.rows + r] =
        spread > 0 ? b.values[r * b.columns + j] / spread : 0;
  }
  const rowsQr = pivotedQr(joined, tolerance);
  const kept = Array.from(rowsQr.order.subarray(0, rowsQr.rank));
  const combinations = nullSpace(rowsQr);
  const dependent = combinations.map((weights, i) => ({
    row: rowsQr.order[rowsQr.rank + i],
    weights: Float64Array.from(kept, (k) => -weights[k]),
  }));
  const columnsQr = pivotedQr(a, tolerance);
  return {
    kept,
    dependent,
    basic: Array.from(columnsQr.order.subarray(0, columnsQr.rank)),
    free: nullSpace(columnsQr),
  };
};

/** Adjusts the kept equations for the basic unknowns; the others stay as they are. */
export const adjust = (a: Dense, b: Dense, w: Float64Array, structure: Structure): Adjustment => {
  const { kept, basic } = structure;
  const e = kept.length;
  const u = basic.length;
  const m = b.columns;
  const size = e + u;
  const keptB = zeros(e, m);
  kept.forEach((k, r) => keptB.values.set(b.values.subarray(k * m, (k + 1) * m), r * m));
  const sigma = multiply(keptB, transpose(keptB));
  // Variances are brought to the size of A, so that pivots compare like with like.
  const variance = largest(sigma.values) || 1;
  const system = zeros(size, size);
  for (let r = 0; r < e; r++) {
    for (let c = 0; c < e; c++) system.values[r * size + c] = sigma.values[r * e + c] / variance;
    for (let c = 0; c < u; c++) {
      const value = a.values[kept[r] * a.columns + basic[c]];
      system.values[r * size + e + c] = value;
      system.values[(e + c) * size + r] = value;
    }
  }
  const inverted = inverse(factor(system)).values;
  const multipliers = new Float64Array(e);
  const x = new Float64Array(a.columns);
  const gain = zeros(a.columns, a.rows);
  const weight = zeros(e, e);
  for (let c = 0; c < e; c++) {
    const wc = w[kept[c]];
    for (let r = 0; r < e; r++) {
      const p = inverted[r * size + c] / variance;
      weight.values[r * e + c] = p;
      multipliers[r] -= p * wc;
    }
    for (let r = 0; r < u; r++) {
      const k = inverted[(e + r) * size + c];
      gain.values[basic[r] * a.rows + kept[c]] = k;
      x[basic[r]] -= k * wc;
    }
  }
  const n = new Float64Array(m);
  for (let r = 0; r < e; r++)
    for (let j = 0; j < m; j++) n[j] += keptB.values[r * m + j] * multipliers[r];
  return {
    x,
    n,
    gain,
    control: multiply(transpose(keptB), multiply(weight, keptB)),
    chiSquared: n.reduce((sum, v) => sum + v * v, 0),
  };
};
