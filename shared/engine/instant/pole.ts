import type { Vector } from '../geometry/vector';
import type { Model } from './model';
import type { ValueErrors } from './kinematics';
import { turnFixed } from './kinematics';
import type { AnswerBranch } from './solve';

export interface Pole {
  readonly at: Vector;
  /** By noise, x and y. */
  readonly errors: Float64Array | null;
}

/** A rate of turning that moves a body's points by less than this share of their speed is none. */
const none = 1e-12;

/**
 * Instantaneous centre, t + k × v/ω. Fixed when the body's motion is, and also when the only thing
 * that is not fixed is the scale of that motion (directions alone are known).
 */
export const velocityPole = (
  model: Model,
  branch: AnswerBranch,
  body: number,
  values: ValueErrors,
): Pole | null => {
  const o = 3 * body;
  const own = branch.velocity.motion.subarray(o, o + 3);
  const free = branch.velocity.free
    .map((z) => z.subarray(o, o + 3))
    .filter((z) => z.some((x) => x !== 0));
  const atRest = own.every((x) => x === 0);
  const motion = atRest && free.length > 0 ? free[0] : own;
  const { length } = model.bodies[body];
  if (!free.every((z) => parallel(z, motion, length))) return null;
  const [vx, vy, omega] = motion;
  if (Math.abs(omega) * length <= none * Math.hypot(vx, vy) || omega === 0) return null;
  const g = branch.state.g;
  const at: Vector = [g[o] - vy / omega + model.centre[0], g[o + 1] + vx / omega + model.centre[1]];
  if (motion !== own) return { at, errors: null };
  const errors = new Float64Array(2 * values.length);
  values.forEach((value, j) => {
    const e = branch.velocity.errors[j];
    errors[2 * j] = (value.get(o) ?? 0) - e[o + 1] / omega + (vy * e[o + 2]) / (omega * omega);
    errors[2 * j + 1] = (value.get(o + 1) ?? 0) + e[o] / omega - (vx * e[o + 2]) / (omega * omega);
  });
  return { at, errors };
};

const parallel = (a: Float64Array, b: Float64Array, length: number): boolean => {
  const [ax, ay, az] = [a[0], a[1], a[2] * length];
  const [bx, by, bz] = [b[0], b[1], b[2] * length];
  const across = Math.hypot(ay * bz - az * by, az * bx - ax * bz, ax * by - ay * bx);
  return across <= 1e-9 * Math.hypot(ax, ay, az) * Math.hypot(bx, by, bz);
};

/** The body's point without acceleration: −ω² r + α k × r = −a. */
export const accelerationPole = (
  model: Model,
  branch: AnswerBranch,
  body: number,
  values: ValueErrors,
): Pole | null => {
  const { acceleration, velocity, state } = branch;
  if (acceleration === null || !turnFixed(velocity.free, body)) return null;
  const o = 3 * body;
  if (acceleration.free.some((z) => z[o] !== 0 || z[o + 1] !== 0 || z[o + 2] !== 0)) return null;
  const omega = state.velocity[o + 2];
  const [ax, ay, alpha] = state.acceleration.subarray(o, o + 3);
  const square = omega * omega;
  const size = square * square + alpha * alpha;
  const { length } = model.bodies[body];
  if (Math.sqrt(size) * length <= none * Math.hypot(ax, ay) || size === 0) return null;
  // Inverse of [−ω² −α; α −ω²] applied to a vector.
  const solve = (x: number, y: number): Vector => [
    (-square * x + alpha * y) / size,
    (-alpha * x - square * y) / size,
  ];
  const [rx, ry] = solve(-ax, -ay);
  const errors = new Float64Array(2 * values.length);
  values.forEach((value, j) => {
    const twist = 2 * omega * velocity.errors[j][o + 2];
    const e = acceleration.errors[j];
    const [dx, dy] = solve(
      -e[o] + twist * rx + e[o + 2] * ry,
      -e[o + 1] + twist * ry - e[o + 2] * rx,
    );
    errors[2 * j] = (value.get(o) ?? 0) + dx;
    errors[2 * j + 1] = (value.get(o + 1) ?? 0) + dy;
  });
  return {
    at: [state.g[o] + rx + model.centre[0], state.g[o + 1] + ry + model.centre[1]],
    errors,
  };
};
