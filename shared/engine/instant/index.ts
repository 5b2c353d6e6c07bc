import type { MotionProblem } from '../documents/motion-problem';
import type { MotionSolution, MotionStatus } from '../documents/motion-solution';
import { chiSquaredPValue } from '../uncertainty/distributions';
import { remember } from './answers';
import { smallestClash } from './clash';
import { describeFree } from './free-motion';
import { inWords, suggestionsFor } from './helps';
import type { Refusal } from './level';
import type { Level } from './model';
import { stateOf } from './model';
import { reportBranch } from './report';
import { suspectsOf } from './residuals';
import type { Answer } from './solve';
import { solve } from './solve';
import type { Judged } from './verdict';
import { judge } from './verdict';

export { relativeMotion, velocityOf } from './ask';
export { workInstant } from './working/index';
export type * from './working/working';
export type { AskedPoint, PointAnswer, RelativeMotion } from './ask';

/** Above this, a small change of the poses changes the answer a thousand times as much. */
const leaning = 1e3;

/**
 * Velocities and accelerations of all bodies at one station, with their uncertainty and a verdict
 * on what the problem fixes. Pure and deterministic. Throws an EngineError that names the field
 * when the problem itself is faulty: numbers that are not finite, references to nothing, lengths
 * of zero, poses that do not close the joints.
 */
export const solveInstant = (problem: MotionProblem): MotionSolution => {
  const answer = solve(problem);
  const { model, tolerance, velocity, acceleration } = answer;
  const first = judge(model, velocity.equations, velocity.outcome, tolerance);
  const second =
    acceleration === null || acceleration.outcome.refused === 'too large'
      ? null
      : judge(model, acceleration.equations, acceleration.outcome, tolerance);
  const branches = answer.branches.map((b) => reportBranch(answer, b));
  const redundancy = first.verdict.redundancy + (second?.verdict.redundancy ?? 0);
  const chiSquared = branches.length > 0 ? branches[0].chiSquared : 0;
  const residuals = branches.length > 0 ? branches[0].residuals : [];
  const described = describe(answer, 'velocity', first);
  const suggestions = [
    ...suggest(answer, 'velocity', first),
    ...(second === null || first.free.length > 0 ? [] : suggest(answer, 'acceleration', second)),
  ];
  const solution: MotionSolution = {
    format: 'centrode.motion-solution/1',
    status: statusOf(first, second),
    levels: { velocity: first.verdict, acceleration: second?.verdict ?? null },
    branches,
    redundancy,
    chiSquared,
    pValue: redundancy > 0 ? chiSquaredPValue(chiSquared, redundancy) : null,
    residuals,
    suspects: suspectsOf(residuals),
    free: described.length > 0 ? described : describe(answer, 'acceleration', second),
    helps: suggestions.map(inWords),
    suggestions,
    clash: clashOf(answer),
    condition: first.verdict.condition,
    warnings: warningsOf(answer, first, second),
  };
  remember(solution, answer);
  return solution;
};

const statusOf = (first: Judged, second: Judged | null): MotionStatus => {
  const { status } = first.verdict;
  if (second === null || !['determined', 'over-determined'].includes(status)) return status;
  const other = second.verdict.status;
  return other === 'contradictory' || other === 'over-determined' ? other : status;
};

const suggest = (answer: Answer, level: Level, judged: Judged) => {
  const state = answer.branches[0]?.state ?? stateOf(answer.model);
  return suggestionsFor(answer.model, state, level, judged.free);
};

const describe = (answer: Answer, level: Level, judged: Judged | null) => {
  const state = answer.branches[0]?.state ?? stateOf(answer.model);
  return describeFree(answer.model, state, level, judged?.free ?? []);
};

const clashOf = ({ model, tolerance, velocity, acceleration }: Answer): string[] => {
  if (velocity.outcome.refused !== null) return smallestClash(model, tolerance, 'velocity');
  const refused = acceleration?.outcome.refused ?? null;
  if (refused !== null && refused !== 'too large')
    return smallestClash(model, tolerance, 'acceleration');
  return [];
};

const refusals: Record<Refusal, string> = {
  'exact equations contradict': 'Exact joints and knowns contradict each other.',
  'no such magnitude': 'No motion that agrees with the other knowns reaches a known magnitude.',
  'only rest': 'The known directions do not meet in one pole: only rest agrees with all of them.',
  sense: 'The motion runs against the sense of a known direction.',
  'too large': 'With so many bodies they are sought only where the knowns just fix them.',
};

const warningsOf = (answer: Answer, first: Judged, second: Judged | null): string[] => {
  const warnings: string[] = [];
  const { velocity, acceleration, branches } = answer;
  if (velocity.outcome.refused !== null) warnings.push(refusals[velocity.outcome.refused]);
  const refused = acceleration?.outcome.refused ?? null;
  if (refused !== null) warnings.push(`Accelerations: ${refusals[refused]}`);
  if (branches.length > 1)
    warnings.push(
      `${branches.length} motions agree with the knowns; all of them are given, and nothing here decides between them.`,
    );
  if (acceleration !== null && acceleration.waiting.length > 0)
    warnings.push('Some accelerations need velocities that are not fixed.');
  const conditions: readonly (readonly [string, Judged | null])[] = [
    ['velocities', first],
    ['accelerations', second],
  ];
  for (const [name, judged] of conditions) {
    const condition = judged?.verdict.condition ?? null;
    if (condition !== null && condition > leaning)
      warnings.push(
        `The position is close to a singular one (condition number ${condition.toPrecision(2)}): small errors of the poses change the ${name} much.`,
      );
    if (judged?.verdict.status === 'singular')
      warnings.push(
        `Singular position: here the joints and knowns fix fewer ${name} than they do in a neighbouring position.`,
      );
  }
  return warnings;
};
