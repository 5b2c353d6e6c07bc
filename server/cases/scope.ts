import { Op } from 'sequelize';
import type { CaseRole } from '#shared/contracts/cases';
import type { AccessRule, Endpoint } from '#shared/contracts/endpoint';
import type { AccountRecord } from '../database/models/account';
import { AssignmentRecord, CaseRecord } from '../database/models/case';
import { forbidden, notFound, signInFirst } from '../http/problems';
import type { Services } from '../services';

/**
 * What an account may do in one case. Made here and nowhere else; use cases of a case take a scope,
 * never an id alone, so that nothing of a case is reached without having passed this door.
 */
export interface CaseScope {
  readonly account: AccountRecord;
  readonly caseId: string;
  readonly caseNumber: string;
  readonly record: CaseRecord;
  readonly roles: readonly CaseRole[];
  readonly may: CasePowers;
}

export interface CasePowers {
  /** Exhibits, survey, motion, findings. */
  readonly work: boolean;
  /** Custody of exhibits. */
  readonly custody: boolean;
  /** Brief, stage, release. */
  readonly direct: boolean;
  /** Assign people. */
  readonly assign: boolean;
}

/** The parties for which an attorney reads released summaries. */
export interface PartyScope {
  readonly account: AccountRecord;
  readonly partyIds: readonly string[];
}

interface Admission {
  account: AccountRecord | null;
  scope?: CaseScope;
  party?: PartyScope;
}

/**
 * Decides whether an account may call an endpoint, and gives the scope that its handler works with.
 * What may not be seen does not exist (404); what may be seen but not done is refused (403).
 */
export async function admit(
  services: Services,
  endpoint: Endpoint,
  account: AccountRecord | null,
  params: unknown,
): Promise<Admission> {
  if (endpoint.access === 'public') return { account };
  if (!account) throw signInFirst();
  switch (endpoint.access) {
    case 'signed-in':
      return { account };
    case 'lead':
      if (account.role === 'laboratory-lead') return { account };
      await refuse(services, account, endpoint, params);
      throw account.role === 'investigator'
        ? forbidden('This is for the laboratory lead.')
        : notFound();
    case 'staff':
      if (account.role !== 'attorney') return { account };
      throw notFound();
    case 'party':
      if (account.role !== 'attorney') throw notFound();
      return { account, party: await partyScopeOf(account) };
    default: {
      const scope = await scopeOf(account, caseIdOf(params));
      if (!allows(scope, endpoint.access)) {
        await refuse(services, account, endpoint, params);
        throw forbidden('Your role in this case does not include this.');
      }
      return { account, scope };
    }
  }
}

/** The account's scope in a case, or 404. */
export async function scopeOf(account: AccountRecord, caseId: string): Promise<CaseScope> {
  if (account.role === 'attorney') throw notFound('This case');
  const record = await CaseRecord.findByPk(caseId);
  if (!record) throw notFound('This case');
  const assignments = await AssignmentRecord.findAll({
    where: { caseId, accountId: account.id, endedAt: { [Op.is]: null } },
  });
  const roles = assignments.map((assignment) => assignment.role);
  const lead = account.role === 'laboratory-lead';
  if (!lead && roles.length === 0) throw notFound('This case');
  const work = roles.includes('lead-investigator') || roles.includes('investigator');
  return {
    account,
    caseId,
    caseNumber: record.number,
    record,
    roles,
    may: {
      work,
      custody: work || roles.includes('evidence-custodian'),
      direct: lead || roles.includes('lead-investigator'),
      assign: lead,
    },
  };
}

/** Where clause of the cases that an account may see. */
export async function visibleCaseIds(account: AccountRecord): Promise<'all' | string[]> {
  if (account.role === 'laboratory-lead') return 'all';
  if (account.role === 'attorney') return [];
  const assignments = await AssignmentRecord.findAll({
    where: { accountId: account.id, endedAt: { [Op.is]: null } },
    attributes: ['caseId'],
  });
  return [...new Set(assignments.map((assignment) => assignment.caseId))];
}

async function partyScopeOf(account: AccountRecord): Promise<PartyScope> {
  const assignments = await AssignmentRecord.findAll({
    where: { accountId: account.id, role: 'attorney', endedAt: { [Op.is]: null } },
  });
  return { account, partyIds: assignments.flatMap((a) => (a.partyId === null ? [] : [a.partyId])) };
}

function allows(scope: CaseScope, rule: AccessRule): boolean {
  switch (rule) {
    case 'case-read':
      return true;
    case 'case-work':
      return scope.may.work;
    case 'case-custody':
      return scope.may.custody;
    case 'case-direct':
      return scope.may.direct;
    default:
      return false;
  }
}

function caseIdOf(params: unknown): string {
  return (params as { caseId: string }).caseId;
}

/** A refusal is an event of the access log like every other act. */
async function refuse(
  services: Services,
  account: AccountRecord,
  endpoint: Endpoint,
  params: unknown,
): Promise<void> {
  const caseId = (params as { caseId?: string }).caseId ?? null;
  await services.accessLog.record({
    actor: account,
    action: 'refused',
    caseId,
    subject: endpoint.summary,
    detail: `${endpoint.method} ${endpoint.path}`,
  });
}
