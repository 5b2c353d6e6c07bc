import * as z from 'zod';
import { caseParams, id, line, moment, prose, sha256 } from './common';
import { endpoint } from './endpoint';

export const custodyEventKinds = [
  'collected',
  'received',
  'stored',
  'handed over',
  'accepted',
  'refused',
  'examined',
  'sampled',
  'sealed',
  'opened',
  'returned',
  'disposed',
  'transferred out',
  'file taken in',
  'integrity checked',
  'released',
  'corrected',
] as const;
export type CustodyEventKind = (typeof custodyEventKinds)[number];

/**
 * The body of a ledger event as it is hashed (RFC 8785 canonical JSON of this object, UTF-8).
 * `previous` is the hash of the event before it in the case, 64 zeros for the first.
 */
export const ledgerEvent = z.strictObject({
  format: z.literal('centrode.custody-event/1'),
  caseNumber: z.string(),
  sequence: z.int().min(1),
  kind: z.enum(custodyEventKinds),
  /** null for an event of the whole case (a release). */
  exhibit: z.string().nullable(),
  /** UTC to the microsecond, by the server's clock. */
  recordedAt: z.string().regex(/^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d\.\d{6}Z$/),
  happenedAt: z.string().nullable(),
  zone: z.string(),
  recordedBy: z.object({ id: z.string(), name: z.string() }),
  releasedBy: z.string().nullable(),
  receivedBy: z.string().nullable(),
  purpose: z.string(),
  condition: z.string(),
  sealBefore: z.string(),
  sealAfter: z.string(),
  location: z.string(),
  method: z.enum(['none', 'hand', 'courier', 'post']),
  tracking: z.string(),
  note: z.string(),
  /** Files taken in or checked with this event. */
  files: z.array(z.strictObject({ name: z.string(), size: z.int(), sha256, sha512: z.string() })),
  /** Sequence of the event that this one answers or corrects. */
  refersTo: z.int().nullable(),
  previous: sha256,
});
export type LedgerEvent = z.infer<typeof ledgerEvent>;

export const ledgerEntry = z.object({ hash: sha256, event: ledgerEvent });
export type LedgerEntry = z.infer<typeof ledgerEntry>;

/** A signed statement of where the chain stands (Ed25519 over the canonical JSON without `signature`). */
export const ledgerHead = z.object({
  format: z.literal('centrode.ledger-head/1'),
  caseNumber: z.string(),
  sequence: z.int(),
  hash: sha256,
  signedAt: z.string(),
  keyId: z.string(),
  signature: z.string(),
});
export type LedgerHead = z.infer<typeof ledgerHead>;

/** What the verifier found; `sequence` is null where the whole chain is meant. */
export const ledgerFinding = z.object({
  code: z.enum([
    'changed',
    'missing',
    'reordered',
    'inserted',
    'malformed',
    'head-mismatch',
    'bad-signature',
    'file-changed',
    'file-missing',
    'columns-differ',
  ]),
  sequence: z.int().nullable(),
  message: z.string(),
});
export type LedgerFinding = z.infer<typeof ledgerFinding>;

export const ledgerReport = z.object({
  checkedAt: moment,
  events: z.int(),
  files: z.int(),
  findings: z.array(ledgerFinding),
});
export type LedgerReport = z.infer<typeof ledgerReport>;

const exhibitParams = caseParams.extend({ exhibitId: id });

export const readLedger = endpoint({
  method: 'GET',
  path: '/api/cases/:caseId/custody',
  summary: 'The custody ledger of the case, oldest first',
  access: 'case-read',
  params: caseParams,
  query: z.strictObject({ exhibit: z.string().max(40).optional() }),
  response: z.object({ entries: z.array(ledgerEntry), head: ledgerHead.nullable() }),
});

/** Who may receive a hand-over in this case: its people and the laboratory lead. */
export const listReceivers = endpoint({
  method: 'GET',
  path: '/api/cases/:caseId/custody/receivers',
  summary: 'People to whom an item may be handed over',
  access: 'case-read',
  params: caseParams,
  response: z.object({ items: z.array(z.object({ id, name: z.string() })) }),
});

export const handOver = endpoint({
  method: 'POST',
  path: '/api/cases/:caseId/exhibits/:exhibitId/hand-over',
  summary: 'Offer an item to a colleague; it stays pending until they accept',
  access: 'case-read',
  params: exhibitParams,
  body: z.strictObject({
    toId: id,
    purpose: line(400),
    condition: prose(1000).default(''),
    sealNumber: prose(80).default(''),
    location: prose(400).default(''),
    method: z.enum(['hand', 'courier', 'post']).default('hand'),
    tracking: prose(120).default(''),
    happenedAt: moment.nullable().default(null),
    note: prose(2000).default(''),
  }),
  response: ledgerEntry,
  status: 201,
  idempotent: true,
});

export const answerHandOver = endpoint({
  method: 'POST',
  path: '/api/cases/:caseId/exhibits/:exhibitId/answer',
  summary: 'Accept or refuse a hand-over, signing with the password',
  access: 'case-read',
  params: exhibitParams,
  body: z.strictObject({
    /** The hand-over that is answered, so that an answer never meets another offer. */
    sequence: z.int().min(1),
    answer: z.enum(['accepted', 'refused']),
    password: z.string().min(1).max(200),
    condition: prose(1000).default(''),
    sealNumber: prose(80).default(''),
    location: prose(400).default(''),
    note: prose(2000).default(''),
  }),
  response: ledgerEntry,
  status: 201,
  idempotent: true,
});

/** Events that only the holder records: stored, examined, sampled, sealed, opened, returned ... */
export const recordCustody = endpoint({
  method: 'POST',
  path: '/api/cases/:caseId/exhibits/:exhibitId/custody',
  summary: 'Record what was done with an item by the one who holds it',
  access: 'case-custody',
  params: exhibitParams,
  body: z.strictObject({
    kind: z.enum(['stored', 'examined', 'sealed', 'opened', 'corrected']),
    purpose: prose(400).default(''),
    condition: prose(1000).default(''),
    sealNumber: prose(80).default(''),
    location: prose(400).default(''),
    happenedAt: moment.nullable().default(null),
    note: prose(2000).default(''),
    refersTo: z.int().min(1).nullable().default(null),
  }),
  response: ledgerEntry,
  status: 201,
  idempotent: true,
});

export const verifyLedger = endpoint({
  method: 'POST',
  path: '/api/cases/:caseId/custody/verification',
  summary: 'Check the whole chain, its signed heads and every stored file now',
  access: 'case-read',
  params: caseParams,
  response: ledgerReport,
});
