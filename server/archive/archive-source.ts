import type { Readable } from 'node:stream';
import type { PublicKeys } from '../ledger/head';
import type { ReleaseSnapshot } from './snapshot';

/** One recorded computation: the exact canonical text whose SHA-256 is its address. */
export interface ArchiveComputation {
  readonly hash: string;
  readonly text: string;
}

/**
 * One event of the ledger: its exact canonical text, or, for an exhibit that is withheld, only its
 * place and hash, so that the chain still closes and the event can be checked if it is ever shown.
 */
export type ArchiveLedgerLine =
  | { readonly hash: string; readonly text: string }
  | { readonly hash: string; readonly sequence: number; readonly withheldExhibit: string };

/** Everything that a released archive is made of. Nothing else is read while it is built. */
export interface ArchiveSource {
  /** What was released, frozen; `snapshotText` is its canonical text, named by the ledger. */
  readonly snapshot: ReleaseSnapshot;
  readonly snapshotText: string;
  /** Opens a stored file by its SHA-256, from the beginning; once per file and building. */
  openFile(sha256: string): Readable;
  readonly ledger: readonly ArchiveLedgerLine[];
  /** Canonical texts of the signed heads, oldest first; the last one closes the release. */
  readonly heads: readonly string[];
  /** Raw public keys by key id: at least those that the heads name. */
  readonly publicKeys: PublicKeys;
  readonly computations: readonly ArchiveComputation[];
  /** JSON Schemas of the documents, by file name. */
  readonly schemas: Readonly<Record<string, string>>;
  /** The two programs of one file each. */
  readonly tools: { readonly verify: string; readonly recompute: string };
}
