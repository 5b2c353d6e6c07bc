import * as z from 'zod';
import { caseParams, day, id, line, moment, page, pageQuery, prose, version } from './common';
import { endpoint } from './endpoint';

export const caseStages = [
  'opened',
  'assigned',
  'in-examination',
  'in-technical-review',
  'issued',
  'disclosed',
  'closed',
] as const;
export type CaseStage = (typeof caseStages)[number];

export const caseRoles = [
  'lead-investigator',
  'investigator',
  'technical-reviewer',
  'evidence-custodian',
  'attorney',
] as const;
export type CaseRole = (typeof caseRoles)[number];

export const incidentKinds = [
  'road, one vehicle',
  'road, two vehicles',
  'road, articulated',
  'road, person on foot',
  'machine, linkage',
  'machine, chain',
  'other',
] as const;

export const party = z.object({ id, name: z.string(), role: z.string() });
export type Party = z.infer<typeof party>;

export const question = z.object({ id, number: z.int().min(1), text: z.string() });
export type Question = z.infer<typeof question>;

export const conflictDeclaration = z.strictObject({
  /** True: the person has a possible conflict of interest; the assignment then needs a reason. */
  conflict: z.boolean(),
  statement: line(2000),
});

export const assignment = z.object({
  id,
  accountId: id,
  name: z.string(),
  role: z.enum(caseRoles),
  /** The party that an attorney acts for. */
  partyId: id.nullable(),
  declaration: conflictDeclaration,
  assignedAt: moment,
});
export type Assignment = z.infer<typeof assignment>;

/** What may be done in the case by the one who asks; the server decides, screens follow. */
export const mayDo = z.object({
  work: z.boolean(),
  custody: z.boolean(),
  direct: z.boolean(),
  assign: z.boolean(),
});

export const caseSummary = z.object({
  id,
  number: z.string(),
  title: z.string(),
  kind: z.string(),
  stage: z.enum(caseStages),
  leadInvestigator: z.string().nullable(),
  dueOn: day.nullable(),
  openedAt: moment,
});
export type CaseSummary = z.infer<typeof caseSummary>;

export const brief = z.strictObject({
  title: line(160),
  kind: z.enum(incidentKinds),
  commissionedBy: prose(400),
  jurisdiction: prose(200),
  incidentOn: day.nullable(),
  place: prose(400),
  circumstances: prose(),
  dueOn: day.nullable(),
  /** Speeds are shown in this unit beside m/s. */
  speedUnit: z.enum(['km/h', 'mph', 'm/s']),
  /** Bearing of the scene's +x axis, rad clockwise from north; null for machines. */
  xAxisBearing: z.number().nullable(),
});
export type Brief = z.infer<typeof brief>;

export const caseFile = caseSummary.extend({
  ...brief.shape,
  title: z.string(),
  version,
  parties: z.array(party),
  questions: z.array(question),
  assignments: z.array(assignment),
  may: mayDo,
  counts: z.object({
    exhibits: z.int(),
    marks: z.int(),
    computations: z.int(),
    releases: z.int(),
  }),
});
export type CaseFile = z.infer<typeof caseFile>;

export const listCases = endpoint({
  method: 'GET',
  path: '/api/cases',
  summary: 'Cases that the account may see, newest number first',
  access: 'staff',
  query: pageQuery,
  response: page(caseSummary),
});

export const openCase = endpoint({
  method: 'POST',
  path: '/api/cases',
  summary: 'Open a case; it gets the next number of the year',
  access: 'lead',
  body: brief.partial().required({ title: true, kind: true }),
  response: caseFile,
  status: 201,
});

export const readCase = endpoint({
  method: 'GET',
  path: '/api/cases/:caseId',
  summary: 'The case file: brief, parties, questions, people',
  access: 'case-read',
  params: caseParams,
  response: caseFile,
});

export const editBrief = endpoint({
  method: 'PATCH',
  path: '/api/cases/:caseId',
  summary: 'Change the brief',
  access: 'case-direct',
  params: caseParams,
  body: brief.partial(),
  response: caseFile,
  ifMatch: true,
});

export const addParty = endpoint({
  method: 'POST',
  path: '/api/cases/:caseId/parties',
  summary: 'Add a party',
  access: 'case-direct',
  params: caseParams,
  body: z.strictObject({ name: line(160), role: line(80) }),
  response: party,
  status: 201,
});

export const addQuestion = endpoint({
  method: 'POST',
  path: '/api/cases/:caseId/questions',
  summary: 'Add a question to answer; it gets the next number',
  access: 'case-direct',
  params: caseParams,
  body: z.strictObject({ text: line(1000) }),
  response: question,
  status: 201,
});

export const assign = endpoint({
  method: 'POST',
  path: '/api/cases/:caseId/assignments',
  summary: 'Assign a person to a case role, with their conflict-of-interest declaration',
  access: 'lead',
  params: caseParams,
  body: z.strictObject({
    accountId: id,
    role: z.enum(caseRoles),
    partyId: id.nullable().default(null),
    declaration: conflictDeclaration,
    /** Needed when the declaration states a possible conflict. */
    overrideReason: prose(2000).optional(),
  }),
  response: assignment,
  status: 201,
});

export const endAssignment = endpoint({
  method: 'DELETE',
  path: '/api/cases/:caseId/assignments/:assignmentId',
  summary: 'End an assignment; the record of it stays',
  access: 'lead',
  params: caseParams.extend({ assignmentId: id }),
  response: null,
});

export const moveStage = endpoint({
  method: 'POST',
  path: '/api/cases/:caseId/stage',
  summary: 'Move the case to another stage, with the reason',
  access: 'case-direct',
  params: caseParams,
  body: z.strictObject({ stage: z.enum(caseStages), reason: prose(2000).default('') }),
  response: caseFile,
  ifMatch: true,
});
