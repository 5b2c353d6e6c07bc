import type * as z from 'zod';
import type { ComputationKind } from '../documents/computation';
import { motionProblem } from '../documents/motion-problem';
import { motionSolution } from '../documents/motion-solution';
import { poseProblem } from '../documents/pose-problem';
import { poseSolution } from '../documents/pose-solution';
import { stationAnswer, stationProblem } from '../documents/station';
import {
  stationUncertaintyProblem,
  stationUncertaintySolution,
} from '../documents/station-uncertainty';
import { worksheetProblem, worksheetSolution } from '../documents/worksheet';
import { solveInstant } from '../instant/index';
import { fitPoses } from '../pose/index';
import { solveStation, stationUncertainty } from '../reconstruction/index';
import { solveWorksheet } from '../worksheets/index';

/** Computes one kind of document: what it takes, what it gives, and how. */
export interface Solver {
  readonly input: z.ZodType;
  readonly result: z.ZodType;
  /** Of an input that its schema has passed. */
  solve(input: unknown, options: Readonly<Record<string, unknown>>, seed: number | null): unknown;
  /** One word for a list of computations. */
  status(result: unknown): string;
}

function solver<Input extends z.ZodType, Result extends z.ZodType>(
  input: Input,
  result: Result,
  solve: (input: z.output<Input>) => z.input<Result>,
  status: (result: z.output<Result>) => string,
): Solver {
  return {
    input,
    result,
    solve: (given) => solve(given as z.output<Input>),
    status: (answer) => status(answer as z.output<Result>),
  };
}

/** Everything that can be computed, and computed again, by kind. */
export const solvers: Readonly<Partial<Record<ComputationKind, Solver>>> = {
  pose: solver(poseProblem, poseSolution, fitPoses, ({ redundancy }) =>
    redundancy > 0 ? 'over-determined' : 'determined',
  ),
  instant: solver(motionProblem, motionSolution, solveInstant, ({ status }) => status),
  station: solver(
    stationProblem,
    stationAnswer,
    solveStation,
    ({ failure, solution }) => failure?.code ?? solution?.status ?? 'poses only',
  ),
  'station-uncertainty': solver(
    stationUncertaintyProblem,
    stationUncertaintySolution,
    stationUncertainty,
    ({ quantities }) =>
      quantities.every(({ simulated }) => simulated?.agrees !== false)
        ? 'confirmed'
        : 'not confirmed',
  ),
  worksheet: solver(worksheetProblem, worksheetSolution, solveWorksheet, ({ warnings }) =>
    warnings.length === 0 ? 'determined' : 'with warnings',
  ),
};
