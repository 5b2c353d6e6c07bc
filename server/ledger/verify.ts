import type { LedgerFinding, LedgerHead } from '#shared/contracts/custody';
import { firstPrevious } from './chain';
import { isSignedHead, type PublicKeys } from './head';
import { isMalformed, readRow, type LedgerRow, type ReadRow } from './kept-row';

export type { LedgerRow, NamedFile } from './kept-row';

/** A file as it was found now, by hashing it again. */
export interface FoundFile {
  readonly size: number;
  readonly sha256: string;
  readonly sha512: string;
}

/** Everything that the verifier looks at; plain data, so that an archive can be checked alike. */
export interface LedgerEvidence {
  readonly caseNumber: string;
  /** In the order in which they are kept. */
  readonly rows: readonly LedgerRow[];
  readonly heads: readonly LedgerHead[];
  readonly publicKeys: PublicKeys;
  /** A head is signed at least every so many events; 1 where not told. */
  readonly headEvery?: number;
  /** What each file named in the ledger is now, by its recorded SHA-256; null: it is gone. */
  readonly files?: ReadonlyMap<string, FoundFile | null>;
}

/** What stands at one sequence: the row, and whether something later vouches for it. */
interface Standing {
  readonly read: ReadRow;
  readonly vouched: boolean;
}

/**
 * Finds every event that was changed, removed, reordered or inserted since it was written, also by
 * somebody who can write to the database and computes hashes anew.
 *
 * A valid signed head vouches for the event it names; an event that is vouched for vouches, by
 * `previous`, for the one before it. So the walk goes from the last event to the first: at each
 * sequence the text is known by its hash wherever it now stands, and what stands there instead is a
 * change. Rows that nothing asks for were inserted. Where heads are rarer than events, a tail that
 * was hashed anew is found by the head above it; which event of that tail was the first to change
 * cannot be told, and the finding says so.
 */
export function verifyLedger(evidence: LedgerEvidence): LedgerFinding[] {
  const findings: LedgerFinding[] = [];
  const anchors = readAnchors(evidence, findings);
  const rows = evidence.rows.map((row) => readRow(row, evidence.caseNumber));
  const standing = walkBack(rows, anchors, findings);
  findings.push(
    ...insertedRows(rows, standing),
    ...unsignedTail(standing, anchors, evidence.headEvery ?? 1),
    ...reorderedRows(rows, standing),
    ...differingColumns(standing),
    ...differingFiles(standing, evidence.files),
  );
  const unique = new Map(findings.map((finding) => [JSON.stringify(finding), finding]));
  return [...unique.values()].sort((a, b) => (a.sequence ?? 0) - (b.sequence ?? 0));
}

/** Hash by sequence, from the heads whose signature holds. */
function readAnchors(evidence: LedgerEvidence, findings: LedgerFinding[]): Map<number, string> {
  const anchors = new Map<number, string>();
  for (const head of evidence.heads) {
    const { sequence, hash } = head;
    if (head.caseNumber !== evidence.caseNumber || !isSignedHead(head, evidence.publicKeys)) {
      findings.push({
        code: 'bad-signature',
        sequence,
        message: `The signed head of event ${sequence} was altered or was not signed by this laboratory's key.`,
      });
    } else if (anchors.has(sequence) && anchors.get(sequence) !== hash) {
      findings.push({
        code: 'head-mismatch',
        sequence,
        message: `Two signed heads name different events ${sequence}: the ledger was once set back and continued.`,
      });
    } else {
      anchors.set(sequence, hash);
    }
  }
  return anchors;
}

function walkBack(
  rows: readonly ReadRow[],
  anchors: ReadonlyMap<number, string>,
  findings: LedgerFinding[],
): Map<number, Standing> {
  const highestHead = highest(anchors.keys());
  // A claim far beyond what can be here is a forgery, not a gap of a million events.
  const reach = highestHead + 2 * rows.length + 1000;
  const last = rows.reduce(
    (most, { claims }) => (claims <= reach ? Math.max(most, claims) : most),
    highestHead,
  );
  const pool = new RowPool(rows, anchors);
  const standing = new Map<number, Standing>();
  for (let k = last; k >= 1; k--) {
    const above = standing.get(k + 1);
    const link = above?.read.event?.previous;
    const anchor = anchors.get(k);
    const expected = anchor ?? (above?.vouched ? link : undefined);
    if (anchor !== undefined && above?.vouched && link !== undefined && link !== anchor) {
      findings.push(fork(k));
    }
    const exact = pool.takeByHash(expected ?? link, k);
    if (exact) {
      const vouched = expected !== undefined;
      standing.set(k, { read: exact, vouched });
      if (exact.row.hash !== exact.hash) findings.push(storedHashChanged(k));
      if (vouched ? exact.event === null && exact.row.text !== null : isMalformed(exact)) {
        findings.push(malformed(k));
      }
      continue;
    }
    const instead = pool.takeInstead(k);
    if (!instead) {
      findings.push(missing(k, anchors));
      continue;
    }
    standing.set(k, { read: instead, vouched: false });
    if (isMalformed(instead)) findings.push(malformed(k));
    else if (expected !== undefined || instead.hash !== instead.row.hash) findings.push(changed(k));
    else if (link !== undefined) findings.push(unconfirmed(k));
  }
  const first = standing.get(1)?.read.event;
  if (first && first.previous !== firstPrevious) findings.push(changed(1));
  const failing = [...anchors.keys()].filter((k) => standing.get(k)?.read.hash !== anchors.get(k));
  if (failing.length > 0) findings.push(headMismatch(highest(failing), anchors));
  return standing;
}

/** Rows that have not found their place yet, by hash and by what they claim. */
class RowPool {
  private readonly byHash = new Map<string, ReadRow[]>();
  private readonly byClaim = new Map<number, ReadRow[]>();
  private readonly taken = new Set<ReadRow>();
  private readonly vouchedHashes: ReadonlySet<string>;

  constructor(rows: readonly ReadRow[], anchors: ReadonlyMap<number, string>) {
    this.vouchedHashes = new Set([
      ...anchors.values(),
      ...rows.flatMap(({ event }) => (event ? [event.previous] : [])),
    ]);
    for (const row of rows) {
      put(this.byHash, row.hash, row);
      put(this.byClaim, row.claims, row);
      if (row.claims !== row.row.place) put(this.byClaim, row.row.place, row);
    }
  }

  /** The row with this hash; of several copies the one that stands where it belongs. */
  takeByHash(hash: string | undefined, k: number): ReadRow | undefined {
    if (hash === undefined) return undefined;
    const free = (this.byHash.get(hash) ?? []).filter((row) => !this.taken.has(row));
    return this.take(free.find((row) => row.row.place === k) ?? free[0]);
  }

  /** A row that claims the place, or stands at it without belonging elsewhere. */
  takeInstead(k: number): ReadRow | undefined {
    const free = (this.byClaim.get(k) ?? []).filter((row) => !this.taken.has(row));
    return this.take(
      free.find((row) => row.claims === k) ?? free.find((row) => !this.vouchedHashes.has(row.hash)),
    );
  }

  private take(row: ReadRow | undefined): ReadRow | undefined {
    if (row) this.taken.add(row);
    return row;
  }
}

function put<K>(map: Map<K, ReadRow[]>, key: K, row: ReadRow): void {
  const list = map.get(key);
  if (list) list.push(row);
  else map.set(key, [row]);
}

function insertedRows(
  rows: readonly ReadRow[],
  standing: ReadonlyMap<number, Standing>,
): LedgerFinding[] {
  const placed = new Set([...standing.values()].map(({ read }) => read));
  return rows
    .filter((row) => !placed.has(row))
    .map(({ row }) => ({
      code: 'inserted',
      sequence: row.place,
      message: `The row at place ${row.place} does not belong to the ledger: no event or signed head vouches for it.`,
    }));
}

/** Among the rows that belong, each must come as many-th as its sequence says. */
function reorderedRows(
  rows: readonly ReadRow[],
  standing: ReadonlyMap<number, Standing>,
): LedgerFinding[] {
  const sequenceOf = new Map([...standing].map(([k, { read }]) => [read, k]));
  const kept = rows.flatMap((row) => sequenceOf.get(row) ?? []);
  const right = [...kept].sort((a, b) => a - b);
  return kept
    .filter((k, rank) => right[rank] !== k)
    .map((k) => ({
      code: 'reordered',
      sequence: k,
      message: `Event ${k} stands out of its order.`,
    }));
}

function differingColumns(standing: ReadonlyMap<number, Standing>): LedgerFinding[] {
  return [...standing].flatMap(([k, { read }]) => {
    const { event, row, hash } = read;
    // A text that does not even fit its own hash is named as changed already.
    if (!event || !row.columns || row.hash !== hash) return [];
    const differing = Object.entries({ sequence: row.place, ...row.columns })
      .filter(([name, value]) => event[name] !== value)
      .map(([name]) => name);
    if (differing.length === 0) return [];
    const message = `The columns of event ${k} no longer say what its recorded text says: ${differing.join(', ')}.`;
    return [{ code: 'columns-differ' as const, sequence: k, message }];
  });
}

function differingFiles(
  standing: ReadonlyMap<number, Standing>,
  files: LedgerEvidence['files'],
): LedgerFinding[] {
  if (!files) return [];
  return [...standing].flatMap(([k, { read }]) =>
    (read.event?.files ?? []).flatMap((named): LedgerFinding[] => {
      const found = files.get(named.sha256);
      const what = `The file "${named.name}" of event ${k}`;
      if (!found) {
        return [{ code: 'file-missing', sequence: k, message: `${what} is no longer there.` }];
      }
      const same =
        found.size === named.size && found.sha256 === named.sha256 && found.sha512 === named.sha512;
      const message = `${what} is not the file that was recorded: its hash or size differs.`;
      return same ? [] : [{ code: 'file-changed', sequence: k, message }];
    }),
  );
}

/** Events above the last signed head, where a head is due. */
function unsignedTail(
  standing: ReadonlyMap<number, Standing>,
  anchors: ReadonlyMap<number, string>,
  headEvery: number,
): LedgerFinding[] {
  const signed = highest(anchors.keys());
  const last = highest(standing.keys());
  if (last - signed < headEvery) return [];
  if (signed === 0) {
    const message = 'No signed head vouches for the ledger.';
    return [{ code: 'head-mismatch', sequence: null, message }];
  }
  return [...standing.keys()]
    .filter((k) => k > signed)
    .map((k) => ({
      code: 'inserted',
      sequence: k,
      message: `Event ${k} stands above the last signed head, where every event is signed.`,
    }));
}

/** Without spreading: a call takes only so many arguments. */
const highest = (numbers: Iterable<number>): number => {
  let most = 0;
  for (const number of numbers) most = Math.max(most, number);
  return most;
};

const changed = (k: number): LedgerFinding => ({
  code: 'changed',
  sequence: k,
  message: `Event ${k} was changed after it was recorded.`,
});

const storedHashChanged = (k: number): LedgerFinding => ({
  code: 'changed',
  sequence: k,
  message: `The stored hash of event ${k} was changed; its text is as recorded.`,
});

const unconfirmed = (k: number): LedgerFinding => ({
  code: 'changed',
  sequence: k,
  message: `Event ${k} cannot be confirmed: event ${k + 1}, which vouches for it, names another hash and is itself in doubt.`,
});

const malformed = (k: number): LedgerFinding => ({
  code: 'malformed',
  sequence: k,
  message: `Event ${k} cannot be read as an event of this case.`,
});

const missing = (k: number, anchors: ReadonlyMap<number, string>): LedgerFinding => ({
  code: 'missing',
  sequence: k,
  message: anchors.has(k)
    ? `Event ${k} was removed; a signed head says that it was there.`
    : `Event ${k} was removed.`,
});

const fork = (k: number): LedgerFinding => ({
  code: 'head-mismatch',
  sequence: k,
  message: `The signed head of event ${k} and the event after it vouch for different texts.`,
});

function headMismatch(k: number, anchors: ReadonlyMap<number, string>): LedgerFinding {
  const below = highest([...anchors.keys()].filter((other) => other < k));
  const range =
    below + 1 === k ? `event ${k} is` : `one or more of events ${below + 1} to ${k} are`;
  return {
    code: 'head-mismatch',
    sequence: k,
    message: `The ledger does not hold what the signed head of event ${k} names: ${range} not as signed.`,
  };
}
