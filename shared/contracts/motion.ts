import * as z from 'zod';
import { key, reconstructionDocument } from '../engine/documents/reconstruction';
import { caseParams, id, line, moment, prose, sha256, version } from './common';
import { endpoint } from './endpoint';

export const reconstruction = z.object({
  id,
  name: z.string(),
  /** What this alternative assumes, in one sentence. */
  assumption: z.string(),
  document: reconstructionDocument,
  version,
  changedAt: moment,
  changedBy: z.string(),
});
export type Reconstruction = z.infer<typeof reconstruction>;

export const computationSummary = z.object({
  hash: sha256,
  kind: z.string(),
  reconstructionId: id,
  reconstructionName: z.string(),
  stationId: z.string(),
  stationName: z.string(),
  status: z.string(),
  recordedAt: moment,
  recordedBy: z.string(),
});
export type ComputationSummary = z.infer<typeof computationSummary>;

const reconstructionParams = caseParams.extend({ reconstructionId: id });
const reconstructionEntry = z.strictObject({
  name: line(120),
  assumption: prose(1000).default(''),
  document: reconstructionDocument,
});

export const listReconstructions = endpoint({
  method: 'GET',
  path: '/api/cases/:caseId/reconstructions',
  summary: 'Reconstructions (alternatives) of the case',
  access: 'case-read',
  params: caseParams,
  response: z.object({ items: z.array(reconstruction) }),
});

export const addReconstruction = endpoint({
  method: 'POST',
  path: '/api/cases/:caseId/reconstructions',
  summary: 'Begin a reconstruction',
  access: 'case-work',
  params: caseParams,
  body: reconstructionEntry,
  response: reconstruction,
  status: 201,
});

export const editReconstruction = endpoint({
  method: 'PUT',
  path: '/api/cases/:caseId/reconstructions/:reconstructionId',
  summary: 'Save a reconstruction',
  access: 'case-work',
  params: reconstructionParams,
  body: reconstructionEntry,
  response: reconstruction,
  ifMatch: true,
});

export const recordComputation = endpoint({
  method: 'POST',
  path: '/api/cases/:caseId/reconstructions/:reconstructionId/computations',
  summary:
    'Compute a station on the server from the saved reconstruction and marks, and record it for good',
  access: 'case-work',
  params: reconstructionParams,
  body: z.strictObject({ stationId: key, version }),
  response: computationSummary,
  status: 201,
});

export const listComputations = endpoint({
  method: 'GET',
  path: '/api/cases/:caseId/computations',
  summary: 'Recorded computations of the case, newest first',
  access: 'case-read',
  params: caseParams,
  response: z.object({ items: z.array(computationSummary) }),
});

/** The stored bytes: canonical JSON whose SHA-256 is the address. */
export const readComputation = endpoint({
  method: 'GET',
  path: '/api/cases/:caseId/computations/:hash',
  summary: 'A recorded computation, as the canonical document',
  access: 'case-read',
  params: caseParams.extend({ hash: sha256 }),
  response: z.unknown(),
});
