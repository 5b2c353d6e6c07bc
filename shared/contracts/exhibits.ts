import * as z from 'zod';
import { caseParams, id, line, moment, prose, sha256, version } from './common';
import { endpoint } from './endpoint';

export const exhibitKinds = [
  'physical item',
  'photographs',
  'video',
  'document',
  'survey data',
  'recorder data',
  'sample',
] as const;

/** Something in a picture's metadata that an investigator should look at twice. */
export const metadataDoubt = z.object({ code: z.string(), message: z.string() });

export const pictureMetadata = z.object({
  width: z.int().nullable(),
  height: z.int().nullable(),
  make: z.string().nullable(),
  model: z.string().nullable(),
  lens: z.string().nullable(),
  focalLengthMm: z.number().nullable(),
  /** As the camera wrote it, without a zone. */
  takenAtLocal: z.string().nullable(),
  /** Offset from UTC if the camera wrote one, e.g. "+01:00". */
  takenAtOffset: z.string().nullable(),
  latitude: z.number().nullable(),
  longitude: z.number().nullable(),
  software: z.string().nullable(),
  doubts: z.array(metadataDoubt),
});
export type PictureMetadata = z.infer<typeof pictureMetadata>;

export const exhibitFile = z.object({
  id,
  name: z.string(),
  /** Found from the content, never taken from the sender. */
  mediaType: z.string(),
  size: z.int(),
  sha256,
  sha512: z.string().regex(/^[0-9a-f]{128}$/),
  statedSha256: sha256.nullable(),
  takenInAt: moment,
  picture: pictureMetadata.nullable(),
  hasThumbnail: z.boolean(),
  /** Numbers of other exhibits of the case that hold the same content. */
  sameContentAs: z.array(z.string()),
});
export type ExhibitFile = z.infer<typeof exhibitFile>;

/** What a person enters about an exhibit; a physical item may have no file. */
export const exhibitEntry = z.strictObject({
  kind: z.enum(exhibitKinds),
  description: line(1000),
  /** Who gave it, or where it was found. */
  source: prose(1000).default(''),
  collectedBy: prose(160).default(''),
  collectedAt: moment.nullable().default(null),
  collectedPlace: prose(400).default(''),
  condition: prose(1000).default(''),
  packaging: prose(400).default(''),
  sealNumber: prose(80).default(''),
  sensitive: z.boolean().default(false),
  parentNumber: z.string().max(40).nullable().default(null),
});
export type ExhibitEntry = z.input<typeof exhibitEntry>;

/** Where the item is and who answers for it. */
export const custodyState = z.object({
  holderId: id.nullable(),
  holder: z.string().nullable(),
  location: z.string(),
  sealNumber: z.string(),
  /** A hand-over that waits for the receiver. */
  pending: z
    .object({
      sequence: z.int(),
      fromId: id,
      from: z.string(),
      toId: id,
      to: z.string(),
      offeredAt: moment,
      purpose: z.string(),
    })
    .nullable(),
});
export type CustodyState = z.infer<typeof custodyState>;

export const exhibit = z.object({
  id,
  /** Per case, never used again: "2026-014/3". */
  number: z.string(),
  kind: z.enum(exhibitKinds),
  description: z.string(),
  source: z.string(),
  collectedBy: z.string(),
  collectedAt: moment.nullable(),
  collectedPlace: z.string(),
  condition: z.string(),
  packaging: z.string(),
  sealNumber: z.string(),
  sensitive: z.boolean(),
  parentNumber: z.string().nullable(),
  registeredAt: moment,
  version,
  custody: custodyState,
  files: z.array(exhibitFile),
});
export type Exhibit = z.infer<typeof exhibit>;

const exhibitParams = caseParams.extend({ exhibitId: id });
const fileParams = exhibitParams.extend({ fileId: id });

export const listExhibits = endpoint({
  method: 'GET',
  path: '/api/cases/:caseId/exhibits',
  summary: 'Exhibits of the case in order of number',
  access: 'case-read',
  params: caseParams,
  response: z.object({ items: z.array(exhibit) }),
});

export const registerExhibit = endpoint({
  method: 'POST',
  path: '/api/cases/:caseId/exhibits',
  summary: 'Register an exhibit; writes "collected" (if told) and "received" to the ledger',
  access: 'case-custody',
  params: caseParams,
  body: exhibitEntry,
  response: exhibit,
  status: 201,
  idempotent: true,
});

export const readExhibit = endpoint({
  method: 'GET',
  path: '/api/cases/:caseId/exhibits/:exhibitId',
  summary: 'One exhibit with its files',
  access: 'case-read',
  params: exhibitParams,
  response: exhibit,
});

export const editExhibit = endpoint({
  method: 'PATCH',
  path: '/api/cases/:caseId/exhibits/:exhibitId',
  summary: 'Change the description of an exhibit (custody is changed by events only)',
  access: 'case-custody',
  params: exhibitParams,
  body: z
    .strictObject({ description: line(1000), source: prose(1000), sensitive: z.boolean() })
    .partial(),
  response: exhibit,
  ifMatch: true,
});

/** Multipart: field `file` (one), and the field below. */
export const uploadFile = endpoint({
  method: 'POST',
  path: '/api/cases/:caseId/exhibits/:exhibitId/files',
  summary: 'Take in one file, whole or not at all; its hash is computed while it arrives',
  access: 'case-custody',
  params: exhibitParams,
  encoding: 'multipart',
  body: z.strictObject({ statedSha256: sha256.optional() }),
  response: exhibitFile,
  status: 201,
});

/** The original, as an attachment; Range requests work. */
export const downloadFile = endpoint({
  method: 'GET',
  path: '/api/cases/:caseId/exhibits/:exhibitId/files/:fileId/content',
  summary: 'The original file',
  access: 'case-read',
  params: fileParams,
  response: 'binary',
});

/** A re-encoded picture that is safe to show in the page. `blurred` is what a sensitive one shows first. */
export const showPicture = endpoint({
  method: 'GET',
  path: '/api/cases/:caseId/exhibits/:exhibitId/files/:fileId/picture',
  summary: 'A derivative of a photograph for the screen',
  access: 'case-read',
  params: fileParams,
  query: z.strictObject({ size: z.enum(['thumbnail', 'thumbnail-blurred', 'screen']) }),
  response: 'binary',
});

/** The text of a CSV or text file, for the survey import and the viewer; at most 10 MiB. */
export const readText = endpoint({
  method: 'GET',
  path: '/api/cases/:caseId/exhibits/:exhibitId/files/:fileId/text',
  summary: 'The text of a text or CSV file',
  access: 'case-read',
  params: fileParams,
  response: z.object({ name: z.string(), encoding: z.string(), text: z.string() }),
});
