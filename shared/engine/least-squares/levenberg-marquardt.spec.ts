import { describe, expect, it } from '@jest/globals';
import { minimise, type LeastSquaresProblem } from './levenberg-marquardt';

/** H. H. Rosenbrock, Computer J. 3 (1960) 175: a curved valley, least at (1, 1). */
const valley: LeastSquaresProblem = {
  freedom: 2,
  evaluate: ([x, y]) => ({
    residuals: Float64Array.of(10 * (y - x * x), 1 - x),
    jacobian: () => Float64Array.of(-20 * x, -1, 10, 0),
  }),
};

describe('Levenberg–Marquardt', () => {
  it('follows a curved valley to its end', () => {
    const { x, sumOfSquares, converged } = minimise(valley, Float64Array.of(-1.2, 1));
    expect(converged).toBe(true);
    expect(x[0]).toBeCloseTo(1, 12);
    expect(x[1]).toBeCloseTo(1, 12);
    expect(sumOfSquares).toBeLessThan(1e-25);
  });

  it('says when it was not given the time', () => {
    expect(minimise(valley, Float64Array.of(-1.2, 1), { maxIterations: 2 }).converged).toBe(false);
  });

  it('finds a least sum of squares that is not zero', () => {
    const { x, sumOfSquares } = minimise(
      {
        freedom: 1,
        evaluate: ([t]) => ({
          residuals: Float64Array.of(t - 1, t - 2, t - 6),
          jacobian: () => Float64Array.of(1, 1, 1),
        }),
      },
      Float64Array.of(100),
    );
    expect(x[0]).toBeCloseTo(3, 13);
    expect(sumOfSquares).toBeCloseTo(14, 12);
  });

  it('stays on a circle where its moves lead along one', () => {
    const target = [3, 4];
    const { x, converged } = minimise(
      {
        freedom: 1,
        evaluate: ([px, py]) => ({
          residuals: Float64Array.of(px - target[0], py - target[1]),
          jacobian: () => Float64Array.of(-py, px),
        }),
        move: ([px, py], [step]) => {
          const [qx, qy] = [px - step * py, py + step * px];
          const length = Math.hypot(qx, qy);
          return Float64Array.of(qx / length, qy / length);
        },
      },
      Float64Array.of(1, 0),
      { scaling: false },
    );
    expect(converged).toBe(true);
    // far from the circle, |r|² is flat to 1e-15 within the root of that
    expect(x[0]).toBeCloseTo(0.6, 6);
    expect(x[1]).toBeCloseTo(0.8, 6);
  });

  it('stops where it may not move, and where there is nothing to move', () => {
    const stuck = minimise({ ...valley, move: () => null }, Float64Array.of(-1.2, 1));
    expect(Array.from(stuck.x)).toEqual([-1.2, 1]);
    const none = minimise(
      {
        freedom: 0,
        evaluate: () => ({
          residuals: Float64Array.of(2),
          jacobian: () => new Float64Array(0),
        }),
      },
      Float64Array.of(5),
    );
    expect(none).toMatchObject({ converged: true, sumOfSquares: 4 });
  });
});
