import {
  type BodyMotion,
  type Vec2,
  place,
  rungeKuttaStep,
  turn,
  velocityAt,
} from './plane-motion';

/**
 * The truth of "Spin on Marl Lane bend": a car, already in a yaw, locks all four wheels and slides to
 * rest. Each locked wheel is dragged against its own motion with mu times its static load (Coulomb
 * friction; planar, without load transfer), so translation and spin share the friction.
 */
export const GRAVITY = 9.80665;

export const CAR = {
  mass: 1420,
  inertia: 2310,
  dragFactor: 0.68,
  wheels: {
    LF: [1.18, 0.755],
    RF: [1.18, -0.755],
    LR: [-1.46, 0.745],
    RR: [-1.46, -0.745],
  },
} as const satisfies { wheels: Record<string, Vec2> } & Record<string, unknown>;

export type Wheel = keyof typeof CAR.wheels;
export const WHEELS = Object.keys(CAR.wheels) as Wheel[];

const START = [2.0, -3.55, 0.34, 19.9, 0.1, 2.02];
const STEP = 0.001;
/** Below this sliding speed (m/s) friction fades out, so that the car comes to rest smoothly. */
const FADE = 0.02;

export interface SpinMotion {
  at(time: number): BodyMotion;
  /** Time at which the car stands still, s. */
  restTime: number;
  /** Static load of each wheel, N. */
  loads: Record<Wheel, number>;
}

export function wheelLoads(): Record<Wheel, number> {
  const front = CAR.wheels.LF[0];
  const rear = -CAR.wheels.LR[0];
  const weight = CAR.mass * GRAVITY;
  const onFront = (weight * rear) / (front + rear) / 2;
  const onRear = weight / 2 - onFront;
  return { LF: onFront, RF: onFront, LR: onRear, RR: onRear };
}

function accelerations(state: readonly number[], loads: Record<Wheel, number>): number[] {
  const body = motionOf(state, [0, 0, 0]);
  let forceX = 0;
  let forceY = 0;
  let moment = 0;
  for (const wheel of WHEELS) {
    const [vx, vy] = velocityAt(body, CAR.wheels[wheel]);
    const speed = Math.hypot(vx, vy);
    const force = (CAR.dragFactor * loads[wheel]) / Math.hypot(speed, FADE);
    const [rx, ry] = turn(CAR.wheels[wheel], body.pose.heading);
    forceX -= force * vx;
    forceY -= force * vy;
    moment += rx * -force * vy - ry * -force * vx;
  }
  return [forceX / CAR.mass, forceY / CAR.mass, moment / CAR.inertia];
}

function motionOf(state: readonly number[], rates: readonly number[]): BodyMotion {
  return {
    pose: { x: state[0], y: state[1], heading: state[2] },
    velocity: [state[3], state[4]],
    omega: state[5],
    acceleration: [rates[0], rates[1]],
    alpha: rates[2],
  };
}

/** Integrates the slide once and answers for any time between the first mark (t = 0) and rest. */
export function spinMotion(): SpinMotion {
  const loads = wheelLoads();
  const rate = (_time: number, s: readonly number[]): number[] => [
    s[3],
    s[4],
    s[5],
    ...accelerations(s, loads),
  ];
  const states: number[][] = [START];
  const moving = (s: readonly number[]): boolean =>
    WHEELS.some(
      (wheel) => Math.hypot(...velocityAt(motionOf(s, [0, 0, 0]), CAR.wheels[wheel])) > FADE / 4,
    );
  while (moving(states[states.length - 1])) {
    const last = states[states.length - 1];
    states.push(rungeKuttaStep(rate, 0, last, STEP));
  }
  const restTime = (states.length - 1) * STEP;
  const at = (time: number): BodyMotion => {
    const index = Math.min(Math.floor(time / STEP + 1e-6), states.length - 1);
    const rest = time - index * STEP;
    const state = rest > 1e-9 ? rungeKuttaStep(rate, 0, states[index], rest) : states[index];
    return motionOf(state, accelerations(state, loads));
  };
  return { at, restTime, loads };
}

/** Angle from the wheel's own forward direction to its velocity, rad. */
export function slipAngle(body: BodyMotion, wheel: Wheel): number {
  const [vx, vy] = turn(velocityAt(body, CAR.wheels[wheel]), -body.pose.heading);
  return Math.atan2(vy, vx);
}

export function wheelPlace(body: BodyMotion, wheel: Wheel): Vec2 {
  return place(body.pose, CAR.wheels[wheel]);
}
