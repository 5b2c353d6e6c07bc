import { type JackKnifeMotion, TRAILER_LOCKS, UNIT, type UnitMotion } from './jack-knife-motion';
import { type Vec2, place, turn, velocityAt } from './plane-motion';
import { seededRandom } from './random';
import {
  type FieldBook,
  type SurveyRow,
  csv,
  fieldBook,
  fixed,
  tangentAt,
  timesAlong,
} from './survey';

/** The cutting: a straight road, its centre line and half-width. */
export const CUTTING = { centre: -1.75, heading: 0, halfWidth: 3.9 } as const;

export const UNIT_STATION_TIMES = { S1: 0, S2: 0.5, S3: 1.0, S4: 1.5, S5: 2.0, S6: 2.5 } as const;
export type UnitStationId = keyof typeof UNIT_STATION_TIMES;
export const UNIT_STATION_IDS = Object.keys(UNIT_STATION_TIMES) as UnitStationId[];

/** Stations at which the trailer axle still rolls. */
export const rollsAt = (id: UnitStationId): boolean => UNIT_STATION_TIMES[id] < TRAILER_LOCKS;

export const UNIT_MARK_SIGMA = 0.025;

export interface UnitTrace {
  id: string;
  body: 'tractor' | 'trailer';
  point: 'SL' | 'DL' | 'DR' | 'AL' | 'AR';
  kind: 'skid mark' | 'rolling print' | 'scrub';
  title: string;
}

export const UNIT_TRACES: readonly UnitTrace[] = [
  { id: 'U1', body: 'tractor', point: 'DL', kind: 'skid mark', title: 'Double-tyre skid, left' },
  { id: 'U2', body: 'tractor', point: 'DR', kind: 'skid mark', title: 'Double-tyre skid, right' },
  { id: 'U3', body: 'tractor', point: 'SL', kind: 'scrub', title: 'Single-tyre print and scrub' },
  {
    id: 'U4',
    body: 'trailer',
    point: 'AL',
    kind: 'rolling print',
    title: 'Axle-group print, left',
  },
  {
    id: 'U5',
    body: 'trailer',
    point: 'AR',
    kind: 'rolling print',
    title: 'Axle-group print, right',
  },
];

const CODES = { 'skid mark': 'SK', 'rolling print': 'TM', scrub: 'SCR' } as const;

/** Distance between the points of a trace, m: closer on the scrub, which bends tightly. */
const SPACING = { 'skid mark': 0.5, 'rolling print': 0.5, scrub: 0.25 } as const;

export const UNIT_CONTROL: Record<string, Vec2> = {
  K1: [-9.4, 4.1],
  K2: [4.8, -8.3],
  K3: [15.2, 5.6],
  K4: [24.9, -9.4],
  K5: [36.2, 4.7],
  K6: [41.7, -7.8],
};

export function pointPlace(unit: UnitMotion, trace: Pick<UnitTrace, 'body' | 'point'>): Vec2 {
  return place(unit[trace.body].pose, pointOf(trace));
}

export function pointOf({ body, point }: Pick<UnitTrace, 'body' | 'point'>): Vec2 {
  const points: Record<string, Vec2> = UNIT.points[body];
  return points[point];
}

export interface UnitSurvey {
  book: FieldBook;
  /** Survey points of each trace, by trace id. */
  traces: Record<string, string[]>;
  stationMarks: Record<UnitStationId | 'S7', Record<string, string>>;
  tangents: Record<UnitStationId, Record<string, { direction: number; sigma: number }>>;
  lines: { string: string; title: string; points: string[] }[];
}

export function jackKnifeSurvey(motion: JackKnifeMotion): UnitSurvey {
  const random = seededRandom(20260013);
  const book = fieldBook(random);
  const add = (
    id: string,
    code: string,
    string: string,
    sequence: number | null,
    truth: Vec2,
    sigma: number,
    remark: string,
    withHeight: boolean,
  ): string =>
    book.measure({
      id,
      code,
      string,
      sequence,
      truth,
      sigma,
      remark,
      height: withHeight ? 112.08 - 0.0052 * truth[0] + random.normal(0.012) : null,
    });

  for (const [id, at] of Object.entries(UNIT_CONTROL)) {
    add(id, 'CP', '', null, at, 0.004, 'pin in concrete, target', true);
  }
  const lines = (
    [
      ['KL', 'Left edge of the carriageway', 'RE', CUTTING.centre + CUTTING.halfWidth, 'a'],
      ['KR', 'Right edge of the carriageway', 'RE', CUTTING.centre - CUTTING.halfWidth, 'b'],
      ['KM', 'Centre line', 'LM', CUTTING.centre, 'c'],
    ] as const
  ).map(([string, title, code, offset, letter]) => ({
    string,
    title,
    points: Array.from({ length: 9 }, (_unused, i) =>
      add(`E${letter}${i + 1}`, code, string, i + 1, [-12 + 7.5 * i, offset], 0.02, '', true),
    ),
  }));

  const traces: UnitSurvey['traces'] = {};
  UNIT_TRACES.forEach((trace) => {
    const path = (time: number): Vec2 => pointPlace(motion.at(time), trace);
    traces[trace.id] = timesAlong(path, 0, motion.restTime, SPACING[trace.kind], random).map(
      (time, i) =>
        add(
          `${trace.id}-${i + 1}`,
          CODES[trace.kind],
          trace.id,
          i + 1,
          path(time),
          UNIT_MARK_SIGMA,
          '',
          i % 5 === 0,
        ),
    );
  });

  const measured = (id: string): Vec2 => (book.rows.find((row) => row.id === id) as SurveyRow).at;
  const stationMarks = {} as UnitSurvey['stationMarks'];
  const tangents = {} as UnitSurvey['tangents'];
  UNIT_STATION_IDS.forEach((station, s) => {
    const time = UNIT_STATION_TIMES[station];
    const unit = motion.at(time);
    stationMarks[station] = {};
    tangents[station] = {};
    for (const trace of UNIT_TRACES) {
      const id = `P${s + 1}-${trace.id}`;
      const remark = s === 0 ? 'begin' : `release ${s}`;
      add(id, 'RLS', trace.id, null, pointPlace(unit, trace), UNIT_MARK_SIGMA, remark, false);
      stationMarks[station][trace.id] = id;
      const line = traces[trace.id].map(measured);
      tangents[station][trace.id] = tangentAt(line, UNIT_MARK_SIGMA, measured(id));
    }
  });
  const rest = motion.at(motion.restTime);
  stationMarks.S7 = {};
  for (const trace of UNIT_TRACES) {
    const id = `R-${trace.point}`;
    stationMarks.S7[trace.id] = add(
      id,
      'POR',
      '',
      null,
      pointPlace(rest, trace),
      0.015,
      'wheel at rest',
      true,
    );
  }
  add(
    'G1',
    'GO',
    '',
    null,
    place(rest.tractor.pose, [2.5, -0.9]),
    0.02,
    'gouge, step bracket',
    false,
  );
  add('D1', 'DB', '', null, [27.8, 1.4], 0.03, 'mirror housing', true);
  return { book, traces, stationMarks, tangents, lines };
}

export const UNIT_COLUMNS = [
  'POINT',
  'CODE',
  'LINE',
  'SEQ IN LINE',
  'E_loc (m)',
  'N_loc (m)',
  'Z (m)',
  'sdE (mm)',
  'sdN (mm)',
  'NOTE',
] as const;

export function unitSurveyCsv(rows: readonly SurveyRow[]): string {
  return csv(
    UNIT_COLUMNS,
    rows.map((row) => [
      row.id,
      row.code,
      row.string,
      row.sequence ?? '',
      fixed(row.at[0], 3),
      fixed(row.at[1], 3),
      fixed(row.height, 2),
      fixed(row.sigma * 1000, 0),
      fixed(row.sigma * 1000, 0),
      row.remark,
    ]),
  );
}

export const TACHOGRAPH_START = 2.0;
export const TACHOGRAPH_NOISE = { trailerWheel: 0.18, shaft: 0.28 } as const;
const SAMPLE = 0.05;

export interface TachographSample {
  time: number;
  /** Speed from the tractor's output shaft, m/s: nought while the drive wheels are locked. */
  shaft: number;
  /** Speed from the trailer's wheel sensor, m/s: nought once its wheels are locked. */
  trailerWheel: number;
  pressure: number;
}

/** Forward speed of the trailer axle, m/s. */
export function axleSpeed(unit: UnitMotion): number {
  const velocity = velocityAt(unit.trailer, UNIT.points.trailer.axle);
  return turn(velocity, -unit.trailer.pose.heading)[0];
}

export function tachograph(motion: JackKnifeMotion): TachographSample[] {
  const random = seededRandom(20260113);
  const pulses = UNIT_STATION_IDS.slice(1).map((id) => UNIT_STATION_TIMES[id]);
  const first = axleSpeed(motion.at(0));
  return Array.from({ length: 121 }, (_unused, i) => {
    const clock = i * SAMPLE;
    const time = clock - TACHOGRAPH_START;
    const before = first - 1.4 * time;
    const drives = time < -SAMPLE / 2;
    const rolls = time < TRAILER_LOCKS - SAMPLE / 2;
    const trailer = drives
      ? before
      : axleSpeed(motion.at(Math.max(0, Math.min(time, motion.restTime))));
    const pulsed = pulses.some((pulse) => Math.abs(pulse - time) < SAMPLE / 4);
    const held = time < -0.6 ? 0 : 6.4 * Math.min(1, (time + 0.6) / 0.6);
    return {
      time: clock,
      shaft: drives ? before + random.normal(TACHOGRAPH_NOISE.shaft) : 0,
      trailerWheel: rolls ? trailer + random.normal(TACHOGRAPH_NOISE.trailerWheel) : 0,
      pressure: Math.max(0, (pulsed ? 2.1 : held) + random.normal(0.05)),
    };
  });
}

export const TACHOGRAPH_COLUMNS = [
  't [s]',
  'v shaft [km/h]',
  'v trailer wheel [km/h]',
  'p brake [bar]',
] as const;

export function tachographCsv(samples: readonly TachographSample[]): string {
  return csv(
    TACHOGRAPH_COLUMNS,
    samples.map(({ time, shaft, trailerWheel, pressure }) => [
      fixed(time, 2),
      fixed(shaft * 3.6, 1),
      fixed(trailerWheel * 3.6, 1),
      fixed(pressure, 2),
    ]),
  );
}

/** Trailer-wheel speed about a station: value and standard uncertainty. */
export function trailerWheelAt(
  samples: readonly TachographSample[],
  time: number,
): { value: number; sigma: number } {
  const centre = Math.round((time + TACHOGRAPH_START) / SAMPLE);
  const steps = time === 0 ? [0] : [-1, 0, 1];
  const used = steps.map((step) => samples[centre + step].trailerWheel);
  return {
    value: used.reduce((sum, speed) => sum + speed, 0) / used.length,
    sigma: TACHOGRAPH_NOISE.trailerWheel / Math.sqrt(used.length),
  };
}
