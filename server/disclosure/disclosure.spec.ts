import { execFile } from 'node:child_process';
import { chmod, mkdtemp, readFile, readdir, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { afterAll, beforeAll, describe, expect, it, jest } from '@jest/globals';
import { QueryTypes } from 'sequelize';
import type { Release } from '#shared/contracts/disclosure';
import type { Exhibit, ExhibitFile } from '#shared/contracts/exhibits';
import { bundleTools } from '../../scripts/bundle-tools.mjs';
import { armReconstruction } from '../../test/fixtures/computations';
import { verifyBag } from '../archive/tools/verify-bag';
import { ReleaseArchiveRecord } from '../database/models/release';
import { sha256Hex } from '../ledger/canonical';
import { startTestApi, testPassword, type TestApi, type TestPerson } from '../testing/api';
import { assignTo, openTestCase, type TestCase } from '../testing/factories';

const run = promisify(execFile);

// Each person who signs in costs two Argon2id hashes.
jest.setTimeout(60_000);

let api: TestApi;
let tools: string;
let opened: TestCase;
let releases: string;
let computation: string;
let photo: Exhibit;
let letter: Exhibit;
let photoFile: ExhibitFile;

const claimant = () => opened.file.parties[0].id;
const defendant = () => opened.file.parties[1].id;

beforeAll(async () => {
  tools = await mkdtemp(join(tmpdir(), 'centrode-tools-'));
  await bundleTools(tools);
  api = await startTestApi({ TOOLS_DIR: tools });
  opened = await openTestCase(api, { title: 'Spin on Marl Lane' });
  releases = `/api/cases/${opened.id}/releases`;
  photo = await register('Photographs of the bend');
  letter = await register('Letter to counsel');
  photoFile = await upload(photo, 'Straße 1%.txt', 'what was there\n');
  await upload(letter, 'letter.txt', 'privileged\n');
  await opened.investigator
    .post(`/api/cases/${opened.id}/marks`, {
      label: 'G1',
      kind: 'gouge',
      at: [1, 2],
      sigma: [0.01, 0.02],
      raw: '1 m; 2 m',
    })
    .expect(201);
  computation = await computeArm();
}, 120_000);
afterAll(async () => {
  await api.stop();
  await rm(tools, { recursive: true, force: true });
});

async function register(description: string, test = opened): Promise<Exhibit> {
  const path = `/api/cases/${test.id}/exhibits`;
  const { body } = await test.investigator
    .post(path, { kind: 'document', description })
    .expect(201);
  return body as Exhibit;
}

/** Reconstructs and records by the API, so that the engine itself made the result. */
async function computeArm(): Promise<string> {
  const path = `/api/cases/${opened.id}/reconstructions`;
  const { body } = await opened.investigator
    .post(path, { name: 'The arm made it', document: armReconstruction })
    .expect(201);
  const recorded = await opened.investigator
    .post(`${path}/${body.id}/computations`, { stationId: 's1', version: body.version })
    .expect(201);
  return recorded.body.hash as string;
}

async function upload(exhibit: Exhibit, name: string, content: string): Promise<ExhibitFile> {
  const path = `/api/cases/${opened.id}/exhibits/${exhibit.id}/files`;
  const { body } = await opened.investigator
    .call('post', path)
    .attach('file', Buffer.from(content), name)
    .expect(201);
  return body as ExhibitFile;
}

const entry = (over: object = {}) => ({
  partyId: claimant(),
  exhibits: [photo.number],
  withheld: [{ exhibit: letter.number, reason: 'privileged', explanation: 'Counsel.' }],
  password: testPassword,
  ...over,
});

async function release(over: object = {}): Promise<Release> {
  return (await opened.investigator.post(releases, entry(over)).expect(201)).body as Release;
}

async function attorneyFor(partyId: string, test = opened): Promise<TestPerson> {
  const attorney = await api.as('attorney');
  await assignTo(test.lead, test.id, attorney, 'attorney', partyId);
  return attorney;
}

const fieldsOf = ({ body }: { body: { errors?: { field: string; message: string }[] } }) =>
  (body.errors ?? []).map(({ field, message }) => `${field}: ${message}`);

const download = (person: TestPerson, path: string) =>
  person
    .get(path)
    .buffer(true)
    .parse((response, done) => {
      const parts: Buffer[] = [];
      response.on('data', (part: Buffer) => parts.push(part));
      response.on('end', () => done(null, Buffer.concat(parts)));
    });

describe('releasing a case', () => {
  it('when there are no findings, then nothing is released', async () => {
    const answer = await opened.investigator.post(releases, entry()).expect(422);
    expect(fieldsOf(answer)).toEqual([expect.stringMatching(/^findings: /)]);
    const figures = [{ computation, quantity: 'speed', body: 'arm', point: 'tip' }];
    await opened.investigator
      .put(
        `/api/cases/${opened.id}/findings`,
        {
          answers: [{ questionNumber: 1, text: 'About 6 m/s.' }],
          figures,
          dependsOn: 'The pin.',
          against: 'The film.',
        },
        1,
      )
      .expect(200);
  });

  it('when an exhibit is neither released nor withheld, then it is named', async () => {
    const answer = await opened.investigator.post(releases, entry({ withheld: [] })).expect(422);
    expect(fieldsOf(answer)).toEqual([
      `exhibits: Neither released nor withheld with a reason: ${letter.number}.`,
    ]);
  });

  it('when exhibits are unknown, named twice or withheld without a word, then each is told', async () => {
    const withheld = [
      { exhibit: letter.number, reason: 'other', explanation: ' ' },
      { exhibit: photo.number, reason: 'sensitive', explanation: '' },
    ];
    const exhibits = [photo.number, '1999-001/1'];
    const answer = await opened.investigator
      .post(releases, entry({ exhibits, withheld }))
      .expect(422);
    expect(fieldsOf(answer)).toEqual([
      'exhibits.1: There is no exhibit 1999-001/1.',
      `withheld.0.explanation: Say why ${letter.number} is withheld.`,
      `withheld.1.exhibit: ${photo.number} is named twice.`,
    ]);
  });

  it('when the password or the party is wrong, then nothing is released', async () => {
    const wrong = await opened.investigator.post(releases, entry({ password: 'x' })).expect(422);
    expect(fieldsOf(wrong)).toEqual([expect.stringMatching(/^password: /)]);
    const other = await openTestCase(api);
    const foreign = await opened.investigator
      .post(releases, entry({ partyId: other.file.parties[0].id }))
      .expect(422);
    expect(fieldsOf(foreign)).toEqual([expect.stringMatching(/^partyId: /)]);
    expect((await opened.lead.get(releases).expect(200)).body.items).toEqual([]);
  });

  it('when it is sent twice with one key, then it is done once', async () => {
    const send = () =>
      opened.investigator.post(releases, entry()).set('Idempotency-Key', 'release-key-1');
    const [first, second] = await Promise.all([send(), send()]);
    expect([first.status, second.status]).toEqual([201, 201]);
    expect(second.body).toEqual(first.body);
    expect((await send().expect(201)).body.id).toBe(first.body.id);
    const { items } = (await opened.lead.get(releases).expect(200)).body;
    expect(items).toHaveLength(1);
    expect(items[0]).toMatchObject({
      number: 1,
      party: 'The claimant',
      releasedBy: opened.investigator.account?.name,
      exhibits: [photo.number],
      withheld: [{ exhibit: letter.number, reason: 'privileged', explanation: 'Counsel.' }],
      computations: [computation],
      withdrawnAt: null,
      openings: [],
    });
  });

  it('when it is released, then the ledger names what was released and a head is signed', async () => {
    const { body } = await opened.lead.get(`/api/cases/${opened.id}/custody`).expect(200);
    const { event, hash } = body.entries.at(-1);
    expect(event).toMatchObject({ kind: 'released', exhibit: null, receivedBy: 'The claimant' });
    expect(body.head).toMatchObject({ sequence: event.sequence, hash });
    const [kept] = await api.services.sequelize.query<{ snapshot: string }>(
      'SELECT snapshot FROM releases WHERE number = 1',
      { type: QueryTypes.SELECT },
    );
    expect(event.note).toContain(sha256Hex(kept.snapshot));
  });

  it('when somebody changes a release in the database itself, then the database refuses', async () => {
    for (const table of ['releases', 'release_withdrawals', 'release_openings']) {
      const remove = api.services.sequelize.query(`DELETE FROM ${table}`, {
        type: QueryTypes.DELETE,
      });
      await expect(remove).rejects.toThrow(/append-only|denied/);
    }
  });

  it('when a stored file is not what was taken in, then the exhibit blocks the release', async () => {
    const file = api.services.store.pathOf(photoFile.sha256);
    const good = await readFile(file);
    await chmod(file, 0o600);
    await writeFile(file, 'what was here!\n');
    const answer = await opened.investigator.post(releases, entry()).expect(409);
    expect(answer.body.detail).toContain(`${photo.number} (Straße 1%.txt: changed)`);
    await rm(file);
    const gone = await opened.investigator.post(releases, entry()).expect(409);
    expect(gone.body.detail).toContain(`${photo.number} (Straße 1%.txt: missing)`);
    await writeFile(file, good);
  });

  it('lets only those who direct the case release and withdraw', async () => {
    const [{ id }] = (await opened.lead.get(releases).expect(200)).body.items as Release[];
    const withdrawal = `${releases}/${id}/withdrawal`;
    const colleague = await api.as('investigator');
    await colleague.get(releases).expect(404);
    await colleague.post(releases, entry()).expect(404);
    await assignTo(opened.lead, opened.id, colleague, 'investigator');
    await colleague.get(releases).expect(200);
    await colleague.post(releases, entry()).expect(403);
    await colleague.post(withdrawal, { reason: 'x' }).expect(403);
    await (await api.as('attorney')).get(releases).expect(404);
    await (await api.nobody().signIn()).get(releases).expect(401);
    const other = await openTestCase(api);
    const elsewhere = `/api/cases/${other.id}/releases/${id}`;
    await other.lead.post(`${elsewhere}/withdrawal`, { reason: 'x' }).expect(404);
    await other.lead.get(`${elsewhere}/archive`).expect(404);
  });
});

describe('the archive of a release', () => {
  it('is built after the release and verifies', async () => {
    await api.services.archives.idle();
    const [first] = (await opened.lead.get(releases).expect(200)).body.items as Release[];
    expect(first.archive).toMatchObject({ state: 'ready', message: '' });
    const answer = await download(opened.lead, `${releases}/${first.id}/archive`).expect(200);
    const bytes = answer.body as Buffer;
    expect(bytes.length).toBe(first.archive.size);
    expect(sha256Hex(bytes)).toBe(first.archive.sha256);
    const name = `${opened.file.number}-release-1`;
    expect(answer.headers).toMatchObject({
      'content-disposition': `attachment; filename=${name}.zip`,
      'content-type': 'application/zip',
      'accept-ranges': 'bytes',
      etag: `"${first.archive.sha256}"`,
    });
    const folder = await mkdtemp(join(tmpdir(), 'centrode-bag-'));
    await writeFile(join(folder, 'a.zip'), bytes);
    await run('unzip', ['-q', 'a.zip'], { cwd: folder });
    const { findings, checked } = await verifyBag(join(folder, name));
    expect(findings).toEqual([]);
    expect(checked.length).toBeGreaterThan(10);
    const recompute = join(folder, name, 'data/tools/recompute.mjs');
    const { stdout } = await run(process.execPath, [recompute], { env: {} });
    expect(stdout).toContain('Same result again: 1. Another result: 0. Not readable: 0.');
    const velocities = await readFile(join(folder, name, 'data/velocities.csv'), 'utf8');
    expect(velocities).toMatch(/,The arm made it,first mark,1,arm,tip,speed,m\/s,6/);
    const all = (await readdir(join(folder, name), { recursive: true })).join('\n');
    expect(all).not.toContain(letter.number.replace('/', '-'));
    const ledger = await readFile(join(folder, name, 'data/custody/ledger.jsonl'), 'utf8');
    expect(ledger).not.toContain('letter.txt');
    const marks = await readFile(join(folder, name, 'data/survey/marks.csv'), 'utf8');
    expect(marks).toContain('\r\nG1,gouge,1,2,0.01,0.02,0,');
    await rm(folder, { recursive: true });
  });

  it('can be downloaded in pieces', async () => {
    const [first] = (await opened.lead.get(releases).expect(200)).body.items as Release[];
    const path = `${releases}/${first.id}/archive`;
    const whole = (await download(opened.lead, path)).body as Buffer;
    const head = await download(opened.lead, path).set('Range', 'bytes=0-999').expect(206);
    const rest = await download(opened.lead, path)
      .set('Range', 'bytes=1000-')
      .set('If-Range', `"${first.archive.sha256}"`)
      .expect(206);
    expect(Buffer.concat([head.body, rest.body]).equals(whole)).toBe(true);
    const other = download(opened.lead, path).set('Range', 'bytes=1000-');
    expect((await other.set('If-Range', '"another"').expect(200)).body).toHaveLength(whole.length);
    await opened.lead.get(path).set('Range', `bytes=${whole.length}-`).expect(416);
  });

  it('when the server ended while it was being built, then the next start builds it', async () => {
    const [first] = (await opened.lead.get(releases).expect(200)).body.items as Release[];
    const folder = join(api.services.config.dataDir, 'archives');
    await rm(join(folder, `${first.id}.zip`));
    await writeFile(join(folder, `${first.id}.zip.left.part`), 'half');
    await ReleaseArchiveRecord.update(
      { state: 'building', size: null, sha256: null },
      { where: { releaseId: first.id } },
    );
    const waiting = await opened.lead.get(`${releases}/${first.id}/archive`).expect(409);
    expect(waiting.body.detail).toContain('still being built');
    await api.services.archives.resume();
    await api.services.archives.idle();
    expect(await readdir(folder)).toEqual([`${first.id}.zip`]);
    const [again] = (await opened.lead.get(releases).expect(200)).body.items as Release[];
    expect(again.archive).toEqual(first.archive);
  });

  it('when the file of a ready archive is gone, then it is built again', async () => {
    const [first] = (await opened.lead.get(releases).expect(200)).body.items as Release[];
    await rm(join(api.services.config.dataDir, 'archives', `${first.id}.zip`));
    await opened.lead.get(`${releases}/${first.id}/archive`).expect(503);
    await api.services.archives.idle();
    await download(opened.lead, `${releases}/${first.id}/archive`).expect(200);
  });

  it('when a file cannot be had while it is built, then it fails with the reason', async () => {
    const { id } = await release();
    await api.services.archives.idle();
    const file = api.services.store.pathOf(photoFile.sha256);
    const good = await readFile(file);
    await rm(file);
    await writeFile(file, 'what was here!\n');
    api.services.archives.build(id);
    await api.services.archives.idle();
    const { items } = (await opened.lead.get(releases).expect(200)).body as { items: Release[] };
    expect(items.at(-1)?.archive).toMatchObject({ state: 'failed', size: null, sha256: null });
    expect(items.at(-1)?.archive.message).not.toBe('');
    await writeFile(file, good);
    await api.services.archives.resume();
    await api.services.archives.idle();
    const after = (await opened.lead.get(releases).expect(200)).body as { items: Release[] };
    expect(after.items.at(-1)?.archive.state).toBe('ready');
  });
});

describe('an attorney', () => {
  let own: Release;
  let theirs: Release;
  let attorney: TestPerson;

  beforeAll(async () => {
    own = await release();
    theirs = await release({ partyId: defendant() });
    attorney = await attorneyFor(claimant());
    await api.services.archives.idle();
  }, 60_000);

  it('finds the releases to the own party, the newest first, and no other', async () => {
    const { items } = (await attorney.get('/api/disclosures').expect(200)).body;
    expect(items[0]).toMatchObject({
      releaseId: own.id,
      caseNumber: opened.file.number,
      title: 'Spin on Marl Lane',
      party: 'The claimant',
    });
    expect(items.map((item: { releaseId: string }) => item.releaseId)).not.toContain(theirs.id);
    const { items: none } = (await (await api.as('attorney')).get('/api/disclosures')).body;
    expect(none).toEqual([]);
  });

  it('reads what was frozen, whatever is changed in the case afterwards', async () => {
    const before = (await attorney.get(`/api/disclosures/${own.id}`).expect(200)).body;
    expect(before.summary).toMatchObject({
      questions: [{ number: 1, question: 'How fast was the car?', answer: 'About 6 m/s.' }],
      figures: [
        expect.objectContaining({ title: 'Speed', value: expect.closeTo(6, 9), computation }),
      ],
      exhibits: [{ number: photo.number, description: 'Photographs of the bend' }],
      withheld: [{ exhibit: letter.number, reason: 'privileged' }],
    });
    expect(before.archive).toEqual({
      ready: true,
      size: expect.any(Number),
      sha256: expect.stringMatching(/^[0-9a-f]{64}$/),
    });
    const findings = `/api/cases/${opened.id}/findings`;
    const { version } = (await opened.lead.get(findings).expect(200)).body;
    await opened.investigator
      .put(findings, { answers: [], figures: [], dependsOn: 'changed', against: '' }, version)
      .expect(200);
    const after = (await attorney.get(`/api/disclosures/${own.id}`).expect(200)).body;
    expect(after.summary).toEqual(before.summary);
  });

  it('leaves a trace with every opening, in the release and in the access log', async () => {
    const fresh = await release();
    await api.services.archives.idle();
    await attorney.get(`/api/disclosures/${fresh.id}`).expect(200);
    await download(attorney, `/api/disclosures/${fresh.id}/archive`).expect(200);
    await download(attorney, `/api/disclosures/${fresh.id}/archive`)
      .set('Range', 'bytes=100-')
      .expect(206);
    const { items } = (await opened.lead.get(releases).expect(200)).body as { items: Release[] };
    const openings = items.find(({ id }) => id === fresh.id)?.openings;
    const by = attorney.account?.name;
    expect(openings).toEqual([
      { at: expect.any(String), by, what: 'summary' },
      { at: expect.any(String), by, what: 'archive' },
    ]);
    const events = (await opened.lead.get(`/api/cases/${opened.id}/events`).expect(200)).body;
    expect(events.items.map((event: { action: string }) => event.action)).toEqual(
      expect.arrayContaining([
        'opened released summary',
        'opened released archive',
        'resumed download of archive',
      ]),
    );
  });

  it('when a release is withdrawn, then it is gone for the attorney and stays on record', async () => {
    const fresh = await release();
    const path = `/api/disclosures/${fresh.id}`;
    await attorney.get(path).expect(200);
    const withdrawal = `${releases}/${fresh.id}/withdrawal`;
    const { body } = await opened.investigator
      .post(withdrawal, { reason: 'Wrong exhibit.' })
      .expect(200);
    expect(body.withdrawnAt).not.toBeNull();
    await opened.investigator.post(withdrawal, { reason: 'again' }).expect(409);
    await attorney.get(path).expect(404);
    await attorney.get(`${path}/archive`).expect(404);
    const { items } = (await attorney.get('/api/disclosures').expect(200)).body;
    expect(JSON.stringify(items)).not.toContain(fresh.id);
    await api.services.archives.idle();
    await download(opened.lead, `${releases}/${fresh.id}/archive`).expect(200);
  });

  it('reaches nothing of another party, of another case, or of the live case', async () => {
    const other = await openTestCase(api);
    const stranger = await attorneyFor(other.file.parties[0].id, other);
    const opponent = await attorneyFor(defendant());
    for (const [person, foreign] of [
      [attorney, theirs],
      [stranger, own],
      [stranger, theirs],
      [opponent, own],
    ] as const) {
      await person.get(`/api/disclosures/${foreign.id}`).expect(404);
      await person.get(`/api/disclosures/${foreign.id}/archive`).expect(404);
    }
    for (const path of [
      `/api/cases/${opened.id}`,
      `/api/cases/${opened.id}/releases`,
      `/api/cases/${opened.id}/releases/${own.id}/archive`,
      `/api/cases/${opened.id}/findings`,
      `/api/cases/${opened.id}/notes`,
      `/api/cases/${opened.id}/events`,
      `/api/cases/${opened.id}/custody`,
      `/api/cases/${opened.id}/exhibits`,
      `/api/cases/${opened.id}/exhibits/${photo.id}`,
      `/api/cases/${opened.id}/exhibits/${photo.id}/files/${photoFile.id}/content`,
      `/api/cases/${opened.id}/computations`,
      `/api/cases/${opened.id}/computations/${computation}`,
      `/api/cases/${opened.id}/marks`,
      `/api/cases/${opened.id}/reconstructions`,
      '/api/cases',
    ]) {
      await attorney.get(path).expect(404);
    }
    const { items } = (await opened.lead.get(releases).expect(200)).body as { items: Release[] };
    expect(items.find(({ id }) => id === theirs.id)?.openings).toEqual([]);
  });

  it('when the assignment has ended, then finds nothing any more', async () => {
    const leaving = await attorneyFor(claimant());
    await leaving.get(`/api/disclosures/${own.id}`).expect(200);
    const file = (await opened.lead.get(`/api/cases/${opened.id}`).expect(200)).body;
    const { id } = file.assignments.find(
      (each: { accountId: string }) => each.accountId === leaving.id,
    );
    await opened.lead.delete(`/api/cases/${opened.id}/assignments/${id}`).expect(204);
    await leaving.get(`/api/disclosures/${own.id}`).expect(404);
  });

  it('is the only kind of account that these addresses know', async () => {
    for (const person of [opened.lead, opened.investigator]) {
      await person.get('/api/disclosures').expect(404);
      await person.get(`/api/disclosures/${own.id}`).expect(404);
    }
    await (await api.nobody().signIn()).get(`/api/disclosures/${own.id}`).expect(401);
  });
});
