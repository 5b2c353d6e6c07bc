import type { MotionProblem } from '../documents/motion-problem';
import type { MotionSolution } from '../documents/motion-solution';
import { EngineError } from '../errors';
import type { Vector } from '../geometry/vector';
import { dot, norm, scale, subtract, turnLeft, unit } from '../geometry/vector';
import { answerTo } from './answers';
import type { PlaceMotion } from './kinematics';
import { covarianceOf, placeMotion, valueErrorsOf } from './kinematics';
import type { Model, Place, State } from './model';
import type { AnswerBranch } from './solve';

/** A named point of a body, or any place on it in its own coordinates, m. */
export interface AskedPoint {
  readonly body: string;
  readonly point: string | Vector;
}

export interface PointAnswer {
  readonly position: Vector;
  readonly velocity: Vector | null;
  readonly acceleration: Vector | null;
  /** Over v_x, v_y, a_x, a_y; rows of what is not fixed are to be left aside. */
  readonly covariance: number[][];
}

interface Asked {
  readonly model: Model;
  readonly branch: AnswerBranch;
  readonly motion: PlaceMotion;
}

const ask = (
  problem: MotionProblem,
  solution: MotionSolution,
  branch: number,
  asked: AskedPoint,
  field: string,
): Asked => {
  const answer = answerTo(problem, solution);
  const { model } = answer;
  const found = answer.branches[branch];
  if (found === undefined)
    throw new EngineError('unknown-reference', 'branch', `There is no branch ${branch}.`);
  const body = model.bodies.findIndex((b) => b.id === asked.body);
  if (body < 0)
    throw new EngineError('unknown-reference', `${field}.body`, `There is no body ${asked.body}.`);
  const { place, state } = placeOf(model, found.state, body, asked, field);
  const viewed = { ...found, state };
  const motion = placeMotion(model, viewed, place, valueErrorsOf(model, viewed));
  return { model, branch: viewed, motion };
};

/** A place for the asked point; coordinates that have no name are added to a copy of the values. */
const placeOf = (
  model: Model,
  state: State,
  body: number,
  { point, body: id }: AskedPoint,
  field: string,
): { place: Place; state: State } => {
  const { points, origin } = model.bodies[body];
  if (typeof point === 'string') {
    const place = points.get(point);
    if (place !== undefined) return { place, state };
    throw new EngineError(
      'unknown-reference',
      `${field}.point`,
      `The body ${id} has no point ${point}.`,
    );
  }
  if (!point.every(Number.isFinite))
    throw new EngineError('not-finite', `${field}.point`, 'The asked place is not finite.');
  const at = state.g.length;
  const g = new Float64Array(at + 2);
  g.set(state.g);
  g[at] = point[0] + state.g[origin.at];
  g[at + 1] = point[1] + state.g[origin.at + 1];
  return { place: { body, at }, state: { ...state, g } };
};

/** Velocity and acceleration, with covariance, of any place on any body. */
export const velocityOf = (
  problem: MotionProblem,
  solution: MotionSolution,
  branch: number,
  asked: AskedPoint,
): PointAnswer => {
  const { motion } = ask(problem, solution, branch, asked, 'asked');
  return {
    position: motion.position,
    velocity: motion.velocity,
    acceleration: motion.acceleration,
    covariance: covarianceOf(motion.errors, 6, 0, 4),
  };
};

export interface RelativeMotion {
  /** Direction from the first point toward the second, rad. */
  readonly normal: number;
  /** Speed at which the points approach along the normal, m/s; null where it is not fixed. */
  readonly closing: number | null;
  /** Speed of the first against the second along the tangent, to the left of the normal. */
  readonly sliding: number | null;
  readonly closingRate: number | null;
  readonly slidingRate: number | null;
  /** Over closing, sliding and their rates. */
  readonly covariance: number[][];
}

/**
 * How two points move against each other. The normal (rad) is exact when it is given; without it,
 * it runs from the first point to the second and is as uncertain as they are.
 */
export const relativeMotion = (
  problem: MotionProblem,
  solution: MotionSolution,
  branch: number,
  first: AskedPoint,
  second: AskedPoint,
  normal?: number,
): RelativeMotion => {
  const a = ask(problem, solution, branch, first, 'first').motion;
  const b = ask(problem, solution, branch, second, 'second').motion;
  const apart = subtract(b.position, a.position);
  const distance = norm(apart);
  const together =
    1e-9 * Math.max(...answerTo(problem, solution).model.bodies.map((x) => x.length));
  if (normal === undefined && distance <= together)
    throw new EngineError(
      'coincident-points',
      'normal',
      'The points coincide, so the direction between them must be given.',
    );
  const n = normal === undefined ? scale(1 / distance, apart) : unit(normal);
  const t = turnLeft(n);
  const v = difference(a.velocity, b.velocity);
  const w = difference(a.acceleration, b.acceleration);
  const errors = new Float64Array((a.errors.length / 6) * 4);
  for (let j = 0; 6 * j < a.errors.length; j++) {
    const d = (k: number): number => a.errors[6 * j + k] - b.errors[6 * j + k];
    const dv: Vector = [d(0), d(1)];
    const dw: Vector = [d(2), d(3)];
    const turned = normal === undefined ? -dot(t, [d(4), d(5)]) / distance : 0;
    errors.set(
      [
        dot(n, dv) + turned * (v === null ? 0 : dot(t, v)),
        dot(t, dv) - turned * (v === null ? 0 : dot(n, v)),
        dot(n, dw) + turned * (w === null ? 0 : dot(t, w)),
        dot(t, dw) - turned * (w === null ? 0 : dot(n, w)),
      ],
      4 * j,
    );
  }
  return {
    normal: Math.atan2(n[1], n[0]),
    closing: v === null ? null : dot(n, v),
    sliding: v === null ? null : dot(t, v),
    closingRate: w === null ? null : dot(n, w),
    slidingRate: w === null ? null : dot(t, w),
    covariance: covarianceOf(errors, 4, 0, 4),
  };
};

const difference = (a: Vector | null, b: Vector | null): Vector | null =>
  a === null || b === null ? null : subtract(a, b);
