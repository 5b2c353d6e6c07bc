import { execFile } from 'node:child_process';
import { mkdtemp, readFile, readdir, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { afterAll, beforeAll, describe, expect, it, jest } from '@jest/globals';
import { verifyBag } from '../archive/tools/verify-bag';
import { ReleaseArchiveRecord } from '../database/models/release';
import { sha256Hex } from '../ledger/canonical';
import { download, openReleasableCase, type ReleasableCase } from './testing';

const run = promisify(execFile);

// Each person who signs in costs two Argon2id hashes.
jest.setTimeout(60_000);

let world: ReleasableCase;
let api: ReleasableCase['api'];
let opened: ReleasableCase['opened'];
let releases: ReleasableCase['releases'];
let photoFile: ReleasableCase['photoFile'];
let letter: ReleasableCase['letter'];
let release: ReleasableCase['release'];
let listReleases: ReleasableCase['listReleases'];

beforeAll(async () => {
  world = await openReleasableCase();
  ({ api, opened, releases, photoFile, letter, release, listReleases } = world);
  await world.saveFindings();
}, 120_000);
afterAll(() => world.stop());

describe('the archive of a release', () => {
  beforeAll(() => release());

  it('is built after the release and verifies', async () => {
    await api.services.archives.idle();
    const [first] = await listReleases();
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
    const [first] = await listReleases();
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
    const [first] = await listReleases();
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
    const [again] = await listReleases();
    expect(again.archive).toEqual(first.archive);
  });

  it('when the file of a ready archive is gone, then it is built again', async () => {
    const [first] = await listReleases();
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
    const items = await listReleases();
    expect(items.at(-1)?.archive).toMatchObject({ state: 'failed', size: null, sha256: null });
    expect(items.at(-1)?.archive.message).not.toBe('');
    await writeFile(file, good);
    await api.services.archives.resume();
    await api.services.archives.idle();
    const after = await listReleases();
    expect(after.at(-1)?.archive.state).toBe('ready');
  });
});
