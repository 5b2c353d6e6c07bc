import Papa from 'papaparse';
import type { Vec2 } from './plane-motion';
import type { Random } from './random';

/** One measured point, in the units of its file. */
export interface SurveyRow {
  id: string;
  code: string;
  string: string;
  sequence: number | null;
  /** Metres. */
  at: Vec2;
  height: number | null;
  /** Standard deviation of each coordinate, m. */
  sigma: number;
  remark: string;
}

export interface FieldBook {
  rows: SurveyRow[];
  /** Adds a point with noise and answers its number. */
  measure(row: Omit<SurveyRow, 'at'> & { truth: Vec2 }): string;
}

export function fieldBook(random: Random): FieldBook {
  const rows: SurveyRow[] = [];
  return {
    rows,
    measure: ({ truth, ...row }) => {
      const at: Vec2 = [truth[0] + random.normal(row.sigma), truth[1] + random.normal(row.sigma)];
      rows.push({ ...row, at });
      return row.id;
    },
  };
}

/**
 * Times at which a moving point has come another `spacing` metres along its path, with a staff-man's
 * unevenness; the first and the last time are always among them.
 */
export function timesAlong(
  path: (time: number) => Vec2,
  from: number,
  to: number,
  spacing: number,
  random: Random,
): number[] {
  const step = 0.001;
  const times = [from];
  let way = 0;
  let next = spacing * (0.85 + 0.3 * random.uniform());
  let before = path(from);
  for (let time = from + step; time < to; time += step) {
    const here = path(time);
    way += Math.hypot(here[0] - before[0], here[1] - before[1]);
    before = here;
    if (way >= next) {
      times.push(time);
      next = way + spacing * (0.85 + 0.3 * random.uniform());
    }
  }
  return [...times, to];
}

/**
 * Direction of travel of a measured line at a place on it: a straight line or parabola fitted by least
 * squares to the points nearest to the place, in axes along the local chord. The standard uncertainty
 * comes from the points' own sigma.
 */
export function tangentAt(
  points: readonly Vec2[],
  sigma: number,
  place: Vec2,
  count = 7,
): { direction: number; sigma: number } {
  const distance = (p: Vec2): number => Math.hypot(p[0] - place[0], p[1] - place[1]);
  const nearest = points.reduce(
    (best, p, i) => (distance(p) < distance(points[best]) ? i : best),
    0,
  );
  const first = Math.max(0, Math.min(nearest - (count - 1) / 2, points.length - count));
  const used = points.slice(first, first + count);
  const [a, b] = [used[0], used[used.length - 1]];
  const chord = Math.atan2(b[1] - a[1], b[0] - a[0]);
  const cos = Math.cos(chord);
  const sin = Math.sin(chord);
  const local = used.map(([x, y]) => [
    cos * (x - place[0]) + sin * (y - place[1]),
    cos * (y - place[1]) - sin * (x - place[0]),
  ]);
  const moment = (power: number): number => local.reduce((sum, [s]) => sum + s ** power, 0);
  const [n, s1, s2, s3, s4] = [0, 1, 2, 3, 4].map(moment);
  const [t0, t1, t2] = [0, 1, 2].map((k) => local.reduce((sum, [s, h]) => sum + h * s ** k, 0));
  const det = n * (s2 * s4 - s3 * s3) - s1 * (s1 * s4 - s2 * s3) + s2 * (s1 * s3 - s2 * s2);
  const slope =
    (-(s1 * s4 - s2 * s3) * t0 + (n * s4 - s2 * s2) * t1 - (n * s3 - s1 * s2) * t2) / det;
  const variance = ((n * s4 - s2 * s2) / det) * sigma * sigma;
  return {
    direction: chord + Math.atan(slope),
    sigma: Math.sqrt(variance) / (1 + slope * slope),
  };
}

/** Spreadsheet text with CRLF line ends, as measuring instruments write it. */
export function csv(
  header: readonly string[],
  rows: readonly (readonly (string | number)[])[],
): string {
  return `${Papa.unparse([[...header], ...rows.map((row) => [...row])], { newline: '\r\n' })}\r\n`;
}

export function fixed(value: number | null, digits: number): string {
  return value === null ? '' : value.toFixed(digits);
}
