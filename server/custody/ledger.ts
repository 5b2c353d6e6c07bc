import { QueryTypes, type Transaction } from 'sequelize';
import type { LedgerEntry, LedgerEvent, LedgerHead } from '#shared/contracts/custody';
import type { CaseScope } from '../cases/scope';
import { now } from '../clock';
import {
  CustodyChainRecord,
  CustodyEventRecord,
  CustodyHeadRecord,
} from '../database/models/custody';
import { HttpProblem } from '../http/problems';
import { sha256Hex } from '../ledger/canonical';
import { chainEvent, firstPrevious } from '../ledger/chain';
import { signHead } from '../ledger/head';
import type { Services } from '../services';
import { keepHeads } from './head-witness';

/** What somebody did with an exhibit; the ledger adds its place, the time and who recorded it. */
export type Deed = Pick<LedgerEvent, 'kind' | 'exhibit'> &
  Partial<Omit<LedgerEvent, 'format' | 'caseNumber' | 'sequence' | 'recordedBy' | 'previous'>>;

/** The ledger of a case while its chain is locked: nobody else adds to it before the transaction ends. */
export interface OpenLedger {
  readonly transaction: Transaction;
  append(deed: Deed): Promise<LedgerEntry>;
  /** The next number of an exhibit; a number is never given twice, whatever becomes of its row. */
  nextOrdinal(): Promise<number>;
}

/**
 * Runs a change of state and its events in one transaction, with the case's chain locked first. Each
 * event is signed as the chain's head, and after the commit the heads are also kept outside the
 * database, so that even a tail that was cut off together with its heads is missed.
 */
export async function withLedger<T>(
  services: Services,
  scope: CaseScope,
  change: (ledger: OpenLedger) => Promise<T>,
): Promise<T> {
  const heads: LedgerHead[] = [];
  const result = await services.sequelize.transaction(async (transaction) => {
    const chain = await lockChain(scope.caseId, transaction);
    const result = await change({
      transaction,
      append: async (deed) => {
        const { entry, head } = await append(services, scope, chain, deed, transaction);
        heads.push(head);
        return entry;
      },
      nextOrdinal: async () => {
        chain.lastOrdinal += 1;
        return Promise.resolve(chain.lastOrdinal);
      },
    });
    await chain.save({ transaction });
    return result;
  });
  await keepHeads(services, scope.caseId, heads);
  return result;
}

/** Locks the row at which the case's chain stands; makes it for the first event. */
async function lockChain(caseId: string, transaction: Transaction): Promise<CustodyChainRecord> {
  const { sequelize } = CustodyChainRecord;
  // One statement makes the row or locks it: two first events cannot both make it.
  await sequelize?.query(
    `INSERT INTO custody_chains (case_id, sequence, hash, last_ordinal) VALUES (?, 0, ?, 0)
       ON DUPLICATE KEY UPDATE case_id = case_id`,
    { type: QueryTypes.INSERT, replacements: [caseId, firstPrevious], transaction },
  );
  const chain = await CustodyChainRecord.findByPk(caseId, {
    transaction,
    lock: true,
    rejectOnEmpty: true,
  });
  await refuseToContinueTampered(chain, transaction);
  return chain;
}

/** A new event on top of a ledger that was set back would lend it a fresh signature. */
async function refuseToContinueTampered(
  chain: CustodyChainRecord,
  transaction: Transaction,
): Promise<void> {
  const last = await CustodyEventRecord.findOne({
    where: { caseId: chain.caseId },
    order: [['sequence', 'DESC']],
    transaction,
  });
  const agrees = last
    ? last.sequence === chain.sequence &&
      last.hash === chain.hash &&
      sha256Hex(last.canonical) === chain.hash
    : chain.sequence === 0;
  if (!agrees) {
    throw new HttpProblem(
      503,
      'The custody ledger does not agree with itself',
      'Nothing can be added to the ledger of this case until the laboratory lead has verified it.',
    );
  }
}

async function append(
  { signingKey }: Services,
  scope: CaseScope,
  chain: CustodyChainRecord,
  deed: Deed,
  transaction: Transaction,
): Promise<{ entry: LedgerEntry; head: LedgerHead }> {
  const { caseId, caseNumber, account } = scope;
  const recordedAt = now();
  const { event, text, hash } = chainEvent(
    {
      happenedAt: null,
      zone: 'UTC',
      releasedBy: null,
      receivedBy: null,
      purpose: '',
      condition: '',
      sealBefore: '',
      sealAfter: '',
      location: '',
      method: 'none',
      tracking: '',
      note: '',
      files: [],
      refersTo: null,
      ...deed,
      caseNumber,
      recordedAt,
      recordedBy: { id: account.id, name: account.name },
    },
    chain,
  );
  await CustodyEventRecord.create(
    {
      caseId,
      sequence: event.sequence,
      exhibit: event.exhibit,
      kind: event.kind,
      recordedAt,
      previousHash: event.previous,
      canonical: text,
      hash,
    },
    { transaction },
  );
  const head = signHead(signingKey, {
    caseNumber,
    sequence: event.sequence,
    hash,
    signedAt: recordedAt,
  });
  await CustodyHeadRecord.create({ caseId, ...head }, { transaction });
  chain.set({ sequence: event.sequence, hash });
  return { entry: { hash, event }, head };
}
