/**
 * A case that can be released, made through the API: two exhibits with a file each, a mark, and a
 * computation that the engine recorded.
 *
 *   const world = await openReleasableCase();   // in beforeAll; await world.stop() in afterAll
 *   await world.saveFindings();
 *   const release = await world.release();      // to the claimant, the photographs alone
 */
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Release } from '#shared/contracts/disclosure';
import type { Exhibit, ExhibitFile } from '#shared/contracts/exhibits';
import type { Reconstruction } from '#shared/contracts/motion';
import { bundleTools } from '../../scripts/bundle-tools.mjs';
import { armReconstruction } from '../../test/fixtures/computations';
import { startTestApi, testPassword, type TestApi, type TestPerson } from '../testing/api';
import { assignTo, openTestCase, type TestCase } from '../testing/factories';

export interface ReleasableCase {
  readonly api: TestApi;
  readonly opened: TestCase;
  /** Address of the case's releases. */
  readonly releases: string;
  readonly computation: string;
  readonly photo: Exhibit;
  readonly photoFile: ExhibitFile;
  readonly letter: Exhibit;
  readonly claimant: string;
  readonly defendant: string;
  /** A body for `POST releases` that is right: the letter is withheld. */
  readonly entry: (over?: object) => object;
  readonly saveFindings: () => Promise<void>;
  readonly release: (over?: object) => Promise<Release>;
  readonly listReleases: () => Promise<Release[]>;
  /** A new attorney, signed in, who acts for this party. */
  readonly attorneyFor: (partyId: string, test?: TestCase) => Promise<TestPerson>;
  readonly stop: () => Promise<void>;
}

export async function openReleasableCase(): Promise<ReleasableCase> {
  const tools = await mkdtemp(join(tmpdir(), 'centrode-tools-'));
  await bundleTools(tools);
  const api = await startTestApi({ TOOLS_DIR: tools });
  const opened = await openTestCase(api, { title: 'Spin on Marl Lane' });
  const base = `/api/cases/${opened.id}`;
  const releases = `${base}/releases`;
  const post = async <T>(path: string, body: object): Promise<T> =>
    (await opened.investigator.post(base + path, body).expect(201)).body as T;
  const register = (description: string) =>
    post<Exhibit>('/exhibits', { kind: 'document', description });
  const upload = async (exhibit: Exhibit, name: string, content: string) => {
    const answer = await opened.investigator
      .call('post', `${base}/exhibits/${exhibit.id}/files`)
      .attach('file', Buffer.from(content), name)
      .expect(201);
    return answer.body as ExhibitFile;
  };

  const photo = await register('Photographs of the bend');
  const letter = await register('Letter to counsel');
  const photoFile = await upload(photo, 'Straße 1%.txt', 'what was there\n');
  await upload(letter, 'letter.txt', 'privileged\n');
  await post('/marks', {
    label: 'G1',
    kind: 'gouge',
    at: [1, 2],
    sigma: [0.01, 0.02],
    raw: '1 m; 2 m',
  });
  const reconstruction = await post<Reconstruction>('/reconstructions', {
    name: 'The arm made it',
    document: armReconstruction,
  });
  const { hash: computation } = await post<{ hash: string }>(
    `/reconstructions/${reconstruction.id}/computations`,
    { stationId: 's1', version: reconstruction.version },
  );

  const [claimant, defendant] = opened.file.parties.map((party) => party.id);
  const entry = (over: object = {}) => ({
    partyId: claimant,
    exhibits: [photo.number],
    withheld: [{ exhibit: letter.number, reason: 'privileged', explanation: 'Counsel.' }],
    password: testPassword,
    ...over,
  });
  return {
    api,
    opened,
    releases,
    computation,
    photo,
    photoFile,
    letter,
    claimant,
    defendant,
    entry,
    saveFindings: async () => {
      const findings = {
        answers: [{ questionNumber: 1, text: 'About 6 m/s.' }],
        figures: [{ computation, quantity: 'speed', body: 'arm', point: 'tip' }],
        dependsOn: 'The pin.',
        against: 'The film.',
      };
      await opened.investigator.put(`${base}/findings`, findings, 1).expect(200);
    },
    release: (over = {}) => post<Release>('/releases', entry(over)),
    listReleases: async () => {
      const answer = await opened.lead.get(releases).expect(200);
      return (answer.body as { items: Release[] }).items;
    },
    attorneyFor: async (partyId, test = opened) => {
      const attorney = await api.as('attorney');
      await assignTo(test.lead, test.id, attorney, 'attorney', partyId);
      return attorney;
    },
    stop: async () => {
      await api.stop();
      await rm(tools, { recursive: true, force: true });
    },
  };
}

/** "field: message" of each thing that a 422 names. */
export const fieldsOf = ({
  body,
}: {
  body: { errors?: { field: string; message: string }[] };
}): string[] => (body.errors ?? []).map(({ field, message }) => `${field}: ${message}`);

/** A GET whose answer's body is the bytes. */
export const download = (person: TestPerson, path: string) =>
  person
    .get(path)
    .buffer(true)
    .parse((response, done) => {
      const parts: Buffer[] = [];
      response.on('data', (part: Buffer) => parts.push(part));
      response.on('end', () => done(null, Buffer.concat(parts)));
    });
