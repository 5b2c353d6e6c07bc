import { createHash } from 'node:crypto';
import { Readable } from 'node:stream';

/** One file of the bag: where it goes, and what its bytes must be. */
export interface BagEntry {
  readonly path: string;
  readonly size: number;
  readonly sha256: string;
  readonly sha512: string;
  open(): Readable;
}

/** A file that is made here, from text or bytes held in memory. */
export function madeEntry(path: string, content: string | Buffer): BagEntry {
  const bytes = typeof content === 'string' ? Buffer.from(content, 'utf8') : content;
  return {
    path,
    size: bytes.length,
    sha256: createHash('sha256').update(bytes).digest('hex'),
    sha512: createHash('sha512').update(bytes).digest('hex'),
    open: () => Readable.from(bytes.length > 0 ? [bytes] : []),
  };
}
