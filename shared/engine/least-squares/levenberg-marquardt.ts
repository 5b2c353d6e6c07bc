import { applyTransposed, factorise, solve, type Qr } from './qr';
import { linearNorm, scaledNorm, trustRegionStep } from './trust-region';

/**
 * Non-linear least squares: the x that makes |r(x)|² least.
 *
 * Levenberg–Marquardt as a trust region with scaled variables, by QR of the Jacobian (never of the
 * normal equations, which would square its condition).
 * Source: J. J. Moré, "The Levenberg–Marquardt algorithm: implementation and theory", Lecture
 * Notes in Mathematics 630, Springer 1978, pp. 105–116.
 */
export interface Evaluation {
  /** m residuals, each divided by its standard uncertainty where that is known. */
  readonly residuals: Float64Array;
  /** ∂r/∂step at no step, m × n, column-major; asked for only at accepted points. */
  jacobian(): Float64Array;
}

export interface LeastSquaresProblem {
  /** Length of a step; less than that of x when constraints tie its elements. */
  readonly freedom: number;
  evaluate(x: Float64Array): Evaluation;
  /** x moved by a step; null when the point cannot be reached. Addition when left out. */
  move?(x: Float64Array, step: Float64Array): Float64Array | null;
}

export interface LeastSquaresOptions {
  readonly maxIterations?: number;
  /** Relative decrease of |r|² that counts as none. */
  readonly tolerance?: number;
  /** False where the elements of a step are of like size and their meaning may turn. */
  readonly scaling?: boolean;
  /** First trust radius over the scaled length of x. */
  readonly radius?: number;
}

export interface LeastSquaresResult {
  readonly x: Float64Array;
  readonly residuals: Float64Array;
  readonly jacobian: Float64Array;
  /** |r|² at x. */
  readonly sumOfSquares: number;
  readonly iterations: number;
  readonly converged: boolean;
}

export function minimise(
  problem: LeastSquaresProblem,
  start: Float64Array,
  options: LeastSquaresOptions = {},
): LeastSquaresResult {
  const { maxIterations = 500, tolerance = 1e-15, scaling = true, radius = 1 } = options;
  const n = problem.freedom;
  let x = start;
  let current = problem.evaluate(x);
  let norm = euclid(current.residuals);
  let jacobian = current.jacobian();
  const scale = new Float64Array(n).fill(1);
  const size = (a: Float64Array): number => (scaling ? scaledNorm(scale, a) : euclid(a));
  let trust = 0;
  let damping = 0;
  for (let iteration = 1; iteration <= maxIterations; iteration++) {
    const m = current.residuals.length;
    const qr = factorise(jacobian, m, n, 0);
    if (scaling) rescale(scale, jacobian, m, iteration === 1);
    if (iteration === 1) trust = radius * (size(x) || 1);
    const projected = applyTransposed(qr, current.residuals);
    const done = (): LeastSquaresResult => polished(problem, x, current, jacobian, iteration);
    if (n === 0 || gradientIsZero(qr, jacobian, current.residuals, norm)) return done();
    for (;;) {
      const { step, lambda } = trustRegionStep(qr, projected, scale, trust, damping);
      damping = lambda;
      const length = scaledNorm(scale, step);
      if (iteration === 1) trust = Math.min(trust, length || trust);
      const moved = problem.move ? problem.move(x, step) : sum(x, step);
      const trial = moved === null ? null : problem.evaluate(moved);
      const trialNorm = trial === null ? Infinity : euclid(trial.residuals);
      const actual = trialNorm < 10 * norm ? 1 - (trialNorm / norm) ** 2 : -1;
      const linear = linearNorm(qr, step) / norm;
      const damped = (Math.sqrt(damping) * length) / norm;
      const predicted = linear ** 2 + 2 * damped ** 2;
      const slope = -(linear ** 2 + damped ** 2);
      const ratio = predicted === 0 ? 0 : actual / predicted;
      if (!(ratio > 0.25)) {
        let shrink = actual >= 0 ? 0.5 : (0.5 * slope) / (slope + 0.5 * actual);
        if (!(0.1 * trialNorm < norm) || !(shrink >= 0.1)) shrink = 0.1;
        trust = shrink * Math.min(trust, length / 0.1);
        damping /= shrink;
      } else if (damping === 0 || ratio >= 0.75) {
        trust = length / 0.5;
        damping *= 0.5;
      }
      if (ratio >= 1e-4 && moved !== null && trial !== null) {
        x = moved;
        current = trial;
        norm = trialNorm;
        jacobian = current.jacobian();
      }
      const negligible = Math.abs(actual) <= tolerance && predicted <= tolerance && ratio <= 2;
      if (negligible || trust <= Number.EPSILON * size(x)) return done();
      if (ratio >= 1e-4) break;
      if (predicted <= Number.EPSILON ** 2 || trust < 1e-300) return done();
    }
  }
  return {
    x,
    residuals: current.residuals,
    jacobian,
    sumOfSquares: norm * norm,
    iterations: maxIterations,
    converged: false,
  };
}

const polishings = 3;

/**
 * The test on |r|² leaves an error of about the root of its tolerance in x: full Gauss–Newton steps
 * take it away, as long as they keep |r|² to rounding.
 */
function polished(
  problem: LeastSquaresProblem,
  from: Float64Array,
  evaluation: Evaluation,
  slopes: Float64Array,
  iterations: number,
): LeastSquaresResult {
  let x = from;
  let current = evaluation;
  let jacobian = slopes;
  let norm = euclid(current.residuals);
  for (let i = 0; i < polishings && problem.freedom > 0 && norm > 0; i++) {
    const qr = factorise(jacobian, current.residuals.length, problem.freedom);
    if (qr.rank < problem.freedom) break;
    const step = solve(qr, current.residuals).map((value) => -value);
    const moved = problem.move ? problem.move(x, step) : sum(x, step);
    if (moved === null) break;
    const next = problem.evaluate(moved);
    const nextNorm = euclid(next.residuals);
    if (!(nextNorm <= norm * (1 + 1e-14))) break;
    [x, current, jacobian, norm] = [moved, next, next.jacobian(), nextNorm];
  }
  return {
    x,
    residuals: current.residuals,
    jacobian,
    sumOfSquares: norm * norm,
    iterations,
    converged: true,
  };
}

function rescale(scale: Float64Array, jacobian: Float64Array, m: number, first: boolean): void {
  for (let j = 0; j < scale.length; j++) {
    const norm = euclid(jacobian.subarray(j * m, (j + 1) * m));
    if (first) scale[j] = norm || 1;
    else scale[j] = Math.max(scale[j], norm);
  }
}

/** Every column of the Jacobian is orthogonal to the residuals, to rounding. */
function gradientIsZero(
  qr: Qr,
  jacobian: Float64Array,
  residuals: Float64Array,
  norm: number,
): boolean {
  if (norm === 0) return true;
  const m = qr.rows;
  for (let j = 0; j < qr.columns; j++) {
    const column = jacobian.subarray(j * m, (j + 1) * m);
    const length = euclid(column);
    let dot = 0;
    for (let i = 0; i < m; i++) dot += column[i] * residuals[i];
    if (length > 0 && Math.abs(dot) > 4 * Number.EPSILON * length * norm) return false;
  }
  return true;
}

function euclid(a: Float64Array): number {
  let sum = 0;
  for (const value of a) sum += value * value;
  return Math.sqrt(sum);
}

function sum(x: Float64Array, step: Float64Array): Float64Array {
  return x.map((value, i) => value + step[i]);
}
