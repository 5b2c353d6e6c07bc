import { createHash } from 'node:crypto';

/** What a file is, whatever it is called. */
export interface FileDigest {
  readonly size: number;
  readonly sha256: string;
  readonly sha512: string;
}

/** SHA-256 and SHA-512 of bytes as they pass. */
export class HashMeter {
  private readonly sha256 = createHash('sha256');
  private readonly sha512 = createHash('sha512');
  private size = 0;

  add(piece: Uint8Array): void {
    this.sha256.update(piece);
    this.sha512.update(piece);
    this.size += piece.byteLength;
  }

  digest(): FileDigest {
    return {
      size: this.size,
      sha256: this.sha256.digest('hex'),
      sha512: this.sha512.digest('hex'),
    };
  }
}
