import { type Vec2, place } from './plane-motion';
import type { Sketch } from './sketch';
import { type SpinMotion, WHEELS } from './spin-motion';
import { CONTROL, STATION_IDS, type SpinSurvey, TRACE_OF } from './spin-survey';

const CORNERS: Vec2[] = [
  [2, 0.85],
  [-2.24, 0.86],
  [-2.24, -0.86],
  [2, -0.85],
  [2, 0.85],
];

export function spinSketch(survey: SpinSurvey, motion: SpinMotion, bearingOfX: number): Sketch {
  const measured = new Map(survey.book.rows.map((row) => [row.id, row.at]));
  const pointsOf = (ids: readonly string[]): Vec2[] =>
    ids.flatMap((id) => {
      const at = measured.get(id);
      return at === undefined ? [] : [at];
    });
  const rest = motion.at(motion.restTime).pose;
  const gaps = STATION_IDS.map((id) => survey.stationMarks[id].LF);
  return {
    title: 'Scene sketch: Marl Lane bend',
    subtitle:
      'Case 2026-014. Vehicle 1 from the left, counter-clockwise spin, at rest on the right.',
    author: 'E. Varo',
    date: '2026-10-17T16:20:00-08:00',
    bearingOfX,
    window: [
      [-10, -14],
      [47, 12],
    ],
    scaleBar: { length: 10, label: '0 - 10 m' },
    lines: [
      ...survey.lines.map(({ string, title, points }) => ({
        points: pointsOf(points),
        kind: string === 'CL' ? ('dashed' as const) : ('edge' as const),
        label: title,
      })),
      ...WHEELS.map((wheel) => ({
        points: pointsOf(survey.traces[wheel]),
        kind: 'trace' as const,
        label: TRACE_OF[wheel],
      })),
      { points: CORNERS.map((corner) => place(rest, corner)), kind: 'outline' as const },
    ],
    labels: [
      ...Object.entries(CONTROL).map(([id, at]) => ({ at, text: id, kind: 'control' as const })),
      ...pointsOf(gaps).map((at, i) => ({ at, text: `board ${i + 1}`, kind: 'mark' as const })),
    ],
    notes: [
      'Dry asphalt, level, 12 degC. No kerb; gravel shoulder about 1.2 m on both sides.',
      'Four marks T1 to T4, dark and continuous, each with five gaps of 0.2 to 0.4 m (boards 2 to 6 stand at T1).',
      'All four marks begin within the length of the vehicle. Marks end beneath the wheels of vehicle 1 (board 7).',
      'Front wheels straight ahead as found. Vehicle 1 not moved before the survey.',
      'Lane closed by cones during the work. Targets on control points 9001 to 9006 for the photographs.',
    ],
  };
}
