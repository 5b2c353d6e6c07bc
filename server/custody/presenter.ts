import type { LedgerEntry, LedgerEvent, LedgerHead } from '#shared/contracts/custody';
import type { CaseScope } from '../cases/scope';
import type { CustodyEventRecord, CustodyHeadRecord } from '../database/models/custody';

/** The event as its recorded text says it; the columns beside it are not asked. */
export const presentEvent = (record: Pick<CustodyEventRecord, 'canonical'>): LedgerEvent =>
  JSON.parse(record.canonical) as LedgerEvent;

export const presentEntry = (
  record: Pick<CustodyEventRecord, 'canonical' | 'hash'>,
): LedgerEntry => ({ hash: record.hash, event: presentEvent(record) });

export const presentHead = (
  head: CustodyHeadRecord,
  { caseNumber }: Pick<CaseScope, 'caseNumber'>,
): LedgerHead => ({
  format: 'centrode.ledger-head/1',
  caseNumber,
  sequence: head.sequence,
  hash: head.hash,
  signedAt: head.signedAt,
  keyId: head.keyId,
  signature: head.signature,
});
