import { type Vec2, place } from './plane-motion';
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
import { type SpinMotion, type Wheel, WHEELS, wheelPlace } from './spin-motion';

/** The bend: centre line radius and centre of curvature, half the width of the road. */
export const BEND = { centre: [0, 114.7], radius: 120, halfWidth: 3.6 } as const;

/** Times of the stations that marks fix, s after the first mark. */
export const STATION_TIMES = { S1: 0, S2: 0.45, S3: 0.9, S4: 1.35, S5: 1.8, S6: 2.3 } as const;
export type StationId = keyof typeof STATION_TIMES;
export const STATION_IDS = Object.keys(STATION_TIMES) as StationId[];

/** Trace numbers as the surveyor gave them, before anyone knew which wheel made which. */
export const TRACE_OF: Record<Wheel, string> = { LF: 'T1', LR: 'T2', RF: 'T3', RR: 'T4' };

export const MARK_SIGMA = 0.02;
const CONTROL_SIGMA = 0.003;

export const CONTROL: Record<string, Vec2> = {
  '9001': [-8.2, -10.4],
  '9002': [9.5, 2.9],
  '9003': [16.8, -9.3],
  '9004': [27.4, 4.6],
  '9005': [36.9, -6.2],
  '9006': [44.1, 5.7],
};

export interface SpinSurvey {
  book: FieldBook;
  traces: Record<Wheel, string[]>;
  stationMarks: Record<StationId | 'S7', Record<Wheel, string>>;
  lines: { string: string; title: string; points: string[] }[];
  /** Measured direction of travel of each wheel's mark at each station but the last. */
  tangents: Record<StationId, Record<Wheel, { direction: number; sigma: number }>>;
}

const height = ([x, y]: Vec2): number => 31.42 + 0.0021 * x - 0.0034 * y;

function onBend(along: number, offset: number): Vec2 {
  const angle = along / BEND.radius;
  const radius = BEND.radius - offset;
  return [BEND.centre[0] + radius * Math.sin(angle), BEND.centre[1] - radius * Math.cos(angle)];
}

export function spinSurvey(motion: SpinMotion): SpinSurvey {
  const random = seededRandom(20260014);
  const book = fieldBook(random);
  const add = (
    id: number,
    code: string,
    string: string,
    sequence: number | null,
    truth: Vec2,
    sigma: number,
    remark: string,
    withHeight: boolean,
  ): string =>
    book.measure({
      id: String(id),
      code,
      string,
      sequence,
      truth,
      sigma,
      remark,
      height: withHeight ? height(truth) + random.normal(0.01) : null,
    });

  for (const [id, at] of Object.entries(CONTROL)) {
    add(Number(id), 'CP', '', null, at, CONTROL_SIGMA, 'nail with target', true);
  }
  const lines = [
    {
      string: 'EL',
      title: 'Left edge of the road',
      code: 'RE',
      offset: BEND.halfWidth,
      first: 1101,
    },
    {
      string: 'ER',
      title: 'Right edge of the road',
      code: 'RE',
      offset: -BEND.halfWidth,
      first: 1201,
    },
    { string: 'CL', title: 'Centre line', code: 'LM', offset: 0, first: 1301 },
  ].map(({ string, title, code, offset, first }) => ({
    string,
    title,
    points: Array.from({ length: 14 }, (_unused, i) =>
      add(first + i, code, string, i + 1, onBend(-12 + 5 * i, offset), 0.02, '', true),
    ),
  }));

  const traces = {} as Record<Wheel, string[]>;
  WHEELS.forEach((wheel) => {
    const path = (time: number): Vec2 => wheelPlace(motion.at(time), wheel);
    const number = Number(TRACE_OF[wheel].slice(1));
    traces[wheel] = timesAlong(path, 0, motion.restTime, 0.5, random).map((time, i) =>
      add(
        100 * number + 1 + i,
        'YM',
        TRACE_OF[wheel],
        i + 1,
        path(time),
        MARK_SIGMA,
        i === 0 ? 'start' : '',
        i % 4 === 0,
      ),
    );
  });

  const stationMarks = {} as SpinSurvey['stationMarks'];
  const tangents = {} as SpinSurvey['tangents'];
  const measured = (id: string): Vec2 => (book.rows.find((row) => row.id === id) as SurveyRow).at;
  STATION_IDS.forEach((station, s) => {
    const body = motion.at(STATION_TIMES[station]);
    const marks = {} as Record<Wheel, string>;
    const directions = {} as Record<Wheel, { direction: number; sigma: number }>;
    WHEELS.forEach((wheel) => {
      const trace = TRACE_OF[wheel];
      const id = 500 + 10 * s + Number(trace.slice(1));
      const remark = s === 0 ? `begin of ${trace}` : `gap ${s} in ${trace}`;
      marks[wheel] = add(id, 'YG', trace, null, wheelPlace(body, wheel), MARK_SIGMA, remark, false);
      const line = traces[wheel].map(measured);
      directions[wheel] = tangentAt(line, MARK_SIGMA, measured(marks[wheel]));
    });
    stationMarks[station] = marks;
    tangents[station] = directions;
  });
  const atRest = motion.at(motion.restTime);
  stationMarks.S7 = {} as Record<Wheel, string>;
  WHEELS.forEach((wheel, i) => {
    const truth = wheelPlace(atRest, wheel);
    stationMarks.S7[wheel] = add(
      701 + i,
      'POR',
      '',
      null,
      truth,
      0.01,
      `point of rest, wheel ${wheel}`,
      true,
    );
  });
  const nose = place(atRest.pose, [2.02, 0.1]);
  add(801, 'DB', '', null, [nose[0] - 0.6, nose[1] - 1.4], 0.03, 'lamp glass', false);
  add(802, 'DB', '', null, onBend(19.5, -4.1), 0.03, 'wheel trim', true);
  add(
    803,
    'FL',
    '',
    null,
    [atRest.pose.x - 0.9, atRest.pose.y - 0.7],
    0.05,
    'coolant, centre of stain',
    false,
  );
  return { book, traces, stationMarks, lines, tangents };
}

export const SPIN_COLUMNS = [
  'Pt No',
  'Code',
  'String',
  'Seq',
  'X loc [m]',
  'Y loc [m]',
  'H [m]',
  's(X) [mm]',
  's(Y) [mm]',
  's(H) [mm]',
  'Remark',
] as const;

/** The field book as a total station exports it. */
export function totalStationCsv(rows: readonly SurveyRow[]): string {
  return csv(
    SPIN_COLUMNS,
    rows.map((row) => [
      row.id,
      row.code,
      row.string,
      row.sequence ?? '',
      fixed(row.at[0], 3),
      fixed(row.at[1], 3),
      fixed(row.height, 3),
      fixed(row.sigma * 1000, 0),
      fixed(row.sigma * 1000, 0),
      row.height === null ? '' : '10',
      row.remark,
    ]),
  );
}

/** The recorder's clock shows this when the first mark begins, s. */
export const RECORDER_START = 1.5;
export const RECORDER_NOISE = { speed: 0.3, yawRate: 0.009 } as const;
const SAMPLE = 0.05;

export interface RecorderSample {
  time: number;
  /** m/s */
  speed: number;
  /** rad/s */
  yawRate: number;
  pressure: number;
}

/**
 * Twenty samples a second. Before the first mark the values follow an assumed run-in, not the
 * integration; nothing is computed from that part.
 */
export function recorder(motion: SpinMotion): RecorderSample[] {
  const random = seededRandom(20260114);
  const start = motion.at(0);
  const startSpeed = Math.hypot(...start.velocity);
  const pulses = STATION_IDS.slice(1).map((id) => STATION_TIMES[id]);
  return Array.from({ length: 101 }, (_unused, i) => {
    const clock = i * SAMPLE;
    const time = clock - RECORDER_START;
    let speed = startSpeed - 1.1 * time;
    const turned = Math.min(1, Math.max(0, (time + 1.1) / 1.1));
    let yawRate = 0.17 + (start.omega - 0.17) * turned * turned * (3 - 2 * turned);
    if (time >= 0) {
      const body = motion.at(Math.min(time, motion.restTime));
      speed = time < motion.restTime ? Math.hypot(...body.velocity) : 0;
      yawRate = time < motion.restTime ? body.omega : 0;
    }
    const pulsed = pulses.some((pulse) => Math.abs(pulse - time) < SAMPLE / 4);
    const level = time < -SAMPLE / 2 ? 0 : 112;
    const pressure = pulsed ? 24 : level;
    return {
      time: clock,
      speed: Math.max(0, speed + random.normal(RECORDER_NOISE.speed)),
      yawRate: yawRate + random.normal(RECORDER_NOISE.yawRate),
      pressure: Math.max(0, Math.round(pressure + random.normal(1.2))),
    };
  });
}

export const RECORDER_COLUMNS = [
  'T_rec [s]',
  'V_CG [km/h]',
  'YawRate [deg/s]',
  'BrkPress [bar]',
] as const;

export function recorderCsv(samples: readonly RecorderSample[]): string {
  return csv(
    RECORDER_COLUMNS,
    samples.map(({ time, speed, yawRate, pressure }) => [
      fixed(time, 2),
      fixed(speed * 3.6, 2),
      fixed((yawRate * 180) / Math.PI, 2),
      pressure,
    ]),
  );
}

/**
 * Mean of the three samples about a station: value and standard uncertainty. At the first mark the
 * retardation sets in, so there one sample stands alone.
 */
export function recordedAt(
  samples: readonly RecorderSample[],
  time: number,
  quantity: 'speed' | 'yawRate',
): { value: number; sigma: number } {
  const centre = Math.round((time + RECORDER_START) / SAMPLE);
  const steps = time === 0 ? [0] : [-1, 0, 1];
  const used = steps.map((step) => samples[centre + step][quantity]);
  const value = used.reduce((sum, sample) => sum + sample, 0) / used.length;
  return { value, sigma: RECORDER_NOISE[quantity] / Math.sqrt(used.length) };
}
