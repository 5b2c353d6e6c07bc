import { sha256Hex } from '../documents/canonical';
import { EngineError } from '../errors';
import { recompute } from './recompute';

export interface RecomputeReport {
  /** 0 identical, or the same but for rounding; 1 different; 2 not readable. */
  readonly exitCode: 0 | 1 | 2;
  readonly lines: readonly string[];
}

const mostShown = 20;

/** Recomputes the text of a computation record and says in plain words how it came out. */
export function recomputeReport(text: string, name: string): RecomputeReport {
  try {
    const found = recompute(JSON.parse(text));
    const { differences, document } = found;
    const lines = [
      name,
      `  kind       ${document.kind}, engine ${document.engine}${found.sameEngine ? '' : ' (another version than this one)'}`,
      `  SHA-256    ${found.address}${found.address === sha256Hex(text) ? '' : ' (of the canonical text; the file is written otherwise)'}`,
    ];
    if (found.identical) lines.push('  result     identical, byte for byte');
    else if (found.agrees)
      lines.push(
        `  result     the same but for rounding: ${differences.length} numbers differ by at most ${largest(differences)}`,
      );
    else
      lines.push(
        `  result     DIFFERENT in ${differences.length} ${differences.length === 1 ? 'place' : 'places'}`,
        ...differences
          .slice(0, mostShown)
          .map(
            ({ path, recorded, recomputed }) =>
              `    ${path}: recorded ${JSON.stringify(recorded)}, now ${JSON.stringify(recomputed)}`,
          ),
      );
    return { exitCode: found.agrees ? 0 : 1, lines };
  } catch (error) {
    if (!(error instanceof EngineError) && !(error instanceof SyntaxError)) throw error;
    const where = error instanceof EngineError && error.field !== '' ? ` (${error.field})` : '';
    return { exitCode: 2, lines: [name, `  not a computation record: ${error.message}${where}`] };
  }
}

const largest = (differences: readonly { relative: number | null }[]): string =>
  Math.max(...differences.map(({ relative }) => relative ?? 0)).toExponential(1);
