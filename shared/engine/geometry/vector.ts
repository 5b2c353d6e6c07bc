/**
 * Vectors of the plane, as pairs of numbers in SI units.
 *
 * Two frames are used and must not be mixed: the scene (fixed, right-handed, x and y in the ground
 * plane or in the plane of the machine) and a body (x forward, y left, ISO 8855). Names say which:
 * p, q for scene points, b for body points, r for a scene vector between two points of one body.
 */
export type Vector = readonly [x: number, y: number];

export const add = (a: Vector, b: Vector): Vector => [a[0] + b[0], a[1] + b[1]];
export const subtract = (a: Vector, b: Vector): Vector => [a[0] - b[0], a[1] - b[1]];
export const scale = (k: number, a: Vector): Vector => [k * a[0], k * a[1]];
export const dot = (a: Vector, b: Vector): number => a[0] * b[0] + a[1] * b[1];
/** z component of a × b. */
export const cross = (a: Vector, b: Vector): number => a[0] * b[1] - a[1] * b[0];
/** k × a: a turned a quarter turn counter-clockwise. */
export const turnLeft = (a: Vector): Vector => [-a[1], a[0]];
export const norm = (a: Vector): number => Math.hypot(a[0], a[1]);
/** Direction of a, rad counter-clockwise from +x, in (−π, π]. */
export const direction = (a: Vector): number => Math.atan2(a[1], a[0]);
export const unit = (angle: number): Vector => [Math.cos(angle), Math.sin(angle)];
export const rotate = (angle: number, a: Vector): Vector => {
  const c = Math.cos(angle);
  const s = Math.sin(angle);
  return [c * a[0] - s * a[1], s * a[0] + c * a[1]];
};

/** Where a body stands: scene position of its origin (m) and heading of its x axis (rad). */
export interface Pose {
  readonly x: number;
  readonly y: number;
  readonly heading: number;
}

/** Scene position of the body point b: p = t + R(ψ)·b. */
export const toScene = (pose: Pose, b: Vector): Vector =>
  add([pose.x, pose.y], rotate(pose.heading, b));

/** Body coordinates of the scene point p, the inverse of `toScene`. */
export const toBody = (pose: Pose, p: Vector): Vector =>
  rotate(-pose.heading, subtract(p, [pose.x, pose.y]));

/** The angle brought into (−π, π]. */
export const wrap = (angle: number): number => {
  const turn = 2 * Math.PI;
  const a = angle - turn * Math.round(angle / turn);
  return a <= -Math.PI ? a + turn : a;
};
