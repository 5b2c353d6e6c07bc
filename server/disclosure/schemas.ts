import * as z from 'zod';
import { motionProblem } from '#shared/engine/documents/motion-problem';
import { motionSolution } from '#shared/engine/documents/motion-solution';
import { poseProblem } from '#shared/engine/documents/pose-problem';
import { poseSolution } from '#shared/engine/documents/pose-solution';
import { releaseSnapshot } from '../archive/snapshot';

const documents: Readonly<Record<string, z.ZodType>> = {
  'motion-problem': motionProblem,
  'motion-solution': motionSolution,
  'pose-problem': poseProblem,
  'pose-solution': poseSolution,
  release: releaseSnapshot,
};

/** JSON Schemas of the documents in an archive, from the very schemas that validate them here. */
export function documentSchemas(): Record<string, string> {
  return Object.fromEntries(
    Object.entries(documents).map(([name, type]) => [
      `${name}.schema.json`,
      `${JSON.stringify(z.toJSONSchema(type, { io: 'output' }), null, 2)}\n`,
    ]),
  );
}
