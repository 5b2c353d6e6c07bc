import type { Transaction } from 'sequelize';
import type { CaseScope } from '../cases/scope';
import { AccountRecord } from '../database/models/account';
import { ExhibitRecord } from '../database/models/exhibit';
import { conflict, notFound, unprocessable } from '../http/problems';

/** The exhibit, locked until the transaction ends; 404 where the case has no such exhibit. */
export async function lockExhibit(
  scope: CaseScope,
  exhibitId: string,
  transaction: Transaction,
): Promise<ExhibitRecord> {
  const exhibit = await ExhibitRecord.findOne({
    where: { id: exhibitId, caseId: scope.caseId },
    transaction,
    lock: true,
  });
  if (!exhibit) throw notFound('This exhibit');
  return exhibit;
}

/** Only who holds an item can do something with it or give it away. */
export async function mustHold(
  exhibit: ExhibitRecord,
  { account }: CaseScope,
  transaction: Transaction,
): Promise<void> {
  if (exhibit.holderId === account.id) return;
  const holder =
    exhibit.holderId === null
      ? null
      : await AccountRecord.findByPk(exhibit.holderId, { transaction });
  throw conflict(
    holder
      ? `${exhibit.number} is held by ${holder.name}; only they can do this.`
      : `Nobody in the laboratory holds ${exhibit.number}.`,
  );
}

/** An item that waits for its receiver stays as it was offered. */
export function mustNotWait(exhibit: ExhibitRecord): void {
  if (exhibit.pendingSequence !== null) {
    throw conflict(
      `A hand-over of ${exhibit.number} waits for its receiver (event ${exhibit.pendingSequence}). ` +
        'It must be accepted, refused or withdrawn first.',
    );
  }
}

/** Clocks of people and machine may differ a little. */
const toleranceMs = 2 * 60 * 1000;

/** A late entry tells of the past. */
export function mustBePast(happenedAt: string | null): void {
  if (happenedAt !== null && Date.parse(happenedAt) > Date.now() + toleranceMs) {
    throw unprocessable('happenedAt', 'This lies in the future.');
  }
}

/** Nobody did anything with an item before they held it. */
export function mustBeWhileHeld(happenedAt: string | null, exhibit: ExhibitRecord): void {
  mustBePast(happenedAt);
  if (happenedAt === null || exhibit.heldSince === null) return;
  if (Date.parse(happenedAt) < exhibit.heldSince.getTime() - toleranceMs) {
    throw unprocessable(
      'happenedAt',
      `This lies before the item was received (${exhibit.heldSince.toISOString()}).`,
    );
  }
}

/** A seal that is not the recorded one needs an explanation. */
export function mustExplainSeal(exhibit: ExhibitRecord, seal: string, note: string): void {
  if (seal !== '' && seal !== exhibit.seal && exhibit.seal !== '' && note.trim() === '') {
    throw unprocessable(
      'note',
      `The recorded seal is ${exhibit.seal}. Say why it is another one now.`,
    );
  }
}
