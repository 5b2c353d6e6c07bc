import type { Shot } from './draft';
import { unit } from './picture/camera';
import type { Stage } from './picture/render';
import { bend, roadGround, sky } from './picture/road';
import { noise } from './picture/texture';
import { bush, numeral, placard, post, scaleRod, target, trafficCone } from './picture/things';
import { type Band, tyreBands } from './picture/tyre-bands';
import { car } from './picture/vehicles';
import type { Vec2 } from './plane-motion';
import { type SpinMotion, type Wheel, WHEELS, slipAngle, wheelPlace } from './spin-motion';
import { BEND, CONTROL, STATION_IDS, STATION_TIMES } from './spin-survey';

const shot = (
  number: number,
  title: string,
  time: string,
  eye: readonly [number, number, number],
  aim: readonly [number, number, number],
  focalLength: number,
): Shot => ({
  number,
  title,
  takenAt: `2026-10-17T${time}-08:00`,
  takenBy: 'J. Oduya',
  sensitive: false,
  camera: { eye, target: aim, focalLength },
  stage: 'main',
});

export const SPIN_SHOTS: readonly Shot[] = [
  shot(
    1,
    'From the approach, towards the marks',
    '15:02:11',
    [-8.6, -3.6, 1.65],
    [12, -3.9, 0.1],
    28,
  ),
  shot(
    2,
    'Beginning of the marks, boards 1 and 2',
    '15:04:37',
    [0.6, -8.4, 1.7],
    [6.6, -2.6, 0],
    28,
  ),
  shot(
    3,
    'Gap 3 at board 4, with one-metre rod',
    '15:07:52',
    [19.2, -5.6, 1.35],
    [22.0, -3.0, 0],
    35,
  ),
  shot(4, 'Vehicle 1 at its point of rest', '15:11:05', [26.0, -9.2, 1.6], [31.6, -3.3, 0.55], 32),
  shot(
    5,
    'From the point of rest, back along the marks',
    '15:13:48',
    [39.5, -1.2, 1.7],
    [20, -3.6, 0],
    28,
  ),
  shot(6, 'From the mast, over the whole scene', '15:21:30', [18.5, -27, 17], [18.2, -2.6, 0], 24),
];

/** The four marks as bands, with a gap at every station but the first. */
function bands(motion: SpinMotion): Band[] {
  const gaps = STATION_IDS.slice(1).map((id) => STATION_TIMES[id]);
  return WHEELS.map((wheel) => {
    const line: Vec2[] = [];
    const strength: number[] = [];
    for (let time = 0; time <= motion.restTime; time += 0.004) {
      const body = motion.at(time);
      const inGap = gaps.some((gap) => Math.abs(gap - time) < 0.013);
      const sideways = Math.abs(Math.sin(slipAngle(body, wheel)));
      line.push(wheelPlace(body, wheel));
      strength.push(inGap ? 0.06 : 0.78 + 0.17 * sideways);
    }
    return { line, strength, halfWidth: 0.095 };
  });
}

export async function spinStages(motion: SpinMotion): Promise<Record<Shot['stage'], Stage>> {
  const ground = roadGround({
    line: bend(BEND.centre, BEND.radius),
    halfWidth: BEND.halfWidth,
    shoulder: 1.2,
    wet: 0.1,
    verge: [0.12, 0.16, 0.055],
    marks: tyreBands(bands(motion)),
  });
  const at = (time: number, wheel: Wheel): Vec2 => wheelPlace(motion.at(time), wheel);
  const faces = await Promise.all(['1', '2', '3', '4', '5', '6', '7'].map(numeral));
  const boards = STATION_IDS.map((id, i) => {
    const [x, y] = at(STATION_TIMES[id], 'LF');
    return placard([x + 0.1, y + 0.42], -2.2, faces[i]);
  });
  const rest = motion.at(motion.restTime).pose;
  const [gapX, gapY] = at(STATION_TIMES.S4, 'LF');
  const main: Stage = {
    planes: [ground],
    solids: [
      ...boards,
      placard([rest.x + 0.6, rest.y - 1.5], -2.2, faces[6]),
      ...Object.values(CONTROL).map((point) => target(point, 0.2)),
      scaleRod([gapX + 0.05, gapY - 0.35], 0.1),
      scaleRod([3.2, -5.2], 0.15),
      ...[-9, -4, 2].map((x) => trafficCone([x, -9.4 + 0.001 * x * x])),
      trafficCone([43, 4.6]),
      trafficCone([47, 6.4]),
      ...[6, 24, 40].map((x) => post([x, 1.6 + (x * x) / 240])),
      bush([31, 15.5], 2.2, 2.1),
      bush([27, 18], 2.8, 3),
      bush([60, -6], 3, 2.6),
      ...car(rest, [0.05, 0.1, 0.16]),
    ],
    sky: sky({
      zenith: [0.3, 0.45, 0.7],
      horizon: [0.72, 0.78, 0.84],
      skyline: (azimuth) =>
        0.03 + 0.05 * noise(4 + 4 * Math.cos(azimuth), 4 + 4 * Math.sin(azimuth)),
      trees: [0.08, 0.11, 0.05],
    }),
    sun: { towards: unit([-0.5, -0.45, 0.6]), strength: 1.75, softness: 14 },
    daylight: 0.95,
    haze: 420,
  };
  return { main, detail: main };
}
