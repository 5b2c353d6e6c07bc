import { createPublicKey } from 'node:crypto';
import { readFile, readdir } from 'node:fs/promises';
import { join } from 'node:path';
import { ledgerHead, type LedgerEvent, type LedgerHead } from '#shared/contracts/custody';
import { canonicalText, isCanonical, sha256Hex } from '../../ledger/canonical';
import { firstPrevious } from '../../ledger/chain';
import { isSignedHead, keyIdOf, signedBytes, type PublicKeys } from '../../ledger/head';
import { filesCsv, listFiles } from '../exhibit-files';
import { eventOf, withheldEventFormat } from '../ledger-files';
import { releaseSnapshot, type ReleaseSnapshot } from '../snapshot';
import { marksCsv } from '../survey-files';
import { velocitiesCsv } from '../velocities';
import { withheldCsv } from '../withheld';
import { hashFile, text } from './check-bag';
import type { Report } from './finding';

interface Ledger {
  /** Hash of the event at each sequence, the first at 1. */
  readonly hashes: string[];
  readonly events: LedgerEvent[];
  /** Exhibits of which only place and hash of events are told. */
  readonly withheld: Set<string>;
}

/** Checks what the bag says of the case: ledger, signatures, release, computations and tables. */
export async function checkRelease(folder: string, report: Report): Promise<void> {
  const ledger: Ledger = { hashes: [firstPrevious], events: [], withheld: new Set() };
  await report.part('custody/ledger.jsonl', async () => {
    readLedger(await text(folder, 'data/custody/ledger.jsonl'), ledger, report);
    return `${ledger.hashes.length - 1} events, each holds the hash of the one before`;
  });
  await report.part('custody/heads.jsonl', () => checkHeads(folder, ledger, report));

  let snapshot: ReleaseSnapshot | undefined;
  await report.part('release.json', async () => {
    const content = await text(folder, 'data/release.json');
    if (!isCanonical(content)) throw new Error('is not canonical JSON');
    snapshot = releaseSnapshot.parse(JSON.parse(content));
    const last = ledger.events.at(-1);
    const hash = sha256Hex(content);
    if (last?.kind !== 'released' || !last.note.includes(hash)) {
      throw new Error(`is not what the ledger's last event released (SHA-256 ${hash})`);
    }
    const listed = new Set(snapshot.withheld.map((item) => item.exhibit));
    for (const exhibit of ledger.withheld) {
      if (!listed.has(exhibit)) throw new Error(`does not say why ${exhibit} was withheld`);
    }
    return `is what event ${last.sequence} of the ledger released`;
  });
  if (snapshot !== undefined) await checkContents(folder, snapshot, ledger, report);
}

/** One event or one withheld place a line; `previous` of each must be the hash of the one before. */
function readLedger(content: string, ledger: Ledger, report: Report): void {
  const lines = content.split('\n');
  if (lines.pop() !== '') report.wrong('custody/ledger.jsonl', 'does not end with a line end');
  lines.forEach((line, i) => {
    const wrong = (message: string) => report.wrong(`custody ledger, event ${i + 1}`, message);
    const parsed = JSON.parse(line) as Record<string, unknown>;
    if (!isCanonical(line)) wrong('is not in its canonical form');
    if (parsed['sequence'] !== i + 1) wrong(`stands where number ${i + 1} should be`);
    if (parsed['format'] === withheldEventFormat) {
      ledger.hashes.push(String(parsed['hash']));
      ledger.withheld.add(String(parsed['exhibit']));
      return;
    }
    const event = eventOf(line);
    if (event.previous !== ledger.hashes[i]) {
      wrong('does not follow the event before it: one of them was changed, removed or put in');
    }
    ledger.hashes.push(sha256Hex(line));
    ledger.events.push(event);
  });
}

async function checkHeads(folder: string, ledger: Ledger, report: Report): Promise<string> {
  const keys = await readKeys(folder);
  const heads = (await text(folder, 'data/custody/heads.jsonl')).split('\n');
  if (heads.pop() !== '') report.wrong('custody/heads.jsonl', 'does not end with a line end');
  let last: LedgerHead | undefined;
  for (const line of heads) {
    const head = ledgerHead.parse(JSON.parse(line));
    const where = `signed head of event ${head.sequence}`;
    if (!isCanonical(line)) report.wrong(where, 'is not in its canonical form');
    if (!isSignedHead(head, keys)) report.wrong(where, 'does not carry a true signature');
    if (ledger.hashes[head.sequence] !== head.hash) report.wrong(where, 'names another event');
    last = head;
  }
  if (last === undefined) throw new Error('holds no signed head');
  if (last.sequence !== ledger.hashes.length - 1) {
    report.wrong('custody/ledger.jsonl', 'has no signature over its last event');
  }
  await checkOwnHead(folder, last, report);
  return `signed heads: ${heads.length}, the last with key ${last.keyId} on ${last.signedAt}`;
}

/** The three files for openssl must say what the last head says. */
async function checkOwnHead(folder: string, last: LedgerHead, report: Report): Promise<void> {
  const expected: [string, string | Buffer][] = [
    ['head.json', canonicalText(last)],
    ['head-signed-bytes.json', signedBytes(last)],
    ['head.sig', Buffer.from(last.signature, 'hex')],
  ];
  for (const [name, content] of expected) {
    const found = await readFile(join(folder, 'data/custody', name));
    if (!found.equals(Buffer.from(content))) {
      report.wrong(`custody/${name}`, 'differs from the last head in heads.jsonl');
    }
  }
  const own = rawKey(await text(folder, 'data/custody/public-key.pem'));
  if (keyIdOf(own) !== last.keyId) {
    report.wrong('custody/public-key.pem', 'is not the key that signed the last head');
  }
}

async function readKeys(folder: string): Promise<PublicKeys> {
  const names = await readdir(join(folder, 'data/custody/keys'));
  const keys = await Promise.all(
    names.map(async (name) => rawKey(await text(folder, `data/custody/keys/${name}`))),
  );
  return new Map(keys.map((key) => [keyIdOf(key), key]));
}

function rawKey(pem: string): string {
  const { x } = createPublicKey(pem).export({ format: 'jwk' });
  return Buffer.from(x ?? '', 'base64url').toString('hex');
}

async function checkContents(
  folder: string,
  snapshot: ReleaseSnapshot,
  ledger: Ledger,
  report: Report,
): Promise<void> {
  await report.part('exhibits', async () => {
    const takenIn = new Set(ledger.events.flatMap((e) => e.files.map((file) => file.sha256)));
    const files = listFiles(snapshot.exhibits);
    for (const { file, path } of files) {
      if (!takenIn.has(file.sha256)) report.wrong(path, 'was never taken in by the ledger');
      if ((await hashFile(join(folder, path), 'sha256')) !== file.sha256) {
        report.wrong(path, 'is not the file of the release');
      }
    }
    return `${files.length} files are those that the ledger took in`;
  });
  const textOf = new Map<string, string>();
  await report.part('computations', async () => {
    for (const { hash } of snapshot.computations) {
      const content = await text(folder, `data/computations/${hash}.json`);
      if (sha256Hex(content) !== hash) report.wrong(`computations/${hash}.json`, 'was changed');
      textOf.set(hash, content);
    }
    return `${textOf.size} documents have the SHA-256 in their names`;
  });
  const tables: [string, () => string][] = [
    [
      'velocities.csv',
      () => velocitiesCsv(snapshot.computations, (hash) => textOf.get(hash) ?? ''),
    ],
    ['survey/marks.csv', () => marksCsv(snapshot.marks)],
    ['exhibits/files.csv', () => filesCsv(snapshot.exhibits)],
    ['withheld.csv', () => withheldCsv(snapshot.withheld)],
  ];
  for (const [name, make] of tables) {
    await report.part(name, async () => {
      if ((await text(folder, `data/${name}`)) !== make()) {
        throw new Error('does not say what the release and its computations say');
      }
      return 'agrees with the release and its computations';
    });
  }
}
