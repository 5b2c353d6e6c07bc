import * as z from 'zod';

/**
 * The motion problem, `centrode.motion-problem/1`: bodies where they stood at one station, the
 * joints between them, and what is known of the motion. Lengths in m, time in s, angles in rad
 * counter-clockwise from the scene's +x. A quantity without `sigma` is exact; a `sigma` is a
 * standard uncertainty (k = 1). `source` names the measurement, document or computation that a
 * value came from; `label` is what people call the thing.
 */
const id = z.string().min(1);
const number = z.number();
const sigma = z.number().nonnegative();
const vector = z.tuple([number, number]);
const covariance2 = z.tuple([vector, vector]);
const row3 = z.tuple([number, number, number]);

/** Rows and columns: x (m), y (m), heading (rad). Symmetric, positive semi-definite. */
export const poseCovariance = z.tuple([row3, row3, row3]);

/** Position of the body's origin (m) and heading of its x axis (rad) in the scene. */
export const pose = z.strictObject({ x: number, y: number, heading: number });

const named = { label: z.string().optional(), source: z.string().optional() };

/** Place on a body, in its own frame (x forward, y left); `[x, y]` alone is exact. */
export const bodyPoint = z.union([
  vector,
  z.strictObject({
    at: vector,
    sigma: z.tuple([sigma, sigma]).optional(),
    covariance: covariance2.optional(),
    source: z.string().optional(),
  }),
]);

export const body = z.strictObject({
  id,
  ...named,
  pose,
  points: z.record(z.string().min(1), bodyPoint),
  poseCovariance: poseCovariance.optional(),
  /**
   * The pose was not measured: it follows from the joints, so that the uncertainty of the other
   * poses and of the dimensions moves it.
   */
  poseFollows: z.boolean().optional(),
});

export const pointReference = z.strictObject({ body: id, point: z.string().min(1) });

const joint = { id, ...named };
/** Signed radius of a path: its centre lies to the left of the direction when positive. */
const signedRadius = number.nullable().optional();
const pathSigma = z.strictObject({ direction: sigma.optional(), radius: sigma.optional() });

/** Two bodies share a point, or a body turns about a point of the ground. */
export const pin = z.strictObject({
  ...joint,
  kind: z.literal('pin'),
  a: pointReference,
  b: pointReference.optional(),
  ground: z.literal(true).optional(),
  /** Where the ground holds the pin, when it was measured apart from the body. */
  groundPoint: vector.optional(),
});

/** Two bodies move as one, or a body is fixed to the ground. */
export const weld = z.strictObject({ ...pin.shape, kind: z.literal('weld') });

/** A point moves along a path that is fixed in the scene. */
export const guide = z.strictObject({
  ...joint,
  kind: z.literal('guide'),
  a: pointReference,
  ground: z.literal(true).optional(),
  /** Direction of the path in the scene, at `through` or else at the point itself. */
  direction: number,
  radius: signedRadius,
  through: vector.optional(),
  sigma: pathSigma.optional(),
});

/** Point `a` moves along a slot fixed in the body of `b`, which passes through the point `b`. */
export const slot = z.strictObject({
  ...joint,
  kind: z.literal('slot'),
  a: pointReference,
  b: pointReference,
  /** Direction of the slot at `b`, in the frame of b's body. */
  direction: number,
  radius: signedRadius,
  sigma: pathSigma.optional(),
});

/** Two points keep their distance, or change it at a rate (a strut, a hydraulic ram). */
export const link = z.strictObject({
  ...joint,
  kind: z.literal('link'),
  a: pointReference,
  b: pointReference.optional(),
  /** The far end when it is fixed to the ground. */
  groundPoint: vector.optional(),
  /** Rate of the distance, m/s; absent is 0, `null` is unknown. */
  rate: number.nullable().optional(),
  /** Rate of the rate, m/s²; absent is 0, `null` is unknown. */
  rateChange: number.nullable().optional(),
  sigma: z.strictObject({ rate: sigma.optional(), rateChange: sigma.optional() }).optional(),
});

/** The point does not slip sideways: its velocity lies in the plane of the wheel. */
export const wheel = z.strictObject({
  ...joint,
  kind: z.literal('wheel'),
  a: pointReference,
  /** Angle of the wheel from the body's heading, rad; absent is 0. */
  steer: number.optional(),
  /** rad/s; absent is 0. */
  steerRate: number.optional(),
  sigma: z.strictObject({ steer: sigma.optional(), steerRate: sigma.optional() }).optional(),
});

/**
 * A round part of body a (centre `a`, `radius`) rolls without slip:
 * - on the ground, which runs in direction `surface` with the centre to its left;
 * - on a flat or curved side of body b: `surface` in the frame of b's body, passing through `b`;
 * - on a round part of body b: no `surface`, `b` is its centre and `otherRadius` its radius,
 *   negative when a runs inside it.
 */
export const roll = z.strictObject({
  ...joint,
  kind: z.literal('roll'),
  a: pointReference,
  b: pointReference.optional(),
  ground: z.literal(true).optional(),
  radius: z.number().positive(),
  surface: number.optional(),
  /** Radius of a curved surface: its centre lies to the left of `surface` when positive. */
  surfaceRadius: signedRadius,
  otherRadius: number.optional(),
  sigma: z.strictObject({ radius: sigma.optional(), surface: sigma.optional() }).optional(),
});

export const jointDocument = z.discriminatedUnion('kind', [
  pin,
  weld,
  guide,
  slot,
  link,
  wheel,
  roll,
]);

const vectorKnown = {
  id,
  ...named,
  at: pointReference,
  components: vector.optional(),
  magnitude: z.number().nonnegative().optional(),
  direction: number.optional(),
  /** Only the line of the direction is known, not the sense along it. */
  line: z.boolean().optional(),
  sigma: z
    .union([
      sigma,
      z.tuple([sigma, sigma]),
      z.strictObject({ magnitude: sigma.optional(), direction: sigma.optional() }),
    ])
    .optional(),
  /** Of the components, instead of `sigma`. */
  covariance: covariance2.optional(),
};

const scalarKnown = { id, ...named, value: number, sigma: sigma.optional() };

export const known = z.discriminatedUnion('quantity', [
  z.strictObject({
    ...vectorKnown,
    quantity: z.literal('velocity'),
    /**
     * Of the mark that the point made, 1/m: gives a_n = κ v² toward the left of `direction` when
     * positive.
     */
    curvature: z.strictObject({ value: number, sigma: sigma.optional() }).optional(),
  }),
  z.strictObject({ ...vectorKnown, quantity: z.literal('acceleration') }),
  z.strictObject({ ...scalarKnown, quantity: z.literal('angular-velocity'), body: id }),
  z.strictObject({ ...scalarKnown, quantity: z.literal('angular-acceleration'), body: id }),
  /** Along the direction of a slot, guide or rolling contact, or in the plane of a wheel. */
  z.strictObject({ ...scalarKnown, quantity: z.literal('slide-rate'), joint: id }),
  z.strictObject({ ...scalarKnown, quantity: z.literal('slide-acceleration'), joint: id }),
  /** Of a link whose `rate` (or `rateChange`) is null. */
  z.strictObject({ ...scalarKnown, quantity: z.literal('link-rate'), joint: id }),
  z.strictObject({ ...scalarKnown, quantity: z.literal('link-acceleration'), joint: id }),
]);

export const motionProblem = z.strictObject({
  format: z.literal('centrode.motion-problem/1'),
  bodies: z.array(body),
  joints: z.array(jointDocument),
  knowns: z.array(known),
  /**
   * Joint covariance of several poses, in the order x, y, heading of each body in turn; then of
   * points that were fitted with them, x and y of each, which carry no uncertainty of their own.
   */
  poseCovariance: z
    .strictObject({
      bodies: z.array(id),
      points: z.array(pointReference).optional(),
      matrix: z.array(z.array(number)),
    })
    .optional(),
  /** Largest gap between joined points that is still taken as closed, m. */
  closureTolerance: z.number().positive().optional(),
});

export type MotionProblem = z.infer<typeof motionProblem>;
export type MotionBody = z.infer<typeof body>;
export type BodyPoint = z.infer<typeof bodyPoint>;
export type PointReference = z.infer<typeof pointReference>;
export type Joint = z.infer<typeof jointDocument>;
export type JointOf<K extends Joint['kind']> = Extract<Joint, { kind: K }>;
export type Known = z.infer<typeof known>;
export type KnownOf<Q extends Known['quantity']> = Extract<Known, { quantity: Q }>;
export type VectorKnown = KnownOf<'velocity'> | KnownOf<'acceleration'>;
