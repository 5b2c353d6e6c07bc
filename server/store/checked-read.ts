import { createHash } from 'node:crypto';
import { Transform, pipeline, type Readable } from 'node:stream';

/** What stands at an address is not the content of that address any more. */
export class ContentChanged extends Error {
  constructor(readonly sha256: string) {
    super(`The stored content ${sha256} is not what it was when it was taken in.`);
  }
}

/** Passes bytes on and holds the last piece back until the SHA-256 of all of them is right. */
export function checkedRead(source: Readable, sha256: string): Readable {
  const hash = createHash('sha256');
  let held: Buffer | null = null;
  const check = new Transform({
    transform(piece: Buffer, _encoding, done) {
      hash.update(piece);
      const before = held;
      held = piece;
      done(null, before ?? undefined);
    },
    flush(done) {
      if (hash.digest('hex') === sha256) done(null, held ?? undefined);
      else done(new ContentChanged(sha256));
    },
  });
  // The error reaches the reader through `check`; there is nothing else to do at the end.
  pipeline(source, check, () => undefined);
  return check;
}
