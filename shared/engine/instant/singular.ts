import { zeros } from '../linear/dense';
import { pivotedQr, solveLeastSquares } from '../linear/pivoted-qr';
import { denseRows, rowNorms, unknownScales } from './assemble';
import { closureJacobian } from './closure';
import type { Equations } from './equations';
import { writeEquations } from './equations';
import type { Model } from './model';
import { stateOf } from './model';

/** Share of each body's length by which the mechanism is moved to look at its neighbourhood. */
const aside = 1e-2;

/**
 * Whether the equations are fewer than usual only in this position (dead centre, change point):
 * the mechanism is moved a little, with its joints kept closed, and the rank is taken again.
 */
export const isSingularPosition = (
  model: Model,
  equations: Equations,
  motion: Float64Array,
  tolerance: number,
): boolean => {
  const rank = rankOf(model, equations, motion, tolerance);
  return [1, 2].some((seed) => {
    const moved = moveAside(model, seed);
    return moved !== null && rankOf(moved, equations, motion, Math.max(tolerance, 1e-6)) > rank;
  });
};

const rankOf = (
  model: Model,
  equations: Equations,
  motion: Float64Array,
  tolerance: number,
): number => {
  const s = stateOf(model);
  s.velocity.set(motion);
  s.acceleration.set(motion);
  const rows = writeEquations(equations, model.ground, s);
  const scales = unknownScales(model);
  const linear = Array.from({ length: equations.count }, (_, k) => k).filter(
    (k) => !equations.quadratic.includes(k),
  );
  const norms = rowNorms(rows, scales, model.ground);
  return pivotedQr(denseRows(model, rows, linear, scales, norms), tolerance).rank;
};

/** A neighbouring position with the joints closed, or null when none is found. */
const moveAside = (model: Model, seed: number): Model | null => {
  const g = Float64Array.from(model.g);
  const moved = { ...model, g };
  const scale = (i: number): number => (i % 3 === 2 ? model.bodies[(i - 2) / 3].length : 1);
  for (let i = 0; i < 3 * model.ground; i++) {
    const length = model.bodies[Math.floor(i / 3)].length;
    g[i] += (aside * length * Math.sin(seed * 12.9898 + 78.233 * (i + 1))) / scale(i);
  }
  const wanted = closureJacobian(model).values;
  for (let round = 0; round < 20; round++) {
    const { columns, values } = closureJacobian(moved);
    const gap = values.map((v, i) => wanted[i] - v);
    if (gap.every((v) => Math.abs(v) < 1e-12)) return moved;
    const matrix = zeros(values.length, columns.length);
    columns.forEach((column, c) =>
      column.forEach((v, r) => {
        matrix.values[r * columns.length + c] = v / scale(c);
      }),
    );
    const step = solveLeastSquares(pivotedQr(matrix, 1e-8), gap);
    step.forEach((v, c) => {
      g[c] += v / scale(c);
    });
  }
  const { values } = closureJacobian(moved);
  return values.every((v, i) => Math.abs(v - wanted[i]) < 1e-9) ? moved : null;
};
