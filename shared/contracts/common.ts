import * as z from 'zod';

/** Identifiers are UUIDv7 in lower case. */
export const id = z.uuid();
export const sha256 = z.string().regex(/^[0-9a-f]{64}$/, 'must be 64 hexadecimal digits');
/** A moment, ISO 8601 in UTC. */
export const moment = z.iso.datetime({ offset: false, precision: undefined });
export const day = z.iso.date();
/** Grows by one at every change; sent back in `If-Match`. */
export const version = z.int().min(1);
/** A line of text that a person types: trimmed, not empty. */
export const line = (most = 200) => z.string().trim().min(1, 'must not be empty').max(most);
/** Longer text; may be empty. */
export const prose = (most = 20_000) => z.string().max(most);
export const finite = z.number();
export const positive = z.number().positive();
export const vector = z.tuple([finite, finite]);
/** Symmetric positive semi-definite 2 × 2, m². */
export const covariance2 = z.tuple([vector, vector]);

export const caseParams = z.strictObject({ caseId: id });

/** Lists are paged by key: `after` is the last item's key of the page before. */
export const pageQuery = z.strictObject({
  after: z.string().max(200).optional(),
  limit: z.coerce.number().int().min(1).max(200).default(100),
});
export const page = <T extends z.ZodType>(item: T) =>
  z.object({ items: z.array(item), next: z.string().nullable() });

/** RFC 9457 problem details; `errors` names each field at fault. */
export const problem = z.object({
  type: z.string(),
  title: z.string(),
  status: z.int(),
  detail: z.string().optional(),
  errors: z.array(z.object({ field: z.string(), message: z.string() })).optional(),
  /** On 412: what the record looks like now, so that both versions can be shown side by side. */
  current: z.unknown().optional(),
});
export type Problem = z.infer<typeof problem>;
