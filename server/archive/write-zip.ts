import { createHash } from 'node:crypto';
import { createWriteStream } from 'node:fs';
import { Transform } from 'node:stream';
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

/** Passes the bytes on and fails at the end unless they are those of the record. */
class Checked extends Transform {
  private size = 0;
  private readonly hash = createHash('sha256');

  constructor(private readonly entry: BagEntry) {
    super({ highWaterMark: 1 << 20 });
  }

  override _transform(chunk: Buffer, _: string, done: (error: null, chunk: Buffer) => void): void {
    this.size += chunk.length;
    this.hash.update(chunk);
    done(null, chunk);
  }

  override _flush(done: (error: Error | null) => void): void {
    const { path, size, sha256 } = this.entry;
    if (this.size !== size) {
      done(new ArchiveMismatch(path, `has ${this.size} bytes, its record says ${size}`));
    } else if (this.hash.digest('hex') !== sha256) {
      done(new ArchiveMismatch(path, 'is not the file that its record says (SHA-256 differs)'));
    } else done(null);
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
  const checked = new Checked(entry);
  const added = new Promise<void>((resolve) => zip.once('entry', () => resolve()));
  zip.append(checked, { name: `${options.folder}/${entry.path}`, date: options.date, mode: 0o644 });
  await pipeline(entry.open(), checked, { signal: options.signal });
  await added;
}
