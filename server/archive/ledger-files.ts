import { createPublicKey } from 'node:crypto';
import { ledgerEvent, ledgerHead, type LedgerEvent } from '#shared/contracts/custody';
import { canonicalText } from '../ledger/canonical';
import { signedBytes, type PublicKeys } from '../ledger/head';
import type { ArchiveLedgerLine, ArchiveSource } from './archive-source';
import { csv, type CsvCell } from './csv';
import { madeEntry, type BagEntry } from './entry';

/** What stands in the ledger file for an event of a withheld exhibit. */
export const withheldEventFormat = 'centrode.custody-event-withheld/1';

/** One line of `ledger.jsonl`: the exact text that was hashed, or what is told of a withheld event. */
export function ledgerText(line: ArchiveLedgerLine): string {
  if ('text' in line) return line.text;
  return canonicalText({
    format: withheldEventFormat,
    sequence: line.sequence,
    exhibit: line.withheldExhibit,
    hash: line.hash,
  });
}

/** The event of an exact text. */
export const eventOf = (text: string): LedgerEvent => ledgerEvent.parse(JSON.parse(text));

const header = [
  'sequence',
  'kind',
  'exhibit',
  'recorded_at_utc',
  'happened_at_utc',
  'zone',
  'recorded_by',
  'released_by',
  'received_by',
  'purpose',
  'condition',
  'seal_before',
  'seal_after',
  'location',
  'method',
  'tracking',
  'note',
  'refers_to',
  'files',
  'sha256_of_event',
];

function withheldRow(sequence: number, exhibit: string, hash: string): CsvCell[] {
  const untold = Array.from({ length: header.length - 4 }, (): CsvCell => null);
  return [sequence, 'withheld', exhibit, ...untold, hash];
}

function shownRow(event: LedgerEvent, hash: string): CsvCell[] {
  return [
    event.sequence,
    event.kind,
    event.exhibit,
    event.recordedAt,
    event.happenedAt,
    event.zone,
    event.recordedBy.name,
    event.releasedBy,
    event.receivedBy,
    event.purpose,
    event.condition,
    event.sealBefore,
    event.sealAfter,
    event.location,
    event.method,
    event.tracking,
    event.note,
    event.refersTo,
    event.files.map((file) => `${file.name} ${file.sha256}`).join('; '),
    hash,
  ];
}

const row = (line: ArchiveLedgerLine): CsvCell[] =>
  'text' in line
    ? shownRow(eventOf(line.text), line.hash)
    : withheldRow(line.sequence, line.withheldExhibit, line.hash);

/** A raw Ed25519 key as other programs read it. */
function pem(publicKeys: PublicKeys, keyId: string): string {
  const raw = publicKeys.get(keyId);
  if (raw === undefined) throw new RangeError(`The public key ${keyId} of a head is not at hand.`);
  const x = Buffer.from(raw, 'hex').toString('base64url');
  return createPublicKey({ key: { kty: 'OKP', crv: 'Ed25519', x }, format: 'jwk' })
    .export({ type: 'spki', format: 'pem' })
    .toString();
}

/** The custody ledger with its signed heads, in forms for programs, people and openssl. */
export function ledgerEntries(source: ArchiveSource): BagEntry[] {
  const heads = source.heads.map((text) => ledgerHead.parse(JSON.parse(text)));
  const last = heads.at(-1);
  if (last === undefined) throw new RangeError('A release needs a signed head.');
  const keyIds = [...new Set(heads.map((head) => head.keyId))].sort();
  return [
    madeEntry('data/custody/head-signed-bytes.json', signedBytes(last)),
    madeEntry('data/custody/head.json', source.heads[heads.length - 1]),
    madeEntry('data/custody/head.sig', Buffer.from(last.signature, 'hex')),
    madeEntry('data/custody/heads.jsonl', source.heads.map((text) => `${text}\n`).join('')),
    ...keyIds.map((keyId) =>
      madeEntry(`data/custody/keys/${keyId}.pem`, pem(source.publicKeys, keyId)),
    ),
    madeEntry('data/custody/ledger.csv', csv(header, source.ledger.map(row))),
    madeEntry(
      'data/custody/ledger.jsonl',
      source.ledger.map((line) => `${ledgerText(line)}\n`).join(''),
    ),
    madeEntry('data/custody/public-key.pem', pem(source.publicKeys, last.keyId)),
  ];
}
