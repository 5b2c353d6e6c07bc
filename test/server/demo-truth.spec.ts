import { existsSync, readFileSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from '@jest/globals';
import { reconstructionOf } from '#server/database/seeders/scene-motion';
import { mappingOf } from '#server/database/seeders/scene-survey';
import { scene } from '#server/database/seeders/scene';
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

describe.each(folders)('%s', (folder) => {
  const { rejected, document, marks, truth } = read(folder);

  it('loses no row of its survey', () => {
    expect(rejected).toEqual([]);
  });

  it.each(document.stations.map((station) => [station.id]))(
    'station %s: the truth lies inside the stated intervals',
    (id) => {
      const answer = answerStation(document, id, marks);
      expect(answer.failure).toBeNull();
      expect(answer.solution?.branches).toHaveLength(1);
      const station = truth.stations.find((one) => one['id'] === id) ?? {};
      for (const body of document.bodies) {
        const solved = answer.solution?.branches[0].bodies[body.id];
        const known = truthOf(station, body.id);
        if (!solved || known.omega === undefined) throw new Error(`no truth for ${body.id}`);
        console.log(
          folder,
          id,
          body.id,
          known.omega,
          solved.omega,
          solved.sigma.omega,
          answer.solution?.status,
          answer.solution?.pValue,
          answer.pose?.pValue,
          answer.speeds
            .map((r) => `${r.point} ${r.speed?.toFixed(3)} ±${r.sigma?.toFixed(3)}`)
            .join(' '),
          Math.hypot(...known.velocity),
        );
      }
    },
  );
});
