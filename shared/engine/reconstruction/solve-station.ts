import type { ReconstructionDocument } from '../documents/reconstruction';
import type { StationAnswer, StationMark, StationProblem } from '../documents/station';
import { EngineError } from '../errors';
import { solveInstant } from '../instant/index';
import { markDirections, type Windows } from './mark-directions';
import { motionOfStation } from './motion-of-station';
import { poseOfStation } from './pose-of-station';
import { speedsOf } from './speeds';
import { stationProblemOf } from './station-problem';

/**
 * Answers a station: fits the poses, builds the motion problem on them and solves it.
 *
 * This is the one place where a reconstruction becomes engine problems, in the browser as on the
 * server. What stops the answer (too few marks, a joint that does not close) comes back in
 * `failure` with what was reached before it, so that the plan can show the poses all the same;
 * anything but an EngineError is thrown on. `windows` as in `markDirections`.
 */
export function solveStation(
  problem: StationProblem,
  windows: Windows | null = null,
): StationAnswer {
  const answer: StationAnswer = {
    format: 'centrode.station-answer/1',
    poseProblem: null,
    pose: null,
    directions: [],
    problem: null,
    solution: null,
    speeds: [],
    unplaced: [],
    failure: null,
    warnings: [],
  };
  try {
    const pose = poseOfStation(problem);
    answer.poseProblem = pose.problem;
    answer.pose = pose.solution;
    answer.unplaced.push(...pose.unplaced);
    answer.warnings.push(...pose.solution.warnings);
    answer.directions.push(...markDirections(problem, windows));
    const motion = motionOfStation(problem, pose.solution, answer.directions);
    answer.problem = motion.problem;
    answer.warnings.push(...motion.warnings);
    answer.solution = solveInstant(motion.problem);
    answer.speeds.push(...speedsOf(problem, answer.solution));
    answer.warnings.push(...answer.solution.warnings);
  } catch (error) {
    if (!(error instanceof EngineError)) throw error;
    const { code, field, message } = error;
    answer.failure = { stage: answer.pose === null ? 'pose' : 'motion', code, field, message };
  }
  return answer;
}

/** The answer of one station of a reconstruction, from all marks of the survey. */
export const answerStation = (
  reconstruction: ReconstructionDocument,
  stationId: string,
  marks: readonly StationMark[],
): StationAnswer => solveStation(stationProblemOf(reconstruction, stationId, marks));
