import type { PoseProblem } from '../documents/pose-problem';
import { EngineError } from '../errors';
import { unitColumns } from '../least-squares/covariance';
import { minimise } from '../least-squares/levenberg-marquardt';
import { factorise, inverseNormal, multiply } from '../least-squares/qr';
import { wrap } from '../geometry/vector';
import { equationsOf, type Equations } from './equations';
import { layOut, poseFrom, unknownsFrom, type Layout } from './layout';
import { Manifold } from './manifold';
import { startingPoses } from './starting-poses';
import { observationWeights, whitened, whitenedJacobian } from './whitened';

/** A fit of the unknowns, with what is needed to judge it. */
export interface Fit {
  readonly layout: Layout;
  readonly equations: Equations;
  readonly x: Float64Array;
  /** Huber weight of each observation; 1 with squares. */
  readonly weights: readonly number[];
  /** Covariance of the unknowns, size × size. */
  readonly covariance: Float64Array;
  readonly freedom: number;
  readonly chiSquared: number;
  readonly iterations: number;
  readonly alternatives: readonly { readonly x: Float64Array; readonly chiSquared: number }[];
}

/** χ² above the best at which another minimum is still worth showing: 0.1 % of one parameter. */
const worthShowing = 10.83;
const mostAlternatives = 6;
/** Absolute, m: minima nearer than this in every unknown are one. */
const sameMinimum = 1e-5;
const mostReweightings = 200;
/** Relative, to the largest pivot of the Jacobian with unit columns. */
const undetermined = 1e-9;

export function fit(problem: PoseProblem): Fit {
  const layout = layOut(problem);
  const equations = equationsOf(problem, layout);
  const manifold = new Manifold(layout.size, equations.constraints);
  const even = equations.observations.map(() => 1);
  const minima: Minimum[] = [];
  let worst = { of: '', gap: Infinity };
  let iterations = 0;
  for (const poses of startingPoses(problem, layout)) {
    const start = manifold.project(unknownsFrom(layout, poses));
    if (!start.closed) {
      const left = manifold.worst(start.x);
      if (left.gap < worst.gap) worst = left;
      continue;
    }
    const found = descend(equations, manifold, start.x, even);
    iterations += found.iterations;
    if (!minima.some((other) => isSame(layout, other.x, found.x))) minima.push(found);
  }
  if (minima.length === 0)
    throw new EngineError(
      'joint-does-not-close',
      worst.of,
      `The joints cannot all be closed; this one is left ${(1000 * worst.gap).toFixed(1)} mm open.`,
    );
  const settled = minima.filter((minimum) => minimum.converged);
  if (settled.length === 0)
    throw new EngineError('not-converged', 'marks', 'The fit of the poses did not settle.');
  settled.sort((a, b) => a.chiSquared - b.chiSquared);
  const [squares] = settled;
  const best =
    problem.loss === 'huber'
      ? reweigh(equations, manifold, squares)
      : { ...squares, weights: even };
  const covariance = covarianceAt(layout, equations, manifold, best.x, best.weights);
  return {
    layout,
    equations,
    x: best.x,
    weights: best.weights,
    covariance: covariance.matrix,
    freedom: covariance.freedom,
    chiSquared: best.chiSquared,
    iterations: iterations + best.iterations - squares.iterations,
    alternatives: settled
      .slice(1, 1 + mostAlternatives)
      .filter((minimum) => minimum.chiSquared - squares.chiSquared < worthShowing),
  };
}

interface Minimum {
  readonly x: Float64Array;
  readonly chiSquared: number;
  readonly iterations: number;
  readonly converged: boolean;
}

function descend(
  equations: Equations,
  manifold: Manifold,
  start: Float64Array,
  weights: readonly number[],
): Minimum {
  const freedom = manifold.freedom(start);
  const result = minimise(
    {
      freedom,
      evaluate: (x) => {
        const rows = whitened(equations.observations, x, weights);
        return {
          residuals: rows.residuals,
          jacobian: () => tangentJacobian(rows.jacobian(), manifold, x, freedom),
        };
      },
      move: (x, step) => {
        const basis = manifold.basis(x, freedom);
        const along = multiply(basis, step, x.length, freedom, 1);
        const moved = manifold.project(x.map((value, i) => value + along[i]));
        return moved.closed ? moved.x : null;
      },
    },
    start,
    { scaling: false, maxIterations: 200 },
  );
  return {
    x: result.x,
    chiSquared: result.sumOfSquares,
    iterations: result.iterations,
    converged: result.converged,
  };
}

function tangentJacobian(
  jacobian: Float64Array,
  manifold: Manifold,
  x: Float64Array,
  freedom: number,
): Float64Array {
  const rows = jacobian.length / x.length;
  return multiply(jacobian, manifold.basis(x, freedom), rows, x.length, freedom);
}

/** Iteratively reweighted least squares with Huber's weights, from the fit of least squares. */
function reweigh(
  equations: Equations,
  manifold: Manifold,
  squares: Minimum,
): Minimum & { weights: readonly number[] } {
  let current = squares;
  let weights: readonly number[] = equations.observations.map(() => 1);
  let iterations = squares.iterations;
  for (let i = 0; i < mostReweightings; i++) {
    const next = observationWeights(equations.observations, current.x);
    const change = Math.max(...next.map((weight, k) => Math.abs(weight - weights[k])));
    weights = next;
    if (change < 1e-12) return { ...current, iterations, weights };
    current = descend(equations, manifold, current.x, weights);
    iterations += current.iterations;
  }
  throw new EngineError('not-converged', 'loss', 'The weights of the Huber loss did not settle.');
}

export function covarianceAt(
  layout: Layout,
  equations: Equations,
  manifold: Manifold,
  x: Float64Array,
  weights: readonly number[],
): { matrix: Float64Array; freedom: number } {
  const freedom = manifold.freedom(x);
  if (freedom === 0) return { matrix: new Float64Array(layout.size ** 2), freedom };
  const full = whitenedJacobian(equations.observations, x, weights);
  const jacobian = tangentJacobian(full, manifold, x, freedom);
  const basis = manifold.basis(x, freedom);
  const rows = jacobian.length / freedom;
  const { scaled, lengths } = unitColumns(jacobian, rows, freedom);
  const qr = factorise(scaled, rows, freedom, undetermined);
  if (qr.rank < freedom) refuseUndetermined(layout, basis, freedom, qr, lengths);
  const inverse = inverseNormal(qr).map(
    (value, k) => value / (lengths[Math.floor(k / freedom)] * lengths[k % freedom]),
  );
  const half = multiply(basis, inverse, layout.size, freedom, freedom);
  const matrix = new Float64Array(layout.size ** 2);
  for (let i = 0; i < layout.size; i++)
    for (let j = 0; j <= i; j++) {
      let sum = 0;
      for (let k = 0; k < freedom; k++)
        sum += half[k * layout.size + i] * basis[k * layout.size + j];
      matrix[i * layout.size + j] = sum;
      matrix[j * layout.size + i] = sum;
    }
  return { matrix, freedom };
}

/** Names the body that could still move most. */
function refuseUndetermined(
  layout: Layout,
  basis: Float64Array,
  freedom: number,
  qr: ReturnType<typeof factorise>,
  lengths: Float64Array,
): never {
  const free = new Float64Array(freedom);
  const column = qr.rank;
  free[qr.pivots[column]] = 1;
  for (let k = qr.rank - 1; k >= 0; k--) {
    let sum = -qr.factors[column * qr.rows + k];
    for (let j = k + 1; j < qr.rank; j++) sum -= qr.factors[j * qr.rows + k] * free[qr.pivots[j]];
    free[qr.pivots[k]] = sum / qr.factors[k * qr.rows + k];
  }
  const move = multiply(
    basis,
    free.map((value, k) => value / lengths[k]),
    layout.size,
    freedom,
    1,
  );
  let loosest = '';
  let most = -1;
  for (const { id, index } of layout.bodies.values()) {
    const size = Math.hypot(move[index], move[index + 1], move[index + 2]);
    if (size > most) [most, loosest] = [size, id];
  }
  throw new EngineError(
    'not-enough-marks',
    `bodies.${loosest}`,
    `The marks, joints and stated poses do not fix where "${loosest}" stood: it takes two points, or one point and a direction.`,
  );
}

function isSame(layout: Layout, a: Float64Array, b: Float64Array): boolean {
  const angles = new Set([...layout.bodies.values()].map((slot) => slot.index + 2));
  for (const slot of layout.bodies.values()) {
    const turn = poseFrom(layout, slot, a).heading - poseFrom(layout, slot, b).heading;
    if (Math.abs(wrap(turn)) * slot.arm > sameMinimum) return false;
  }
  return a.every((value, i) => angles.has(i) || Math.abs(value - b[i]) <= sameMinimum);
}
