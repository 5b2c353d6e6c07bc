import {
  type JackKnifeMotion,
  TRAILER_LOCKS,
  UNIT,
  type UnitMotion,
  articulation,
} from './jack-knife-motion';
import {
  TACHOGRAPH_NOISE,
  TACHOGRAPH_START,
  UNIT_MARK_SIGMA,
  UNIT_STATION_IDS,
  UNIT_STATION_TIMES,
  UNIT_TRACES,
  axleSpeed,
  pointOf,
  pointPlace,
  rollsAt,
} from './jack-knife-survey';
import { type BodyMotion, accelerationAt, directionOf, velocityAt } from './plane-motion';
import { rounded } from './folder';
import { NOTICE } from './scene';

export function jackKnifeTruth(motion: JackKnifeMotion): Record<string, unknown> {
  return {
    format: 'centrode.demo-truth/1',
    notice: NOTICE,
    units: 'm, s, rad, kg, N; scene frame; angles counter-clockwise from +x',
    model:
      'Two planar rigid bodies with a pin at K. Drive wheels locked from the first mark (t = 0): Coulomb ' +
      'friction with constant axle loads. Steered wheels roll free, straight ahead. The trailer axle rolls ' +
      'without side-slip, with some braking, until trailerLocksAt; then its wheels are locked and slide.',
    noise: {
      markSigma: UNIT_MARK_SIGMA,
      controlSigma: 0.004,
      restSigma: 0.015,
      trailerWheelSpeedSigma: TACHOGRAPH_NOISE.trailerWheel,
      shaftSpeedSigma: TACHOGRAPH_NOISE.shaft,
      tachographClockAtFirstMark: TACHOGRAPH_START,
    },
    unit: UNIT,
    axleLoads: motion.loads,
    trailerLocksAt: TRAILER_LOCKS,
    traces: Object.fromEntries(UNIT_TRACES.map(({ id, body, point }) => [id, `${body}.${point}`])),
    restTime: motion.restTime,
    stations: [
      ...UNIT_STATION_IDS.map((id) => ({
        id,
        time: UNIT_STATION_TIMES[id],
        trailerAxleRolls: rollsAt(id),
        ...moment(motion.at(UNIT_STATION_TIMES[id])),
      })),
      { id: 'S7', time: motion.restTime, ...restMoment(motion.at(motion.restTime)) },
    ],
    samples: Array.from({ length: 71 }, (_unused, i) => {
      const time = Math.min(i * 0.05, motion.restTime);
      return rounded({ time, ...motion.at(time) }, 6);
    }),
  };
}

function bodyMoment({
  pose,
  velocity,
  omega,
  acceleration,
  alpha,
}: BodyMotion): Record<string, unknown> {
  const pole = [pose.x - velocity[1] / omega, pose.y + velocity[0] / omega];
  return { pose, velocity, speed: Math.hypot(...velocity), omega, acceleration, alpha, pole };
}

function moment(unit: UnitMotion): Record<string, unknown> {
  const wheels = UNIT_TRACES.map((trace) => {
    const body = unit[trace.body];
    const velocity = velocityAt(body, pointOf(trace));
    const values = {
      place: pointPlace(unit, trace),
      velocity,
      direction: directionOf(velocity),
      acceleration: accelerationAt(body, pointOf(trace)),
    };
    return [`${trace.body}.${trace.point}`, values] as const;
  });
  return rounded(
    {
      tractor: bodyMoment(unit.tractor),
      trailer: bodyMoment(unit.trailer),
      articulation: articulation(unit),
      trailerAxleSpeed: axleSpeed(unit),
      wheels: Object.fromEntries(wheels),
    },
    6,
  );
}

function restMoment(unit: UnitMotion): Record<string, unknown> {
  const still = (body: BodyMotion): Record<string, unknown> => ({
    pose: body.pose,
    velocity: [0, 0],
    omega: 0,
    acceleration: null,
    alpha: null,
  });
  const poses = { tractor: still(unit.tractor), trailer: still(unit.trailer) };
  return rounded({ ...poses, articulation: articulation(unit) }, 6);
}
