import * as z from 'zod';

/**
 * A computation that is kept, `centrode.computation/1`: the complete input, what it was computed
 * with, and the result. Written as canonical JSON (RFC 8785), known by the SHA-256 of that text, and
 * never changed.
 */
export const computationKinds = [
  'pose',
  'instant',
  'station',
  'station-uncertainty',
  'run',
  'impact',
  'worksheet',
] as const;

export const computation = z.strictObject({
  format: z.literal('centrode.computation/1'),
  kind: z.enum(computationKinds),
  /** Name and version of the engine that computed the result. */
  engine: z.string().min(1),
  input: z.unknown(),
  options: z.record(z.string(), z.unknown()),
  /** Of the random numbers; null when none were used. */
  seed: z.int().min(0).max(0xffffffff).nullable(),
  result: z.unknown(),
});

export type Computation = z.infer<typeof computation>;
export type ComputationKind = (typeof computationKinds)[number];
