import { UniqueConstraintError, type Transaction } from 'sequelize';
import { v7 as newId } from 'uuid';
import type * as z from 'zod';
import type { RejectedRow, SurveyImport, importSurvey } from '#shared/contracts/survey';
import { SurveyFileProblem } from '#shared/survey/csv-rows';
import {
  apartFromStanding,
  readSurveyCsv,
  type SurveyReading,
  type SurveyRow,
} from '#shared/survey/read-survey-csv';
import type { CaseScope } from '../cases/scope';
import { CaseRecord } from '../database/models/case';
import { ExhibitRecord } from '../database/models/exhibit';
import { MarkRecord, SurveyImportRecord } from '../database/models/mark';
import { fileOf, readTextOf } from '../exhibits/serve-file';
import { conflict, HttpProblem, notFound, unprocessable } from '../http/problems';
import type { Services } from '../services';
import { rowOf } from './marks';
import { presentImport } from './presenter';

type Request = z.output<(typeof importSurvey)['body']>;

const marksAtOnce = 1000;
const mostNamed = 100;

/** Takes in the marks of a survey file: its good rows, or with `strict` all rows or none. */
export async function importMarks(
  services: Services,
  scope: CaseScope,
  request: Request,
  remember: (transaction: Transaction, answer: SurveyImport) => Promise<void>,
): Promise<SurveyImport> {
  const file = await surveyFile(services, scope, request);
  const reading = read(file.text, request);
  const answer = await once(() =>
    services.sequelize.transaction(async (transaction) => {
      const standing = await lockLabels(scope, transaction);
      const { rows, rejected } = apartFromStanding(reading, standing, request.mapping);
      refuseUseless(rows, rejected, request.strict);
      const record = await SurveyImportRecord.create(
        {
          id: newId(),
          caseId: scope.caseId,
          fileId: request.fileId,
          exhibitNumber: file.exhibitNumber,
          fileName: file.name,
          mapping: JSON.stringify(request.mapping),
          rejected: JSON.stringify(rejected),
          accepted: rows.length,
          importedBy: scope.account.id,
          importedAt: new Date(),
        },
        { transaction },
      );
      const marks = rows.map(({ row, raw, entry }) =>
        rowOf(scope, entry, {
          kind: 'import',
          importId: record.id,
          exhibitNumber: file.exhibitNumber,
          fileName: file.name,
          row,
          raw,
        }),
      );
      for (let from = 0; from < marks.length; from += marksAtOnce) {
        await MarkRecord.bulkCreate(marks.slice(from, from + marksAtOnce), { transaction });
      }
      const made = presentImport(record, scope.account.name);
      await remember(transaction, made);
      return made;
    }),
  );
  await services.accessLog.record({
    actor: scope.account,
    action: 'imported survey',
    caseId: scope.caseId,
    subject: `${file.exhibitNumber} ${file.name}`,
    detail: `${answer.accepted} marks, ${answer.rejected.length} rows rejected`,
  });
  return answer;
}

async function surveyFile(
  services: Services,
  scope: CaseScope,
  { exhibitId, fileId }: Request,
): Promise<{ exhibitNumber: string; name: string; text: string }> {
  const file = await fileOf(scope, exhibitId, fileId);
  const exhibit = await ExhibitRecord.findByPk(exhibitId, { attributes: ['number'] });
  if (!exhibit) throw notFound('This exhibit');
  const { name, text } = await readTextOf(services, file);
  return { exhibitNumber: exhibit.number, name, text };
}

function read(text: string, request: Request): SurveyReading {
  try {
    return readSurveyCsv(text, request.mapping);
  } catch (error) {
    if (!(error instanceof SurveyFileProblem)) throw error;
    const field = error.field === 'file' ? 'fileId' : `mapping.${error.field}`;
    throw unprocessable(field, `The file cannot be read so: ${error.message}.`);
  }
}

/** Labels of the case's standing marks; other imports wait until the transaction ends. */
async function lockLabels(scope: CaseScope, transaction: Transaction): Promise<Set<string>> {
  // Locked so that the same file imported twice at one moment is taken in once.
  await CaseRecord.findByPk(scope.caseId, { transaction, lock: transaction.LOCK.UPDATE });
  const standing = await MarkRecord.findAll({
    where: { caseId: scope.caseId, removedAt: null },
    attributes: ['label'],
    raw: true,
    transaction,
  });
  return new Set(standing.map((mark) => mark.label));
}

function refuseUseless(
  rows: readonly SurveyRow[],
  rejected: readonly RejectedRow[],
  strict: boolean,
): void {
  if (rows.length > 0 && !(strict && rejected.length > 0)) return;
  const counted =
    rejected.length === 1 ? '1 row is rejected' : `${rejected.length} rows are rejected`;
  throw new HttpProblem(
    422,
    'Please correct',
    rows.length === 0
      ? `No row of the file can be taken: ${counted}. Nothing was imported.`
      : `${counted}, and all rows or none were asked for. Nothing was imported.`,
    rejected
      .slice(0, mostNamed)
      .map(({ row, field, message }) => ({ field: `row ${row}, ${field}`, message })),
  );
}

async function once<T>(change: () => Promise<T>): Promise<T> {
  try {
    return await change();
  } catch (error) {
    // The request's own key is replayed by the door; a label can only clash with a mark entered just now.
    if (error instanceof UniqueConstraintError && 'marks_label' in error.fields) {
      throw conflict('A mark with one of these labels was entered just now. Import again.');
    }
    throw error;
  }
}
