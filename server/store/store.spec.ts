import { execFileSync, spawn } from 'node:child_process';
import { once } from 'node:events';
import {
  chmodSync,
  existsSync,
  mkdtempSync,
  readFileSync,
  readdirSync,
  rmSync,
  statSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { buffer } from 'node:stream/consumers';
import { setTimeout } from 'node:timers/promises';
import { afterAll, beforeEach, describe, expect, it } from '@jest/globals';
import fips180 from '../../test/reference/vectors/sha2_fips180.json' with { type: 'json' };
import { seeded } from '../ledger/testing';
import { ContentChanged } from './checked-read';
import { FileStore } from './file-store';
import { TooManyBytes } from './receive';
import { sweep } from './sweep';

const folders: string[] = [];
let root: string;
let store: FileStore;
beforeEach(() => {
  root = mkdtempSync(join(tmpdir(), 'store-'));
  folders.push(root);
  store = new FileStore(root);
});
afterAll(() => {
  for (const folder of folders) rmSync(folder, { recursive: true, force: true });
});

async function* pieces(...content: (Buffer | string)[]): AsyncGenerator<Buffer> {
  for (const piece of content) yield await Promise.resolve(Buffer.from(piece));
}

const take = async (...content: (Buffer | string)[]) => {
  const published = await store.publish(await store.receive(pieces(...content), 1e9));
  await store.settle(published);
  return published;
};

const incoming = (): string[] => readdirSync(store.incomingDir);
const objects = (): string[] =>
  readdirSync(join(root, 'objects'), { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile())
    .map(({ name }) => name)
    .sort();

describe('the store', () => {
  it.each(fips180.tests)('hashes "$name" as FIPS 180-4 says', async (vector) => {
    const [part, times] = vector.message_repeat ?? [vector.message_utf8 ?? '', 1];
    const received = await store.receive(pieces(String(part).repeat(Number(times))), 1e9);
    expect(received).toMatchObject({ sha256: vector.sha256, sha512: vector.sha512 });
  });

  it('keeps content read-only under its hash, as sha256sum computes it', async () => {
    const content = Buffer.alloc(2_500_001, 'tread ');
    const { sha256, size } = await take(content.subarray(0, 7), content.subarray(7));
    const path = store.pathOf(sha256);
    expect(execFileSync('sha256sum', [path]).toString().split(' ')[0]).toBe(sha256);
    expect(execFileSync('sha512sum', [path]).toString().split(' ')[0]).toBe(
      (await store.measure(sha256))?.sha512,
    );
    expect(statSync(path).mode & 0o777).toBe(0o444);
    expect([size, await store.sizeOf(sha256)]).toEqual([2_500_001, 2_500_001]);
    expect(Buffer.compare(await buffer(store.read(sha256)), content)).toBe(0);
    const part = await buffer(store.read(sha256, { start: 5, end: 14 }));
    expect(part.toString()).toBe(content.subarray(5, 15).toString());
    expect(incoming()).toEqual([]);
  });

  it('leaves nothing behind when more comes than is taken, or the sender goes away', async () => {
    await expect(store.receive(pieces('12345', '67890'), 9)).rejects.toThrow(TooManyBytes);
    async function* broken(): AsyncGenerator<Buffer> {
      yield await Promise.resolve(Buffer.alloc(3_000_000));
      throw new Error('gone');
    }
    await expect(store.receive(broken(), 1e9)).rejects.toThrow('gone');
    expect([incoming(), objects()]).toEqual([[], []]);
    await expect(store.receive(pieces('123456789'), 9)).resolves.toMatchObject({ size: 9 });
  });

  it('stores the same content once, also when it arrives five times at once', async () => {
    await Promise.all(Array.from({ length: 5 }, () => take('the same')));
    expect([incoming(), objects()]).toEqual([[], [(await take('the same')).sha256]]);
  });

  it('does not give out the end of content that was changed', async () => {
    const content = Buffer.alloc(3_000_000, 'a');
    const { sha256 } = await take(content);
    chmodSync(store.pathOf(sha256), 0o600);
    content[1_500_000] = 98;
    writeFileSync(store.pathOf(sha256), content);
    let bytes = 0;
    const reading = async (): Promise<void> => {
      for await (const piece of store.read(sha256)) bytes += (piece as Buffer).length;
    };
    await expect(reading()).rejects.toThrow(ContentChanged);
    expect(bytes).toBeLessThan(content.length);
    await expect(take(Buffer.alloc(3_000_000, 'a'))).rejects.toThrow(ContentChanged);
    expect(incoming()).toEqual([]);
  });

  it('takes no path for an address', () => {
    expect(() => store.pathOf('../../etc/passwd')).toThrow();
  });
});

describe('the sweep', () => {
  /** As if an earlier run of a process had written the name. */
  const ofEarlierRun = (name: string): string => name.replace(/^(\w+-\d+)-\w+/, '$1-00000000');
  const abandon = (path: string): void => {
    const name = path.split('/').at(-1) ?? '';
    execFileSync('mv', [path, join(store.incomingDir, ofEarlierRun(name))]);
  };

  it('does not touch what this run is taking in', async () => {
    await store.receive(pieces('arriving'), 1e9);
    await store.publish(await store.receive(pieces('published'), 1e9));
    const swept = await sweep(store, () => Promise.resolve(false));
    expect(swept).toEqual({ unfinished: 0, unrecorded: 0, kept: 0 });
    expect([incoming().length, objects().length]).toEqual([2, 1]);
  });

  it('removes what was not recorded and keeps what was', async () => {
    const kept = await store.publish(await store.receive(pieces('recorded'), 1e9));
    const lost = await store.publish(await store.receive(pieces('not recorded'), 1e9));
    const unfinished = await store.receive(pieces('half'), 1e9);
    for (const path of [kept.pendingPath, lost.pendingPath, unfinished.path]) abandon(path);
    const swept = await sweep(store, (sha256) => Promise.resolve(sha256 === kept.sha256));
    expect(swept).toEqual({ unfinished: 1, unrecorded: 1, kept: 1 });
    expect([incoming(), objects()]).toEqual([[], [kept.sha256]]);
  });

  it('keeps unrecorded content that another intake relies on', async () => {
    const earlier = await store.publish(await store.receive(pieces('shared'), 1e9));
    abandon(earlier.pendingPath);
    const now = await store.publish(await store.receive(pieces('shared'), 1e9));
    await sweep(store, () => Promise.resolve(false));
    await store.settle(now);
    expect([incoming(), objects()]).toEqual([[], [now.sha256]]);
  });
});

describe('a process killed while it takes files in', () => {
  const child = join(import.meta.dirname, 'testing/intake-child.ts');

  it('leaves whole recorded files and nothing else (8 seeded kills)', async () => {
    const random = seeded(44);
    const journal = join(root, 'journal');
    let recordedInAll = 0;
    for (let i = 0; i < 8; i++) {
      const running = spawn(process.execPath, ['--import', 'tsx', child, root, journal], {
        stdio: ['ignore', 'pipe', 'inherit'],
      });
      await once(running.stdout, 'data');
      await setTimeout(Math.floor(10 + random() * 150));
      running.kill('SIGKILL');
      await once(running, 'exit');
      const lines = existsSync(journal) ? readFileSync(journal, 'utf8').split('\n') : [];
      const recorded = new Set(lines.filter((line) => line.length === 64));
      await sweep(store, (sha256) => Promise.resolve(recorded.has(sha256)));
      expect(incoming()).toEqual([]);
      expect(objects()).toEqual([...recorded].sort());
      for (const sha256 of recorded) {
        expect(await store.measure(sha256)).toMatchObject({ sha256, size: 2_400_000 });
      }
      recordedInAll = recorded.size;
    }
    expect(recordedInAll).toBeGreaterThan(0);
  });
});
