import type { JackKnifeMotion } from './jack-knife-motion';
import { UNIT_CONTROL, UNIT_STATION_IDS, UNIT_TRACES, type UnitSurvey } from './jack-knife-survey';
import { type Vec2, place } from './plane-motion';
import type { Sketch } from './sketch';

/** Outlines in the frames of the bodies, first corner repeated at the end. */
export const TRACTOR_OUTLINE: Vec2[] = [
  [2.6, 1.22],
  [0.64, 1.22],
  [0.64, 0.5],
  [-3.3, 0.5],
  [-3.3, -0.5],
  [0.64, -0.5],
  [0.64, -1.22],
  [2.6, -1.22],
];
export const TRAILER_OUTLINE: Vec2[] = [
  [5.65, 1.25],
  [-5.55, 1.25],
  [-5.55, -1.25],
  [5.65, -1.25],
];

export function jackKnifeSketch(
  survey: UnitSurvey,
  motion: JackKnifeMotion,
  bearingOfX: number,
): Sketch {
  const measured = new Map(survey.book.rows.map((row) => [row.id, row.at]));
  const pointsOf = (ids: readonly string[]): Vec2[] =>
    ids.flatMap((id) => {
      const at = measured.get(id);
      return at === undefined ? [] : [at];
    });
  const rest = motion.at(motion.restTime);
  const closed = (outline: Vec2[], body: 'tractor' | 'trailer'): Vec2[] =>
    [...outline, outline[0]].map((corner) => place(rest[body].pose, corner));
  const releases = UNIT_STATION_IDS.map((id) => survey.stationMarks[id]['U1']);
  return {
    title: 'Scene sketch: Tarn Cutting',
    subtitle:
      'Case 2026-013. Articulated unit from the left, folded to the right, at rest across the road.',
    author: 'R. Amadi',
    date: '2026-09-29T10:30:00-08:00',
    bearingOfX,
    window: [
      [-12, -14],
      [46, 9],
    ],
    scaleBar: { length: 10, label: '0 - 10 m' },
    lines: [
      ...survey.lines.map(({ string, title, points }) => ({
        points: pointsOf(points),
        kind: string === 'KM' ? ('dashed' as const) : ('edge' as const),
        label: title,
      })),
      ...UNIT_TRACES.map(({ id }) => ({
        points: pointsOf(survey.traces[id]),
        kind: 'trace' as const,
        label: id,
      })),
      { points: closed(TRACTOR_OUTLINE, 'tractor'), kind: 'outline' as const },
      { points: closed(TRAILER_OUTLINE, 'trailer'), kind: 'outline' as const },
    ],
    labels: [
      ...Object.entries(UNIT_CONTROL).map(([id, at]) => ({
        at,
        text: id,
        kind: 'control' as const,
      })),
      ...pointsOf(releases).map((at, i) => ({ at, text: `board ${i + 1}`, kind: 'mark' as const })),
    ],
    notes: [
      'Wet asphalt, film of wet marl washed from the slope: the trailer tyres left clear prints in it.',
      'U1, U2: double skids without tread. U3: single print, turning to a scrub. U4, U5: prints with tread, smeared from about x = 15 m on.',
      'Five releases of the brakes show in all marks at once: gaps in U1 and U2, crisp tread in U4 and U5 (boards 2 to 6).',
      'Marks of the trailer are taken at the middle axle of its group. Steered wheels straight ahead as found.',
      'Road closed. Unit made safe (wheels chocked, air drained) before anyone went between tractor and trailer.',
    ],
  };
}
