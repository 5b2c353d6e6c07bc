import type { Dense } from '../linear/dense';
import type { Column } from './derivative';
import type { Equations, Owner } from './equations';
import type { Model, State } from './model';

/** The equations of one level, ready to be solved. */
export interface Task {
  readonly model: Model;
  readonly equations: Equations;
  readonly readers: ReadonlyMap<number, readonly Owner[]>;
  readonly scales: Float64Array;
  /** Below this share of a row of unit norm a singular value counts as zero. */
  readonly tolerance: number;
  /** Derivatives of the residuals by every noise; at acceleration level through the velocities too. */
  readonly columns: (s: State) => Column[];
  /** Whether the level may adjust the value behind a noise. */
  readonly adjusts: readonly boolean[];
}

/** One motion that satisfies the equations of a level. Motions hold three numbers a body. */
export interface LevelResult {
  readonly motion: Float64Array;
  /** What one standard deviation of each noise does to the motion. */
  readonly errors: readonly Float64Array[];
  /** The values as adjusted. */
  readonly g: Float64Array;
  readonly adjustment: {
    /** Of each noise, in standard deviations. */
    readonly n: Float64Array;
    /** Covariance of `n`. */
    readonly control: Dense;
  } | null;
  /** Basis of what may still be added to the motion. */
  readonly free: readonly Float64Array[];
  readonly rank: number;
  readonly redundancy: number;
  readonly chiSquared: number;
  readonly condition: number | null;
}

/** An unknown that stays as it starts, since only the scale of its bodies' motion is open. */
export interface Held {
  readonly unknown: number;
  readonly bodies: readonly number[];
}

/** The part of a state that a level solves for. */
export const motionOf = (task: Task, s: State): Float64Array =>
  task.equations.level === 'velocity' ? s.velocity : s.acceleration;
