import * as z from 'zod';
import {
  caseParams,
  covariance2,
  finite,
  id,
  line,
  moment,
  positive,
  prose,
  version,
} from './common';
import { endpoint } from './endpoint';

export const markKinds = [
  'tyre mark',
  'skid mark',
  'yaw mark',
  'scrub',
  'gouge',
  'scrape',
  'witness mark',
  'debris',
  'fluid',
  'point of rest',
  'road edge',
  'line marking',
  'control point',
  'other',
] as const;
export type MarkKind = (typeof markKinds)[number];

/** Where a mark came from: a row of a survey file, or a person's entry. */
export const markSource = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('import'),
    importId: id,
    exhibitNumber: z.string(),
    fileName: z.string(),
    /** Line of the file, the header being 1. */
    row: z.int(),
    /** The row word for word. */
    raw: z.string(),
  }),
  z.object({ kind: z.literal('entry'), by: z.string(), raw: z.string() }),
]);

/** Scene coordinates in metres; the covariance in m². A mark without uncertainty is refused. */
export const mark = z.object({
  id,
  label: z.string(),
  kind: z.enum(markKinds),
  at: z.tuple([finite, finite]),
  covariance: covariance2,
  height: finite.nullable(),
  /** Name of the trace (a mark that is a line) that this point is on, and its place along it. */
  trace: z.string().nullable(),
  order: z.int().nullable(),
  note: z.string(),
  source: markSource,
  version,
});
export type Mark = z.infer<typeof mark>;

export const markEntry = z.strictObject({
  label: line(40),
  kind: z.enum(markKinds),
  at: z.tuple([finite, finite]),
  /** Standard uncertainties along x and y in metres, and their correlation. */
  sigma: z.tuple([positive.max(100, 'is over 100 m'), positive.max(100, 'is over 100 m')]),
  correlation: z.number().gt(-1).lt(1).default(0),
  height: finite.nullable().default(null),
  trace: z.string().trim().max(40).nullable().default(null),
  order: z.int().min(0).nullable().default(null),
  note: prose(1000).default(''),
  /** What was typed, word for word with its units. */
  raw: prose(400).default(''),
});
export type MarkEntry = z.input<typeof markEntry>;

export const lengthUnits = ['m', 'cm', 'mm', 'ft', 'in'] as const;
export type LengthUnit = (typeof lengthUnits)[number];

/** How the columns of a survey file are read. Column values are header names. */
export const surveyMapping = z.strictObject({
  delimiter: z.enum([',', ';', '\t']),
  decimal: z.enum(['.', ',']),
  unit: z.enum(lengthUnits),
  /** Unit of the uncertainty columns and of `sigma` below. */
  sigmaUnit: z.enum(lengthUnits),
  label: z.string().min(1),
  x: z.string().min(1),
  y: z.string().min(1),
  height: z.string().nullable(),
  sigmaX: z.string().nullable(),
  sigmaY: z.string().nullable(),
  /** Used where the file has no uncertainty of its own; null: such rows are rejected. */
  sigma: positive.nullable(),
  code: z.string().nullable(),
  trace: z.string().nullable(),
  order: z.string().nullable(),
  note: z.string().nullable(),
  /** What each code of the file means; codes not listed are kept as 'other' and reported. */
  kinds: z.record(z.string(), z.enum(markKinds)),
});
export type SurveyMapping = z.infer<typeof surveyMapping>;

export const rejectedRow = z.object({
  row: z.int(),
  raw: z.string(),
  field: z.string(),
  message: z.string(),
});
export type RejectedRow = z.infer<typeof rejectedRow>;

export const surveyImport = z.object({
  id,
  exhibitNumber: z.string(),
  fileName: z.string(),
  importedAt: moment,
  by: z.string(),
  accepted: z.int(),
  rejected: z.array(rejectedRow),
});
export type SurveyImport = z.infer<typeof surveyImport>;

/** A change of a mark: what it was before, who changed it, and why. */
export const markChange = z.object({
  markId: id,
  /** The version that was changed. */
  version,
  withdrawn: z.boolean(),
  before: mark.omit({ version: true }),
  reason: z.string(),
  by: z.string(),
  at: moment,
});
export type MarkChange = z.infer<typeof markChange>;

const markParams = caseParams.extend({ markId: id });

export const listMarks = endpoint({
  method: 'GET',
  path: '/api/cases/:caseId/marks',
  summary: 'Every measured mark of the case',
  access: 'case-read',
  params: caseParams,
  response: z.object({ items: z.array(mark), imports: z.array(surveyImport) }),
});

export const addMark = endpoint({
  method: 'POST',
  path: '/api/cases/:caseId/marks',
  summary: 'Enter a mark by coordinates',
  access: 'case-work',
  params: caseParams,
  body: markEntry,
  response: mark,
  status: 201,
});

export const editMark = endpoint({
  method: 'PUT',
  path: '/api/cases/:caseId/marks/:markId',
  summary: 'Change a mark; what it was before stays in its history',
  access: 'case-work',
  params: markParams,
  body: markEntry.extend({ reason: line(1000) }),
  response: mark,
  ifMatch: true,
});

export const removeMark = endpoint({
  method: 'DELETE',
  path: '/api/cases/:caseId/marks/:markId',
  summary: 'Withdraw a mark; it stays in the history with the reason',
  access: 'case-work',
  params: markParams,
  query: z.strictObject({ reason: line(1000) }),
  response: null,
  ifMatch: true,
});

export const listMarkChanges = endpoint({
  method: 'GET',
  path: '/api/cases/:caseId/mark-changes',
  summary: 'Every change and withdrawal of marks of the case, newest first',
  access: 'case-read',
  params: caseParams,
  response: z.object({ items: z.array(markChange) }),
});

export const importSurvey = endpoint({
  method: 'POST',
  path: '/api/cases/:caseId/survey-imports',
  summary:
    'Read marks from a survey file that is an exhibit; all good rows or, when `strict`, all or none',
  access: 'case-work',
  params: caseParams,
  body: z.strictObject({ exhibitId: id, fileId: id, mapping: surveyMapping, strict: z.boolean() }),
  response: surveyImport,
  status: 201,
  idempotent: true,
});
