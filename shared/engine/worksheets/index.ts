import type { WorksheetProblem, WorksheetSolution } from '../documents/worksheet';
import { EngineError } from '../errors';
import { collision } from './collision';
import { curves } from './curves';
import { flight } from './flight';
import { machinery } from './machinery';
import { sliding } from './sliding';
import { timing } from './timing';
import { turning } from './turning';
import { workOut } from './work-out';
import type { Worksheet } from './worksheet';

export { workOut } from './work-out';
export type { Condition, GivenQuantity, Quantity, Result, Worksheet } from './worksheet';

/** Every worksheet, in the order in which they are offered. */
export const worksheets: readonly Worksheet[] = [
  ...sliding,
  ...curves,
  ...flight,
  ...collision,
  ...timing,
  ...turning,
  ...machinery,
];

/** Works out the worksheet that the problem names. Throws EngineError as `workOut`. */
export function solveWorksheet(problem: WorksheetProblem): WorksheetSolution {
  const sheet = worksheets.find(({ id }) => id === problem.worksheet);
  if (sheet === undefined)
    throw new EngineError(
      'unknown-reference',
      'worksheet',
      `There is no worksheet "${problem.worksheet}".`,
    );
  return workOut(sheet, problem);
}
