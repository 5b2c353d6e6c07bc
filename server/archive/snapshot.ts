import * as z from 'zod';
import { sha256 } from '#shared/contracts/common';
import { releasedSummary, withheldItem } from '#shared/contracts/disclosure';
import { exhibitKinds } from '#shared/contracts/exhibits';
import { mark } from '#shared/contracts/survey';

/** A file of a released exhibit, as its record stood when the case was released. */
export const snapshotFile = z.strictObject({
  name: z.string(),
  mediaType: z.string(),
  size: z.int().min(0),
  sha256,
  sha512: z.string().regex(/^[0-9a-f]{128}$/),
});
export type SnapshotFile = z.infer<typeof snapshotFile>;

export const snapshotExhibit = z.strictObject({
  number: z.string(),
  kind: z.enum(exhibitKinds),
  description: z.string(),
  source: z.string(),
  collectedBy: z.string(),
  collectedAt: z.string().nullable(),
  collectedPlace: z.string(),
  condition: z.string(),
  packaging: z.string(),
  sealNumber: z.string(),
  sensitive: z.boolean(),
  files: z.array(snapshotFile),
});
export type SnapshotExhibit = z.infer<typeof snapshotExhibit>;

/** What a computation is called where people read of it; its content is under its hash. */
export const snapshotComputation = z.strictObject({
  hash: sha256,
  kind: z.string(),
  reconstruction: z.string(),
  assumption: z.string(),
  station: z.string(),
  status: z.string(),
  recordedAt: z.string(),
  recordedBy: z.string(),
});
export type SnapshotComputation = z.infer<typeof snapshotComputation>;

/**
 * A release, frozen: all that the party may see of the case and nothing that can change later. The
 * ledger's event "released" names the SHA-256 of its canonical text, and a signed head closes that
 * event, so the whole archive hangs on one signature.
 */
export const releaseSnapshot = z.strictObject({
  format: z.literal('centrode.release/1'),
  summary: releasedSummary,
  exhibits: z.array(snapshotExhibit),
  withheld: z.array(withheldItem),
  marks: z.array(mark),
  computations: z.array(snapshotComputation),
  /** Bearing of the scene's +x axis, rad clockwise from north; null where there is no north. */
  xAxisBearing: z.number().nullable(),
});
export type ReleaseSnapshot = z.infer<typeof releaseSnapshot>;
