import { UniqueConstraintError, type Transaction } from 'sequelize';
import { v7 as newId } from 'uuid';
import type * as z from 'zod';
import type {
  Mark,
  MarkChange,
  SurveyImport,
  editMark,
  markEntry,
  markSource,
} from '#shared/contracts/survey';
import { namesOf } from '../cases/case-file';
import type { CaseScope } from '../cases/scope';
import { MarkHistoryRecord, MarkRecord, SurveyImportRecord } from '../database/models/mark';
import { conflict, notFound, stale, unprocessable } from '../http/problems';
import type { Services } from '../services';
import { presentChange, presentImport, presentMark } from './presenter';

type Entry = z.output<typeof markEntry>;

/** The marks that stand, in the order in which they were taken in, and the imports, newest first. */
export async function listMarks(
  scope: CaseScope,
): Promise<{ items: Mark[]; imports: SurveyImport[] }> {
  const { caseId } = scope;
  const [marks, imports] = await Promise.all([
    // Rows, not instances: a survey has thousands of marks, and instances cost two to three times as much.
    MarkRecord.findAll({ where: { caseId, removedAt: null }, order: [['id', 'ASC']], raw: true }),
    SurveyImportRecord.findAll({ where: { caseId }, order: [['id', 'DESC']] }),
  ]);
  const names = await namesOf(imports.map((record) => record.importedBy));
  return {
    items: marks.map(presentMark),
    imports: imports.map((record) => presentImport(record, names.get(record.importedBy) ?? '')),
  };
}

export async function enterMark(services: Services, scope: CaseScope, entry: Entry): Promise<Mark> {
  const record = await namingLabel(entry.label, () =>
    MarkRecord.create(
      rowOf(scope, entry, { kind: 'entry', by: scope.account.name, raw: entry.raw }),
    ),
  );
  await note(services, scope, 'entered mark', entry.label);
  return presentMark(await record.reload());
}

/**
 * Changes exactly the version that was opened; a newer one is answered with what stands. A mark whose
 * place or uncertainty is changed no longer has them from its file, and its source then says so.
 */
export async function changeMark(
  services: Services,
  scope: CaseScope,
  markId: string,
  version: number,
  { reason, ...entry }: z.output<(typeof editMark)['body']>,
): Promise<Mark> {
  const changed = await namingLabel(entry.label, () =>
    services.sequelize.transaction(async (transaction) => {
      const record = await lockMark(scope, markId, version, transaction);
      const before = presentMark(record);
      await keep(scope, record, reason, transaction);
      const source =
        before.source.kind === 'entry' || moved(before, entry)
          ? { kind: 'entry' as const, by: scope.account.name, raw: entry.raw }
          : before.source;
      return record.update(
        { ...columnsOf(entry), source: JSON.stringify(source), version: version + 1 },
        { transaction },
      );
    }),
  );
  await note(services, scope, 'changed mark', entry.label, reason);
  return presentMark(changed);
}

/** Takes a mark out of the survey; it and the reason stay in the history. */
export async function withdrawMark(
  services: Services,
  scope: CaseScope,
  markId: string,
  version: number,
  reason: string,
): Promise<void> {
  const label = await services.sequelize.transaction(async (transaction) => {
    const record = await lockMark(scope, markId, version, transaction);
    await keep(scope, record, reason, transaction);
    await record.update({ removedAt: new Date(), version: version + 1 }, { transaction });
    return record.label;
  });
  await note(services, scope, 'withdrew mark', label, reason);
}

/** What every changed mark was before, newest change first. */
export async function listChanges(scope: CaseScope): Promise<{ items: MarkChange[] }> {
  const { caseId } = scope;
  const records = await MarkHistoryRecord.findAll({ where: { caseId }, order: [['id', 'DESC']] });
  const gone = await MarkRecord.findAll({
    where: { id: [...new Set(records.map((record) => record.markId))] },
    attributes: ['id', 'version', 'removedAt'],
  });
  // Nothing follows a withdrawal, so it is the last change of a mark that does not stand.
  const withdrawnAt = new Map(
    gone.filter((mark) => mark.removedAt !== null).map((mark) => [mark.id, mark.version - 1]),
  );
  const names = await namesOf(records.map((record) => record.changedBy));
  return {
    items: records.map((record) =>
      presentChange(
        record,
        names.get(record.changedBy) ?? '',
        withdrawnAt.get(record.markId) === record.version,
      ),
    ),
  };
}

/** The row of a new mark. */
export const rowOf = (scope: CaseScope, entry: Entry, source: z.input<typeof markSource>) => ({
  id: newId(),
  caseId: scope.caseId,
  ...columnsOf(entry),
  source: JSON.stringify(source),
});

function columnsOf({ label, kind, at, sigma, correlation, height, trace, order, note }: Entry) {
  const [sx, sy] = sigma;
  return {
    label,
    kind,
    x: at[0],
    y: at[1],
    varX: sx * sx,
    covXy: correlation * sx * sy,
    varY: sy * sy,
    height,
    trace: trace === '' ? null : trace,
    place: order,
    note,
  };
}

function moved(before: Mark, entry: Entry): boolean {
  const { x, y, varX, covXy, varY, height } = columnsOf(entry);
  const [[beforeX, beforeXy], [, beforeY]] = before.covariance;
  // A standard uncertainty squared, rooted and squared again differs in its last digits.
  const differ = (a: number, b: number) => Math.abs(a - b) > 1e-9 * Math.max(beforeX, beforeY);
  return (
    x !== before.at[0] ||
    y !== before.at[1] ||
    height !== before.height ||
    differ(varX, beforeX) ||
    differ(covXy, beforeXy) ||
    differ(varY, beforeY)
  );
}

/** The mark at the version that the person opened, held until the transaction ends. */
async function lockMark(
  scope: CaseScope,
  markId: string,
  version: number,
  transaction: Transaction,
): Promise<MarkRecord> {
  const record = await MarkRecord.findOne({
    where: { id: markId, caseId: scope.caseId },
    transaction,
    lock: transaction.LOCK.UPDATE,
  });
  if (!record) throw notFound('This mark');
  if (record.removedAt !== null) {
    throw conflict('This mark was withdrawn; its history says by whom and why.');
  }
  if (record.version !== version) throw stale(presentMark(record));
  return record;
}

async function keep(
  scope: CaseScope,
  record: MarkRecord,
  reason: string,
  transaction: Transaction,
): Promise<void> {
  const { version, ...before } = presentMark(record);
  await MarkHistoryRecord.create(
    {
      id: newId(),
      markId: record.id,
      caseId: scope.caseId,
      version,
      beforeChange: JSON.stringify(before),
      reason,
      changedBy: scope.account.id,
      changedAt: new Date(),
    },
    { transaction },
  );
}

/** The database keeps labels of standing marks apart, also for two entries at one moment. */
async function namingLabel<T>(label: string, change: () => Promise<T>): Promise<T> {
  try {
    return await change();
  } catch (error) {
    if (!(error instanceof UniqueConstraintError)) throw error;
    throw unprocessable('label', `Another mark of this case has the label "${label}".`);
  }
}

const note = (
  services: Services,
  scope: CaseScope,
  action: string,
  label: string,
  detail = '',
): Promise<void> =>
  services.accessLog.record({
    actor: scope.account,
    action,
    caseId: scope.caseId,
    subject: `mark ${label}`,
    detail,
  });
