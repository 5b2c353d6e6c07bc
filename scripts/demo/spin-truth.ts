import { accelerationAt, directionOf, velocityAt } from './plane-motion';
import { rounded } from './folder';
import { CAR, GRAVITY, type SpinMotion, WHEELS, slipAngle, wheelPlace } from './spin-motion';
import {
  MARK_SIGMA,
  RECORDER_NOISE,
  RECORDER_START,
  STATION_IDS,
  STATION_TIMES,
  TRACE_OF,
} from './spin-survey';
import { NOTICE } from './scene';

/** What really happened, for checking solutions; never shown in the demo case itself. */
export function spinTruth(motion: SpinMotion): Record<string, unknown> {
  return {
    format: 'centrode.demo-truth/1',
    notice: NOTICE,
    units: 'm, s, rad, kg, N; scene frame; angles counter-clockwise from +x',
    model:
      'Planar rigid body, all four wheels locked from the first mark (t = 0) to rest, Coulomb friction ' +
      'with the static wheel loads, no load transfer, level ground. Recorder values before t = 0 are assumed.',
    noise: {
      markSigma: MARK_SIGMA,
      controlSigma: 0.003,
      restSigma: 0.01,
      recorderSpeedSigma: RECORDER_NOISE.speed,
      recorderYawRateSigma: RECORDER_NOISE.yawRate,
      recorderClockAtFirstMark: RECORDER_START,
    },
    vehicle: { mass: CAR.mass, inertia: CAR.inertia, wheels: CAR.wheels, loads: motion.loads },
    gravity: GRAVITY,
    dragFactor: CAR.dragFactor,
    traces: Object.fromEntries(WHEELS.map((wheel) => [TRACE_OF[wheel], wheel])),
    restTime: motion.restTime,
    stations: [
      ...STATION_IDS.map((id) => ({
        id,
        time: STATION_TIMES[id],
        ...momentOf(motion, STATION_TIMES[id]),
      })),
      { id: 'S7', time: motion.restTime, ...momentOf(motion, motion.restTime) },
    ],
    samples: Array.from({ length: 61 }, (_unused, i) => {
      const time = Math.min(i * 0.05, motion.restTime);
      const { pose, velocity, omega, acceleration, alpha } = motion.at(time);
      return rounded({ time, pose, velocity, omega, acceleration, alpha }, 6);
    }),
  };
}

function momentOf(motion: SpinMotion, time: number): Record<string, unknown> {
  const body = motion.at(time);
  const atRest = time === motion.restTime;
  const still = { velocity: [0, 0], omega: 0, acceleration: null, alpha: null };
  const moment = {
    pose: body.pose,
    ...(atRest
      ? still
      : {
          velocity: body.velocity,
          speed: Math.hypot(...body.velocity),
          omega: body.omega,
          acceleration: body.acceleration,
          alpha: body.alpha,
          pole: [
            body.pose.x - body.velocity[1] / body.omega,
            body.pose.y + body.velocity[0] / body.omega,
          ],
        }),
    wheels: Object.fromEntries(
      WHEELS.map((wheel) => {
        const velocity = velocityAt(body, CAR.wheels[wheel]);
        const moving = {
          velocity,
          direction: directionOf(velocity),
          slipAngle: slipAngle(body, wheel),
          acceleration: accelerationAt(body, CAR.wheels[wheel]),
        };
        return [
          wheel,
          { place: wheelPlace(body, wheel), ...(atRest ? { velocity: [0, 0] } : moving) },
        ];
      }),
    ),
  };
  return rounded(moment, 6);
}
