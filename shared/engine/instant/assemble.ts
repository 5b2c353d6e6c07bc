import type { Dense } from '../linear/dense';
import { zeros } from '../linear/dense';
import type { Column } from './derivative';
import type { Model } from './model';
import type { Rows } from './rows';

/**
 * Scale of each unknown: velocities as they are, ω times the body's length, so that a rank can be
 * judged from columns that all carry m/s. The motion is q = scaled / scale.
 */
export const unknownScales = (model: Model): Float64Array => {
  const scales = new Float64Array(3 * model.ground).fill(1);
  model.bodies.forEach((b, i) => {
    scales[3 * i + 2] = b.length;
  });
  return scales;
};

/** Norm of each row in scaled unknowns; 1 for an empty row. */
export const rowNorms = (
  rows: Rows,
  scales: Float64Array,
  ground: number,
  norms: Float64Array = new Float64Array(rows.count),
): Float64Array => {
  const c = rows.coefficients;
  for (let k = 0; k < rows.count; k++) {
    const a = rows.first[k];
    const b = rows.second[k];
    let sum = 0;
    for (let i = 0; i < 3; i++) {
      if (a !== ground) sum += (c[6 * k + i] / scales[3 * a + i]) ** 2;
      if (b !== ground) sum += (c[6 * k + 3 + i] / scales[3 * b + i]) ** 2;
    }
    norms[k] = sum > 0 ? Math.sqrt(sum) : 1;
  }
  return norms;
};

/** The chosen rows as a matrix of scaled unknowns, every row of unit norm. */
export const denseRows = (
  model: Model,
  rows: Rows,
  chosen: readonly number[],
  scales: Float64Array,
  norms: Float64Array,
): Dense => {
  const columns = 3 * model.ground;
  const a = zeros(chosen.length, columns);
  chosen.forEach((k, r) => {
    for (let i = 0; i < 6; i++) {
      const body = i < 3 ? rows.first[k] : rows.second[k];
      if (body === model.ground) continue;
      const column = 3 * body + (i % 3);
      a.values[r * columns + column] += rows.coefficients[6 * k + i] / (scales[column] * norms[k]);
    }
  });
  return a;
};

/** Derivatives by the noises as a matrix of the chosen rows, divided by their norms. */
export const denseColumns = (
  columns: readonly Column[],
  count: number,
  chosen: readonly number[],
  norms: Float64Array,
): Dense => {
  const place = new Int32Array(count).fill(-1);
  chosen.forEach((k, r) => {
    place[k] = r;
  });
  const b = zeros(chosen.length, columns.length);
  columns.forEach((column, j) => {
    column.rows.forEach((k, i) => {
      if (place[k] >= 0) b.values[place[k] * columns.length + j] += column.values[i] / norms[k];
    });
  });
  return b;
};
