import * as z from 'zod';

const finite = z.number();
const positive = z.number().positive();
const id = z.uuid();
const line = (most: number) => z.string().trim().min(1, 'must not be empty').max(most);
const prose = (most: number) => z.string().max(most);

/** Names of bodies, points, joints, knowns and stations inside one reconstruction. */
export const key = z
  .string()
  .regex(
    /^[A-Za-z][A-Za-z0-9_-]{0,39}$/,
    'must begin with a letter; letters, digits, _ and - only',
  );
const vector = z.tuple([finite, finite]);
const pointRef = z.strictObject({ body: key, point: key });

/** A named point of a body: body frame, x forward, y left, metres; standard uncertainty of each. */
export const bodyPoint = z.strictObject({
  id: key,
  name: line(80),
  at: vector,
  sigma: z.tuple([z.number().min(0), z.number().min(0)]),
});
export type BodyPoint = z.infer<typeof bodyPoint>;

export const reconstructionBody = z.strictObject({
  id: key,
  name: line(80),
  points: z.array(bodyPoint).max(60),
  /** Closed outline in the body frame, drawn on the plan. */
  outline: z.array(vector).max(200),
});
export type ReconstructionBody = z.infer<typeof reconstructionBody>;

/** As in the motion problem; a ground pin and a guide also say where in the scene they are. */
export const reconstructionJoint = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('pin'), id: key, a: pointRef, b: pointRef }),
  z.strictObject({
    kind: z.literal('ground-pin'),
    id: key,
    a: pointRef,
    /** Scene position, if it is measured; then it takes part in the pose fit. */
    at: vector.nullable(),
    sigma: z.number().min(0),
  }),
  z.strictObject({ kind: z.literal('weld'), id: key, a: pointRef, b: pointRef }),
  z.strictObject({
    kind: z.literal('guide'),
    id: key,
    a: pointRef,
    /** Scene direction, rad; radius null for a straight guide, else the centre is to the left if > 0. */
    direction: finite,
    radius: finite.nullable(),
    /** A scene point on the guide's line, if it is measured; then it takes part in the pose fit. */
    at: vector.nullable(),
    sigma: z.number().min(0),
  }),
  z.strictObject({
    kind: z.literal('slot'),
    id: key,
    a: pointRef,
    b: pointRef,
    direction: finite,
    radius: finite.nullable(),
  }),
  z.strictObject({
    kind: z.literal('link'),
    id: key,
    a: pointRef,
    b: pointRef,
    rate: finite,
    rateChange: finite,
  }),
  z.strictObject({
    kind: z.literal('wheel'),
    id: key,
    a: pointRef,
    steer: finite,
    steerRate: finite,
  }),
  z.strictObject({
    kind: z.literal('roll'),
    id: key,
    a: pointRef,
    radius: positive,
    /** Direction in which the ground runs, rad; the centre is `radius` to its left. */
    surface: finite,
  }),
]);
export type ReconstructionJoint = z.infer<typeof reconstructionJoint>;

const uncertain = z.strictObject({
  value: finite,
  /** Standard uncertainty; 0 states it as exact. */
  sigma: z.number().min(0),
});

/** What is known of the motion at a station. `basis` says why it may be taken as known. */
export const reconstructionKnown = z.discriminatedUnion('quantity', [
  z.strictObject({
    quantity: z.enum(['velocity', 'acceleration']),
    id: key,
    at: pointRef,
    magnitude: uncertain.nullable(),
    /** Scene direction, rad. */
    direction: uncertain.nullable(),
    /** True: only the line of the direction is known, not its sense. */
    line: z.boolean(),
    basis: prose(1000),
  }),
  z.strictObject({
    quantity: z.enum(['velocity-components', 'acceleration-components']),
    id: key,
    at: pointRef,
    x: uncertain,
    y: uncertain,
    basis: prose(1000),
  }),
  z.strictObject({
    quantity: z.enum(['angular-velocity', 'angular-acceleration']),
    id: key,
    body: key,
    value: uncertain,
    basis: prose(1000),
  }),
]);
export type ReconstructionKnown = z.infer<typeof reconstructionKnown>;

/** A mark that a body point made at a station, and what it tells. */
export const markAssignment = z.strictObject({
  markId: id,
  body: key,
  point: key,
  /** It fixes where the point was. */
  position: z.boolean(),
  /** The tangent of its trace is the direction in which the point moved (sense along the trace's order). */
  direction: z.boolean(),
});
export type MarkAssignment = z.infer<typeof markAssignment>;

/** An instant of the motion that evidence fixes. */
export const station = z.strictObject({
  id: key,
  name: line(80),
  marks: z.array(markAssignment).max(200),
  /** Bodies whose pose is stated rather than fitted. */
  poses: z.array(
    z.strictObject({
      body: key,
      x: uncertain,
      y: uncertain,
      heading: uncertain,
      basis: prose(1000),
    }),
  ),
  /** Joints that do not act at this station (a wheel that slides). */
  joints: z.strictObject({ off: z.array(key) }),
  knowns: z.array(reconstructionKnown).max(200),
});
export type Station = z.infer<typeof station>;

export const reconstructionDocument = z.strictObject({
  format: z.literal('centrode.reconstruction/1'),
  bodies: z.array(reconstructionBody).max(50),
  joints: z.array(reconstructionJoint).max(100),
  stations: z.array(station).max(50),
});
export type ReconstructionDocument = z.infer<typeof reconstructionDocument>;
