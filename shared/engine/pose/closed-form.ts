import type { PoseProblem } from '../documents/pose-problem';
import { equationsOf } from './equations';
import { covarianceAt, type Fit } from './fit';
import { dimension, layOut, unknownsFrom } from './layout';
import { Manifold } from './manifold';
import { rigidFit } from './rigid-fit';
import { whitened } from './whitened';

/**
 * The fit of one body whose marks are each equally uncertain in all directions, without iteration;
 * null for any other problem.
 */
export function closedForm(problem: PoseProblem): Fit | null {
  const [body] = problem.bodies;
  const plain =
    problem.bodies.length === 1 &&
    problem.joints.length === 0 &&
    problem.marks.length >= 2 &&
    problem.loss === 'squares' &&
    Object.keys(body.stated ?? {}).length === 0 &&
    Object.values(body.points).every((point) => dimension(point).sigma.every((s) => s === 0)) &&
    problem.marks.every(
      ({ covariance: [[a, b], [, d]], line, tangent }) =>
        a === d && b === 0 && line === undefined && tangent === undefined,
    );
  if (!plain) return null;
  const pose = rigidFit(
    Float64Array.from(problem.marks.flatMap(({ point }) => dimension(body.points[point]).at)),
    Float64Array.from(problem.marks.flatMap(({ at }) => at)),
    Float64Array.from(problem.marks, ({ covariance }) => 1 / covariance[0][0]),
  );
  const layout = layOut(problem);
  const equations = equationsOf(problem, layout);
  const x = unknownsFrom(layout, new Map([[body.id, pose]]));
  const weights = equations.observations.map(() => 1);
  const { residuals } = whitened(equations.observations, x, weights);
  const manifold = new Manifold(layout.size, []);
  return {
    layout,
    equations,
    x,
    weights,
    covariance: covarianceAt(layout, equations, manifold, x, weights).matrix,
    freedom: 3,
    chiSquared: residuals.reduce((sum, r) => sum + r * r, 0),
    iterations: 0,
    alternatives: [],
  };
}
