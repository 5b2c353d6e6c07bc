import { bandedZeros, factorBanded, solveBanded } from '../linear/banded';
import type { Banded, BandedFactors } from '../linear/banded';
import { inverseNorm1 } from '../linear/condition';
import { bandOrder } from '../linear/ordering';
import { rowNorms } from './assemble';
import type { Model } from './model';
import type { Rows } from './rows';

/**
 * As many equations as unknowns: one banded LU serves velocities, accelerations and the
 * derivatives by every noise. Bodies stand in reverse Cuthill–McKee order of the joints, and
 * equations by the bodies that they tie together, so that the work grows with the number of bodies
 * in a chain.
 */
export interface BandPlan {
  readonly size: number;
  readonly ground: number;
  readonly lower: number;
  readonly upper: number;
  /** Row of the band for each equation. */
  readonly rowPlace: Int32Array;
  /** Column of the band for each unknown. */
  readonly columnPlace: Int32Array;
  readonly scales: Float64Array;
}

/** Room for the numbers of a factorisation, which may be used again for the next one. */
export interface BandSpace {
  readonly band: Banded;
  readonly pivots: Int32Array;
  readonly norms: Float64Array;
  readonly sums: Float64Array;
}

export const spaceFor = ({ size, lower, upper }: BandPlan): BandSpace => ({
  band: bandedZeros(size, lower, upper),
  pivots: new Int32Array(size),
  norms: new Float64Array(size),
  sums: new Float64Array(size),
});

export interface Direct {
  readonly plan: BandPlan;
  readonly factors: BandedFactors;
  /** What each equation was divided by. */
  readonly norms: Float64Array;
  /** Largest sum of a column's absolute values. */
  readonly norm1: number;
}

const neighboursOf = (model: Model): number[][] => {
  const lists: number[][] = model.bodies.map(() => []);
  for (const j of model.joints) {
    if (!('b' in j) || j.b.body === model.ground) continue;
    lists[j.a.body].push(j.b.body);
    lists[j.b.body].push(j.a.body);
  }
  return lists;
};

/** Where equations and unknowns stand; depends on which bodies the rows tie, not on their numbers. */
export const planBand = (model: Model, rows: Rows, scales: Float64Array): BandPlan => {
  const { ground } = model;
  const size = rows.count;
  const bodyPlace = new Int32Array(ground + 1).fill(-1);
  bandOrder(neighboursOf(model)).forEach((body, k) => {
    bodyPlace[body] = k;
  });
  const low = new Int32Array(size);
  const high = new Int32Array(size);
  for (let k = 0; k < size; k++) {
    const a = bodyPlace[rows.first[k]];
    const b = bodyPlace[rows.second[k]];
    low[k] = a < 0 ? b : b < 0 ? a : Math.min(a, b);
    high[k] = Math.max(a, b);
  }
  const order = Array.from({ length: size }, (_, k) => k).sort(
    (i, j) => low[i] + high[i] - low[j] - high[j] || i - j,
  );
  const rowPlace = new Int32Array(size);
  let lower = 0;
  let upper = 0;
  order.forEach((k, r) => {
    rowPlace[k] = r;
    lower = Math.max(lower, r - 3 * low[k]);
    upper = Math.max(upper, 3 * high[k] + 2 - r);
  });
  const columnPlace = new Int32Array(3 * ground);
  for (let b = 0; b < ground; b++)
    for (let c = 0; c < 3; c++) columnPlace[3 * b + c] = 3 * bodyPlace[b] + c;
  const most = size - 1;
  return {
    size,
    ground,
    lower: Math.min(lower, most),
    upper: Math.min(upper, most),
    rowPlace,
    columnPlace,
    scales,
  };
};

export const factorDirect = (
  plan: BandPlan,
  rows: Rows,
  space: BandSpace = spaceFor(plan),
): Direct => {
  const { size, ground, lower, rowPlace, columnPlace, scales } = plan;
  const { band, norms, sums } = space;
  const { values, width } = band;
  values.fill(0);
  sums.fill(0);
  rowNorms(rows, scales, ground, norms);
  for (let k = 0; k < size; k++) {
    const from = rowPlace[k] * (width - 1) + lower;
    for (let i = 0; i < 6; i++) {
      const value = rows.coefficients[6 * k + i];
      const body = i < 3 ? rows.first[k] : rows.second[k];
      if (value === 0 || body === ground) continue;
      const unknown = 3 * body + (i < 3 ? i : i - 3);
      const scaled = value / (scales[unknown] * norms[k]);
      values[from + columnPlace[unknown]] += scaled;
      sums[columnPlace[unknown]] += Math.abs(scaled);
    }
  }
  let norm1 = 0;
  for (let c = 0; c < size; c++) if (sums[c] > norm1) norm1 = sums[c];
  return { plan, factors: factorBanded(band, space.pivots), norms, norm1 };
};

/** Estimate of the condition number in the 1-norm, or null where the equations are dependent. */
export const conditionOf = (direct: Direct, tolerance: number): number | null => {
  if (!(direct.factors.pivotRatio > tolerance)) return null;
  const condition = direct.norm1 * inverseNorm1(direct.factors);
  return condition * tolerance < 1 ? condition : null;
};

/** Solves for a motion, given one number per equation. */
export const solveDirect = (
  { plan, factors, norms }: Direct,
  right: Float64Array,
  motion: Float64Array,
  work: Float64Array = new Float64Array(plan.size),
): void => {
  const { size, rowPlace, columnPlace, scales } = plan;
  for (let k = 0; k < size; k++) work[rowPlace[k]] = right[k] / norms[k];
  solveBanded(factors, work);
  for (let i = 0; i < size; i++) motion[i] = work[columnPlace[i]] / scales[i];
};
