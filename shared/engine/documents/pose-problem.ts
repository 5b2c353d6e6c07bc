import * as z from 'zod';

/**
 * The pose problem, `centrode.pose-problem/1`: where bodies stood at one station, from marks that
 * their points made. Lengths in m, angles in rad counter-clockwise from the scene's +x. `at` is
 * in the scene, points are in the frame of their body (x forward, y left). A `sigma` is a standard
 * uncertainty (k = 1); a joint, a dimension or a stated pose without one is exact. A mark is never
 * exact.
 */
const id = z.string().min(1);
const number = z.number();
const sigma = z.number().nonnegative();
const vector = z.tuple([number, number]);
const covariance2 = z.tuple([vector, vector]);
const named = { label: z.string().optional(), source: z.string().optional() };

/** Place on a body; an uncertain one is a parameter of the fit, with this value as its prior. */
export const posePoint = z.union([
  vector,
  z.strictObject({
    at: vector,
    sigma: z.tuple([sigma, sigma]).optional(),
    source: z.string().optional(),
  }),
]);

const stated = z.strictObject({ value: number, sigma: sigma.optional() });

export const poseBody = z.strictObject({
  id,
  ...named,
  points: z.record(z.string().min(1), posePoint),
  /** What is known of the pose apart from marks and joints; each part may be left out. */
  stated: z
    .strictObject({ x: stated.optional(), y: stated.optional(), heading: stated.optional() })
    .optional(),
});

export const posePointReference = z.strictObject({ body: id, point: z.string().min(1) });

const joint = {
  id,
  ...named,
  a: posePointReference,
  /** Play of the joint, m; absent or 0 makes it a constraint. */
  sigma: sigma.optional(),
};
/** Signed radius of a path: its centre lies to the left of the direction when positive. */
const signedRadius = number.nullable().optional();

/** Two bodies share a point, or a point stands at a place of the ground. */
export const posePin = z.strictObject({
  ...joint,
  kind: z.literal('pin'),
  b: posePointReference.optional(),
  ground: z.literal(true).optional(),
  /** Scene position of a pin to the ground. */
  at: vector.optional(),
});

/** A point stands on a straight or circular path that is fixed in the scene and goes through `at`. */
export const poseGuide = z.strictObject({
  ...joint,
  kind: z.literal('guide'),
  at: vector,
  direction: number,
  radius: signedRadius,
});

/** Point `a` stands on a path fixed in the body of `b`: through the point `b`, direction in its frame. */
export const poseSlot = z.strictObject({
  ...joint,
  kind: z.literal('slot'),
  b: posePointReference,
  direction: number,
  radius: signedRadius,
});

/** Two points share a place; with `angle`, the heading of b's body less that of a's is fixed too. */
export const poseWeld = z.strictObject({
  ...joint,
  kind: z.literal('weld'),
  b: posePointReference,
  angle: number.optional(),
  angleSigma: sigma.optional(),
});

/** Two points stand at a known distance. */
export const poseLink = z.strictObject({
  ...joint,
  kind: z.literal('link'),
  b: posePointReference,
  length: z.number().positive(),
});

export const poseJoint = z.discriminatedUnion('kind', [
  posePin,
  poseGuide,
  poseSlot,
  poseWeld,
  poseLink,
]);

export const poseMark = z.strictObject({
  id,
  ...named,
  at: vector,
  covariance: covariance2,
  body: id,
  point: z.string().min(1),
  /**
   * Direction of the mark at the point, where it shows how the body stood: the body's direction
   * `along` (in its frame, rad; absent is 0, straight ahead) lay along it. With `line`, the sense is
   * not known. The print of a straight edge is such a mark, and the track of a wheel that rolled.
   */
  tangent: z
    .strictObject({
      direction: number,
      sigma: z.number().positive(),
      along: number.optional(),
      line: z.boolean().optional(),
    })
    .optional(),
  /** The point stood somewhere on the line through `at`: only the distance across it counts. */
  line: z.strictObject({ direction: number }).optional(),
});

export const poseLoss = z.enum(['squares', 'huber']);

export const poseProblem = z.strictObject({
  format: z.literal('centrode.pose-problem/1'),
  bodies: z.array(poseBody),
  joints: z.array(poseJoint).default([]),
  marks: z.array(poseMark),
  loss: poseLoss.default('squares'),
});

export type PoseProblem = z.infer<typeof poseProblem>;
export type PoseBody = z.infer<typeof poseBody>;
export type PosePoint = z.infer<typeof posePoint>;
export type PosePointReference = z.infer<typeof posePointReference>;
export type PoseJoint = z.infer<typeof poseJoint>;
export type PoseMark = z.infer<typeof poseMark>;
export type PoseLoss = z.infer<typeof poseLoss>;
