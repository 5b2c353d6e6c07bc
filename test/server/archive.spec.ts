import { access, readFile, readdir, stat, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { Readable } from 'node:stream';
import { afterAll, beforeAll, describe, expect, it, jest } from '@jest/globals';
import type { ArchiveSource } from '#server/archive/archive-source';
import { buildArchive } from '#server/archive/build-archive';
import {
  independentVerifier,
  ordinary,
  unpackArchive,
  type UnpackedArchive,
} from './unpacked-archive';

jest.setTimeout(60_000);

let archive: UnpackedArchive;
let folder: string;
let source: ArchiveSource;
let zip: string;
let bag: string;

beforeAll(async () => {
  archive = await unpackArchive();
  ({ folder, source, zip, bag } = archive);
});
afterAll(() => archive.remove());

const node = (args: string[], cwd: string) => ordinary(process.execPath, args, cwd);

describe('a released archive, checked with ordinary tools', () => {
  it('is a sound ZIP for unzip and for 7z', async () => {
    expect(await ordinary('unzip', ['-t', zip], folder)).toMatchObject({
      code: 0,
      output: expect.stringContaining('No errors detected'),
    });
    expect(await ordinary('7z', ['t', zip], folder)).toMatchObject({
      code: 0,
      output: expect.stringContaining('Everything is Ok'),
    });
  });

  it.each([
    ['sha256sum', 'manifest-sha256.txt'],
    ['sha256sum', 'tagmanifest-sha256.txt'],
    ['sha512sum', 'manifest-sha512.txt'],
    ['sha512sum', 'tagmanifest-sha512.txt'],
  ])('satisfies %s -c %s', async (program, manifest) => {
    expect(await ordinary(program, ['--strict', '-c', manifest], bag)).toMatchObject({ code: 0 });
  });

  it('is a valid bag for a verifier that shares nothing with it', async () => {
    const { code, output } = await independentVerifier(bag);
    expect([code, output]).toEqual([0, 'The bag is valid.\n']);
  });

  it('carries a signature that openssl accepts, and only for these bytes', async () => {
    const custody = join(bag, 'data/custody');
    const check = (file: string) =>
      ordinary(
        'openssl',
        ['pkeyutl', '-verify', '-pubin', '-inkey', 'public-key.pem', '-rawin', '-in', file].concat(
          '-sigfile',
          'head.sig',
        ),
        custody,
      );
    expect((await check('head-signed-bytes.json')).code).toBe(0);
    expect((await check('head.json')).code).not.toBe(0);
  });

  it('verifies itself with its own verify.mjs on plain Node.js', async () => {
    const { code, output } = await node(['data/tools/verify.mjs', '.'], bag);
    expect(output).toContain('The archive is whole');
    expect(output).not.toContain('WRONG');
    expect(code).toBe(0);
  });

  it('recomputes every result with its own recompute.mjs on plain Node.js', async () => {
    const { code, output } = await node(['data/tools/recompute.mjs', '.'], bag);
    expect(output.match(/identical, byte for byte/g)).toHaveLength(2);
    expect(output).toContain('Same result again: 2. Another result: 0. Not readable: 0.');
    expect(code).toBe(0);
  });

  it('says where a recorded result is not what the engine gives', async () => {
    const [{ text }] = source.computations;
    const file = join(folder, 'wrong.json');
    await writeFile(file, text.replace('"speed":6', '"speed":7'));
    const { code, output } = await node(['data/tools/recompute.mjs', file], bag);
    expect(output).toContain('result.branches.0.points.arm.tip.speed: recorded 7, now 6');
    expect(code).toBe(1);
    await writeFile(file, 'no record');
    expect((await node(['data/tools/recompute.mjs', file], bag)).code).toBe(2);
  });

  it('unpacks into one folder named like the release, with nothing beside it', async () => {
    const { output } = await ordinary('unzip', ['-Z1', zip], folder);
    const names = output.trim().split('\n');
    expect(names.every((name) => name.startsWith('2026-014-release-2/'))).toBe(true);
    expect(names.every((name) => /^[\x21-\x7e]+$/.test(name))).toBe(true);
    expect(names).toContain('2026-014-release-2/data/index.html');
  });
});

describe('what the archive holds', () => {
  const read = (path: string) => readFile(join(bag, 'data', path), 'utf8');

  it('has released originals byte for byte, and their own names only in a table', async () => {
    const names = await readdir(join(bag, 'data/exhibits/2026-014-1'));
    expect(names.map((name) => name.replace(/-[0-9a-f]{12}/, ''))).toEqual([
      '001.jpg',
      '002.txt',
      '003.bin',
    ]);
    const table = await read('exhibits/files.csv');
    expect(table).toContain('Straße 100% naß.JPG');
    expect(table).toContain(",'=cmd|x.txt,");
  });

  it('names what was withheld, with the reason, and tells nothing else of it', async () => {
    expect(await read('withheld.csv')).toBe(
      "exhibit,reason,explanation\r\n2026-014/3,privileged,'-1 letter to counsel\r\n",
    );
    for (const path of ['custody/ledger.jsonl', 'custody/ledger.csv', 'index.html']) {
      expect(await read(path)).not.toContain('a secret');
    }
    expect(await readdir(join(bag, 'data/exhibits'))).not.toContain('2026-014-3');
  });

  it('keeps numbers numbers and neutralises what a spreadsheet would run', async () => {
    const marks = await read('survey/marks.csv');
    expect(marks).toContain("\r\n'=G1,gouge,9.3,-2.25,0.02,0.03,0.0001,,");
    expect(marks).toContain(`"'@SUM(A1:A9) ""deep"", 12 mm"`);
    expect(await read('custody/ledger.csv')).toContain(`"'=1+1, ""quoted""\nsecond line"`);
  });

  it('gives every velocity and acceleration of every named point with its 95 % interval', async () => {
    const rows = (await read('velocities.csv')).trimEnd().split('\r\n');
    expect(rows[0]).toContain(
      'computation,reconstruction,station,solution,body,point,quantity,unit',
    );
    for (const { hash } of source.computations) {
      const of = (point: string, name: string) =>
        rows.find((row) => row.startsWith(hash) && row.includes(`,arm,${point},${name},`));
      const numbers = (point: string, name: string) =>
        of(point, name)?.split(',').slice(8).map(Number) ?? [];
      // By hand: omega = 3 ± 0.5 rad/s at 2 m: v = 6 ± 1 m/s; 95 % is ± 1.960 sigma.
      expect(numbers('tip', 'speed')).toEqual(
        [6, 1, 6 - 1.96, 6 + 1.96].map((value) => expect.closeTo(value, 3)),
      );
      expect(numbers('', 'angular-velocity')).toEqual(
        [3, 0.5, 3 - 0.98, 3 + 0.98].map((value) => expect.closeTo(value, 3)),
      );
      expect(of('O', 'velocity-x')).toBeDefined();
    }
    // The first also knows that the arm does not speed up: a = omega² r = 18 ± 6 m/s².
    const acceleration = rows.find(
      (row) => row.startsWith(source.computations[0].hash) && row.includes(',tip,acceleration,'),
    );
    expect(acceleration?.split(',').slice(7, 10)).toEqual([
      'm/s²',
      expect.stringMatching(/^(18|1[78]\.\d+)$/),
      expect.stringMatching(/^(6|[56]\.\d+)$/),
    ]);
  });

  it('has a reader that needs no network, no script and no other file', async () => {
    const page = await read('index.html');
    expect(page).toContain(`default-src 'none'`);
    expect(page).not.toMatch(
      /<script|<link|<iframe|@import|url\((?!data:)|src=|https?:(?!\/\/www\.w3\.org\/2000\/svg")/,
    );
    expect(page).toContain('Spin on Marl Lane &lt;bend&gt;');
    expect(page).toContain('&lt;script&gt;');
    for (const [, path] of page.matchAll(/href="(?!#)([^"]+)"/g)) {
      await access(join(bag, 'data', decodeURI(path)));
    }
  });

  it('gives marks as points and traces as lines in their order', async () => {
    const { features } = JSON.parse(await read('survey/marks.geojson'));
    const [trace, ...points] = features;
    expect(trace.geometry).toEqual({
      type: 'LineString',
      coordinates: [
        [0, 0],
        [4.2, 0.35],
        [8.1, 1.4],
      ],
    });
    expect(
      points.map((point: { properties: { label: string } }) => point.properties.label),
    ).toEqual(['T1-01', 'T1-02', 'T1-03', '=G1', 'R1']);
  });

  it('draws the plan to scale', async () => {
    const plan = await read('survey/plan.svg');
    expect(plan).toContain('width="420mm" height="297mm" viewBox="0 0 420 297"');
    expect(plan).toContain('Scale 1:100 on A3');
    expect(plan.match(/>(gouge|point of rest|yaw mark)</g)).toHaveLength(3);
    // 31.5 m at 1:100 are 315 mm between the first mark and the point of rest.
    const at = [...plan.matchAll(/translate\(([\d.]+) ([\d.]+)\)/g)].map(([, x, y]) => [+x, +y]);
    expect(at[4][0] - at[0][0]).toBeCloseTo(315, 1);
    expect(at[0][1] - at[4][1]).toBeCloseTo(67.5, 1);
    // +x bears 60°, so north lies 60° to the left of it: 30° to the right of straight up.
    expect(plan).toContain('transform="rotate(30.000)"');
  });
});

describe('building', () => {
  it('gives identical bytes twice', async () => {
    const again = join(folder, 'again.zip');
    const { sha256, size } = await buildArchive(source, again);
    expect((await readFile(again)).equals(await readFile(zip))).toBe(true);
    expect(size).toBe((await stat(zip)).size);
    expect((await ordinary('sha256sum', [again], folder)).output).toContain(sha256);
  });

  it.each([
    ['another file', (bytes: Buffer) => Buffer.concat([bytes.subarray(1), Buffer.from('x')])],
    ['a short file', (bytes: Buffer) => bytes.subarray(0, -1)],
    ['a long file', (bytes: Buffer) => Buffer.concat([bytes, Buffer.from('x')])],
  ])('refuses %s in the store and leaves nothing behind', async (_, spoil) => {
    const target = join(folder, 'spoilt.zip');
    const spoilt: ArchiveSource = {
      ...source,
      openFile: (sha256) =>
        Readable.from(source.openFile(sha256).map((bytes: Buffer) => spoil(bytes))),
    };
    await expect(buildArchive(spoilt, target)).rejects.toThrow(/001-[0-9a-f]{12}\.jpg/);
    expect((await readdir(folder)).filter((name) => name.startsWith('spoilt'))).toEqual([]);
  });

  it('passes on the error of a file that cannot be read', async () => {
    const broken: ArchiveSource = {
      ...source,
      openFile: () =>
        new Readable({
          read() {
            this.destroy(new Error('the disk is gone'));
          },
        }),
    };
    await expect(buildArchive(broken, join(folder, 'broken.zip'))).rejects.toThrow('disk is gone');
  });

  it('refuses a computation that was changed', async () => {
    const changed = {
      ...source,
      computations: source.computations.map(({ hash, text }) => ({ hash, text: `${text} ` })),
    };
    await expect(buildArchive(changed, join(folder, 'changed.zip'))).rejects.toThrow('was changed');
  });

  it.each([
    ['before it begins', 0],
    ['half way', 3],
    ['while it is read back', 1000],
  ])('can be stopped %s, and leaves nothing behind', async (_, entries) => {
    const stop = new AbortController();
    let written = 0;
    const progress = () => {
      written += 1;
      if (written >= entries || written === bagFiles) stop.abort(new Error('stopped'));
    };
    const bagFiles = (await readdir(bag, { recursive: true, withFileTypes: true })).filter(
      (entry) => entry.isFile(),
    ).length;
    if (entries === 0) stop.abort(new Error('stopped'));
    const target = join(folder, 'stopped.zip');
    const building = buildArchive(source, target, { signal: stop.signal, progress });
    await expect(building).rejects.toThrow('stopped');
    expect((await readdir(folder)).filter((name) => name.startsWith('stopped'))).toEqual([]);
  });
});
