import { type Vec2, place } from './plane-motion';
import { PRESS, asFound } from './press-motion';
import { DATUMS, type PressSurvey, WITNESSES } from './press-survey';
import type { Sketch } from './sketch';

const circle = (centre: Vec2, radius: number): Vec2[] =>
  Array.from({ length: 41 }, (_unused, i) => {
    const angle = (i * Math.PI) / 20;
    return [centre[0] + radius * Math.cos(angle), centre[1] + radius * Math.sin(angle)];
  });

export const CRANK_OUTLINE: Vec2[] = circle([0, 0], 0.1);
export const ROD_OUTLINE: Vec2[] = [
  [-0.06, 0.03],
  [0.4, 0.03],
  [0.4, -0.03],
  [-0.06, -0.03],
];
export const RAM_OUTLINE: Vec2[] = [
  [-0.165, -0.09],
  [0.165, -0.09],
  [0.165, 0.15],
  [-0.165, 0.15],
];

export function pressSketch(survey: PressSurvey): Sketch {
  const measured = new Map(survey.book.rows.map((row) => [row.id, row.at]));
  const at = (id: string): Vec2 => measured.get(id) ?? [0, 0];
  const found = asFound();
  const outline = (points: Vec2[], body: 'crank' | 'rod' | 'ram'): Vec2[] =>
    [...points, points[0]].map((corner) => place(found[body].pose, corner));
  return {
    title: 'Inspection note: Press 4, Fennel Works',
    subtitle:
      'Case 2026-011. Elevation from the operator side, as found and locked out. Crank turns counter-clockwise.',
    author: 'S. Lindqvist',
    date: '2026-08-19T18:05:00-08:00',
    bearingOfX: null,
    window: [
      [-1.2, -0.8],
      [1.2, 0.36],
    ],
    scaleBar: { length: 0.4, label: '0 - 400 mm' },
    lines: [
      { points: circle([0, 0], PRESS.crank), kind: 'dashed' },
      { points: outline(CRANK_OUTLINE, 'crank'), kind: 'outline' },
      { points: outline(ROD_OUTLINE, 'rod'), kind: 'outline' },
      { points: outline(RAM_OUTLINE, 'ram'), kind: 'outline' },
      ...survey.lines.map(({ title, points }) => ({
        points: points.map(at),
        kind: 'edge' as const,
        label: title,
      })),
    ],
    labels: [
      ...Object.keys(DATUMS).map((id) => ({ at: at(id), text: id, kind: 'control' as const })),
      ...WITNESSES.map(({ id }) => ({ at: at(id), text: id, kind: 'mark' as const })),
      { at: at('O'), text: 'O', kind: 'control' },
    ],
    notes: [
      'Isolated and locked out at the switch, flywheel run down and blocked, ram propped, before anyone reached in.',
      'W1 dent of the guard bolt in the web rim. W2 paint of the cover on the counterweight. W3 scrape on the rod.',
      'W4, W5 fresh dents in both gibs at the lower edge of the ram: the ram struck the guard frame and jumped.',
      'Motor plate: 960 per minute, plus or minus 3 per cent; gear 17.0 to 1; belt without visible slip.',
      'Brake and clutch: stopped 39 degrees of crank after contact. Glove in the die space, see exhibit 6.',
      'Measured with arm and probe from datum holes F1 to F4; all values in millimetres.',
    ],
  };
}
