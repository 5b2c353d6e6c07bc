import type { Transaction } from 'sequelize';
import * as z from 'zod';
import { figure, type Figure, type Findings, type findingsEntry } from '#shared/contracts/findings';
import type { CaseScope } from '../cases/scope';
import { CaseRecord, QuestionRecord } from '../database/models/case';
import { FindingsRecord } from '../database/models/findings';
import { invalid, stale } from '../http/problems';
import type { Services } from '../services';
import { readFigure } from './read-figure';

type Entry = z.output<typeof findingsEntry>;
type FieldErrors = { field: string; message: string }[];

/** What is kept: answers by number, figures as they were read from their computations. */
const kept = z.object({
  answers: z.array(z.object({ questionNumber: z.int(), text: z.string() })),
  figures: z.array(figure),
  dependsOn: z.string(),
  against: z.string(),
});

const nothingYet: z.output<typeof kept> = { answers: [], figures: [], dependsOn: '', against: '' };

/** The findings with every question of the case, answered or not. */
export async function findingsOf(scope: CaseScope, transaction?: Transaction): Promise<Findings> {
  const { caseId } = scope;
  const [record, questions] = await Promise.all([
    FindingsRecord.findByPk(caseId, { transaction }),
    QuestionRecord.findAll({ where: { caseId }, order: [['number', 'ASC']], transaction }),
  ]);
  const document = record ? kept.parse(JSON.parse(record.document)) : nothingYet;
  const texts = new Map(document.answers.map(({ questionNumber, text }) => [questionNumber, text]));
  return {
    ...document,
    answers: questions.map(({ number, text }) => ({
      questionNumber: number,
      question: text,
      text: texts.get(number) ?? '',
    })),
    version: record?.version ?? 1,
    changedAt: record?.changedAt.toISOString() ?? null,
  };
}

/** Saves over exactly the version that was edited. Figures are read here, from what was recorded. */
export async function saveFindings(
  services: Services,
  scope: CaseScope,
  version: number,
  entry: Entry,
): Promise<Findings> {
  const { caseId, account } = scope;
  await checkAnswers(caseId, entry);
  const document = JSON.stringify({ ...entry, figures: await readFigures(scope, entry.figures) });
  const saved = await services.sequelize.transaction(async (transaction) => {
    // The case is locked, so that two first savings at once do not both win.
    await CaseRecord.findByPk(caseId, { transaction, lock: transaction.LOCK.UPDATE });
    const before = await FindingsRecord.findByPk(caseId, { transaction });
    if ((before?.version ?? 1) !== version) return false;
    const changes = {
      document,
      version: version + 1,
      changedBy: account.id,
      changedAt: new Date(),
    };
    if (before) await before.update(changes, { transaction });
    else await FindingsRecord.create({ caseId, ...changes }, { transaction });
    return true;
  });
  const now = await findingsOf(scope);
  if (!saved) throw stale(now);
  await services.accessLog.record({
    actor: account,
    action: 'saved findings',
    caseId,
    subject: scope.caseNumber,
    detail: `version ${version + 1}`,
  });
  return now;
}

async function checkAnswers(caseId: string, entry: Entry): Promise<void> {
  const questions = await QuestionRecord.findAll({ where: { caseId } });
  const numbers = new Set(questions.map(({ number }) => number));
  const answered = new Set<number>();
  const errors: FieldErrors = [];
  entry.answers.forEach(({ questionNumber }, i) => {
    const field = `answers.${i}.questionNumber`;
    if (!numbers.has(questionNumber)) {
      errors.push({ field, message: `There is no question ${questionNumber}.` });
    } else if (answered.has(questionNumber)) {
      errors.push({ field, message: `Question ${questionNumber} is answered twice.` });
    }
    answered.add(questionNumber);
  });
  if (errors.length > 0) throw invalid(errors);
}

async function readFigures(scope: CaseScope, choices: Entry['figures']): Promise<Figure[]> {
  const figures: Figure[] = [];
  const errors: FieldErrors = [];
  for (const [i, choice] of choices.entries()) {
    const read = await readFigure(scope, choice);
    if (typeof read === 'string') errors.push({ field: `figures.${i}`, message: read });
    else figures.push(read);
  }
  if (errors.length > 0) throw invalid(errors);
  return figures;
}
