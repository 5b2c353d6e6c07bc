import { Matrix, solve } from 'ml-matrix';
import {
  type BodyMotion,
  type Vec2,
  directionOf,
  place,
  rungeKuttaStep,
  turn,
  velocityAt,
} from './plane-motion';

/**
 * The truth of "Articulated unit, Tarn Cutting": a tractor whose drive wheels lock on a wet road and
 * swing out while the semi-trailer pushes. Two rigid bodies joined by a pin at the kingpin. Until
 * `TRAILER_LOCKS` the trailer axle rolls without side-slip (a wheel constraint); after it the trailer
 * wheels are locked and slide as well. Planar, with constant axle loads.
 */
const GRAVITY = 9.80665;

export const UNIT = {
  dragFactor: 0.54,
  tractor: { mass: 7400, inertia: 19500 },
  trailer: { mass: 21600, inertia: 214000 },
  points: {
    tractor: {
      K: [-1.95, 0],
      SL: [1.52, 1.02],
      SR: [1.52, -1.02],
      DL: [-2.18, 0.93],
      DR: [-2.18, -0.93],
    },
    trailer: { K: [4.35, 0], axle: [-3.25, 0], AL: [-3.25, 1.01], AR: [-3.25, -1.01] },
  },
  /** Retardation of the rolling trailer axle by its brakes, as a share of its load. */
  trailerBraking: 0.25,
} as const satisfies { points: Record<string, Record<string, Vec2>> } & Record<string, unknown>;

export const TRAILER_LOCKS = 1.7;
const STEP = 0.001;
const FADE = 0.02;
/** Slip ratio at which the free steered wheels reach most of their side force. */
const SIDE_SLIP_SCALE = 0.06;

export interface UnitMotion {
  tractor: BodyMotion;
  trailer: BodyMotion;
}

export interface JackKnifeMotion {
  at(time: number): UnitMotion;
  restTime: number;
  loads: Record<'steer' | 'drive' | 'axle', number>;
}

/** Axle loads, N, from the static balance of trailer and tractor. */
export function axleLoads(): JackKnifeMotion['loads'] {
  const { tractor, trailer } = UNIT;
  const { K, axle } = UNIT.points.trailer;
  const pin = (trailer.mass * GRAVITY * -axle[0]) / (K[0] - axle[0]);
  const { SL, DL, K: coupling } = UNIT.points.tractor;
  const wheelbase = SL[0] - DL[0];
  const weight = tractor.mass * GRAVITY;
  const steer = (weight * -DL[0] + pin * (coupling[0] - DL[0])) / wheelbase;
  return { steer, drive: weight + pin - steer, axle: trailer.mass * GRAVITY - pin };
}

/** State: x, y, heading of tractor, of trailer, then their six rates. */
function bodiesOf(state: readonly number[], rates: readonly number[]): UnitMotion {
  const body = (i: number): BodyMotion => ({
    pose: { x: state[i], y: state[i + 1], heading: state[i + 2] },
    velocity: [state[i + 6], state[i + 7]],
    omega: state[i + 8],
    acceleration: [rates[i], rates[i + 1]],
    alpha: rates[i + 2],
  });
  return { tractor: body(0), trailer: body(3) };
}

interface Push {
  force: Vec2;
  point: Vec2;
}

function dragged(body: BodyMotion, point: Vec2, load: number): Push {
  const [vx, vy] = velocityAt(body, point);
  const size = (UNIT.dragFactor * load) / Math.hypot(vx, vy, FADE);
  return { force: [-size * vx, -size * vy], point };
}

/** A free-rolling steered wheel, held straight: it resists only across its own plane. */
function freeRolling(body: BodyMotion, point: Vec2, load: number): Push {
  const [along, across] = turn(velocityAt(body, point), -body.pose.heading);
  const slip = across / (SIDE_SLIP_SCALE * Math.abs(along) + FADE);
  const side = (-UNIT.dragFactor * load * slip) / Math.hypot(1, slip);
  return { force: turn([0, side], body.pose.heading), point };
}

function rolling(body: BodyMotion, point: Vec2, load: number): Push {
  const [along] = turn(velocityAt(body, point), -body.pose.heading);
  const size = UNIT.trailerBraking * load * Math.tanh(along / FADE);
  return { force: turn([-size, 0], body.pose.heading), point };
}

function resultant(body: BodyMotion, pushes: readonly Push[]): number[] {
  const total = [0, 0, 0];
  for (const { force, point } of pushes) {
    const [rx, ry] = turn(point, body.pose.heading);
    total[0] += force[0];
    total[1] += force[1];
    total[2] += rx * force[1] - ry * force[0];
  }
  return total;
}

/** Accelerations of both bodies from the constrained equations of motion (Lagrange multipliers). */
function accelerations(
  state: readonly number[],
  trailerRolls: boolean,
  loads: JackKnifeMotion['loads'],
): number[] {
  const { tractor, trailer } = bodiesOf(state, [0, 0, 0, 0, 0, 0]);
  const onTractor = UNIT.points.tractor;
  const onTrailer = UNIT.points.trailer;
  const hold = trailerRolls ? rolling : dragged;
  const forces = [
    ...resultant(tractor, [
      freeRolling(tractor, onTractor.SL, loads.steer / 2),
      freeRolling(tractor, onTractor.SR, loads.steer / 2),
      dragged(tractor, onTractor.DL, loads.drive / 2),
      dragged(tractor, onTractor.DR, loads.drive / 2),
    ]),
    ...resultant(trailer, [
      hold(trailer, onTrailer.AL, loads.axle / 2),
      hold(trailer, onTrailer.AR, loads.axle / 2),
    ]),
  ];
  const [k1x, k1y] = turn(onTractor.K, tractor.pose.heading);
  const [k2x, k2y] = turn(onTrailer.K, trailer.pose.heading);
  const rows = [
    [1, 0, -k1y, -1, 0, k2y],
    [0, 1, k1x, 0, -1, -k2x],
  ];
  const wanted = [
    tractor.omega ** 2 * k1x - trailer.omega ** 2 * k2x,
    tractor.omega ** 2 * k1y - trailer.omega ** 2 * k2y,
  ];
  if (trailerRolls) {
    const [nx, ny] = turn([0, 1], trailer.pose.heading);
    const [vx, vy] = velocityAt(trailer, onTrailer.axle);
    const along = nx * -vy - ny * -vx;
    rows.push([0, 0, 0, nx, ny, onTrailer.axle[0]]);
    wanted.push(trailer.omega * along);
  }
  const { mass: m1, inertia: i1 } = UNIT.tractor;
  const { mass: m2, inertia: i2 } = UNIT.trailer;
  const size = 6 + rows.length;
  const system = Matrix.zeros(size, size);
  [m1, m1, i1, m2, m2, i2].forEach((value, i) => system.set(i, i, value));
  rows.forEach((row, r) =>
    row.forEach((value, c) => {
      system.set(6 + r, c, value);
      system.set(c, 6 + r, -value);
    }),
  );
  return solve(system, Matrix.columnVector([...forces, ...wanted]))
    .to1DArray()
    .slice(0, 6);
}

/** A consistent start: both bodies at 14 m/s, the tractor already turning about the kingpin. */
function startState(): number[] {
  const tractorHeading = -0.014;
  const trailerHeading = 0.01;
  const trailerSpeed = 14;
  const trailerOmega = -0.045;
  const tractorOmega = -0.08;
  const { K, axle } = UNIT.points.trailer;
  const trailerPose = { x: 0, y: 0, heading: trailerHeading };
  const axleVelocity = turn([trailerSpeed, 0], trailerHeading);
  const toG = turn([-axle[0], 0], trailerHeading);
  const trailerVelocity: Vec2 = [
    axleVelocity[0] - trailerOmega * toG[1],
    axleVelocity[1] + trailerOmega * toG[0],
  ];
  const pin = place(trailerPose, K);
  const arm = turn(K, trailerHeading);
  const pinVelocity: Vec2 = [
    trailerVelocity[0] - trailerOmega * arm[1],
    trailerVelocity[1] + trailerOmega * arm[0],
  ];
  const toTractor = turn([-UNIT.points.tractor.K[0], 0], tractorHeading);
  return [
    pin[0] + toTractor[0],
    pin[1] + toTractor[1],
    tractorHeading,
    0,
    0,
    trailerHeading,
    pinVelocity[0] - tractorOmega * toTractor[1],
    pinVelocity[1] + tractorOmega * toTractor[0],
    tractorOmega,
    ...trailerVelocity,
    trailerOmega,
  ];
}

/** Integrates the event once and answers for any time between the first mark (t = 0) and rest. */
export function jackKnifeMotion(): JackKnifeMotion {
  const loads = axleLoads();
  const rolls = (time: number): boolean => time < TRAILER_LOCKS - STEP / 2;
  const derivative =
    (trailerRolls: boolean) =>
    (_time: number, s: readonly number[]): number[] => [
      ...s.slice(6),
      ...accelerations(s, trailerRolls, loads),
    ];
  const states = [startState()];
  const still = (s: readonly number[]): boolean =>
    s.slice(6).every((rate) => Math.abs(rate) < FADE / 4);
  while (!still(states[states.length - 1])) {
    const time = (states.length - 1) * STEP;
    states.push(rungeKuttaStep(derivative(rolls(time)), time, states[states.length - 1], STEP));
  }
  const at = (time: number): UnitMotion => {
    const index = Math.min(Math.floor(time / STEP + 1e-6), states.length - 1);
    const phase = rolls(index * STEP);
    const rest = time - index * STEP;
    const state =
      rest > 1e-9 ? rungeKuttaStep(derivative(phase), time, states[index], rest) : states[index];
    return bodiesOf(state, accelerations(state, phase, loads));
  };
  return { at, restTime: (states.length - 1) * STEP, loads };
}

export function articulation(motion: UnitMotion): number {
  return motion.tractor.pose.heading - motion.trailer.pose.heading;
}

/** Direction in which a point of the unit moves, rad from +x. */
export function courseOf(body: BodyMotion, point: Vec2): number {
  return directionOf(velocityAt(body, point));
}
