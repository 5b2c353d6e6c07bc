import type {
  BodyMotion,
  JointMotion,
  MotionBranch,
  PointMotion,
} from '../documents/motion-solution';
import { chiSquaredPValue } from '../uncertainty/distributions';
import { isDirectionOnly, rigid } from './starts';
import { pointMotion } from './knowns';
import type { ValueErrors } from './kinematics';
import { covarianceOf, placeMotion, turnFixed, valueErrorsOf } from './kinematics';
import type { Model, Place } from './model';
import type { Pole } from './pole';
import { accelerationPole, velocityPole } from './pole';
import { residualsOf } from './residuals';
import { slideResults } from './slides';
import type { Answer, AnswerBranch } from './solve';

type Pair = [number, number];
const pair = (v: readonly [number, number] | null): Pair | null =>
  v === null ? null : [v[0], v[1]];
const square = (m: number[][]): [Pair, Pair] => [
  [m[0][0], m[0][1]],
  [m[1][0], m[1][1]],
];

/** One branch as the solution document has it. */
export const reportBranch = (answer: Answer, branch: AnswerBranch): MotionBranch => {
  const { model } = answer;
  const values = valueErrorsOf(model, branch);
  const bodies: MotionBranch['bodies'] = {};
  const points: MotionBranch['points'] = {};
  model.bodies.forEach((b, i) => {
    bodies[b.id] = bodyMotion(model, branch, i, values);
    for (const [name, place] of b.points)
      points[`${b.id}.${name}`] = reportPoint(answer, branch, place, values);
  });
  const joints: MotionBranch['joints'] = {};
  for (const [id, slide] of slideResults(model, branch))
    joints[id] = {
      slideRate: slide.rate,
      slideAcceleration: slide.change,
      sigma: { slideRate: slide.rateSigma, slideAcceleration: slide.changeSigma },
    } satisfies JointMotion;
  const { velocity, acceleration } = branch;
  const chiSquared = velocity.chiSquared + (acceleration?.chiSquared ?? 0);
  const redundancy = velocity.redundancy + (acceleration?.redundancy ?? 0);
  return {
    bodies,
    points,
    joints,
    chiSquared,
    pValue: redundancy > 0 ? chiSquaredPValue(chiSquared, redundancy) : null,
    residuals: residualsOf(model, velocity, acceleration),
  };
};

const spread = (errors: readonly Float64Array[], at: number): number => {
  let sum = 0;
  for (const e of errors) sum += e[at] * e[at];
  return Math.sqrt(sum);
};

const poleCovariance = (pole: Pole | null): [Pair, Pair] | null =>
  pole === null || pole.errors === null ? null : square(covarianceOf(pole.errors, 2, 0, 2));

const bodyMotion = (
  model: Model,
  branch: AnswerBranch,
  i: number,
  values: ValueErrors,
): BodyMotion => {
  const { velocity, acceleration, state } = branch;
  const turn = 3 * i + 2;
  const origin = placeMotion(model, branch, model.bodies[i].origin, values);
  const omegaFixed = turnFixed(velocity.free, i);
  const alphaFixed = acceleration !== null && turnFixed(acceleration.free, i);
  const pole = velocityPole(model, branch, i, values);
  const other = accelerationPole(model, branch, i, values);
  return {
    omega: omegaFixed ? state.velocity[turn] : null,
    alpha: alphaFixed ? state.acceleration[turn] : null,
    velocity: pair(origin.velocity),
    acceleration: pair(origin.acceleration),
    pole: pair(pole?.at ?? null),
    accelerationPole: pair(other?.at ?? null),
    sigma: {
      omega: omegaFixed ? spread(velocity.errors, turn) : null,
      alpha: alphaFixed ? spread(acceleration.errors, turn) : null,
    },
    covariance: {
      motion:
        omegaFixed && alphaFixed && origin.velocity !== null && origin.acceleration !== null
          ? motionCovariance(branch, turn, origin.errors)
          : null,
      pole: poleCovariance(pole),
      accelerationPole: poleCovariance(other),
    },
  };
};

/** Over v_x, v_y, ω, a_x, a_y, α of a place, from its errors and those of its body's turning. */
const motionCovariance = (branch: AnswerBranch, turn: number, place: Float64Array): number[][] => {
  const { velocity, acceleration } = branch;
  const errors = new Float64Array(6 * velocity.errors.length);
  velocity.errors.forEach((e, j) => {
    const alpha = acceleration === null ? 0 : acceleration.errors[j][turn];
    const from = 6 * j;
    errors.set([place[from], place[from + 1], e[turn]], from);
    errors.set([place[from + 2], place[from + 3], alpha], from + 3);
  });
  return covarianceOf(errors, 6, 0, 6);
};

const reportPoint = (
  answer: Answer,
  branch: AnswerBranch,
  place: Place,
  values: ValueErrors,
): PointMotion => {
  const motion = placeMotion(answer.model, branch, place, values);
  const { velocity, acceleration, errors } = motion;
  const covariance = velocity === null ? null : square(covarianceOf(errors, 6, 0, 2));
  const polar = velocity === null || covariance === null ? null : polarOf(velocity, covariance);
  return {
    position: [motion.position[0], motion.position[1]],
    velocity: pair(velocity),
    acceleration: pair(acceleration),
    speed: polar?.speed ?? null,
    direction:
      polar?.direction ?? (velocity === null ? freeDirection(answer, branch, place) : null),
    covariance: {
      velocity: covariance,
      acceleration: acceleration === null ? null : square(covarianceOf(errors, 6, 2, 2)),
    },
    sigma: { speed: polar?.speedSigma ?? null, direction: polar?.directionSigma ?? null },
  };
};

const polarOf = ([x, y]: readonly [number, number], c: [Pair, Pair]) => {
  const speed = Math.hypot(x, y);
  if (speed === 0) return { speed, direction: null, speedSigma: null, directionSigma: null };
  const [ux, uy] = [x / speed, y / speed];
  const along = ux * ux * c[0][0] + 2 * ux * uy * c[0][1] + uy * uy * c[1][1];
  const across = uy * uy * c[0][0] - 2 * ux * uy * c[0][1] + ux * ux * c[1][1];
  return {
    speed,
    direction: Math.atan2(y, x),
    speedSigma: Math.sqrt(Math.max(0, along)),
    directionSigma: Math.sqrt(Math.max(0, across)) / speed,
  };
};

/** The direction of a velocity whose magnitude is not fixed, where some known gives its sense. */
const freeDirection = (answer: Answer, branch: AnswerBranch, place: Place): number | null => {
  const sensed = answer.velocity.equations.owners.some(
    ({ known }) => known !== null && isDirectionOnly(known) && !known.line,
  );
  const [x, y] = pointMotion('velocity', branch.state, place);
  const speed = Math.hypot(x, y);
  if (!sensed || speed === 0) return null;
  const same = branch.velocity.free.every((z) => {
    const [zx, zy] = rigid(branch.state, z, place);
    return Math.abs(x * zy - y * zx) <= 1e-9 * speed * (1 + Math.hypot(zx, zy));
  });
  return same ? Math.atan2(y, x) : null;
};
