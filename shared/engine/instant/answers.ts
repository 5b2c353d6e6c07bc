import type { MotionProblem } from '../documents/motion-problem';
import type { MotionSolution } from '../documents/motion-solution';
import type { Answer } from './solve';
import { solve } from './solve';

/** Answers behind the documents made here, so that a further question costs no second solution. */
const answers = new WeakMap<MotionSolution, Answer>();

export const remember = (solution: MotionSolution, answer: Answer): void => {
  answers.set(solution, answer);
};

/** The answer behind a solution; a solution that was read from elsewhere is computed again. */
export const answerTo = (problem: MotionProblem, solution: MotionSolution): Answer =>
  answers.get(solution) ?? solve(problem);
