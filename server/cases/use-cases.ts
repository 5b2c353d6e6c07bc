import { Op, QueryTypes, type Transaction, type WhereOptions } from 'sequelize';
import { v7 as newId } from 'uuid';
import type { z } from 'zod';
import type {
  Assignment,
  CaseSummary,
  Party,
  Question,
  assign,
  moveStage,
  openCase,
} from '#shared/contracts/cases';
import type { Brief } from '#shared/contracts/cases';
import { AccountRecord } from '../database/models/account';
import { AssignmentRecord, CaseRecord, PartyRecord, QuestionRecord } from '../database/models/case';
import { conflict, notFound, stale, unprocessable } from '../http/problems';
import type { Services } from '../services';
import { namesOf, presentAssignment, presentCase, presentSummary } from './case-file';
import { scopeOf, visibleCaseIds, type CaseScope } from './scope';

/** A page of the cases that the account may see, newest number first. */
export async function listCases(
  account: AccountRecord,
  { after, limit }: { after?: string; limit: number },
): Promise<{ items: CaseSummary[]; next: string | null }> {
  const visible = await visibleCaseIds(account);
  const where: WhereOptions[] = [];
  if (visible !== 'all') where.push({ id: visible });
  if (after !== undefined) where.push({ number: { [Op.lt]: after } });
  const records = await CaseRecord.findAll({
    where: { [Op.and]: where },
    order: [['number', 'DESC']],
    limit: limit + 1,
  });
  const shown = records.slice(0, limit);
  const leads = await AssignmentRecord.findAll({
    where: {
      caseId: shown.map((record) => record.id),
      role: 'lead-investigator',
      endedAt: { [Op.is]: null },
    },
  });
  const names = await namesOf(leads.map((lead) => lead.accountId));
  const leadOf = new Map(leads.map((lead) => [lead.caseId, names.get(lead.accountId) ?? null]));
  return {
    items: shown.map((record) => presentSummary(record, leadOf.get(record.id) ?? null)),
    next: records.length > limit ? (shown.at(-1)?.number ?? null) : null,
  };
}

/** Opens a case under the next number of the year; numbers are never used again. */
export async function openNewCase(
  services: Services,
  account: AccountRecord,
  entry: z.output<(typeof openCase)['body']>,
): Promise<CaseScope> {
  const id = newId();
  const number = await services.sequelize.transaction(async (transaction) => {
    const next = await nextNumber(services, transaction);
    await CaseRecord.create(
      {
        circumstances: '',
        ...entry,
        id,
        number: next,
        stage: 'opened',
        openedAt: new Date(),
        version: 1,
      } as never,
      { transaction },
    );
    return next;
  });
  await services.accessLog.record({
    actor: account,
    action: 'opened case',
    caseId: id,
    subject: number,
    detail: entry.title,
  });
  return scopeOf(account, id);
}

async function nextNumber(services: Services, transaction: Transaction): Promise<string> {
  const year = new Date().getUTCFullYear();
  // The highest number of the year is locked: two cases opened at once do not get the same one.
  const [row] = await services.sequelize.query<{ number: string }>(
    `SELECT number FROM cases WHERE number LIKE '${year}-%' ORDER BY LENGTH(number) DESC, number DESC
      LIMIT 1 FOR UPDATE`,
    { type: QueryTypes.SELECT, transaction },
  );
  const last = row ? Number(row.number.slice(5)) : 0;
  return `${year}-${String(last + 1).padStart(3, '0')}`;
}

export async function changeBrief(
  services: Services,
  scope: CaseScope,
  version: number,
  changes: Partial<Brief>,
): Promise<void> {
  const [changed] = await CaseRecord.update(
    { ...changes, version: version + 1 },
    { where: { id: scope.caseId, version } },
  );
  if (changed === 0) throw stale(await presentCase(scope));
  await services.accessLog.record({
    actor: scope.account,
    action: 'changed brief',
    caseId: scope.caseId,
    subject: scope.caseNumber,
    detail: Object.keys(changes).join(', '),
  });
}

export async function addCaseParty(
  services: Services,
  scope: CaseScope,
  entry: { name: string; role: string },
): Promise<Party> {
  const added = await PartyRecord.create({ id: newId(), caseId: scope.caseId, ...entry });
  await services.accessLog.record({
    actor: scope.account,
    action: 'added party',
    caseId: scope.caseId,
    subject: entry.name,
    detail: entry.role,
  });
  return { id: added.id, name: added.name, role: added.role };
}

export async function addCaseQuestion(
  services: Services,
  scope: CaseScope,
  text: string,
): Promise<Question> {
  const added = await services.sequelize.transaction(async (transaction) => {
    await CaseRecord.findByPk(scope.caseId, { transaction, lock: transaction.LOCK.UPDATE });
    const count = await QuestionRecord.count({ where: { caseId: scope.caseId }, transaction });
    return QuestionRecord.create(
      { id: newId(), caseId: scope.caseId, number: count + 1, text },
      { transaction },
    );
  });
  await services.accessLog.record({
    actor: scope.account,
    action: 'added question',
    caseId: scope.caseId,
    subject: `question ${added.number}`,
    detail: text,
  });
  return { id: added.id, number: added.number, text };
}

export async function assignPerson(
  services: Services,
  scope: CaseScope,
  entry: z.output<(typeof assign)['body']>,
): Promise<Assignment> {
  const person = await AccountRecord.findOne({ where: { id: entry.accountId, active: true } });
  if (!person) throw unprocessable('accountId', 'There is no such account.');
  await checkRole(scope, person, entry);
  const record = await services.sequelize.transaction(async (transaction) => {
    const locked = await CaseRecord.findByPk(scope.caseId, {
      transaction,
      lock: transaction.LOCK.UPDATE,
    });
    if (!locked) throw notFound('This case');
    const others = await AssignmentRecord.findAll({
      where: { caseId: scope.caseId, endedAt: { [Op.is]: null } },
      transaction,
    });
    checkAgainstOthers(others, entry);
    const made = await AssignmentRecord.create(
      {
        id: newId(),
        caseId: scope.caseId,
        accountId: entry.accountId,
        role: entry.role,
        partyId: entry.partyId,
        conflict: entry.declaration.conflict,
        conflictStatement: entry.declaration.statement,
        overrideReason: entry.overrideReason ?? null,
        assignedBy: scope.account.id,
        assignedAt: new Date(),
        endedAt: null,
      },
      { transaction },
    );
    if (locked.stage === 'opened' && entry.role === 'lead-investigator') {
      await locked.update({ stage: 'assigned', version: locked.version + 1 }, { transaction });
    }
    return made;
  });
  await services.accessLog.record({
    actor: scope.account,
    action: 'assigned',
    caseId: scope.caseId,
    subject: person.name,
    detail: `${entry.role}; ${entry.declaration.conflict ? `possible conflict, reason: ${entry.overrideReason ?? ''}` : 'no conflict declared'}`,
  });
  return presentAssignment(record, person.name);
}

async function checkRole(
  scope: CaseScope,
  person: AccountRecord,
  entry: z.output<(typeof assign)['body']>,
): Promise<void> {
  if ((entry.role === 'attorney') !== (person.role === 'attorney')) {
    throw unprocessable(
      'role',
      person.role === 'attorney'
        ? 'An attorney can only be assigned as the attorney of a party.'
        : 'Only an attorney account can be assigned as an attorney.',
    );
  }
  if (entry.role === 'attorney') {
    const party =
      entry.partyId === null
        ? null
        : await PartyRecord.findOne({ where: { id: entry.partyId, caseId: scope.caseId } });
    if (!party) throw unprocessable('partyId', 'Say for which party of this case.');
  } else if (entry.partyId !== null) {
    throw unprocessable('partyId', 'Only an attorney acts for a party.');
  }
  if (entry.declaration.conflict && (entry.overrideReason ?? '').trim() === '') {
    throw unprocessable(
      'overrideReason',
      'A possible conflict of interest was declared: assigning all the same needs a reason.',
    );
  }
}

function checkAgainstOthers(
  others: readonly AssignmentRecord[],
  entry: z.output<(typeof assign)['body']>,
): void {
  const same = others.filter((other) => other.accountId === entry.accountId);
  if (same.some((other) => other.role === entry.role && other.partyId === entry.partyId)) {
    throw conflict('This person has this role in the case already.');
  }
  if (
    entry.role === 'lead-investigator' &&
    others.some((other) => other.role === 'lead-investigator')
  ) {
    throw conflict('The case has a lead investigator already; end that assignment first.');
  }
  const does = (role: string) => role === 'lead-investigator' || role === 'investigator';
  if (
    (entry.role === 'technical-reviewer' && same.some((other) => does(other.role))) ||
    (does(entry.role) && same.some((other) => other.role === 'technical-reviewer'))
  ) {
    throw conflict('Nobody reviews what they made: reviewer and investigator must be two people.');
  }
  if (entry.role === 'attorney' && same.some((other) => other.role === 'attorney')) {
    throw conflict('An attorney acts for one party of a case only.');
  }
}

export async function endCaseAssignment(
  services: Services,
  scope: CaseScope,
  assignmentId: string,
): Promise<void> {
  const [ended] = await AssignmentRecord.update(
    { endedAt: new Date() },
    { where: { id: assignmentId, caseId: scope.caseId, endedAt: { [Op.is]: null } } },
  );
  if (ended === 0) throw notFound('This assignment');
  const record = await AssignmentRecord.findByPk(assignmentId);
  const names = await namesOf(record ? [record.accountId] : []);
  await services.accessLog.record({
    actor: scope.account,
    action: 'ended assignment',
    caseId: scope.caseId,
    subject: [...names.values()][0] ?? assignmentId,
    detail: record?.role ?? '',
  });
}

export async function moveCaseStage(
  services: Services,
  scope: CaseScope,
  version: number,
  { stage, reason }: z.output<(typeof moveStage)['body']>,
): Promise<void> {
  const before = scope.record.stage;
  const [changed] = await CaseRecord.update(
    { stage, version: version + 1 },
    { where: { id: scope.caseId, version } },
  );
  if (changed === 0) throw stale(await presentCase(scope));
  await services.accessLog.record({
    actor: scope.account,
    action: 'moved stage',
    caseId: scope.caseId,
    subject: scope.caseNumber,
    detail: `${before} → ${stage}${reason === '' ? '' : `; ${reason}`}`,
  });
}
