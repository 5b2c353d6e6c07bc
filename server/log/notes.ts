import { v7 as newId } from 'uuid';
import type * as z from 'zod';
import type { Note, addNote } from '#shared/contracts/log';
import { namesOf } from '../cases/case-file';
import type { CaseScope } from '../cases/scope';
import { CaseRecord } from '../database/models/case';
import { NoteRecord } from '../database/models/note';
import { unprocessable } from '../http/problems';
import type { Services } from '../services';

const present = (record: NoteRecord, author: string): Note => ({
  id: record.id,
  number: record.number,
  author,
  recordedAt: record.recordedAt.toISOString(),
  happenedAt: record.happenedAt?.toISOString() ?? null,
  text: record.text,
  correctsNumber: record.correctsNumber,
});

/** Notes of the case, oldest first. */
export async function listNotes(scope: CaseScope): Promise<{ items: Note[] }> {
  const records = await NoteRecord.findAll({
    where: { caseId: scope.caseId },
    order: [['number', 'ASC']],
  });
  const names = await namesOf(records.map((record) => record.authorId));
  return { items: records.map((record) => present(record, names.get(record.authorId) ?? '')) };
}

/** Writes a note under the next number. Notes are never changed: a correction names the earlier one. */
export async function writeNote(
  services: Services,
  scope: CaseScope,
  entry: z.output<(typeof addNote)['body']>,
): Promise<Note> {
  const { caseId, account } = scope;
  const record = await services.sequelize.transaction(async (transaction) => {
    // Locked so that two notes written at once do not take the same number.
    await CaseRecord.findByPk(caseId, { transaction, lock: transaction.LOCK.UPDATE });
    const last =
      (await NoteRecord.max<number | null, NoteRecord>('number', {
        where: { caseId },
        transaction,
      })) ?? 0;
    if (entry.correctsNumber !== null && entry.correctsNumber > last) {
      throw unprocessable('correctsNumber', `There is no note ${entry.correctsNumber}.`);
    }
    return NoteRecord.create(
      {
        id: newId(),
        caseId,
        number: last + 1,
        authorId: account.id,
        recordedAt: new Date(),
        happenedAt: entry.happenedAt === null ? null : new Date(entry.happenedAt),
        text: entry.text,
        correctsNumber: entry.correctsNumber,
      },
      { transaction },
    );
  });
  await services.accessLog.record({
    actor: account,
    action: 'wrote note',
    caseId,
    subject: `note ${record.number}`,
    detail: record.correctsNumber === null ? '' : `corrects note ${record.correctsNumber}`,
  });
  return present(record, account.name);
}
