import type { MotionProblem } from '../../documents/motion-problem';
import type { MotionSolution } from '../../documents/motion-solution';
import type { Working } from './working';

export const workInstant = (
  _problem: MotionProblem,
  _solution: MotionSolution,
  asked: { readonly body: string; readonly point: string },
  branch = 0,
): Working => ({ asked, branch, chain: [asked.body], steps: [] });
