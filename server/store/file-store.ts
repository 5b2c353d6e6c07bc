import { createReadStream, mkdirSync } from 'node:fs';
import { chmod, link, mkdir, open, rename, rm, stat } from 'node:fs/promises';
import { join } from 'node:path';
import { pipeline } from 'node:stream/promises';
import type { Readable } from 'node:stream';
import { HashMeter, type FileDigest } from './digest';
import { receive, type Received } from './receive';
import { ContentChanged, checkedRead } from './checked-read';

/**
 * Files by the SHA-256 of their content, created once and never written again.
 *
 *   incoming/<id>              arriving, or taken in but not yet recorded
 *   incoming/<id>.<sha256>     published and waiting for its record
 *   objects/ab/abcdef...       the content, read-only
 *
 * A file is visible to people only through a row of the database. The order is: receive, publish,
 * write the row, settle. While its row is not yet written, the second name under `incoming` says so;
 * after a crash the sweep at the start asks the database and keeps or removes (sweep.ts).
 */
export class FileStore {
  readonly incomingDir: string;
  private readonly objectsDir: string;

  constructor(readonly root: string) {
    this.incomingDir = join(root, 'incoming');
    this.objectsDir = join(root, 'objects');
    mkdirSync(this.incomingDir, { recursive: true, mode: 0o700 });
    mkdirSync(this.objectsDir, { recursive: true, mode: 0o700 });
  }

  /** Writes a stream to a temporary file on this disk, hashing it as it comes. */
  receive(source: AsyncIterable<Buffer>, mostBytes: number): Promise<Received> {
    return receive(source, this.incomingDir, mostBytes);
  }

  /**
   * Gives a received file its address. Where the content is there already it is hashed again first,
   * so that nobody relies on a copy that was changed.
   */
  async publish(file: Received): Promise<Published> {
    const pendingPath = `${file.path}.${file.sha256}`;
    await rename(file.path, pendingPath);
    await syncFolder(this.incomingDir);
    const existed = !(await this.linkObject(pendingPath, file.sha256));
    if (existed) {
      const found = await this.measure(file.sha256);
      if (found?.sha256 !== file.sha256 || found.size !== file.size) {
        await rm(pendingPath);
        throw new ContentChanged(file.sha256);
      }
    }
    return { ...file, pendingPath };
  }

  /** After the row is written: the content stays. */
  async settle(file: Published): Promise<void> {
    // A sweep elsewhere may have found the object without its row a moment ago: make sure of it.
    await this.linkObject(file.pendingPath, file.sha256);
    await rm(file.pendingPath);
  }

  /** Forgets a received file that was not published. */
  async discard(file: Received): Promise<void> {
    await rm(file.path, { force: true });
  }

  pathOf(sha256: string): string {
    if (!/^[0-9a-f]{64}$/.test(sha256)) throw new Error('An address in the store is a SHA-256.');
    return join(this.objectsDir, sha256.slice(0, 2), sha256);
  }

  /** Size on disk; null where nothing has this address. */
  async sizeOf(sha256: string): Promise<number | null> {
    try {
      return (await stat(this.pathOf(sha256))).size;
    } catch (error) {
      if (isMissing(error)) return null;
      throw error;
    }
  }

  /**
   * Opens the content for reading. A complete reading is hashed as it goes, and its last piece is
   * given out only when the hash is right: what leaves is what was taken in. A range is not checked.
   */
  read(sha256: string, range?: { start: number; end: number }): Readable {
    const stream = createReadStream(this.pathOf(sha256), { ...range, highWaterMark: 1024 * 1024 });
    return range ? stream : checkedRead(stream, sha256);
  }

  /** Hashes the content again; null where it is gone. */
  async measure(sha256: string): Promise<FileDigest | null> {
    const meter = new HashMeter();
    try {
      const source = createReadStream(this.pathOf(sha256), { highWaterMark: 1024 * 1024 });
      await pipeline(source, async (pieces: AsyncIterable<Buffer>) => {
        for await (const piece of pieces) meter.add(piece);
      });
    } catch (error) {
      if (isMissing(error)) return null;
      throw error;
    }
    return meter.digest();
  }

  /** False if the object was there. */
  private async linkObject(from: string, sha256: string): Promise<boolean> {
    const target = this.pathOf(sha256);
    const folder = join(target, '..');
    const made = await mkdir(folder, { recursive: true, mode: 0o700 });
    if (made !== undefined) await syncFolder(this.objectsDir);
    await chmod(from, 0o444);
    try {
      await link(from, target);
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code === 'EEXIST') return false;
      throw error;
    }
    await syncFolder(folder);
    return true;
  }
}

/** A file at its address whose row is not written yet. */
export interface Published extends Received {
  readonly pendingPath: string;
}

export const isMissing = (error: unknown): boolean =>
  (error as NodeJS.ErrnoException).code === 'ENOENT';

/** A new name in a folder is on the disk only when the folder is. */
async function syncFolder(folder: string): Promise<void> {
  const handle = await open(folder, 'r');
  try {
    await handle.sync();
  } finally {
    await handle.close();
  }
}
