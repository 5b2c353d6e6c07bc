import { existsSync, readFileSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from '@jest/globals';
import { Matrix, inverse } from 'ml-matrix';
import { reconstructionOf } from '#server/database/seeders/scene-motion';
import { mappingOf } from '#server/database/seeders/scene-survey';
import { scene, type Scene } from '#server/database/seeders/scene';
import type { Mark } from '#shared/contracts/survey';
import { answerStation } from '#shared/engine/reconstruction/index';
import { readSurveyCsv } from '#shared/survey/read-survey-csv';

/**
 * The sample scenes from survey file to velocities, against the motion that the scenes were made
 * from (truth.json, written by the demo generator's integration and never by the engine).
 */
const samples = join(import.meta.dirname, '../../evidence-samples');
const folders = readdirSync(samples).filter((name) =>
  existsSync(join(samples, name, 'truth.json')),
);

interface Truth {
  pose: { x: number; y: number; heading: number };
  velocity: [number, number];
  omega: number;
}

function read(folder: string) {
  const file = (name: string): string => readFileSync(join(samples, folder, name), 'utf8');
  const sample = scene.parse(JSON.parse(file('scene.json')));
  const { rows, rejected } = readSurveyCsv(file(sample.survey.file), mappingOf(sample));
  const marks: Mark[] = rows.map(({ entry, row, raw }, index) => ({
    id: `00000000-0000-7000-8000-${String(index).padStart(12, '0')}`,
    label: entry.label,
    kind: entry.kind,
    at: entry.at,
    covariance: [
      [entry.sigma[0] ** 2, entry.correlation * entry.sigma[0] * entry.sigma[1]],
      [entry.correlation * entry.sigma[0] * entry.sigma[1], entry.sigma[1] ** 2],
    ],
    height: entry.height,
    trace: entry.trace,
    order: entry.order,
    note: entry.note,
    source: { kind: 'import', importId: '', exhibitNumber: '', fileName: '', row, raw },
    version: 1,
  }));
  const truth = JSON.parse(file('truth.json')) as { stations: Record<string, unknown>[] };
  return { sample, rejected, document: reconstructionOf(sample, marks), marks, truth };
}

/** A body's truth at a station: under its name, or the station's own when there is one body. */
function truthOf(station: Record<string, unknown>, body: string): Truth {
  return (station[body] ??
    (station['bodies'] as Record<string, unknown>)?.[body] ??
    station) as Truth;
}

interface Sample {
  readonly sample: Scene;
  readonly station: Scene['reconstruction']['stations'][number];
  readonly truth: Record<string, unknown>;
  readonly marks: readonly Mark[];
}

/** Velocity of a body point, from the truth or from a trial motion of each body (vx, vy, ω of its origin). */
function velocityOf(
  { sample, truth }: Sample,
  motion: ReadonlyMap<string, readonly [number, number, number]>,
  at: { body: string; point: string },
): [number, number] {
  const { heading } = truthOf(truth, at.body).pose;
  const points = sample.reconstruction.bodies.find((body) => body.id === at.body)?.points;
  const [bx, by] = points?.[at.point].at ?? [NaN, NaN];
  const [c, s] = [Math.cos(heading), Math.sin(heading)];
  const [rx, ry] = [c * bx - s * by, s * bx + c * by];
  const [vx, vy, omega] = motion.get(at.body) ?? [NaN, NaN, NaN];
  return [vx - omega * ry, vy + omega * rx];
}

/**
 * The least standard uncertainty of a trace's direction at a mark: a parabola through the nine points of
 * the trace nearest to it, in axes along the true direction, by the normal equations.
 */
function leastOfDirection({ marks }: Sample, mark: Mark, direction: number): number {
  const [c, s] = [Math.cos(direction), Math.sin(direction)];
  const along = marks
    .filter((one) => one.trace === mark.trace)
    .map((one) => c * (one.at[0] - mark.at[0]) + s * (one.at[1] - mark.at[1]))
    .sort((p, q) => Math.abs(p) - Math.abs(q))
    .slice(0, 9);
  const design = new Matrix(along.map((x) => [1, x, x * x]));
  const variance = inverse(design.transpose().mmul(design)).get(1, 1);
  return Math.sqrt(variance * mark.covariance[0][0]);
}

/**
 * The least standard uncertainty that the station's readings allow (Cramér–Rao bound): the inverse of
 * the Fisher information at the true motion, with the stated noise of marks, speeds and rates. Poses are
 * taken as known, so that the bound is a floor. Joints are readings without noise. Written apart from
 * the engine on purpose.
 */
function leastUncertainty(given: Sample): Map<string, { omega: number; speed: number }> {
  const { sample, station, truth, marks } = given;
  const bodies = sample.reconstruction.bodies.map((body) => body.id);
  const centre = bodies.flatMap((body) => {
    const { velocity, omega } = truthOf(truth, body);
    return [...velocity, omega];
  });
  type Motion = readonly number[];
  const motionAt = (x: Motion) =>
    new Map(bodies.map((id, i) => [id, [x[3 * i], x[3 * i + 1], x[3 * i + 2]] as const]));
  const velocity = (at: { body: string; point: string }) => (x: Motion) =>
    velocityOf(given, motionAt(x), at);
  const readings: { of: (x: Motion) => number; sigma: number }[] = [];
  const exact = 1e-6;
  for (const { survey, body, point } of station.marks) {
    const mark = marks.find((one) => one.label === survey);
    if (!mark || mark.trace === null) continue;
    const v = velocity({ body, point });
    const [ux, uy] = v(centre);
    const towards = (x: Motion) => {
      const [vx, vy] = v(x);
      return Math.atan2(ux * vy - uy * vx, ux * vx + uy * vy);
    };
    readings.push({ of: towards, sigma: leastOfDirection(given, mark, Math.atan2(uy, ux)) });
  }
  for (const { quantity, at, body, sigma } of station.knowns) {
    if (quantity === 'velocity' && at && typeof sigma === 'object') {
      const v = velocity(at);
      readings.push({ of: (x) => Math.hypot(...v(x)), sigma: sigma.magnitude ?? Infinity });
    } else if (quantity === 'angular-velocity' && typeof sigma === 'number') {
      const i = bodies.indexOf(body ?? '');
      readings.push({ of: (x) => x[3 * i + 2], sigma });
    }
  }
  for (const joint of sample.reconstruction.joints) {
    if (joint.stations && !joint.stations.includes(station.id)) continue;
    const v = velocity(joint.a);
    if (joint.kind === 'pin') {
      const other = joint.b ? velocity(joint.b) : () => [0, 0];
      for (const i of [0, 1]) readings.push({ of: (x) => v(x)[i] - other(x)[i], sigma: exact });
    } else {
      const direction =
        joint.kind === 'guide'
          ? (joint.direction ?? 0)
          : truthOf(truth, joint.a.body).pose.heading + (joint.steer ?? 0);
      const across = (x: Motion) => -Math.sin(direction) * v(x)[0] + Math.cos(direction) * v(x)[1];
      readings.push({ of: across, sigma: exact });
    }
  }
  const step = 1e-4;
  const jacobian = new Matrix(
    readings.map(({ of, sigma }) =>
      centre.map((_, j) => {
        const moved = (d: number) => of(centre.map((value, k) => (k === j ? value + d : value)));
        return (moved(step) - moved(-step)) / (2 * step * sigma);
      }),
    ),
  );
  const bound = inverse(jacobian.transpose().mmul(jacobian));
  return new Map(
    bodies.map((id, i) => {
      const [vx, vy] = centre.slice(3 * i, 3 * i + 2);
      const speed = Math.hypot(vx, vy);
      const part = bound.subMatrix(3 * i, 3 * i + 1, 3 * i, 3 * i + 1);
      const u = Matrix.columnVector([vx / speed, vy / speed]);
      return [
        id,
        {
          omega: Math.sqrt(bound.get(3 * i + 2, 3 * i + 2)),
          speed: speed > 0 ? Math.sqrt(u.transpose().mmul(part).mmul(u).get(0, 0)) : Infinity,
        },
      ] as const;
    }),
  );
}

/** Inside the 95 % interval (normal quantile), which is no wider than thrice the least possible. */
function agrees(value: number | null, sigma: number | null, actual: number, least: number): void {
  if (value === null) throw new Error('not fixed');
  // What the joints hold still is still to rounding: there is no interval to speak of.
  const rounding = 1e-9;
  if (Math.abs(actual) < rounding) {
    expect(Math.abs(value)).toBeLessThan(rounding);
    return;
  }
  if (sigma === null) throw new Error('no uncertainty');
  expect(Math.abs(value - actual)).toBeLessThan(1.959964 * sigma);
  expect(sigma).toBeLessThan(3 * least);
}

describe.each(folders)('%s', (folder) => {
  const { sample, rejected, document, marks, truth } = read(folder);
  const fixed = sample.reconstruction.stations.filter((station) => station.knowns.length > 0);

  it('loses no row of its survey', () => {
    expect(rejected).toEqual([]);
    expect(fixed.length).toBeGreaterThan(0);
  });

  it.each(fixed.map((station) => [station.id, station] as const))(
    'station %s: the truth lies in the 95 %% intervals, which are no wider than thrice the least possible',
    (id, station) => {
      const answer = answerStation(document, id, marks);
      expect(answer.failure).toBeNull();
      expect(answer.solution?.branches).toHaveLength(1);
      const actual = truth.stations.find((one) => one['id'] === id) ?? {};
      const least = leastUncertainty({ sample, station, truth: actual, marks });
      for (const body of document.bodies) {
        const solved = answer.solution?.branches[0].bodies[body.id];
        const known = truthOf(actual, body.id);
        const possible = least.get(body.id);
        const origin = body.points.find(({ at }) => at[0] === 0 && at[1] === 0)?.id;
        const row = answer.speeds.find((one) => one.body === body.id && one.point === origin);
        if (!solved || !possible || !row) throw new Error(`no answer for ${body.id}`);
        agrees(solved.omega, solved.sigma.omega, known.omega, possible.omega);
        agrees(row.speed, row.sigma, Math.hypot(...known.velocity), possible.speed);
      }
    },
  );

  it('says of a station without any speed that directions alone do not give one', () => {
    const open = sample.reconstruction.stations.filter((station) => !fixed.includes(station));
    for (const { id } of open) {
      const answer = answerStation(document, id, marks);
      expect(answer.solution?.status).toBe('under-determined');
      expect(answer.speeds.every((row) => row.speed === null || row.speed === 0)).toBe(true);
    }
  });
});
