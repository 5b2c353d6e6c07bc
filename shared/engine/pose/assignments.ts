import type { PoseProblem } from '../documents/pose-problem';
import type { PoseSolution } from '../documents/pose-solution';
import { EngineError } from '../errors';
import { fitPoses } from './fit-poses';

export interface RankedAssignment {
  /** Which point of the body made each mark. */
  readonly points: Readonly<Record<string, string>>;
  readonly chiSquared: number;
  readonly pValue: number | null;
  readonly solution: PoseSolution;
}

const mostTried = 5000;

/**
 * Every way in which the marks may have been made by the candidate points, each point making at
 * most one mark, best fit first: a table of alternatives, not a choice. Assignments that fix no
 * pose are left out.
 *
 * `candidates` lists, by mark id, the points of the mark's body that could have made it; a mark that
 * is not listed keeps its point. Throws EngineError `scale` when there are over 5000 assignments.
 */
export function rankAssignments(
  problem: PoseProblem,
  candidates: Readonly<Record<string, readonly string[]>>,
): readonly RankedAssignment[] {
  const choices = problem.marks.map((mark) => candidates[mark.id] ?? [mark.point]);
  const count = choices.reduce((product, options) => product * options.length, 1);
  if (count > mostTried)
    throw new EngineError(
      'scale',
      'candidates',
      `There are ${count} assignments; at most ${mostTried} can be compared.`,
    );
  const ranked: RankedAssignment[] = [];
  for (let k = 0; k < count; k++) {
    const points: Record<string, string> = {};
    let rest = k;
    const marks = problem.marks.map((mark, i) => {
      const options = choices[i];
      const point = options[rest % options.length];
      rest = Math.floor(rest / options.length);
      points[mark.id] = point;
      return { ...mark, point };
    });
    if (new Set(marks.map(({ body, point }) => `${body}.${point}`)).size < marks.length) continue;
    const solution = attempt({ ...problem, marks });
    if (solution !== null)
      ranked.push({
        points,
        chiSquared: solution.chiSquared,
        pValue: solution.pValue,
        solution,
      });
  }
  return ranked.sort((a, b) => a.chiSquared - b.chiSquared);
}

function attempt(problem: PoseProblem): PoseSolution | null {
  try {
    return fitPoses(problem);
  } catch (error) {
    if (error instanceof EngineError && error.code === 'not-enough-marks') return null;
    throw error;
  }
}
