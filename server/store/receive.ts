import { open, rm } from 'node:fs/promises';
import { join } from 'node:path';
import { HashMeter, type FileDigest } from './digest';
import { incomingName } from './owner-mark';

/** A file that arrived whole, under a temporary name. */
export interface Received extends FileDigest {
  readonly path: string;
}

/** More arrived than is taken. */
export class TooManyBytes extends Error {
  constructor(readonly most: number) {
    super(`More than ${most} bytes`);
  }
}

const pieceSize = 1024 * 1024;

/**
 * Writes what arrives to a new file in `folder`, in pieces of 1 MiB, each hashed while it is being
 * written, and sees it on the disk before it answers. Whatever goes wrong, nothing is left behind.
 */
export async function receive(
  source: AsyncIterable<Buffer>,
  folder: string,
  mostBytes: number,
): Promise<Received> {
  const path = join(folder, incomingName());
  const file = await open(path, 'wx', 0o600);
  const meter = new HashMeter();
  const piece = Buffer.allocUnsafe(pieceSize);
  let filled = 0;
  let total = 0;
  const flush = async (): Promise<void> => {
    const bytes = piece.subarray(0, filled);
    const written = writeAll(file, bytes);
    meter.add(bytes);
    await written;
    filled = 0;
  };
  try {
    for await (const chunk of source) {
      total += chunk.length;
      if (total > mostBytes) throw new TooManyBytes(mostBytes);
      for (let from = 0; from < chunk.length;) {
        const taken = chunk.copy(piece, filled, from);
        from += taken;
        filled += taken;
        if (filled === pieceSize) await flush();
      }
    }
    if (filled > 0) await flush();
    await file.sync();
    await file.close();
    return { path, ...meter.digest() };
  } catch (error) {
    await file.close().catch(() => undefined);
    await rm(path, { force: true });
    throw error;
  }
}

async function writeAll(file: Awaited<ReturnType<typeof open>>, bytes: Buffer): Promise<void> {
  for (let from = 0; from < bytes.length;) {
    from += (await file.write(bytes, from)).bytesWritten;
  }
}
