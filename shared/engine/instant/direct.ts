import { bandedZeros, factorBanded, solveBanded } from '../linear/banded';
import type { BandedFactors } from '../linear/banded';
import { inverseNorm1 } from '../linear/condition';
import { bandOrder } from '../linear/ordering';
import { rowNorms } from './assemble';
import type { Model } from './model';
import type { Rows } from './rows';

/**
 * As many equations as unknowns: one banded LU serves velocities, accelerations and the
 * derivatives by every noise. Bodies stand in reverse Cuthill–McKee order of the joints, so that
 * the work grows with the number of bodies in a chain.
 */
export interface Direct {
  readonly factors: BandedFactors;
  /** Row of the band for each equation, and its norm. */
  readonly rowPlace: Int32Array;
  readonly norms: Float64Array;
  /** Column of the band for each unknown. */
  readonly columnPlace: Int32Array;
  readonly condition: number;
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

/** Places in the band, by bodies and then by the bodies that each equation ties together. */
export const bandOf = (model: Model): Int32Array => {
  const place = new Int32Array(model.ground + 1).fill(-1);
  bandOrder(neighboursOf(model)).forEach((body, k) => {
    place[body] = k;
  });
  return place;
};

/** Null when the equations are not independent (a pivot below `tolerance` of the largest). */
export const factorDirect = (
  model: Model,
  rows: Rows,
  scales: Float64Array,
  bodyPlace: Int32Array,
  tolerance: number,
): Direct | null => {
  const { ground } = model;
  const size = rows.count;
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
  lower = Math.min(lower, size - 1);
  upper = Math.min(upper, size - 1);
  const norms = rowNorms(rows, scales, ground);
  const columnPlace = new Int32Array(size);
  for (let b = 0; b < ground; b++)
    for (let c = 0; c < 3; c++) columnPlace[3 * b + c] = 3 * bodyPlace[b] + c;
  const band = bandedZeros(size, lower, upper);
  const columnSums = new Float64Array(size);
  for (let k = 0; k < size; k++) {
    const r = rowPlace[k];
    for (let i = 0; i < 6; i++) {
      const value = rows.coefficients[6 * k + i];
      const body = i < 3 ? rows.first[k] : rows.second[k];
      if (value === 0 || body === ground) continue;
      const unknown = 3 * body + (i % 3);
      const c = columnPlace[unknown];
      const scaled = value / (scales[unknown] * norms[k]);
      band.values[r * band.width + c - r + lower] += scaled;
      columnSums[c] += Math.abs(scaled);
    }
  }
  const factors = factorBanded(band);
  if (!(factors.pivotRatio > tolerance)) return null;
  const condition = Math.max(...columnSums) * inverseNorm1(factors);
  return condition * tolerance < 1 ? { factors, rowPlace, norms, columnPlace, condition } : null;
};

/** Solves for a motion, given one number per equation through `load`. */
export const solveDirect = (
  direct: Direct,
  scales: Float64Array,
  load: (b: Float64Array) => void,
  motion: Float64Array,
): void => {
  const b = new Float64Array(direct.rowPlace.length);
  load(b);
  solveBanded(direct.factors, b);
  for (let i = 0; i < b.length; i++) motion[i] = b[direct.columnPlace[i]] / scales[i];
};
