import type { LedgerFinding, LedgerReport } from '#shared/contracts/custody';
import type { CaseScope } from '../cases/scope';
import { CustodyEventRecord, CustodyHeadRecord } from '../database/models/custody';
import { ExhibitFileRecord, ExhibitRecord } from '../database/models/exhibit';
import { readPublicKeys } from '../ledger/signing-key';
import { verifyLedger, type FoundFile, type LedgerRow } from '../ledger/verify';
import type { Services } from '../services';
import { readKeptHeads } from './head-witness';
import { presentHead } from './presenter';
import { compareFileRows, compareRegister, readableEvents } from './compare-register';

type Case = Pick<CaseScope, 'caseId' | 'caseNumber'>;

/**
 * Checks the ledger of a case against itself, its signed heads (those of the database and those kept
 * outside it), the stored files, each hashed again, and what the register says of each exhibit.
 */
export async function verifyCase(services: Services, of: Case): Promise<LedgerReport> {
  const checkedAt = new Date().toISOString();
  const { caseId, caseNumber } = of;
  const [records, heads, keptHeads, fileRows, exhibits] = await Promise.all([
    CustodyEventRecord.findAll({ where: { caseId }, order: [['sequence', 'ASC']] }),
    CustodyHeadRecord.findAll({ where: { caseId }, order: [['sequence', 'ASC']] }),
    readKeptHeads(services, caseId),
    ExhibitFileRecord.findAll({ where: { caseId } }),
    ExhibitRecord.findAll({ where: { caseId } }),
  ]);
  const rows = records.map(toRow);
  const events = readableEvents(rows);
  const named = new Set(events.flatMap(({ files }) => files.map((file) => file.sha256)));
  const files = await measureAll(services, named);
  const findings: LedgerFinding[] = [
    ...verifyLedger({
      caseNumber,
      rows,
      heads: [...heads.map((head) => presentHead(head, of)), ...keptHeads],
      publicKeys: readPublicKeys(services.keysDir),
      files,
    }),
    ...compareFileRows(events, fileRows, exhibits),
    ...compareRegister(events, exhibits),
  ];
  return { checkedAt, events: rows.length, files: files.size, findings };
}

const toRow = (record: CustodyEventRecord): LedgerRow => ({
  place: record.sequence,
  text: record.canonical,
  hash: record.hash,
  columns: {
    exhibit: record.exhibit,
    kind: record.kind,
    recordedAt: record.recordedAt,
    previous: record.previousHash,
  },
});

/** One after the other: a check must not take the disk away from people at work. */
async function measureAll(
  { store }: Services,
  addresses: ReadonlySet<string>,
): Promise<Map<string, FoundFile | null>> {
  const found = new Map<string, FoundFile | null>();
  for (const sha256 of addresses) {
    found.set(sha256, /^[0-9a-f]{64}$/.test(sha256) ? await store.measure(sha256) : null);
  }
  return found;
}
