import type { Equations, Owner } from './equations';
import { writeEquations } from './equations';
import { noiseColumns, readersOf, velocityDerivatives } from './derivative';
import { slides } from './joints/index';
import { afterAdjustment } from './level';
import type { Level, Model, ModelJoint } from './model';
import { rowResidual } from './rows';
import type { AnswerBranch } from './solve';

export interface Slide {
  readonly rate: number | null;
  readonly change: number | null;
  /** Standard uncertainties. */
  readonly rateSigma: number | null;
  readonly changeSigma: number | null;
}

const slidesOf = (model: Model, joints: readonly ModelJoint[], level: Level): Equations => ({
  level,
  count: joints.length,
  quadratic: [],
  owners: joints.map((joint, from): Owner => {
    const bodies = 'b' in joint ? [joint.a.body, joint.b.body] : [joint.a.body];
    const { id, index } = joint;
    // The value is read from the ground's pose, which is zero: the residual is the rate itself.
    const valueAt = 3 * model.ground;
    const known = { id, index, level, parts: [], kind: 'slide', joint, valueAt } as const;
    return { from, count: 1, bodies, joint: null, known };
  }),
});

/** Rates of sliding (or of length) at the joints that have one, with their uncertainty. */
export const slideResults = (model: Model, branch: AnswerBranch): Map<string, Slide> => {
  const joints = model.joints.filter(slides);
  const found = new Map<string, Slide>();
  if (joints.length === 0) return found;
  const rate = rates(model, branch, joints, 'velocity');
  const change = rates(model, branch, joints, 'acceleration');
  joints.forEach((j, k) =>
    found.set(j.id, {
      rate: rate[k]?.value ?? null,
      change: change[k]?.value ?? null,
      rateSigma: rate[k]?.sigma ?? null,
      changeSigma: change[k]?.sigma ?? null,
    }),
  );
  return found;
};

const rates = (
  model: Model,
  branch: AnswerBranch,
  joints: readonly ModelJoint[],
  level: Level,
): ({ value: number; sigma: number } | null)[] => {
  const { state, velocity, acceleration } = branch;
  const result = level === 'velocity' ? velocity : acceleration;
  if (result === null) return joints.map(() => null);
  const equations = slidesOf(model, joints, level);
  const rows = writeEquations(equations, model.ground, state);
  const columns = afterAdjustment(
    noiseColumns(model, equations, readersOf(equations, model.noises.length), state),
    velocity,
  );
  const derivatives =
    level === 'acceleration' ? velocityDerivatives(model, equations, state) : null;
  const along = (c: Float64Array, k: number, q: Float64Array): number => {
    let sum = 0;
    for (let i = 0; i < 3; i++)
      sum += c[6 * k + i] * q[3 * rows.first[k] + i] + c[6 * k + 3 + i] * q[3 * rows.second[k] + i];
    return sum;
  };
  return joints.map((_, k) => {
    if (result.free.some((z) => Math.abs(along(rows.coefficients, k, z)) > 1e-9)) return null;
    if (derivatives !== null && velocity.free.some((z) => dependsOn(derivatives, k, z, along)))
      return null;
    let variance = 0;
    columns.forEach((column, j) => {
      let error = along(rows.coefficients, k, result.errors[j]);
      column.rows.forEach((row, i) => {
        if (row === k) error += column.values[i];
      });
      if (derivatives !== null) error += along(derivatives, k, velocity.errors[j]);
      variance += error * error;
    });
    return { value: rowResidual(rows, k, result.motion), sigma: Math.sqrt(variance) };
  });
};

const dependsOn = (
  derivatives: Float64Array,
  k: number,
  z: Float64Array,
  along: (c: Float64Array, k: number, q: Float64Array) => number,
): boolean => Math.abs(along(derivatives, k, z)) > 1e-9;
