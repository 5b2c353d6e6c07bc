import type { z } from 'zod';
import type { LedgerEntry, answerHandOver, handOver } from '#shared/contracts/custody';
import { passwordMatches } from '../accounts/passwords';
import type { CaseScope } from '../cases/scope';
import { CustodyEventRecord } from '../database/models/custody';
import type { ExhibitRecord } from '../database/models/exhibit';
import { conflict, forbidden, unprocessable } from '../http/problems';
import type { Call } from '../http/route';
import type { Services } from '../services';
import { lockExhibit, mustBeWhileHeld, mustExplainSeal, mustHold, mustNotWait } from './holding';
import { withLedger, type OpenLedger } from './ledger';
import { presentEvent } from './presenter';
import { receiversOf } from './receivers';

type Offer = z.output<typeof handOver.body>;
type Answer = z.output<typeof answerHandOver.body>;
type Remember = Call<typeof handOver>['remember'];

/** Offers an item to a colleague. Until they answer, the giver holds it and answers for it. */
export async function offer(
  services: Services,
  scope: CaseScope,
  exhibitId: string,
  body: Offer,
  zone: string,
  remember: Remember,
): Promise<LedgerEntry> {
  const receiver = (await receiversOf(scope)).find(({ id }) => id === body.toId);
  if (!receiver) {
    throw unprocessable('toId', 'Choose somebody of this case, other than yourself.');
  }
  return withLedger(services, scope, async (ledger) => {
    const { transaction } = ledger;
    const exhibit = await lockExhibit(scope, exhibitId, transaction);
    await mustHold(exhibit, scope, transaction);
    mustNotWait(exhibit);
    mustBeWhileHeld(body.happenedAt, exhibit);
    mustExplainSeal(exhibit, body.sealNumber, body.note);
    const entry = await ledger.append({
      kind: 'handed over',
      exhibit: exhibit.number,
      happenedAt: body.happenedAt,
      zone,
      releasedBy: scope.account.name,
      receivedBy: receiver.name,
      purpose: body.purpose,
      condition: body.condition,
      sealBefore: exhibit.seal,
      sealAfter: body.sealNumber === '' ? exhibit.seal : body.sealNumber,
      location: body.location === '' ? exhibit.location : body.location,
      method: body.method,
      tracking: body.tracking,
      note: body.note,
    });
    exhibit.set({
      pendingSequence: entry.event.sequence,
      pendingToId: receiver.id,
      seal: entry.event.sealAfter,
      location: entry.event.location,
    });
    await exhibit.save({ transaction });
    await remember(transaction, entry);
    return entry;
  });
}

/**
 * Accepts or refuses an offer, signed with the password. The giver may refuse their own offer, which
 * withdraws it.
 */
export async function answer(
  services: Services,
  scope: CaseScope,
  exhibitId: string,
  body: Answer,
  zone: string,
  remember: Remember,
): Promise<LedgerEntry> {
  await mustSign(services, scope, body.password);
  return withLedger(services, scope, async (ledger) => {
    const exhibit = await lockExhibit(scope, exhibitId, ledger.transaction);
    const offered = await waitingOffer(scope, exhibit, body.sequence, ledger);
    const withdrawn = exhibit.holderId === scope.account.id && body.answer === 'refused';
    if (exhibit.pendingToId !== scope.account.id && !withdrawn) {
      throw forbidden(`This hand-over is for ${offered.receivedBy ?? 'somebody else'} to answer.`);
    }
    mustExplainSeal(exhibit, body.sealNumber, body.note);
    const accepted = body.answer === 'accepted';
    const entry = await ledger.append({
      kind: body.answer,
      exhibit: exhibit.number,
      zone,
      releasedBy: offered.releasedBy,
      receivedBy: accepted ? scope.account.name : offered.releasedBy,
      purpose: withdrawn ? 'withdrawn by the giver' : offered.purpose,
      condition: body.condition,
      sealBefore: exhibit.seal,
      sealAfter: body.sealNumber === '' ? exhibit.seal : body.sealNumber,
      location: body.location === '' ? exhibit.location : body.location,
      method: offered.method,
      tracking: offered.tracking,
      note: body.note,
      refersTo: offered.sequence,
    });
    exhibit.set({
      pendingSequence: null,
      pendingToId: null,
      seal: entry.event.sealAfter,
      location: entry.event.location,
    });
    if (accepted) {
      exhibit.set({ holderId: scope.account.id, heldSince: new Date(entry.event.recordedAt) });
    }
    await exhibit.save({ transaction: ledger.transaction });
    await remember(ledger.transaction, entry);
    return entry;
  });
}

/** Before the chain is locked: checking a password takes as long as several events. */
async function mustSign(services: Services, scope: CaseScope, password: string): Promise<void> {
  if (await passwordMatches(scope.account.passwordHash, password)) return;
  await services.accessLog.record({
    actor: scope.account,
    action: 'refused',
    caseId: scope.caseId,
    subject: 'answer to a hand-over',
    detail: 'The password was not right.',
  });
  throw unprocessable('password', 'The password is not right.');
}

async function waitingOffer(
  scope: CaseScope,
  exhibit: ExhibitRecord,
  sequence: number,
  { transaction }: OpenLedger,
) {
  if (exhibit.pendingSequence === null) {
    throw conflict(`No hand-over of ${exhibit.number} waits for an answer.`);
  }
  if (exhibit.pendingSequence !== sequence) {
    throw conflict(
      `Event ${sequence} is not the hand-over of ${exhibit.number} that waits (event ${exhibit.pendingSequence}).`,
    );
  }
  const record = await CustodyEventRecord.findOne({
    where: { caseId: scope.caseId, sequence },
    transaction,
    rejectOnEmpty: true,
  });
  return presentEvent(record);
}
