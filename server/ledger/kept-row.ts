import { isCanonical, sha256Hex } from './canonical';

/** A row of the ledger as it is kept, in a database, a file or an archive. */
export interface LedgerRow {
  /** Where the row stands: its number in the table, its line in a file. */
  readonly place: number;
  /** The exact text that was hashed; null where the text is withheld and only the hash is shown. */
  readonly text: string | null;
  readonly hash: string;
  /** Columns that repeat fields of the event for queries. */
  readonly columns?: Readonly<Record<string, string | number | null>>;
}

/** A file as an event of the ledger names it. */
export interface NamedFile {
  readonly name: string;
  readonly size: number;
  readonly sha256: string;
  readonly sha512: string;
}

/** What the verifier needs to know of an event; the rest is covered by the hash. */
export interface ReadEvent extends Readonly<Record<string, unknown>> {
  readonly sequence: number;
  readonly previous: string;
  readonly files: readonly NamedFile[];
}

export interface ReadRow {
  readonly row: LedgerRow;
  /** Computed from the text, or the stated one of a withheld row. */
  readonly hash: string;
  readonly event: ReadEvent | null;
  /** The sequence that the row claims for itself. */
  readonly claims: number;
}

/** Reads a row without trusting it: `event` is null where the text is not an event of this case. */
export function readRow(row: LedgerRow, caseNumber: string): ReadRow {
  if (row.text === null) return { row, hash: row.hash, event: null, claims: row.place };
  const event = readEvent(row.text, caseNumber);
  return { row, hash: sha256Hex(row.text), event, claims: event?.sequence ?? row.place };
}

/**
 * True if the text is no event of the case, or not in canonical form. Only asked where nothing vouches
 * for the text: what a hash vouches for is what was written, and it was written in canonical form.
 */
export const isMalformed = ({ row, event }: ReadRow): boolean =>
  row.text !== null && (event === null || !isCanonical(row.text));

function readEvent(text: string, caseNumber: string): ReadEvent | null {
  try {
    const value: unknown = JSON.parse(text);
    return isEvent(value, caseNumber) ? value : null;
  } catch {
    return null;
  }
}

function isEvent(value: unknown, caseNumber: string): value is ReadEvent {
  if (typeof value !== 'object' || value === null) return false;
  const {
    format,
    caseNumber: number,
    sequence,
    previous,
    files,
  } = value as Partial<Record<string, unknown>>;
  return (
    format === 'centrode.custody-event/1' &&
    number === caseNumber &&
    typeof sequence === 'number' &&
    Number.isSafeInteger(sequence) &&
    sequence >= 1 &&
    typeof previous === 'string' &&
    /^[0-9a-f]{64}$/.test(previous) &&
    Array.isArray(files) &&
    files.every(isNamedFile)
  );
}

function isNamedFile(value: unknown): value is NamedFile {
  if (typeof value !== 'object' || value === null) return false;
  const { name, size, sha256, sha512 } = value as Partial<Record<string, unknown>>;
  return (
    [name, sha256, sha512].every((part) => typeof part === 'string') && typeof size === 'number'
  );
}
