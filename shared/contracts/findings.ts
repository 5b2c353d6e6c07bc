import * as z from 'zod';
import { caseParams, finite, moment, prose, sha256, version } from './common';
import { endpoint } from './endpoint';

/**
 * A figure that a finding rests on: bound to a recorded computation, never typed. The server reads
 * value and interval from the computation when the findings are saved.
 */
export const figureChoice = z.strictObject({
  computation: sha256,
  /** "car.G" for the speed of a point, or a body for its rate of turning. */
  quantity: z.enum(['speed', 'acceleration', 'angular-velocity']),
  body: z.string().min(1).max(40),
  point: z.string().max(40).nullable(),
  branch: z.int().min(0).default(0),
});

export const figure = figureChoice.extend({
  /** "Speed", "Rate of turning": for the reader. */
  title: z.string(),
  pointName: z.string(),
  stationName: z.string(),
  /** SI: m/s, m/s², rad/s, with its 95 % interval. */
  value: finite,
  low: finite,
  high: finite,
});
export type Figure = z.infer<typeof figure>;

export const findingsEntry = z.strictObject({
  answers: z.array(z.strictObject({ questionNumber: z.int().min(1), text: prose(4000) })),
  figures: z.array(figureChoice).max(12),
  dependsOn: prose(4000),
  against: prose(4000),
});

export const findings = z.object({
  answers: z.array(z.object({ questionNumber: z.int(), question: z.string(), text: z.string() })),
  figures: z.array(figure),
  dependsOn: z.string(),
  against: z.string(),
  version,
  changedAt: moment.nullable(),
});
export type Findings = z.infer<typeof findings>;

export const readFindings = endpoint({
  method: 'GET',
  path: '/api/cases/:caseId/findings',
  summary: 'Answers to the questions, with their figures',
  access: 'case-read',
  params: caseParams,
  response: findings,
});

export const editFindings = endpoint({
  method: 'PUT',
  path: '/api/cases/:caseId/findings',
  summary: 'Save the findings',
  access: 'case-work',
  params: caseParams,
  body: findingsEntry,
  response: findings,
  ifMatch: true,
});
