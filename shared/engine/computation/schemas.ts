import * as z from 'zod';
import { computation } from '../documents/computation';
import { motionProblem } from '../documents/motion-problem';
import { motionSolution } from '../documents/motion-solution';
import { poseProblem } from '../documents/pose-problem';
import { poseSolution } from '../documents/pose-solution';
import { reconstructionDocument } from '../documents/reconstruction';
import { stationAnswer, stationProblem } from '../documents/station';
import {
  stationUncertaintyProblem,
  stationUncertaintySolution,
} from '../documents/station-uncertainty';
import { worksheetProblem, worksheetSolution } from '../documents/worksheet';

const documents = {
  computation,
  'motion-problem': motionProblem,
  'motion-solution': motionSolution,
  'pose-problem': poseProblem,
  'pose-solution': poseSolution,
  reconstruction: reconstructionDocument,
  'station-problem': stationProblem,
  'station-answer': stationAnswer,
  'station-uncertainty-problem': stationUncertaintyProblem,
  'station-uncertainty-solution': stationUncertaintySolution,
  'worksheet-problem': worksheetProblem,
  'worksheet-solution': worksheetSolution,
};

/**
 * JSON Schema (draft 2020-12) of every document of the engine, by name, made of the same schemas
 * that the program validates with.
 */
export const documentSchemas = (): Readonly<Record<string, unknown>> =>
  Object.fromEntries(
    Object.entries(documents).map(([name, schema]) => [
      name,
      { title: `centrode.${name}/1`, ...z.toJSONSchema(schema, { io: 'input' }) },
    ]),
  );
