import type { Equations, Owner } from './equations';
import { writeOwner } from './equations';
import type { Model, ModelJoint, Noise, Place, State } from './model';
import { turn } from './model';
import { rowResidual, rowsFor } from './rows';

/** Derivatives of the residuals by one cause of uncertainty: rows that it touches, and how much. */
export interface Column {
  readonly rows: number[];
  readonly values: number[];
}

const places = (a: Place): number[] => [3 * a.body, 3 * a.body + 1, 3 * a.body + 2, a.at, a.at + 1];

const jointInputs = (j: ModelJoint): number[] => {
  switch (j.kind) {
    case 'pin':
    case 'weld':
      return [...places(j.a), ...places(j.b)];
    case 'path':
      return [...places(j.a), ...places(j.b), j.directionAt, j.radiusAt, j.rollingAt];
    case 'link':
      return [...places(j.a), ...places(j.b), j.rateAt, j.rateChangeAt];
    case 'wheel':
      return [...places(j.a), j.steerAt, j.steerRateAt];
    case 'gear':
      return [...places(j.a), ...places(j.b), j.radiusAt, j.otherRadiusAt];
  }
};

/** Elements of `g` that the owner's rows read. */
const inputsOf = (owner: Owner): number[] => {
  if (owner.joint !== null) return jointInputs(owner.joint);
  const k = owner.known;
  switch (k.kind) {
    case 'components':
      return [...places(k.a), k.xAt, k.xAt + 1];
    case 'polar':
      return [...places(k.a), k.magnitudeAt, k.directionAt];
    case 'curvature':
      return [...places(k.a), k.directionAt, k.curvatureAt];
    case 'angular':
      return [k.valueAt];
    case 'slide':
      return [...jointInputs(k.joint), k.valueAt];
  }
};

/** Which owners read each element of `g`; nothing is listed where nothing is uncertain. */
export const readersOf = (
  equations: Equations,
  noises: number,
): ReadonlyMap<number, readonly Owner[]> => {
  const readers = new Map<number, Owner[]>();
  if (noises === 0) return readers;
  for (const owner of equations.owners)
    for (const at of new Set(inputsOf(owner))) {
      const list = readers.get(at);
      if (list === undefined) readers.set(at, [owner]);
      else list.push(owner);
    }
  return readers;
};

/**
 * Fourth-order central differences: exact for polynomials up to the fourth degree, which most
 * rows are, and better than 10⁻¹² of the function otherwise at the steps that the model gives.
 * `shift(t)` moves the state by t from where it was.
 */
const weights: readonly (readonly [step: number, weight: number])[] = [
  [1, 8 / 12],
  [-1, -8 / 12],
  [2, -1 / 12],
  [-2, 1 / 12],
];

/** Derivative of every residual by each noise, at the motion and the values of the state. */
export const noiseColumns = (
  model: Model,
  equations: Equations,
  readers: ReadonlyMap<number, readonly Owner[]>,
  s: State,
): Column[] => {
  const motion = equations.level === 'velocity' ? s.velocity : s.acceleration;
  const scratch = rowsFor(3);
  return model.noises.map((noise) => {
    const owners = new Set<Owner>();
    for (const { at } of noise.entries) for (const o of readers.get(at) ?? []) owners.add(o);
    const column: Column = { rows: [], values: [] };
    if (owners.size === 0) return column;
    const step = stepOf(model, noise);
    const list = [...owners];
    const sums = list.map(() => [0, 0, 0]);
    const saved = noise.entries.map(({ at }) => s.g[at]);
    const shift = (t: number): void =>
      noise.entries.forEach(({ at, amount }, i) => {
        s.g[at] = saved[i] + t * amount;
        if (at < 3 * model.ground && at % 3 === 2) turn(s, (at - 2) / 3);
      });
    for (const [multiple, weight] of weights) {
      shift(multiple * step);
      list.forEach((owner, i) => {
        writeOwner(owner, model.ground, equations.level, s, scratch, 0);
        for (let k = 0; k < owner.count; k++)
          sums[i][k] += (weight / step) * rowResidual(scratch, k, motion);
      });
    }
    shift(0);
    list.forEach((owner, i) => {
      for (let k = 0; k < owner.count; k++)
        if (sums[i][k] !== 0) {
          column.rows.push(owner.from + k);
          column.values.push(sums[i][k]);
        }
    });
    return column;
  });
};

const stepOf = (model: Model, noise: Noise): number =>
  noise.entries.reduce(
    (least, { at, amount }) => Math.min(least, model.steps[at] / Math.abs(amount)),
    Infinity,
  );

/**
 * Derivative of every acceleration residual by the velocities of its two bodies, six to a row:
 * the quadratic terms (centripetal, Coriolis, normal) seen from the velocities.
 */
export const velocityDerivatives = (model: Model, equations: Equations, s: State): Float64Array => {
  const derivatives = new Float64Array(6 * equations.count);
  const scratch = rowsFor(3);
  const v = s.velocity;
  const typical = v.reduce(
    (most, x, i) => (i % 3 === 2 || i >= 3 * model.ground ? most : Math.max(most, Math.abs(x))),
    0,
  );
  for (const owner of equations.owners) {
    writeOwner(owner, model.ground, equations.level, s, scratch, 0);
    const pairs = Array.from({ length: owner.count }, (_, k) => [
      scratch.first[k],
      scratch.second[k],
    ]);
    for (const body of new Set(pairs.flat())) {
      if (body === model.ground) continue;
      for (let c = 0; c < 3; c++) {
        const at = 3 * body + c;
        const saved = v[at];
        const scale = c === 2 ? 1 / model.bodies[body].length : 1;
        const step = 1e-2 * (typical > 0 ? typical : 1) * scale;
        for (const [multiple, weight] of weights) {
          v[at] = saved + multiple * step;
          writeOwner(owner, model.ground, equations.level, s, scratch, 0);
          for (let k = 0; k < owner.count; k++) {
            const o = 6 * (owner.from + k) + (pairs[k][0] === body ? 0 : 3) + c;
            derivatives[o] += (weight / step) * rowResidual(scratch, k, s.acceleration);
          }
        }
        v[at] = saved;
      }
    }
  }
  return derivatives;
};
