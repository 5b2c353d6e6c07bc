import * as z from 'zod';
import { caseParams, id, line, moment, prose, sha256 } from './common';
import { endpoint } from './endpoint';
import { figure } from './findings';

export const withheldItem = z.strictObject({
  exhibit: z.string(),
  reason: z.enum(['privileged', 'irrelevant', 'sensitive', 'other']),
  explanation: prose(1000),
});

export const release = z.object({
  id,
  number: z.int().min(1),
  partyId: id,
  party: z.string(),
  releasedAt: moment,
  releasedBy: z.string(),
  exhibits: z.array(z.string()),
  withheld: z.array(withheldItem),
  computations: z.array(sha256),
  archive: z.object({
    state: z.enum(['building', 'ready', 'failed']),
    size: z.int().nullable(),
    sha256: sha256.nullable(),
    message: z.string(),
  }),
  withdrawnAt: moment.nullable(),
  openings: z.array(z.object({ at: moment, by: z.string(), what: z.enum(['summary', 'archive']) })),
});
export type Release = z.infer<typeof release>;

/** What an attorney reads: frozen when the case is released, never the live tables. */
export const releasedSummary = z.object({
  releaseId: id,
  releaseNumber: z.int(),
  caseNumber: z.string(),
  title: z.string(),
  party: z.string(),
  laboratory: z.string(),
  releasedAt: moment,
  speedUnit: z.enum(['km/h', 'mph', 'm/s']),
  questions: z.array(z.object({ number: z.int(), question: z.string(), answer: z.string() })),
  figures: z.array(figure),
  dependsOn: z.string(),
  against: z.string(),
  exhibits: z.array(z.object({ number: z.string(), kind: z.string(), description: z.string() })),
  withheld: z.array(withheldItem),
  caution: z.string(),
});
export type ReleasedSummary = z.infer<typeof releasedSummary>;

export const disclosureItem = z.object({
  releaseId: id,
  releaseNumber: z.int(),
  caseNumber: z.string(),
  title: z.string(),
  party: z.string(),
  releasedAt: moment,
});
export type DisclosureItem = z.infer<typeof disclosureItem>;

const releaseParams = caseParams.extend({ releaseId: id });

export const listReleases = endpoint({
  method: 'GET',
  path: '/api/cases/:caseId/releases',
  summary: 'What was released to whom, and who opened it',
  access: 'case-read',
  params: caseParams,
  response: z.object({ items: z.array(release) }),
});

export const releaseCase = endpoint({
  method: 'POST',
  path: '/api/cases/:caseId/releases',
  summary:
    'Release the findings, chosen exhibits and computations to a party; the archive is then built',
  access: 'case-direct',
  params: caseParams,
  body: z.strictObject({
    partyId: id,
    exhibits: z.array(z.string().max(40)),
    /** Every exhibit of the case is either released or listed here with its reason. */
    withheld: z.array(withheldItem),
    password: z.string().min(1).max(200),
  }),
  response: release,
  status: 201,
  idempotent: true,
});

export const withdrawRelease = endpoint({
  method: 'POST',
  path: '/api/cases/:caseId/releases/:releaseId/withdrawal',
  summary: 'Withdraw a release; it stays on record',
  access: 'case-direct',
  params: releaseParams,
  body: z.strictObject({ reason: line(1000) }),
  response: release,
});

export const downloadReleaseArchive = endpoint({
  method: 'GET',
  path: '/api/cases/:caseId/releases/:releaseId/archive',
  summary: 'The archive of a release, for the laboratory',
  access: 'case-read',
  params: releaseParams,
  response: 'binary',
});

export const listDisclosures = endpoint({
  method: 'GET',
  path: '/api/disclosures',
  summary: 'Releases disclosed to the attorney who asks',
  access: 'party',
  response: z.object({ items: z.array(disclosureItem) }),
});

const disclosureParams = z.strictObject({ releaseId: id });

export const readDisclosure = endpoint({
  method: 'GET',
  path: '/api/disclosures/:releaseId',
  summary: 'The released summary; opening it is recorded',
  access: 'party',
  params: disclosureParams,
  response: z.object({
    summary: releasedSummary,
    archive: z.object({ ready: z.boolean(), size: z.int().nullable(), sha256: sha256.nullable() }),
  }),
});

export const downloadDisclosure = endpoint({
  method: 'GET',
  path: '/api/disclosures/:releaseId/archive',
  summary: 'The released archive; each download is recorded',
  access: 'party',
  params: disclosureParams,
  response: 'binary',
});
