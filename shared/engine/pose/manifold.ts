import { apply, factorise, type Qr } from '../least-squares/qr';
import type { Equation } from './equations';

/** Absolute, m (rad for angles): a joint is closed when its equation is met within this. */
const closed = 1e-9;
const mostSteps = 100;
/** Largest move of one projection step, m; a heading counts as the arc at the size of its body. */
const longestStep = 2;

/**
 * The unknowns that meet every constraint: a surface in the space of all unknowns, on which the
 * fit moves. A point is brought back to the surface by the shortest Newton steps, and steps are
 * taken in the null space of the constraints.
 */
export class Manifold {
  private held: { x: Float64Array; qr: Qr } | null = null;

  constructor(
    private readonly size: number,
    private readonly constraints: readonly Equation[],
  ) {}

  /** Columns: an orthonormal basis of the moves that keep the constraints, size × freedom. */
  basis(x: Float64Array, freedom: number): Float64Array {
    const basis = new Float64Array(this.size * freedom);
    const offset = this.size - freedom;
    const qr = offset > 0 ? this.factors(x) : null;
    for (let j = 0; j < freedom; j++) {
      const axis = new Float64Array(this.size);
      axis[offset + j] = 1;
      basis.set(qr === null ? axis : apply(qr, axis), j * this.size);
    }
    return basis;
  }

  /** Number of independent moves at x. */
  freedom(x: Float64Array): number {
    return this.size - (this.constraints.length === 0 ? 0 : this.factors(x).rank);
  }

  /** The point of the surface near x; `closed` is false where Newton's iteration finds none. */
  project(x: Float64Array): { x: Float64Array; closed: boolean } {
    if (this.constraints.length === 0) return { x, closed: true };
    let at = x;
    let gap = this.gap(at);
    for (let i = 0; i < mostSteps; i++) {
      const step = this.newtonStep(at);
      const length = Math.hypot(...step);
      if (length <= 1e-15 * (1 + Math.hypot(...at))) break;
      let factor = Math.min(1, longestStep / length);
      let trial = moved(at, step, factor);
      let trialGap = this.gap(trial);
      for (; trialGap > gap && factor > 1e-4; trialGap = this.gap(trial)) {
        factor /= 2;
        trial = moved(at, step, factor);
      }
      if (trialGap >= gap) break;
      at = trial;
      gap = trialGap;
    }
    return { x: at, closed: this.worst(at).gap <= closed };
  }

  /** The constraint that is met worst. */
  worst(x: Float64Array): { of: string; gap: number } {
    let worst = { of: '', gap: 0 };
    for (const { of, evaluate } of this.constraints) {
      const gap = Math.abs(evaluate(x)[0].value);
      if (!(gap <= worst.gap)) worst = { of, gap };
    }
    return worst;
  }

  private gap(x: Float64Array): number {
    return Math.hypot(...this.constraints.map(({ evaluate }) => evaluate(x)[0].value));
  }

  /** QR of the transposed constraint matrix, one column per constraint. */
  private factors(x: Float64Array): Qr {
    if (this.held?.x === x) return this.held.qr;
    const columns = new Float64Array(this.size * this.constraints.length);
    this.constraints.forEach(({ evaluate }, k) =>
      columns.set(evaluate(x)[0].gradient, k * this.size),
    );
    const qr = factorise(columns, this.size, this.constraints.length, 1e-9);
    this.held = { x, qr };
    return qr;
  }

  /** The shortest step that closes every constraint to first order. */
  private newtonStep(x: Float64Array): Float64Array {
    const qr = this.factors(x);
    const y = new Float64Array(this.size);
    for (let k = 0; k < qr.rank; k++) {
      let sum = -this.constraints[qr.pivots[k]].evaluate(x)[0].value;
      for (let j = 0; j < k; j++) sum -= qr.factors[k * qr.rows + j] * y[j];
      y[k] = sum / qr.factors[k * qr.rows + k];
    }
    return apply(qr, y);
  }
}

const moved = (x: Float64Array, step: Float64Array, factor: number): Float64Array =>
  x.map((value, i) => value + factor * step[i]);
