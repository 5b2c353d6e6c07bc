import type { Shot } from './draft';
import { type JackKnifeMotion, TRAILER_LOCKS } from './jack-knife-motion';
import {
  CUTTING,
  UNIT_CONTROL,
  UNIT_STATION_IDS,
  UNIT_STATION_TIMES,
  UNIT_TRACES,
  type UnitTrace,
  pointPlace,
} from './jack-knife-survey';
import { unit as unitVector } from './picture/camera';
import type { Stage } from './picture/render';
import { roadGround, sky, straight } from './picture/road';
import { noise } from './picture/texture';
import { bush, numeral, placard, scaleRod, target, trafficCone } from './picture/things';
import { type Band, tyreBands } from './picture/tyre-bands';
import { semiTrailer, tractor } from './picture/vehicles';
import type { Vec2 } from './plane-motion';

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
  takenAt: `2026-09-29T${time}-08:00`,
  takenBy: 'R. Amadi',
  sensitive: false,
  camera: { eye, target: aim, focalLength },
  stage: 'main',
});

export const JACK_KNIFE_SHOTS: readonly Shot[] = [
  shot(
    1,
    'Approach: skids of the drive axle and prints of the trailer',
    '08:41:20',
    [-13.5, -0.6, 1.7],
    [8, -0.1, 0],
    28,
  ),
  shot(
    2,
    'Unit at rest, from the approach side',
    '08:44:02',
    [14.5, 4.9, 1.75],
    [27.4, -2.2, 1.4],
    28,
  ),
  shot(3, 'Unit at rest, from the far side', '08:47:33', [42.5, 1.5, 1.75], [28.5, -3.0, 1.4], 30),
  shot(4, 'Release 2 at board 3', '08:53:10', [11.2, 3.6, 1.5], [18.2, -0.2, 0], 28),
  shot(
    5,
    'End of the prints at the trailer axles',
    '08:58:46',
    [9.8, -5.0, 1.6],
    [17.4, -1.3, 0.3],
    30,
  ),
  shot(6, 'From the slope, over the whole scene', '09:06:15', [17.5, 26, 18], [17.5, -1.0, 0], 24),
];

function band(motion: JackKnifeMotion, trace: UnitTrace, aside: number): Band {
  const releases = UNIT_STATION_IDS.slice(1).map((id) => UNIT_STATION_TIMES[id]);
  const line: Vec2[] = [];
  const strength: number[] = [];
  for (let time = 0; time <= motion.restTime; time += 0.005) {
    const [x, y] = pointPlace(motion.at(time), trace);
    const heading = motion.at(time)[trace.body].pose.heading;
    const released = releases.some((release) => Math.abs(release - time) < 0.018);
    const locked = trace.body === 'tractor' || time > TRAILER_LOCKS;
    const full = trace.point === 'SL' ? Math.min(0.55, 0.25 + 0.2 * time) : 0.85;
    line.push([x - aside * Math.sin(heading), y + aside * Math.cos(heading)]);
    strength.push(released ? 0.05 : locked ? full : 0.4);
  }
  return { line, strength, halfWidth: 0.13 };
}

/** Drive and trailer wheels are double or wide tyres and leave two bands a little apart. */
function bands(motion: JackKnifeMotion): Band[] {
  return UNIT_TRACES.flatMap((trace) =>
    trace.point === 'DL' || trace.point === 'DR'
      ? [band(motion, trace, 0.17), band(motion, trace, -0.17)]
      : [band(motion, trace, 0)],
  );
}

export async function jackKnifeStages(
  motion: JackKnifeMotion,
): Promise<Record<Shot['stage'], Stage>> {
  const ground = roadGround({
    line: straight(CUTTING.centre, CUTTING.heading),
    halfWidth: CUTTING.halfWidth,
    shoulder: 1.6,
    wet: 0.75,
    verge: [0.14, 0.14, 0.07],
    marks: tyreBands(bands(motion)),
  });
  const faces = await Promise.all(['1', '2', '3', '4', '5', '6', '7'].map(numeral));
  const boards = UNIT_STATION_IDS.map((id, i) => {
    const [x, y] = pointPlace(motion.at(UNIT_STATION_TIMES[id]), UNIT_TRACES[0]);
    return placard([x, y + 0.55], 2.4, faces[i]);
  });
  const rest = motion.at(motion.restTime);
  const [releaseX, releaseY] = pointPlace(motion.at(UNIT_STATION_TIMES.S3), UNIT_TRACES[0]);
  const main: Stage = {
    planes: [ground],
    solids: [
      ...boards,
      placard([28.2, 1.6], 2.4, faces[6]),
      ...Object.values(UNIT_CONTROL).map((point) => target(point, 0.2)),
      scaleRod([releaseX + 0.4, releaseY + 0.3], -0.05),
      ...[-11, -6, -1].map((x) => trafficCone([x, -5.2])),
      trafficCone([44, 1.6]),
      trafficCone([44, -4.8]),
      bush([9, -13.5], 2.1, 1.9),
      bush([34, -14.5], 2.6, 2.4),
      bush([52, 9], 2.8, 2.2),
      ...tractor(rest.tractor.pose, [0.3, 0.05, 0.03]),
      ...semiTrailer(rest.trailer.pose, [0.38, 0.39, 0.38]),
    ],
    sky: sky({
      zenith: [0.5, 0.54, 0.6],
      horizon: [0.7, 0.72, 0.74],
      skyline: (azimuth) =>
        0.02 +
        0.3 *
          Math.abs(Math.sin(azimuth)) ** 1.5 *
          noise(5 + 3 * Math.cos(azimuth), 5 + 3 * Math.sin(azimuth)),
      trees: [0.1, 0.1, 0.07],
    }),
    sun: { towards: unitVector([-0.3, -0.5, 0.8]), strength: 0.45, softness: 4 },
    daylight: 1.45,
    haze: 260,
  };
  return { main, detail: main };
}
