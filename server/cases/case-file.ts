import { Op } from 'sequelize';
import type { z } from 'zod';
import type { Assignment, CaseSummary, caseFile } from '#shared/contracts/cases';
import { AccountRecord } from '../database/models/account';
import {
  AssignmentRecord,
  PartyRecord,
  QuestionRecord,
  type CaseRecord,
} from '../database/models/case';
import { caseCounts } from './counts';
import type { CaseScope } from './scope';

export const presentAssignment = (record: AssignmentRecord, name: string): Assignment => ({
  id: record.id,
  accountId: record.accountId,
  name,
  role: record.role,
  partyId: record.partyId,
  declaration: { conflict: Boolean(record.conflict), statement: record.conflictStatement },
  assignedAt: record.assignedAt.toISOString(),
});

export const presentSummary = (
  record: CaseRecord,
  leadInvestigator: string | null,
): CaseSummary => ({
  id: record.id,
  number: record.number,
  title: record.title,
  kind: record.kind,
  stage: record.stage,
  leadInvestigator,
  dueOn: record.dueOn,
  openedAt: record.openedAt.toISOString(),
});

/** The whole case file as one answer. */
export async function presentCase(scope: CaseScope): Promise<z.input<typeof caseFile>> {
  const { record, caseId } = scope;
  await record.reload();
  const [parties, questions, assignments, counts] = await Promise.all([
    PartyRecord.findAll({ where: { caseId }, order: [['id', 'ASC']] }),
    QuestionRecord.findAll({ where: { caseId }, order: [['number', 'ASC']] }),
    AssignmentRecord.findAll({
      where: { caseId, endedAt: { [Op.is]: null } },
      order: [['id', 'ASC']],
    }),
    caseCounts(caseId),
  ]);
  const names = await namesOf(assignments.map((assignment) => assignment.accountId));
  const people = assignments.map((a) => presentAssignment(a, names.get(a.accountId) ?? ''));
  const lead = people.find((person) => person.role === 'lead-investigator')?.name ?? null;
  return {
    ...presentSummary(record, lead),
    commissionedBy: record.commissionedBy,
    jurisdiction: record.jurisdiction,
    incidentOn: record.incidentOn,
    place: record.place,
    circumstances: record.circumstances,
    speedUnit: record.speedUnit,
    xAxisBearing: record.xAxisBearing,
    kind: record.kind as z.input<typeof caseFile>['kind'],
    version: record.version,
    parties: parties.map(({ id, name, role }) => ({ id, name, role })),
    questions: questions.map(({ id, number, text }) => ({ id, number, text })),
    assignments: people,
    may: scope.may,
    counts,
  };
}

export async function namesOf(accountIds: readonly string[]): Promise<Map<string, string>> {
  const accounts = await AccountRecord.findAll({
    where: { id: [...new Set(accountIds)] },
    attributes: ['id', 'name'],
  });
  return new Map(accounts.map((account) => [account.id, account.name]));
}
