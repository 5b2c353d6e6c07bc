import { canonicalText, sha256Hex } from '../documents/canonical';
import { computation, type Computation, type ComputationKind } from '../documents/computation';
import { EngineError } from '../errors';
import { solvers, type Solver } from './solvers';

/** Raised whenever a result could change by more than rounding. */
export const engineVersion = 'centrode-engine/1.0.0';

export interface Computed {
  readonly document: Computation;
  /** The canonical text that is kept. */
  readonly text: string;
  /** SHA-256 of the text. */
  readonly address: string;
  readonly status: string;
}

/**
 * Computes an input and makes the record of it.
 * Throws EngineError: what the solver says, and `unsupported` with the path of the field when the
 * input does not follow its schema.
 */
export function compute(
  kind: ComputationKind,
  input: unknown,
  options: Readonly<Record<string, unknown>> = {},
  seed: number | null = null,
): Computed {
  const solver = solverOf(kind);
  // solved as it will be read again: members in canonical order, which the order of sums follows
  const kept: unknown = JSON.parse(canonicalText(input));
  const result = solver.solve(read(solver, kept), options, seed);
  const text = canonicalText({
    format: 'centrode.computation/1',
    kind,
    engine: engineVersion,
    input: kept,
    options,
    seed,
    result,
  });
  const document = computation.parse(JSON.parse(text));
  return { document, text, address: sha256Hex(text), status: solver.status(result) };
}

/** The result of a problem document, found by its `format`. */
export function solveDocument(document: unknown): unknown {
  for (const solver of Object.values(solvers))
    if (formatOf(document) !== null && accepts(solver, formatOf(document)))
      return solver.solve(read(solver, document), {}, null);
  throw new EngineError(
    'unsupported',
    'format',
    'This is no problem document that the engine knows.',
  );
}

export function solverOf(kind: ComputationKind): Solver {
  const solver = solvers[kind];
  if (solver === undefined)
    throw new EngineError('unsupported', 'kind', `There is no computation of the kind "${kind}".`);
  return solver;
}

export function read(solver: Solver, input: unknown): unknown {
  const parsed = solver.input.safeParse(input);
  if (parsed.success) return parsed.data;
  const [issue] = parsed.error.issues;
  throw new EngineError('unsupported', ['input', ...issue.path].join('.'), issue.message);
}

const formatOf = (document: unknown): string | null =>
  typeof document === 'object' &&
  document !== null &&
  'format' in document &&
  typeof document.format === 'string'
    ? document.format
    : null;

/** Whether the schema's literal `format` is this one. */
function accepts(solver: Solver, format: string | null): boolean {
  const parsed = solver.input.safeParse({ format });
  return !parsed.error?.issues.some(({ path }) => path[0] === 'format');
}
