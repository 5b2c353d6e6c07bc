import { type Vec2, place } from './plane-motion';
import { type PressMotion, PRESS, asFound, atContact } from './press-motion';
import { seededRandom } from './random';
import { type FieldBook, type SurveyRow, csv, fieldBook, fixed } from './survey';

/** Standard deviations, m: a clean datum, a worn edge or centre, and the middle of a witness mark. */
export const PRESS_SIGMA = { datum: 0.00008, edge: 0.00015, witness: 0.0004 } as const;

export const DATUMS: Record<string, Vec2> = {
  F1: [-0.43, 0.28],
  F2: [0.43, 0.28],
  F3: [-0.43, -0.68],
  F4: [0.43, -0.68],
};

interface Witness {
  id: string;
  body: keyof PressMotion;
  point: string;
  what: string;
}

/** Marks of the moment of contact, each pairing a place on the frame with a point of a moving part. */
export const WITNESSES: readonly Witness[] = [
  { id: 'W1', body: 'crank', point: 'P1', what: 'dent of the guard bolt, against web rim' },
  { id: 'W2', body: 'crank', point: 'P2', what: 'paint on the cover, from web counterweight' },
  { id: 'W3', body: 'rod', point: 'Q1', what: 'scrape on the guard rail, from rod shank' },
  { id: 'W4', body: 'ram', point: 'CL', what: 'dent in the left gib, from ram lower edge' },
  { id: 'W5', body: 'ram', point: 'CR', what: 'dent in the right gib, from ram lower edge' },
];

/** Points of the parts measured where the press was found, locked out. */
export const FOUND_POINTS: readonly Witness[] = [
  { id: 'L1', body: 'crank', point: 'P1', what: 'web rim, bruise' },
  { id: 'L2', body: 'crank', point: 'P2', what: 'counterweight, bare patch' },
  { id: 'L3', body: 'rod', point: 'Q1', what: 'rod shank, scrape' },
  { id: 'L4', body: 'ram', point: 'CL', what: 'ram, lower left edge' },
  { id: 'L5', body: 'ram', point: 'CR', what: 'ram, lower right edge' },
];

export function partPoint({ body, point }: Pick<Witness, 'body' | 'point'>): Vec2 {
  const points: Record<string, Vec2> = PRESS.points[body];
  return points[point];
}

export interface PressSurvey {
  book: FieldBook;
  lines: { string: string; title: string; points: string[] }[];
}

export function pressSurvey(): PressSurvey {
  const random = seededRandom(20260011);
  const book = fieldBook(random);
  const add = (
    id: string,
    code: string,
    string: string,
    sequence: number | null,
    truth: Vec2,
    sigma: number,
    remark: string,
  ): string => book.measure({ id, code, string, sequence, truth, height: null, sigma, remark });
  for (const [id, at] of Object.entries(DATUMS))
    add(id, 'DAT', '', null, at, PRESS_SIGMA.datum, 'reamed hole in frame');
  add('O', 'CEN', '', null, PRESS.shaft, PRESS_SIGMA.edge, 'crank shaft, scored centre');
  const lines = [
    { string: 'GL', title: 'Left guide face', x: -0.17, letter: 'a' },
    { string: 'GR', title: 'Right guide face', x: 0.17, letter: 'b' },
  ].map(({ string, title, x, letter }) => ({
    string,
    title,
    points: [-0.2, -0.3, -0.4, -0.5, -0.6].map((y, i) =>
      add(`G${letter}${i + 1}`, 'GIB', string, i + 1, [x, y], PRESS_SIGMA.edge, ''),
    ),
  }));
  const contact = atContact();
  for (const witness of WITNESSES) {
    add(
      witness.id,
      'WIT',
      '',
      null,
      place(contact[witness.body].pose, partPoint(witness)),
      PRESS_SIGMA.witness,
      witness.what,
    );
  }
  const found = asFound();
  for (const part of FOUND_POINTS) {
    add(
      part.id,
      'LOC',
      '',
      null,
      place(found[part.body].pose, partPoint(part)),
      PRESS_SIGMA.edge,
      part.what,
    );
  }
  return { book, lines };
}

export const PRESS_COLUMNS = [
  'Point',
  'Code',
  'Line',
  'Seq',
  'X [mm]',
  'Y [mm]',
  'u X [mm]',
  'u Y [mm]',
  'Note',
] as const;

export function pressSurveyCsv(rows: readonly SurveyRow[]): string {
  return csv(
    PRESS_COLUMNS,
    rows.map((row) => [
      row.id,
      row.code,
      row.string,
      row.sequence ?? '',
      fixed(row.at[0] * 1000, 2),
      fixed(row.at[1] * 1000, 2),
      fixed(row.sigma * 1000, 2),
      fixed(row.sigma * 1000, 2),
      row.remark,
    ]),
  );
}
