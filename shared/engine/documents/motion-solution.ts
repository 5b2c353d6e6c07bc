import * as z from 'zod';

/**
 * The answer to a motion problem, `centrode.motion-solution/1`. SI units, radians, scene frame.
 * What the problem does not fix is `null`, never a number. Covariances are of the whole answer:
 * knowns, poses and dimensions together.
 */
const number = z.number();
const vector = z.tuple([number, number]);
const covariance2 = z.tuple([vector, vector]);

export const motionStatus = z.enum([
  'determined',
  'over-determined',
  'under-determined',
  'contradictory',
  'singular',
]);

const level = z.enum(['velocity', 'acceleration']);

export const bodyMotion = z.object({
  /** rad/s and rad/s². */
  omega: number.nullable(),
  alpha: number.nullable(),
  /** Of the body's origin. */
  velocity: vector.nullable(),
  acceleration: vector.nullable(),
  /** Instantaneous centre, m; null when the body does not turn or when it is not fixed. */
  pole: vector.nullable(),
  /** The body's point without acceleration. */
  accelerationPole: vector.nullable(),
  sigma: z.object({ omega: number.nullable(), alpha: number.nullable() }),
  covariance: z.object({
    /** Over v_x, v_y, ω, a_x, a_y, α of the origin; null when one of the six is not fixed. */
    motion: z.array(z.array(number)).nullable(),
    pole: covariance2.nullable(),
    accelerationPole: covariance2.nullable(),
  }),
});

export const pointMotion = z.object({
  position: vector,
  velocity: vector.nullable(),
  acceleration: vector.nullable(),
  /** |v|, m/s. */
  speed: number.nullable(),
  /** Of the velocity, rad; may be fixed where the velocity is not; null at rest. */
  direction: number.nullable(),
  covariance: z.object({ velocity: covariance2.nullable(), acceleration: covariance2.nullable() }),
  sigma: z.object({ speed: number.nullable(), direction: number.nullable() }),
});

/** Along a slot, guide or rolling contact, in the plane of a wheel, or of the length of a link. */
export const jointMotion = z.object({
  slideRate: number.nullable(),
  slideAcceleration: number.nullable(),
  sigma: z.object({ slideRate: number.nullable(), slideAcceleration: number.nullable() }),
});

/** What a known says less what the answer says, and the same over its own standard deviation. */
export const residual = z.object({
  known: z.string(),
  part: z.enum(['x', 'y', 'magnitude', 'direction', 'curvature', 'value']),
  level,
  residual: number,
  /** Baarda's w; null where nothing else checks the known. */
  normalised: number.nullable(),
  /** Share of an error in the known that shows in its residual, 0 to 1. */
  redundancy: number,
});

export const branch = z.object({
  bodies: z.record(z.string(), bodyMotion),
  /** By `body.point`. */
  points: z.record(z.string(), pointMotion),
  joints: z.record(z.string(), jointMotion),
  chiSquared: number,
  pValue: number.nullable(),
  residuals: z.array(residual),
});

/** One way in which the bodies could still move: v_x, v_y (of the origin) and ω of each. */
export const freeMotion = z.object({
  motion: z.string(),
  level,
  bodies: z.record(z.string(), z.tuple([number, number, number])),
});

/** A further known that would settle what is free; `helps` says the same in words. */
export const suggestion = z.union([
  z.object({
    quantity: level,
    at: z.object({ body: z.string(), point: z.string() }),
    part: z.enum(['components', 'magnitude', 'direction']),
  }),
  z.object({
    quantity: z.enum(['angular-velocity', 'angular-acceleration']),
    body: z.string(),
  }),
]);

const levelVerdict = z.object({
  status: motionStatus,
  unknowns: z.int(),
  /** Scalar equations, of joints and knowns. */
  equations: z.int(),
  rank: z.int(),
  redundancy: z.int(),
  chiSquared: number,
  pValue: number.nullable(),
  /** Of the scaled equations; null when singular. */
  condition: number.nullable(),
});

export const motionSolution = z.object({
  format: z.literal('centrode.motion-solution/1'),
  /**
   * Of the velocities; of the accelerations too when those contradict or are over-determined. A
   * problem that fixes the velocities alone is determined, and `levels.acceleration` says what it lacks.
   */
  status: motionStatus,
  /** No accelerations are sought where no velocities were found. */
  levels: z.object({ velocity: levelVerdict, acceleration: levelVerdict.nullable() }),
  /** Every motion that agrees with the knowns, best fit first; empty when none does. */
  branches: z.array(branch),
  redundancy: z.int(),
  /** Of the first branch, both levels together. */
  chiSquared: number,
  pValue: number.nullable(),
  residuals: z.array(residual),
  /** Knowns whose normalised residual exceeds 3.29 (0.1 %), worst first. */
  suspects: z.array(z.string()),
  free: z.array(freeMotion),
  helps: z.array(z.string()),
  suggestions: z.array(suggestion),
  /** Ids of the fewest joints and knowns that cannot all hold. */
  clash: z.array(z.string()),
  condition: number.nullable(),
  warnings: z.array(z.string()),
});

export type MotionSolution = z.infer<typeof motionSolution>;
export type MotionStatus = z.infer<typeof motionStatus>;
export type MotionBranch = z.infer<typeof branch>;
export type BodyMotion = z.infer<typeof bodyMotion>;
export type PointMotion = z.infer<typeof pointMotion>;
export type JointMotion = z.infer<typeof jointMotion>;
export type FreeMotion = z.infer<typeof freeMotion>;
export type Suggestion = z.infer<typeof suggestion>;
export type Residual = z.infer<typeof residual>;
export type Level = z.infer<typeof level>;
