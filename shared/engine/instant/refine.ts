import type { Dense } from '../linear/dense';
import { condition2 } from '../linear/condition';
import { zeros } from '../linear/dense';
import { EngineError } from '../errors';
import type { Adjustment, Structure } from './adjustment';
import { adjust, structureOf } from './adjustment';
import { denseColumns, denseRows, rowNorms } from './assemble';
import { writeEquations } from './equations';
import type { Model, State } from './model';
import { turn } from './model';
import { rowResidual, rowsFor } from './rows';
import type { Held, LevelResult, Task } from './task';
import { motionOf } from './task';

const rounds = 120;

/** Moves the values by the noises, `amounts` standard deviations of each, from `base`. */
export const shiftValues = (
  model: Model,
  s: State,
  base: Float64Array,
  amounts: Float64Array,
): void => {
  s.g.set(base);
  model.noises.forEach((noise, j) => {
    if (amounts[j] !== 0)
      for (const { at, amount } of noise.entries) s.g[at] += amounts[j] * amount;
  });
  for (let b = 0; b < model.ground; b++) turn(s, b);
};

/**
 * Adjusts a motion, from a start near it, until all equations hold and the values of knowns and
 * geometry are moved as little as their uncertainties ask. `held` are unknowns that stay as they
 * start: the scale of a motion of which only directions are known.
 *
 * Returns null when exact equations contradict each other.
 */
export const refine = (
  task: Task,
  s: State,
  start: Float64Array,
  held: readonly Held[],
): LevelResult | null => {
  const { model, equations, scales } = task;
  const m = model.noises.length;
  const motion = motionOf(task, s);
  motion.set(start);
  const base = Float64Array.from(s.g);
  const shift = new Float64Array(m);
  const rows = rowsFor(equations.count);
  const all = Array.from({ length: equations.count }, (_, k) => k);
  let structure: Structure | null = null;
  let before = Infinity;
  for (let round = 0; round < rounds; round++) {
    writeEquations(equations, model.ground, s, rows);
    const norms = rowNorms(rows, scales, model.ground);
    const a = denseRows(model, rows, all, scales, norms);
    for (const { unknown } of held)
      for (let r = 0; r < a.rows; r++) a.values[r * a.columns + unknown] = 0;
    const b = denseColumns(task.columns(s), equations.count, all, norms);
    const w = Float64Array.from(all, (k) => rowResidual(rows, k, motion) / norms[k]);
    for (let k = 0; k < w.length; k++)
      for (let j = 0; j < m; j++) w[k] -= b.values[k * m + j] * shift[j];
    structure ??= structureOf(a, b, task.tolerance);
    const adjustment = adjust(a, b, w, structure);
    let change = 0;
    let size = 0;
    // Steps that keep overshooting, where magnitudes fit badly, are shortened.
    const share = round < 10 ? 1 : round < 25 ? 0.5 : 0.2;
    for (let i = 0; i < a.columns; i++) {
      motion[i] += (share * adjustment.x[i]) / scales[i];
      change = Math.max(change, Math.abs(adjustment.x[i]));
      size = Math.max(size, Math.abs(motion[i] * scales[i]));
    }
    for (let j = 0; j < m; j++) {
      if (!task.adjusts[j]) continue;
      change = Math.max(change, Math.abs(adjustment.n[j] - shift[j]) * size * 1e-2);
      shift[j] += share * (adjustment.n[j] - shift[j]);
    }
    if (m > 0) shiftValues(model, s, base, shift);
    // Where the position is nearly singular, rounding keeps the steps from getting smaller.
    const stalled = change >= 0.5 * before && change <= 1e-4 * size;
    before = change;
    if (change > 1e-13 * size && !stalled) continue;
    if (contradicts(task, structure, w, rows.right, norms, size)) return null;
    return resultOf(task, s, { a, b, structure, adjustment, held });
  }
  throw new EngineError(
    'not-converged',
    'knowns',
    `The ${equations.level === 'velocity' ? 'velocities' : 'accelerations'} did not converge.`,
  );
};

/** Whether an equation that follows from the others says something else than they do. */
export const contradicts = (
  task: Task,
  structure: Structure,
  w: Float64Array,
  right: Float64Array,
  norms: Float64Array,
  motionSize: number,
): boolean => {
  const size = right.reduce((most, v, k) => Math.max(most, Math.abs(v) / norms[k]), motionSize);
  const limit = Math.max(1e-9, task.tolerance) * size;
  return structure.dependent.some(({ row, weights }) => {
    let gap = w[row];
    structure.kept.forEach((k, i) => {
      gap -= weights[i] * w[k];
    });
    return Math.abs(gap) > limit;
  });
};

interface Solved {
  readonly a: Dense;
  readonly b: Dense;
  readonly structure: Structure;
  readonly adjustment: Adjustment;
  readonly held: readonly Held[];
}

const resultOf = (task: Task, s: State, solved: Solved): LevelResult => {
  const { model, scales } = task;
  const { a, b, structure, adjustment, held } = solved;
  const length = 3 * (model.ground + 1);
  const motion = Float64Array.from(motionOf(task, s));
  const errors = model.noises.map((_, j) => {
    const error = new Float64Array(length);
    for (let i = 0; i < a.columns; i++) {
      let sum = 0;
      for (const k of structure.kept)
        sum += adjustment.gain.values[i * a.rows + k] * b.values[k * b.columns + j];
      error[i] = -sum / scales[i];
    }
    return error;
  });
  const free = structure.free
    .filter((z) => !held.some((h) => z[h.unknown] !== 0))
    .map((z) => {
      const vector = new Float64Array(length);
      for (let i = 0; i < a.columns; i++) vector[i] = z[i] / scales[i];
      return vector;
    });
  for (const { bodies } of held) {
    const vector = new Float64Array(length);
    for (const b of bodies) vector.set(motion.subarray(3 * b, 3 * b + 3), 3 * b);
    free.push(vector);
  }
  return {
    motion,
    errors,
    g: Float64Array.from(s.g),
    adjustment: { n: adjustment.n, control: adjustment.control },
    free,
    rank: structure.basic.length,
    redundancy: structure.kept.length - structure.basic.length,
    chiSquared: adjustment.chiSquared,
    condition: conditionOf(a, structure),
  };
};

const conditionOf = (a: Dense, structure: Structure): number | null => {
  if (structure.free.length > 0) return null;
  const chosen = zeros(structure.kept.length, a.columns);
  structure.kept.forEach((k, r) =>
    chosen.values.set(a.values.subarray(k * a.columns, (k + 1) * a.columns), r * a.columns),
  );
  return condition2(chosen);
};
