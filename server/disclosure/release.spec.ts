import { chmod, readFile, rm, writeFile } from 'node:fs/promises';
import { afterAll, beforeAll, describe, expect, it, jest } from '@jest/globals';
import { QueryTypes } from 'sequelize';
import { sha256Hex } from '../ledger/canonical';
import { openTestCase, assignTo } from '../testing/factories';
import { fieldsOf, openReleasableCase, type ReleasableCase } from './testing';

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
let entry: ReleasableCase['entry'];
let saveFindings: ReleasableCase['saveFindings'];
let listReleases: ReleasableCase['listReleases'];

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
    entry,
    saveFindings,
    listReleases,
  } = world);
}, 120_000);
afterAll(() => world.stop());

describe('releasing a case', () => {
  it('when there are no findings, then nothing is released', async () => {
    const answer = await opened.investigator.post(releases, entry()).expect(422);
    expect(fieldsOf(answer)).toEqual([expect.stringMatching(/^findings: /)]);
    await saveFindings();
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
    expect(await listReleases()).toEqual([]);
  });

  it('when it is sent twice with one key, then it is done once', async () => {
    const send = () =>
      opened.investigator.post(releases, entry()).set('Idempotency-Key', 'release-key-1');
    const [first, second] = await Promise.all([send(), send()]);
    expect([first.status, second.status]).toEqual([201, 201]);
    expect(second.body).toEqual(first.body);
    expect((await send().expect(201)).body.id).toBe(first.body.id);
    const items = await listReleases();
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
    const [{ id }] = await listReleases();
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
