import type { z } from 'zod';
import type { LedgerEntry, LedgerEvent, recordCustody } from '#shared/contracts/custody';
import type { CaseScope } from '../cases/scope';
import { CustodyEventRecord } from '../database/models/custody';
import type { ExhibitRecord } from '../database/models/exhibit';
import { forbidden, unprocessable } from '../http/problems';
import type { Call } from '../http/route';
import type { Services } from '../services';
import { lockExhibit, mustBePast, mustBeWhileHeld, mustHold, mustNotWait } from './holding';
import { withLedger, type OpenLedger } from './ledger';
import { presentEvent } from './presenter';

type Entry = z.output<typeof recordCustody.body>;

/** Records what the holder did with an item, or corrects an event that stands. */
export async function recordEvent(
  services: Services,
  scope: CaseScope,
  exhibitId: string,
  body: Entry,
  zone: string,
  remember: Call<typeof recordCustody>['remember'],
): Promise<LedgerEntry> {
  mustBeComplete(body);
  return withLedger(services, scope, async (ledger) => {
    const { transaction } = ledger;
    const exhibit = await lockExhibit(scope, exhibitId, transaction);
    if (body.kind === 'corrected') {
      mustBePast(body.happenedAt);
      await mustMayCorrect(scope, exhibit, body.refersTo, ledger);
    } else {
      await mustHold(exhibit, scope, transaction);
      mustNotWait(exhibit);
      mustBeWhileHeld(body.happenedAt, exhibit);
    }
    const sealAfter = sealAfterwards(exhibit, body);
    const entry = await ledger.append({
      kind: body.kind,
      exhibit: exhibit.number,
      happenedAt: body.happenedAt,
      zone,
      purpose: body.purpose,
      condition: body.condition,
      sealBefore: exhibit.seal,
      sealAfter,
      location: body.location === '' ? exhibit.location : body.location,
      note: body.note,
      refersTo: body.refersTo,
    });
    exhibit.set({ seal: sealAfter, location: entry.event.location });
    await exhibit.save({ transaction });
    await remember(transaction, entry);
    return entry;
  });
}

/** What each kind cannot do without; the rest may be told. */
function mustBeComplete(body: Entry): void {
  const needed = (
    {
      stored: ['location', 'Say where it is stored.'],
      examined: ['purpose', 'Say what it was examined for.'],
      sealed: ['sealNumber', 'Say the number of the new seal.'],
      opened: ['purpose', 'Say why the seal was opened.'],
      corrected: ['note', 'Say what was wrong and what is right.'],
    } as const
  )[body.kind];
  const [field, message] = needed;
  if (body[field].trim() === '') throw unprocessable(field, message);
  if (body.kind === 'corrected' && body.refersTo === null) {
    throw unprocessable('refersTo', 'Say which event is corrected.');
  }
}

function sealAfterwards(exhibit: ExhibitRecord, body: Entry): string {
  if (body.kind === 'opened') return body.sealNumber;
  if (body.kind === 'sealed' && body.sealNumber === exhibit.seal) {
    throw unprocessable('sealNumber', `${exhibit.seal} is the seal that is on it already.`);
  }
  return body.sealNumber === '' ? exhibit.seal : body.sealNumber;
}

/** Who recorded an event corrects it, or who holds the item now; both stay readable. */
async function mustMayCorrect(
  scope: CaseScope,
  exhibit: ExhibitRecord,
  sequence: number | null,
  { transaction }: OpenLedger,
): Promise<void> {
  const record = await CustodyEventRecord.findOne({
    where: { caseId: scope.caseId, exhibit: exhibit.number, sequence: sequence ?? 0 },
    transaction,
  });
  if (!record) {
    throw unprocessable('refersTo', `${exhibit.number} has no event ${sequence}.`);
  }
  const event: LedgerEvent = presentEvent(record);
  const { id } = scope.account;
  if (event.recordedBy.id !== id && exhibit.holderId !== id) {
    throw forbidden(`Only ${event.recordedBy.name} or who holds the item now can correct this.`);
  }
}
