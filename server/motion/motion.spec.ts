import { createHash } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from '@jest/globals';
import { QueryTypes } from 'sequelize';
import type { Reconstruction } from '#shared/contracts/motion';
import type { Mark } from '#shared/contracts/survey';
import type { ReconstructionDocument } from '#shared/engine/documents/reconstruction';
import { startTestApi, type TestApi, type TestPerson } from '../testing/api';
import { assignTo, openTestCase, type TestCase } from '../testing/factories';

let api: TestApi;
beforeAll(async () => {
  api = await startTestApi();
});
afterAll(() => api.stop());

/** Enters a mark with 1 cm of uncertainty in each direction. */
async function enterMark(person: TestPerson, caseId: string, label: string, x: number, y: number) {
  const answer = await person
    .post(`/api/cases/${caseId}/marks`, {
      label,
      kind: 'tyre mark',
      at: [x, y],
      sigma: [0.01, 0.01],
    })
    .expect(201);
  return answer.body as Mark;
}

/**
 * A bar 2 m long along x, whose ends made one mark each at (0, 0) and (2, 0). It turns at 3 rad/s
 * about its end A, which stands still: the end B moves at 2 m · 3 rad/s = 6 m/s along +y.
 */
function turningBar(a: string, b: string): ReconstructionDocument {
  const exact: [number, number] = [0, 0];
  return {
    format: 'centrode.reconstruction/1',
    bodies: [
      {
        id: 'bar',
        name: 'the bar',
        points: [
          { id: 'A', name: 'end A', at: [0, 0], sigma: exact },
          { id: 'B', name: 'end B', at: [2, 0], sigma: exact },
        ],
        outline: [],
      },
    ],
    joints: [],
    stations: [
      {
        id: 'S1',
        name: 'first mark',
        marks: [
          { markId: a, body: 'bar', point: 'A', position: true, direction: false },
          { markId: b, body: 'bar', point: 'B', position: true, direction: false },
        ],
        poses: [],
        joints: { off: [] },
        knowns: [
          {
            quantity: 'velocity-components',
            id: 'K1',
            at: { body: 'bar', point: 'A' },
            x: { value: 0, sigma: 0.1 },
            y: { value: 0, sigma: 0.1 },
            basis: 'It stands on the pivot.',
          },
          {
            quantity: 'angular-velocity',
            id: 'K2',
            body: 'bar',
            value: { value: 3, sigma: 0.1 },
            basis: 'Encoder.',
          },
        ],
      },
    ],
  };
}

interface Bench extends TestCase {
  readonly marks: readonly [Mark, Mark];
  readonly document: ReconstructionDocument;
  readonly made: Reconstruction;
  readonly base: string;
}

async function openBench(): Promise<Bench> {
  const opened = await openTestCase(api);
  const { investigator, id } = opened;
  const marks = [
    await enterMark(investigator, id, 'M1', 0, 0),
    await enterMark(investigator, id, 'M2', 2, 0),
  ] as const;
  const document = turningBar(marks[0].id, marks[1].id);
  const base = `/api/cases/${id}/reconstructions`;
  const answer = await investigator
    .post(base, { name: 'A', assumption: 'End A stands still.', document })
    .expect(201);
  return { ...opened, marks, document, base, made: answer.body as Reconstruction };
}

const record = (bench: Bench, over: object = {}) =>
  bench.investigator.post(`${bench.base}/${bench.made.id}/computations`, {
    stationId: 'S1',
    version: bench.made.version,
    ...over,
  });

const save = (bench: Bench, document: ReconstructionDocument, version = bench.made.version) =>
  bench.investigator.put(
    `${bench.base}/${bench.made.id}`,
    { name: 'A', assumption: 'End A stands still.', document },
    version,
  );

async function eventsOf(caseId: string): Promise<string[]> {
  const rows = await api.services.sequelize.query<{ action: string }>(
    'SELECT action FROM access_events WHERE case_id = ? ORDER BY sequence',
    { type: QueryTypes.SELECT, replacements: [caseId] },
  );
  return rows.map((row) => row.action);
}

describe('reconstructions', () => {
  it('when one is begun, then it is listed with its document, author and version 1', async () => {
    const bench = await openBench();
    const list = await bench.investigator.get(bench.base).expect(200);
    expect(list.body.items).toEqual([bench.made]);
    expect(bench.made).toMatchObject({ name: 'A', version: 1, document: bench.document });
    expect(bench.made.changedBy).toBe(bench.investigator.account?.name);
    expect(await eventsOf(bench.id)).toContain('began reconstruction');
  });

  it('when two people save over one version, then the later one is shown what stands', async () => {
    const bench = await openBench();
    const stations = [{ ...bench.document.stations[0], name: 'kerb strike' }];
    const saved = await save(bench, { ...bench.document, stations }).expect(200);
    expect(saved.body.version).toBe(2);
    expect(saved.headers['etag']).toBe('"2"');
    const late = await save(bench, bench.document).expect(412);
    expect(late.body.current.version).toBe(2);
    expect(late.body.current.document.stations[0].name).toBe('kerb strike');
    expect(await eventsOf(bench.id)).toContain('saved reconstruction');
  });

  it('when a mark is not one of the case, then the answer names the field', async () => {
    const bench = await openBench();
    const other = await openBench();
    const answer = await save(bench, other.document).expect(422);
    expect(answer.body.errors.map((error: { field: string }) => error.field)).toEqual([
      'document.stations.0.marks.0.markId',
      'document.stations.0.marks.1.markId',
    ]);
  });

  it('when the document does not follow its schema, then the answer names the field', async () => {
    const bench = await openBench();
    const bodies = [{ ...bench.document.bodies[0], id: '1bar' }];
    const answer = await save(bench, { ...bench.document, bodies }).expect(422);
    expect(answer.body.errors[0].field).toBe('document.bodies.0.id');
  });

  it('when somebody does not work the case, then they may read at most', async () => {
    const bench = await openBench();
    const reviewer = await api.as('investigator');
    await assignTo(bench.lead, bench.id, reviewer, 'technical-reviewer');
    await reviewer.get(bench.base).expect(200);
    await reviewer.post(bench.base, { name: 'B', document: bench.document }).expect(403);
    const stranger = await api.as('investigator');
    await stranger.get(bench.base).expect(404);
    await api.nobody().get(bench.base).expect(401);
  });

  it('when a reconstruction is of another case, then it does not exist', async () => {
    const bench = await openBench();
    const other = await openBench();
    await bench.investigator
      .put(`${bench.base}/${other.made.id}`, { name: 'A', document: bench.document }, 1)
      .expect(404);
    await bench.investigator
      .post(`${bench.base}/${other.made.id}/computations`, { stationId: 'S1', version: 1 })
      .expect(404);
  });
});

describe('computations', () => {
  it('when a station is recorded, then its bytes are kept under their SHA-256', async () => {
    const bench = await openBench();
    const made = await record(bench).expect(201);
    expect(made.body).toMatchObject({
      kind: 'station',
      stationId: 'S1',
      stationName: 'first mark',
      status: 'determined',
      reconstructionName: 'A',
    });
    const read = await bench.investigator
      .get(`/api/cases/${bench.id}/computations/${made.body.hash}`)
      .buffer(true)
      .expect(200);
    expect(createHash('sha256').update(read.text).digest('hex')).toBe(made.body.hash);
    const { result, input } = JSON.parse(read.text);
    // ω × r of the bar: 3 rad/s times 2 m.
    expect(result.solution.branches[0].points['bar.B'].speed).toBeCloseTo(6, 9);
    expect(result.solution.branches[0].points['bar.B'].velocity[1]).toBeCloseTo(6, 9);
    expect(input.marks.map((mark: Mark) => mark.label)).toEqual(['M1', 'M2']);
    const events = await eventsOf(bench.id);
    expect(events).toContain('recorded computation');
    expect(events).toContain('read computation');
  });

  it('when the same is recorded again, also at once, then it is the same record', async () => {
    const bench = await openBench();
    const answers = await Promise.all([record(bench), record(bench), record(bench)]);
    expect(new Set(answers.map((answer) => answer.body.hash)).size).toBe(1);
    expect(answers.map((answer) => answer.status)).toEqual([201, 201, 201]);
    const list = await bench.investigator.get(`/api/cases/${bench.id}/computations`).expect(200);
    expect(list.body.items).toEqual([answers[0].body]);
  });

  it('when a mark is measured anew, then the next record is another, listed first', async () => {
    const bench = await openBench();
    const first = await record(bench).expect(201);
    const [, b] = bench.marks;
    await bench.investigator
      .put(
        `/api/cases/${bench.id}/marks/${b.id}`,
        {
          label: b.label,
          kind: b.kind,
          at: [2.004, 0.1],
          sigma: [0.01, 0.01],
          reason: 'Measured again.',
        },
        b.version,
      )
      .expect(200);
    const second = await record(bench).expect(201);
    expect(second.body.hash).not.toBe(first.body.hash);
    const list = await bench.investigator.get(`/api/cases/${bench.id}/computations`).expect(200);
    expect(list.body.items.map((item: { hash: string }) => item.hash)).toEqual([
      second.body.hash,
      first.body.hash,
    ]);
  });

  it('when the saved version is newer, then nothing is recorded and it is shown', async () => {
    const bench = await openBench();
    await save(bench, { ...bench.document, joints: [] }).expect(200);
    const late = await record(bench).expect(412);
    expect(late.body.current.version).toBe(2);
    const list = await bench.investigator.get(`/api/cases/${bench.id}/computations`).expect(200);
    expect(list.body.items).toEqual([]);
  });

  it('when the knowns do not fix the motion, then it is recorded as under-determined', async () => {
    const bench = await openBench();
    const stations = [{ ...bench.document.stations[0], knowns: [] }];
    await save(bench, { ...bench.document, stations }).expect(200);
    const made = await record(bench, { version: 2 }).expect(201);
    expect(made.body.status).toBe('under-determined');
  });

  it('when the engine refuses, then the answer names the field and nothing is kept', async () => {
    const bench = await openBench();
    const [station] = bench.document.stations;
    await save(bench, {
      ...bench.document,
      stations: [{ ...station, marks: station.marks.slice(0, 1) }],
    }).expect(200);
    const answer = await record(bench, { version: 2 }).expect(422);
    expect(answer.body.errors[0].field).toBe('bodies.bar');
    const list = await bench.investigator.get(`/api/cases/${bench.id}/computations`).expect(200);
    expect(list.body.items).toEqual([]);
  });

  it('when an assigned mark was withdrawn, then the answer names it', async () => {
    const bench = await openBench();
    const [a] = bench.marks;
    await bench.investigator
      .delete(`/api/cases/${bench.id}/marks/${a.id}?reason=Not%20of%20this%20car.`)
      .set('If-Match', `"${a.version}"`)
      .expect(204);
    const answer = await record(bench).expect(422);
    expect(answer.body.errors[0].field).toBe(`station.marks.${a.id}`);
  });

  it('when there is no such station or record, then the answer says so', async () => {
    const bench = await openBench();
    const answer = await record(bench, { stationId: 'S9' }).expect(422);
    expect(answer.body.errors[0].field).toBe('stationId');
    const nowhere = '0'.repeat(64);
    await bench.investigator.get(`/api/cases/${bench.id}/computations/${nowhere}`).expect(404);
  });

  it('when somebody reviews, then they read but do not record', async () => {
    const bench = await openBench();
    const made = await record(bench).expect(201);
    const reviewer = await api.as('investigator');
    await assignTo(bench.lead, bench.id, reviewer, 'technical-reviewer');
    await reviewer.get(`/api/cases/${bench.id}/computations/${made.body.hash}`).expect(200);
    await reviewer
      .post(`${bench.base}/${bench.made.id}/computations`, { stationId: 'S1', version: 1 })
      .expect(403);
  });

  it('when the database is told to change a record, then it refuses', async () => {
    const bench = await openBench();
    await record(bench).expect(201);
    await expect(
      api.services.sequelize.query("UPDATE computations SET status = 'determined'", {
        type: QueryTypes.UPDATE,
      }),
    ).rejects.toThrow();
  });
});
