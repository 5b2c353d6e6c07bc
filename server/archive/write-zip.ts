import { createHash } from 'node:crypto';
import { createWriteStream } from 'node:fs';
import { PassThrough } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { ZipArchive } from 'archiver';
import type { BagEntry } from './entry';

/** The bytes of a file are not those that its record says: the archive is not made. */
export class ArchiveMismatch extends Error {
  constructor(
    readonly path: string,
    message: string,
  ) {
    super(`${path}: ${message}`);
    this.name = 'ArchiveMismatch';
  }
}

/** Up to this size a file is read whole: thousands of small ones then cost a fraction. */
const smallFile = 1 << 20;

/** Compares bytes as they come with what their record says. */
class Check {
  private size = 0;
  private readonly hash = createHash('sha256');

  constructor(private readonly entry: BagEntry) {}

  add(piece: Buffer): void {
    this.size += piece.length;
    this.hash.update(piece);
  }

  /** @throws ArchiveMismatch */
  end(): void {
    const { path, size, sha256 } = this.entry;
    if (this.size !== size) {
      throw new ArchiveMismatch(path, `has ${this.size} bytes, its record says ${size}`);
    }
    if (this.hash.digest('hex') !== sha256) {
      throw new ArchiveMismatch(path, 'is not the file that its record says (SHA-256 differs)');
    }
  }
}

export interface ZipOptions {
  /** The one folder at the top of the ZIP. */
  readonly folder: string;
  /** Time of every entry. */
  readonly date: Date;
  readonly signal?: AbortSignal;
  /** Called after each entry with the bytes written so far of all entries. */
  readonly progress?: (bytes: number) => void;
}

/**
 * Writes the entries, in their order, uncompressed (so that the bytes depend on no compressor's
 * version), one at a time, to a new file. Memory stays flat whatever the size; ZIP64 comes by
 * itself where it is needed. Any warning is an error.
 *
 * @throws ArchiveMismatch when a file is not what its record says; the half-made file is the
 *   caller's to remove
 */
export async function writeZip(
  entries: readonly BagEntry[],
  target: string,
  options: ZipOptions,
): Promise<{ size: number; sha256: string }> {
  const zip = new ZipArchive({ store: true, highWaterMark: 1 << 20 });
  const output = createWriteStream(target, { flags: 'wx', flush: true, highWaterMark: 1 << 20 });
  const failed = new Promise<never>((_, reject) => {
    zip.on('error', reject);
    zip.on('warning', reject);
    options.signal?.addEventListener('abort', () => reject(options.signal?.reason as Error), {
      once: true,
    });
  });
  const whole = createHash('sha256');
  let size = 0;
  zip.on('data', (chunk: Buffer) => {
    whole.update(chunk);
    size += chunk.length;
  });
  const written = pipeline(zip, output);
  const append = async () => {
    options.signal?.throwIfAborted();
    let bytes = 0;
    for (const entry of entries) {
      await appendEntry(zip, entry, options);
      bytes += entry.size;
      options.progress?.(bytes);
    }
    await zip.finalize();
  };
  try {
    await Promise.race([Promise.all([append(), written]), failed]);
    return { size, sha256: whole.digest('hex') };
  } catch (error) {
    zip.abort();
    zip.destroy();
    output.destroy();
    await written.catch(() => undefined);
    throw error;
  }
}

async function appendEntry(zip: ZipArchive, entry: BagEntry, options: ZipOptions): Promise<void> {
  const data = { name: `${options.folder}/${entry.path}`, date: options.date, mode: 0o644 };
  const added = new Promise<void>((resolve) => zip.once('entry', () => resolve()));
  const check = new Check(entry);
  if (entry.size <= smallFile) {
    const pieces: Buffer[] = [];
    for await (const piece of entry.open()) {
      check.add(piece as Buffer);
      pieces.push(piece as Buffer);
    }
    check.end();
    zip.append(Buffer.concat(pieces), data);
  } else {
    const passing = new PassThrough({ highWaterMark: 1 << 20 });
    zip.append(passing, data);
    await pipeline(
      entry.open(),
      async function* (source: AsyncIterable<Buffer>) {
        for await (const piece of source) {
          check.add(piece);
          yield piece;
        }
        check.end();
      },
      passing,
      { signal: options.signal },
    );
  }
  await added;
}
