import { cp, readFile, readdir, stat, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it, jest } from '@jest/globals';
import type { ArchiveSource } from '#server/archive/archive-source';
import { verifyBag } from '#server/archive/tools/verify-bag';
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
let bag: string;

beforeAll(async () => {
  archive = await unpackArchive();
  ({ folder, source, bag } = archive);
});
afterAll(() => archive.remove());

/** Small seeded generator (mulberry32), for places to spoil. */
function seeded(seed: number): () => number {
  return () => {
    seed = (seed + 0x6d2b79f5) | 0;
    let t = Math.imul(seed ^ (seed >>> 15), 1 | seed);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 2 ** 32;
  };
}

describe('one flipped bit', () => {
  it('is found by the archive’s verifier and by the independent one, wherever it is', async () => {
    const copy = join(folder, 'copy');
    await cp(bag, copy, { recursive: true });
    const random = seeded(20261201);
    const all = (await readdir(copy, { recursive: true, withFileTypes: true }))
      .filter((entry) => entry.isFile())
      .map((entry) => join(entry.parentPath, entry.name));
    const sizes = await Promise.all(all.map(async (path) => (await stat(path)).size));
    const paths = all.filter((_, i) => sizes[i] > 0).sort();
    const missed: string[] = [];
    // Every file once, then files at random: 60 places in all.
    for (let i = 0; i < 60; i++) {
      const path = i < paths.length ? paths[i] : paths[Math.floor(random() * paths.length)];
      const good = await readFile(path);
      const place = Math.floor(random() * good.length);
      const bit = Math.floor(random() * 8);
      const spoilt = Buffer.from(good);
      spoilt[place] ^= 1 << bit;
      await writeFile(path, spoilt);
      const { findings } = await verifyBag(copy);
      if (findings.length === 0) missed.push(`verify.mjs: ${path} byte ${place} bit ${bit}`);
      // RFC 8493 lets hashes stand in either case, so there a case bit says nothing to it.
      const sameHash = bit === 5 && /manifest-sha/.test(path);
      if (!sameHash && i % 3 === 0) {
        const { code } = await independentVerifier(copy);
        if (code === 0) missed.push(`verify_bag.py: ${path} byte ${place} bit ${bit}`);
      }
      await writeFile(path, good);
    }
    expect(missed).toEqual([]);
    expect((await verifyBag(copy)).findings).toEqual([]);
  }, 300_000);
});

describe('a bag made anew around a change, with manifests that fit', () => {
  /** Changes one file and then makes all four manifests and the Oxum again, as a forger would. */
  async function forge(name: string, path: string, change: (content: string) => string) {
    const copy = join(folder, name);
    await cp(bag, copy, { recursive: true });
    const file = join(copy, path);
    await writeFile(file, change(await readFile(file, 'latin1')), 'latin1');
    const shell = `
      octets=$(find data -type f -printf '%s\\n' | awk '{ s += $1 } END { print s }')
      sed -i "s/^Payload-Oxum: .*/Payload-Oxum: $octets.$(find data -type f | wc -l)/" bag-info.txt
      for a in sha256 sha512; do find data -type f -exec "\${a}sum" {} + > manifest-$a.txt; done
      for a in sha256 sha512; do
        "\${a}sum" bagit.txt bag-info.txt manifest-sha256.txt manifest-sha512.txt > tagmanifest-$a.txt
      done`;
    const { code, output } = await ordinary('sh', ['-ec', shell], copy);
    expect([code, output]).toEqual([0, '']);
    return (await verifyBag(copy)).findings.map((finding) => `${finding.where} ${finding.message}`);
  }

  it('passes when nothing was changed', async () => {
    expect(await forge('same', 'data/README.txt', (text) => text)).toEqual([]);
  });

  it('is found out by the ledger when an exhibit was changed', async () => {
    const path = source.snapshot.exhibits[0].files[0].sha256.slice(0, 12);
    const found = await forge('exhibit', `data/exhibits/2026-014-1/001-${path}.jpg`, (bytes) =>
      bytes.replace(/^./, (first) => (first === 'x' ? 'y' : 'x')),
    );
    expect(found).toEqual([expect.stringMatching(/001-.*is not the file of the release/)]);
  });

  it('is found out when a number in the tables was changed', async () => {
    const found = await forge('table', 'data/velocities.csv', (text) =>
      text.replace(/,speed,m.s,6/, ',speed,m/s,5'),
    );
    expect(found).toEqual([expect.stringContaining('velocities.csv')]);
  });

  it.each([
    ['changed', (lines: string[]) => lines.map((line) => line.replace('Noor Ekdal', 'Ira Vost'))],
    ['removed', (lines: string[]) => lines.filter((_, i) => i !== 1)],
    ['cut off', (lines: string[]) => lines.slice(0, -1)],
    ['put in', (lines: string[]) => [...lines, lines[0]]],
    ['moved', (lines: string[]) => [lines[1], lines[0], ...lines.slice(2)]],
  ])('is found out when an event of the ledger was %s', async (name, change) => {
    const found = await forge(name, 'data/custody/ledger.jsonl', (text) =>
      change(text.trimEnd().split('\n'))
        .map((line) => `${line}\n`)
        .join(''),
    );
    expect(found.join('\n')).toMatch(/custody|release/);
  });

  it('is found out when an event is passed off as withheld', async () => {
    const found = await forge('passed-off', 'data/custody/ledger.jsonl', (text) => {
      const lines = text.trimEnd().split('\n');
      const { hash } = source.ledger[1];
      lines[1] = `{"exhibit":"2026-014/1","format":"centrode.custody-event-withheld/1","hash":"${hash}","sequence":2}`;
      return `${lines.join('\n')}\n`;
    });
    expect(found.join('\n')).toContain('does not say why 2026-014/1 was withheld');
  });

  it('is found out when the release is another', async () => {
    const found = await forge('release', 'data/release.json', (text) =>
      text.replace('The grip of the road.', 'Nothing of weight.'),
    );
    expect(found.join('\n')).toContain("is not what the ledger's last event released");
  });
});
