import { Op } from 'sequelize';
import { v7 as newId } from 'uuid';
import type { z } from 'zod';
import type {
  Exhibit,
  editExhibit,
  exhibitEntry,
  registerExhibit,
} from '#shared/contracts/exhibits';
import type { CaseScope } from '../cases/scope';
import { mustBePast } from '../custody/holding';
import { withLedger, type OpenLedger } from '../custody/ledger';
import { CustodyEventRecord } from '../database/models/custody';
import { ExhibitRecord } from '../database/models/exhibit';
import { notFound, stale, unprocessable } from '../http/problems';
import type { Call } from '../http/route';
import type { Services } from '../services';
import { presentExhibit, presentNew } from './presenter';

type Entry = z.output<typeof exhibitEntry>;
type Edit = z.output<typeof editExhibit.body>;

/** Exhibits of the case in order of number. */
export const exhibitsOf = ({ caseId }: CaseScope): Promise<ExhibitRecord[]> =>
  ExhibitRecord.findAll({ where: { caseId }, order: [['ordinal', 'ASC']] });

/** One exhibit of the case, or 404. */
export async function exhibitOf({ caseId }: CaseScope, id: string): Promise<ExhibitRecord> {
  const exhibit = await ExhibitRecord.findOne({ where: { id, caseId } });
  if (!exhibit) throw notFound('This exhibit');
  return exhibit;
}

/** Gives the exhibit its number; who registers it has received it and holds it. */
export async function register(
  services: Services,
  scope: CaseScope,
  entry: Entry,
  zone: string,
  remember: Call<typeof registerExhibit>['remember'],
): Promise<Exhibit> {
  mustBeCollectedInThePast(entry);
  return withLedger(services, scope, async (ledger) => {
    const { transaction } = ledger;
    await mustHaveParent(scope, entry, ledger);
    const ordinal = await ledger.nextOrdinal();
    const number = `${scope.caseNumber}/${ordinal}`;
    const received = await writeFirstEvents(ledger, scope, number, entry, zone);
    const registeredAt = new Date(received.event.recordedAt);
    const collectedAt = entry.collectedAt === null ? null : new Date(entry.collectedAt);
    const exhibit = await ExhibitRecord.create(
      {
        id: newId(),
        caseId: scope.caseId,
        ordinal,
        number,
        kind: entry.kind,
        description: entry.description,
        source: entry.source,
        collectedBy: entry.collectedBy,
        collectedAt,
        collectedPlace: entry.collectedPlace,
        conditionOnReceipt: entry.condition,
        packaging: entry.packaging,
        sealOnReceipt: entry.sealNumber,
        sensitive: entry.sensitive,
        parentNumber: entry.parentNumber,
        registeredAt,
        registeredBy: scope.account.id,
        holderId: scope.account.id,
        heldSince: collectedAt ?? registeredAt,
        location: '',
        seal: entry.sealNumber,
      },
      { transaction },
    );
    const shown = presentNew(exhibit, scope.account);
    await remember(transaction, shown);
    return shown;
  });
}

/** Changes what an exhibit is called; what it was called before stays in the ledger. */
export async function edit(
  services: Services,
  scope: CaseScope,
  id: string,
  version: number,
  changes: Edit,
  zone: string,
): Promise<Exhibit> {
  await withLedger(services, scope, async (ledger) => {
    const { transaction } = ledger;
    const exhibit = await ExhibitRecord.findOne({
      where: { id, caseId: scope.caseId },
      transaction,
      lock: true,
    });
    if (!exhibit) throw notFound('This exhibit');
    if (exhibit.version !== version) throw stale(await presentExhibit(exhibit));
    const told = differences(exhibit, changes);
    if (told === '') return;
    await ledger.append({
      kind: 'corrected',
      exhibit: exhibit.number,
      zone,
      sealBefore: exhibit.seal,
      sealAfter: exhibit.seal,
      location: exhibit.location,
      note: told,
      refersTo: await receptionOf(exhibit, ledger),
    });
    await exhibit.update({ ...changes, version: version + 1 }, { transaction });
  });
  return presentExhibit(await exhibitOf(scope, id));
}

function mustBeCollectedInThePast({ collectedAt }: Entry): void {
  try {
    mustBePast(collectedAt);
  } catch {
    throw unprocessable('collectedAt', 'This lies in the future.');
  }
}

async function mustHaveParent(
  { caseId }: CaseScope,
  { parentNumber }: Entry,
  { transaction }: OpenLedger,
): Promise<void> {
  if (parentNumber === null) return;
  const parent = await ExhibitRecord.findOne({
    where: { caseId, number: parentNumber },
    transaction,
  });
  if (!parent) throw unprocessable('parentNumber', `This case has no exhibit ${parentNumber}.`);
}

async function writeFirstEvents(
  ledger: OpenLedger,
  { account }: CaseScope,
  number: string,
  entry: Entry,
  zone: string,
) {
  const collected =
    entry.collectedAt !== null || entry.collectedBy !== '' || entry.collectedPlace !== ''
      ? await ledger.append({
          kind: 'collected',
          exhibit: number,
          happenedAt: entry.collectedAt,
          zone,
          receivedBy: entry.collectedBy === '' ? null : entry.collectedBy,
          location: entry.collectedPlace,
        })
      : null;
  return ledger.append({
    kind: 'received',
    exhibit: number,
    zone,
    releasedBy: entry.source === '' ? null : entry.source,
    receivedBy: account.name,
    condition: entry.condition,
    sealAfter: entry.sealNumber,
    note: [
      `${entry.kind}: ${entry.description.replace(/\.$/, '')}`,
      entry.packaging === '' ? '' : `packaging: ${entry.packaging}`,
      entry.parentNumber === null ? '' : `taken from ${entry.parentNumber}`,
    ]
      .filter((part) => part !== '')
      .join('; '),
    refersTo: collected?.event.sequence ?? null,
  });
}

/** In words, what an edit changes; empty if nothing. */
function differences(exhibit: ExhibitRecord, changes: Edit): string {
  const parts: string[] = [];
  for (const name of ['description', 'source'] as const) {
    const value = changes[name];
    if (value !== undefined && value !== exhibit[name]) {
      parts.push(`${name}: "${exhibit[name]}" is now "${value}"`);
    }
  }
  if (changes.sensitive !== undefined && changes.sensitive !== Boolean(exhibit.sensitive)) {
    parts.push(changes.sensitive ? 'marked as sensitive' : 'no longer marked as sensitive');
  }
  return parts.join('; ');
}

async function receptionOf(
  { caseId, number }: ExhibitRecord,
  { transaction }: OpenLedger,
): Promise<number | null> {
  const event = await CustodyEventRecord.findOne({
    where: { caseId, exhibit: number, kind: { [Op.eq]: 'received' } },
    order: [['sequence', 'ASC']],
    transaction,
  });
  return event?.sequence ?? null;
}
