import type { MotionProblem } from '../../documents/motion-problem';
import { EngineError } from '../../errors';

/** Larger than any length, speed or rate that a scene can hold, SI. */
const largest = 1e12;

/** Refuses numbers that are not finite, and ids that are used twice. */
export const checkProblem = (problem: MotionProblem): void => {
  if (problem.bodies.length === 0)
    throw new EngineError('empty', 'bodies', 'The problem has no bodies.');
  checkItems('bodies', problem.bodies, new Set());
  const ids = new Set<string>();
  checkItems('joints', problem.joints, ids);
  checkItems('knowns', problem.knowns, ids);
  checkFinite(problem.poseCovariance, 'poseCovariance');
  checkFinite(problem.closureTolerance, 'closureTolerance');
};

const checkItems = (list: string, items: readonly { id: string }[], taken: Set<string>): void => {
  for (const item of items) {
    const field = `${list}.${item.id}`;
    if (taken.has(item.id))
      throw new EngineError('duplicate-id', field, `The id ${item.id} is used twice.`);
    taken.add(item.id);
    checkFinite(item, field);
  }
};

const checkFinite = (value: unknown, field: string): void => {
  if (typeof value === 'number') {
    if (!Number.isFinite(value))
      throw new EngineError('not-finite', field, `${field} is not a finite number.`);
    if (Math.abs(value) > largest)
      throw new EngineError('scale', field, `${field} is beyond anything that can be measured.`);
  } else if (typeof value === 'object' && value !== null)
    for (const key in value)
      checkFinite((value as Record<string, unknown>)[key], `${field}.${key}`);
};
