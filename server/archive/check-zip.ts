import { createHash } from 'node:crypto';
import type { Readable } from 'node:stream';
import { openPromise } from 'yauzl';
import type { BagEntry } from './entry';
import { ArchiveMismatch } from './write-zip';

/**
 * Reads a finished ZIP back from the disk, with another library than the one that wrote it: the
 * same entries in the same order, no more and no fewer, each with the size and SHA-512 of its record.
 *
 * @throws ArchiveMismatch at the first entry that differs
 */
export async function checkZip(
  file: string,
  folder: string,
  expected: readonly BagEntry[],
  signal?: AbortSignal,
): Promise<void> {
  const zip = await openPromise(file, { lazyEntries: true, autoClose: false });
  try {
    let place = 0;
    for await (const found of zip.eachEntry()) {
      const entry = expected[place++];
      if (entry === undefined || found.fileName !== `${folder}/${entry.path}`) {
        throw new ArchiveMismatch(found.fileName, 'stands in the archive where it should not');
      }
      if (found.uncompressedSize !== entry.size) {
        throw new ArchiveMismatch(entry.path, `has ${found.uncompressedSize} bytes in the archive`);
      }
      if ((await sha512(await zip.openReadStreamPromise(found), signal)) !== entry.sha512) {
        throw new ArchiveMismatch(
          entry.path,
          'was not written as its record says (SHA-512 differs)',
        );
      }
    }
    if (place !== expected.length) {
      throw new ArchiveMismatch(expected[place].path, 'is missing from the archive');
    }
  } finally {
    zip.close();
  }
}

async function sha512(stream: Readable, signal?: AbortSignal): Promise<string> {
  const hash = createHash('sha512');
  for await (const chunk of stream) {
    signal?.throwIfAborted();
    hash.update(chunk as Buffer);
  }
  return hash.digest('hex');
}
