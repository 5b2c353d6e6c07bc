import { addressOf, canonicalText } from '../documents/canonical';
import { computation, type Computation } from '../documents/computation';
import { EngineError } from '../errors';
import { engineVersion, read, solverOf } from './compute';

export interface Difference {
  /** Path into the result. */
  readonly path: string;
  readonly recorded: unknown;
  readonly recomputed: unknown;
  /** Of two numbers, over the larger; null for anything else. */
  readonly relative: number | null;
}

export interface Recomputed {
  readonly address: string;
  /** The same bytes. */
  readonly identical: boolean;
  /** The same but for rounding, as another make of processor or runtime may round. */
  readonly agrees: boolean;
  readonly differences: readonly Difference[];
  readonly sameEngine: boolean;
  readonly document: Computation;
  readonly result: unknown;
}

/** Numbers that differ by less, relative or in SI units, are the same but for rounding. */
const rounding = 1e-9;

/**
 * Computes the input of a record again and compares the result with the recorded one.
 * Throws EngineError `unsupported`, with the path of the field, when it is no computation record.
 */
export function recompute(record: unknown): Recomputed {
  const parsed = computation.safeParse(record);
  if (!parsed.success) {
    const [issue] = parsed.error.issues;
    throw new EngineError('unsupported', issue.path.join('.'), issue.message);
  }
  const document = parsed.data;
  const solver = solverOf(document.kind);
  const answer = solver.solve(read(solver, document.input), document.options, document.seed);
  const text = canonicalText(answer);
  const result: unknown = JSON.parse(text);
  const identical = text === canonicalText(document.result);
  const differences = identical ? [] : [...compare(document.result, result, 'result')];
  return {
    address: addressOf(record),
    identical,
    agrees: differences.every(isRounding),
    differences,
    sameEngine: document.engine === engineVersion,
    document,
    result,
  };
}

function isRounding({ recorded, recomputed, relative }: Difference): boolean {
  if (relative === null) return false;
  return relative <= rounding || Math.abs(Number(recorded) - Number(recomputed)) <= rounding;
}

function* compare(recorded: unknown, recomputed: unknown, path: string): Generator<Difference> {
  if (Object.is(recorded, recomputed)) return;
  if (typeof recorded === 'number' && typeof recomputed === 'number') {
    const size = Math.max(Math.abs(recorded), Math.abs(recomputed));
    if (recorded !== recomputed)
      yield { path, recorded, recomputed, relative: Math.abs(recorded - recomputed) / size };
    return;
  }
  if (isMap(recorded) && isMap(recomputed)) {
    const keys = new Set([...Object.keys(recorded), ...Object.keys(recomputed)]);
    for (const key of [...keys].sort())
      yield* compare(recorded[key], recomputed[key], `${path}.${key}`);
    return;
  }
  yield { path, recorded, recomputed, relative: null };
}

/** Objects and arrays alike: both have members. */
const isMap = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null;
