import { afterAll, beforeAll, describe, expect, it, jest } from '@jest/globals';
import type { Release } from '#shared/contracts/disclosure';
import type { TestPerson } from '../testing/api';
import { openTestCase } from '../testing/factories';
import { download, openReleasableCase, type ReleasableCase } from './testing';

// Each person who signs in costs two Argon2id hashes.
jest.setTimeout(60_000);

let world: ReleasableCase;
let api: ReleasableCase['api'];
let opened: ReleasableCase['opened'];
let releases: ReleasableCase['releases'];
let computation: ReleasableCase['computation'];
let photo: ReleasableCase['photo'];
let photoFile: ReleasableCase['photoFile'];
let letter: ReleasableCase['letter'];
let claimant: ReleasableCase['claimant'];
let defendant: ReleasableCase['defendant'];
let release: ReleasableCase['release'];
let listReleases: ReleasableCase['listReleases'];
let attorneyFor: ReleasableCase['attorneyFor'];

beforeAll(async () => {
  world = await openReleasableCase();
  ({
    api,
    opened,
    releases,
    computation,
    photo,
    photoFile,
    letter,
    claimant,
    defendant,
    release,
    listReleases,
    attorneyFor,
  } = world);
  await world.saveFindings();
}, 120_000);
afterAll(() => world.stop());

describe('an attorney', () => {
  let own: Release;
  let theirs: Release;
  let attorney: TestPerson;

  beforeAll(async () => {
    own = await release();
    theirs = await release({ partyId: defendant });
    attorney = await attorneyFor(claimant);
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
    const items = await listReleases();
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
    const opponent = await attorneyFor(defendant);
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
    const items = await listReleases();
    expect(items.find(({ id }) => id === theirs.id)?.openings).toEqual([]);
  });

  it('when the assignment has ended, then finds nothing any more', async () => {
    const leaving = await attorneyFor(claimant);
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
