import type { Vector } from '../geometry/vector';
import type { Model, Place } from './model';
import { armX, armY, positionX, positionY } from './model';
import type { AnswerBranch } from './solve';

/**
 * Motion of a place, and what one standard deviation of each noise does to it:
 * six numbers a noise: v_x, v_y, a_x, a_y, and x, y of the place itself.
 */
export interface PlaceMotion {
  readonly position: Vector;
  readonly velocity: Vector | null;
  readonly acceleration: Vector | null;
  readonly errors: Float64Array;
}

/** What each noise does to the values, after the adjustment has judged it. */
export type ValueErrors = readonly ReadonlyMap<number, number>[];

export const valueErrorsOf = (model: Model, branch: AnswerBranch): ValueErrors => {
  const { adjustment, redundancy } = branch.velocity;
  return model.noises.map((noise, j) => {
    const errors = new Map(noise.entries.map((e) => [e.at, e.amount]));
    if (adjustment === null || redundancy === 0) return errors;
    model.noises.forEach((other, i) => {
      const share = adjustment.control.values[i * adjustment.control.columns + j];
      if (share !== 0)
        for (const e of other.entries) errors.set(e.at, (errors.get(e.at) ?? 0) - share * e.amount);
    });
    return errors;
  });
};

/** Free motions smaller than this, of a body's own scale, do not move a point. */
const still = 1e-9;

const moves = (free: readonly Float64Array[], cx: number, cy: number, o: number): boolean =>
  free.some(
    (z) => Math.abs(z[o] - z[o + 2] * cy) > still || Math.abs(z[o + 1] + z[o + 2] * cx) > still,
  );

/** Whether ω (or α) of a body is fixed. */
export const turnFixed = (free: readonly Float64Array[], body: number): boolean =>
  !free.some((z) => Math.abs(z[3 * body + 2]) > still);

/** Whether the velocity of a place is fixed. */
export const velocityFixed = (branch: AnswerBranch, place: Place): boolean =>
  !moves(
    branch.velocity.free,
    armX(branch.state, place),
    armY(branch.state, place),
    3 * place.body,
  );

export const placeMotion = (
  model: Model,
  branch: AnswerBranch,
  place: Place,
  valueErrors: ValueErrors,
): PlaceMotion => {
  const s = branch.state;
  const rx = armX(s, place);
  const ry = armY(s, place);
  const o = 3 * place.body;
  const v = s.velocity;
  const q = s.acceleration;
  const omega = v[o + 2];
  const alpha = q[o + 2];
  const square = omega * omega;
  const accelerationKnown =
    branch.acceleration !== null &&
    (turnFixed(branch.velocity.free, place.body) || (rx === 0 && ry === 0)) &&
    !moves(branch.acceleration.free, rx, ry, o);
  const cos = s.cos[place.body];
  const sin = s.sin[place.body];
  const errors = new Float64Array(6 * model.noises.length);
  valueErrors.forEach((values, j) => {
    const dv = branch.velocity.errors[j];
    const da = branch.acceleration?.errors[j];
    const turned = values.get(o + 2) ?? 0;
    const bx = values.get(place.at) ?? 0;
    const by = values.get(place.at + 1) ?? 0;
    const drx = cos * bx - sin * by - ry * turned;
    const dry = sin * bx + cos * by + rx * turned;
    const dOmega = dv[o + 2];
    const e = 6 * j;
    errors[e] = dv[o] - dOmega * ry - omega * dry;
    errors[e + 1] = dv[o + 1] + dOmega * rx + omega * drx;
    errors[e + 4] = (values.get(o) ?? 0) + drx;
    errors[e + 5] = (values.get(o + 1) ?? 0) + dry;
    if (da === undefined) return;
    const dAlpha = da[o + 2];
    const twist = 2 * omega * dOmega;
    errors[e + 2] = da[o] - dAlpha * ry - alpha * dry - twist * rx - square * drx;
    errors[e + 3] = da[o + 1] + dAlpha * rx + alpha * drx - twist * ry - square * dry;
  });
  return {
    position: [positionX(s, place) + model.centre[0], positionY(s, place) + model.centre[1]],
    velocity: velocityFixed(branch, place) ? [v[o] - omega * ry, v[o + 1] + omega * rx] : null,
    acceleration: accelerationKnown
      ? [q[o] - alpha * ry - square * rx, q[o + 1] + alpha * rx - square * ry]
      : null,
    errors,
  };
};

/** Covariance of quantities whose errors stand `stride` apart, from `from` on. */
export const covarianceOf = (
  errors: Float64Array,
  stride: number,
  from: number,
  size: number,
): number[][] =>
  Array.from({ length: size }, (_, i) =>
    Array.from({ length: size }, (__, j) => {
      let sum = 0;
      for (let e = from; e < errors.length; e += stride) sum += errors[e + i] * errors[e + j];
      return sum;
    }),
  );
