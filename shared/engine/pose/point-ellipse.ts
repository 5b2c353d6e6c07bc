import type { PoseSolution } from '../documents/pose-solution';
import { EngineError } from '../errors';
import { errorEllipse, type ErrorEllipse } from '../geometry/error-ellipse';
import { rotate, toScene, turnLeft, type Vector } from '../geometry/vector';

export interface PointEllipse extends ErrorEllipse {
  /** Scene position of the point, m. */
  readonly at: Vector;
  readonly covariance: readonly [Vector, Vector];
}

/**
 * Error ellipse of a body point where a fit puts it. `point` is the name of a point (whose
 * uncertain dimensions then count) or a place in the frame of the body (taken as exact).
 * Throws EngineError `unknown-reference`.
 */
export function pointEllipse(
  solution: PoseSolution,
  body: string,
  point: string | Vector,
  coverage = 0.95,
): PointEllipse {
  const unknown = (): never => {
    throw new EngineError(
      'unknown-reference',
      `bodies.${body}`,
      'The solution has no such body point.',
    );
  };
  const fitted = Object.hasOwn(solution.bodies, body) ? solution.bodies[body] : unknown();
  if (typeof point === 'string') {
    const key = `${body}.${point}`;
    const { at, covariance } = Object.hasOwn(solution.points, key)
      ? solution.points[key]
      : unknown();
    return { at, covariance, ...errorEllipse(covariance, coverage) };
  }
  const lever = turnLeft(rotate(fitted.pose.heading, point));
  const c = fitted.covariance;
  const at = (i: 0 | 1, j: 0 | 1): number =>
    c[i][j] + lever[i] * c[2][j] + lever[j] * c[i][2] + lever[i] * lever[j] * c[2][2];
  const covariance: [Vector, Vector] = [
    [at(0, 0), at(0, 1)],
    [at(1, 0), at(1, 1)],
  ];
  return { at: toScene(fitted.pose, point), covariance, ...errorEllipse(covariance, coverage) };
}
