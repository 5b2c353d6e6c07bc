/**
 * Rigid bodies moving in a plane, in the project's conventions: SI units, scene frame right-handed,
 * angles counter-clockwise from +x, body frame x forward and y left. This is written apart from the
 * engine on purpose: the demo's truth must not come from the code that it is used to check.
 */
export type Vec2 = readonly [number, number];

export interface Pose {
  x: number;
  y: number;
  heading: number;
}

/** Pose of a body's origin with its first and second time derivatives. */
export interface BodyMotion {
  pose: Pose;
  velocity: Vec2;
  omega: number;
  acceleration: Vec2;
  alpha: number;
}

/** Scene position of a body point. */
export function place(pose: Pose, point: Vec2): Vec2 {
  const [rx, ry] = turn(point, pose.heading);
  return [pose.x + rx, pose.y + ry];
}

export function turn(vector: Vec2, angle: number): Vec2 {
  const cos = Math.cos(angle);
  const sin = Math.sin(angle);
  return [cos * vector[0] - sin * vector[1], sin * vector[0] + cos * vector[1]];
}

/** v_P = v_O + omega k x r. */
export function velocityAt(body: BodyMotion, point: Vec2): Vec2 {
  const [rx, ry] = turn(point, body.pose.heading);
  return [body.velocity[0] - body.omega * ry, body.velocity[1] + body.omega * rx];
}

/** a_P = a_O + alpha k x r - omega^2 r. */
export function accelerationAt(body: BodyMotion, point: Vec2): Vec2 {
  const [rx, ry] = turn(point, body.pose.heading);
  const squared = body.omega * body.omega;
  return [
    body.acceleration[0] - body.alpha * ry - squared * rx,
    body.acceleration[1] + body.alpha * rx - squared * ry,
  ];
}

export function directionOf(vector: Vec2): number {
  return Math.atan2(vector[1], vector[0]);
}

/** The classical fourth-order Runge-Kutta step of state' = rate(t, state). */
export function rungeKuttaStep(
  rate: (time: number, state: readonly number[]) => number[],
  time: number,
  state: readonly number[],
  step: number,
): number[] {
  const along = (slope: readonly number[], share: number): number[] =>
    state.map((value, i) => value + share * step * slope[i]);
  const k1 = rate(time, state);
  const k2 = rate(time + step / 2, along(k1, 0.5));
  const k3 = rate(time + step / 2, along(k2, 0.5));
  const k4 = rate(time + step, along(k3, 1));
  return state.map((value, i) => value + (step / 6) * (k1[i] + 2 * k2[i] + 2 * k3[i] + k4[i]));
}
