import type { MotionProblem } from '../documents/motion-problem';
import { EngineError } from '../errors';
import { checkClosure, letPosesFollow } from './closure';
import { compile } from './compile/index';
import type { Equations } from './equations';
import { equationsOf, ownerId, writeEquations } from './equations';
import type { LevelOutcome } from './level';
import { accelerationTask, solveLevel, velocityTask } from './level';
import type { Model, State } from './model';
import { stateOf } from './model';
import type { LevelResult } from './task';

/** Everything found about a problem, before it is put into words and documents. */
export interface Answer {
  readonly model: Model;
  readonly tolerance: number;
  readonly velocity: { readonly equations: Equations; readonly outcome: LevelOutcome };
  /** Of the first branch of the velocities; null when there is none. */
  readonly acceleration: {
    readonly equations: Equations;
    readonly outcome: LevelOutcome;
    /** Acceleration equations that need velocities which are not fixed. */
    readonly waiting: readonly string[];
  } | null;
  readonly branches: readonly AnswerBranch[];
}

export interface AnswerBranch {
  readonly velocity: LevelResult;
  readonly acceleration: LevelResult | null;
  readonly state: State;
}

export const solve = (problem: MotionProblem): Answer => {
  const compiled = compile(problem);
  const gap = checkClosure(problem, compiled);
  const model = letPosesFollow(compiled);
  // What lies within the gaps of the joints cannot be told from zero.
  return solveModel(model, Math.max(1e-10, 10 * gap));
};

/** Solves both levels; items for which `without` is true are left out. */
export const solveModel = (
  model: Model,
  tolerance: number,
  without?: (id: string) => boolean,
): Answer => {
  const s = stateOf(model, Float64Array.from(model.g));
  const equations = equationsOf(model, 'velocity', without);
  const outcome = solveLevel(velocityTask(model, equations, tolerance), s);
  if (outcome.refused === 'too large')
    throw new EngineError(
      'unsupported',
      'bodies',
      'So many bodies are solved only where equations and unknowns are equal in number and independent.',
    );
  let acceleration: Answer['acceleration'] = null;
  const branches: AnswerBranch[] = [];
  for (const velocity of outcome.found) {
    const found = solveAccelerations(model, tolerance, velocity, without);
    acceleration ??= found;
    const results = found.outcome.found;
    for (const result of results.length > 0 ? results : [null]) {
      const state = stateOf(model, result === null ? velocity.g : result.g);
      state.velocity.set(velocity.motion);
      if (result !== null) state.acceleration.set(result.motion);
      branches.push({ velocity, acceleration: result, state });
    }
  }
  return { model, tolerance, velocity: { equations, outcome }, acceleration, branches };
};

const solveAccelerations = (
  model: Model,
  tolerance: number,
  velocity: LevelResult,
  without: ((id: string) => boolean) | undefined,
): NonNullable<Answer['acceleration']> => {
  const s = stateOf(model, Float64Array.from(velocity.g));
  s.velocity.set(velocity.motion);
  const waiting = waitingFor(model, equationsOf(model, 'acceleration', without), s, velocity);
  const equations = equationsOf(
    model,
    'acceleration',
    (id) => waiting.includes(id) || without?.(id) === true,
  );
  const task = accelerationTask(model, equations, tolerance, velocity);
  return { equations, outcome: solveLevel(task, s), waiting };
};

/** Items whose acceleration equations change with what the velocities leave free. */
const waitingFor = (
  model: Model,
  equations: Equations,
  s: State,
  velocity: LevelResult,
): string[] => {
  if (velocity.free.length === 0) return [];
  const rights = (motion: Float64Array): Float64Array => {
    s.velocity.set(motion);
    return Float64Array.from(writeEquations(equations, model.ground, s).right);
  };
  // The right sides are quadratic: they do not depend on the free motions when a general
  // combination of those changes them neither one way nor the other.
  const general = velocity.motion.map((_, i) =>
    velocity.free.reduce((sum, z, k) => sum + Math.cos(1 + k) * z[i], 0),
  );
  const at = rights(velocity.motion);
  const waiting = new Set<string>();
  for (const sign of [1, -1]) {
    const moved = rights(velocity.motion.map((v, i) => v + sign * general[i]));
    for (const owner of equations.owners)
      for (let k = owner.from; k < owner.from + owner.count; k++)
        if (Math.abs(moved[k] - at[k]) > 1e-9 * (Math.abs(at[k]) + Math.abs(moved[k])))
          waiting.add(ownerId(owner));
  }
  s.velocity.set(velocity.motion);
  return [...waiting];
};
