import { describe, expect, it } from '@jest/globals';
import fc from 'fast-check';
import { ellipse95, ellipseRing } from './error-ellipse';

/** 95 % point of χ² with two degrees of freedom, 5.991465 (standard table, from memory). */
const q95 = 5.991465;

describe('the error ellipse of a mark', () => {
  it('has half axes of 2.4477 sigma when x and y are independent', () => {
    const { major, minor, direction } = ellipse95([
      [0.0004, 0],
      [0, 0.0001],
    ]);
    expect(major).toBeCloseTo(0.02 * Math.sqrt(q95), 7);
    expect(minor).toBeCloseTo(0.01 * Math.sqrt(q95), 7);
    expect(direction).toBe(0);
  });

  it('lies along the diagonal when x and y go together', () => {
    const { major, minor, direction } = ellipse95([
      [0.0001, 0.0001],
      [0.0001, 0.0001],
    ]);
    expect(direction).toBeCloseTo(Math.PI / 4, 12);
    expect(major).toBeCloseTo(0.01 * Math.sqrt(2 * q95), 7);
    expect(minor).toBeCloseTo(0, 9);
  });

  it('is where the quadratic form of the covariance is 5.991', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.001, max: 1, noNaN: true }),
        fc.double({ min: 0.001, max: 1, noNaN: true }),
        fc.double({ min: -0.95, max: 0.95, noNaN: true }),
        (sx, sy, rho) => {
          const [xx, xy, yy] = [sx * sx, rho * sx * sy, sy * sy];
          const det = xx * yy - xy * xy;
          const ring = ellipseRing(
            [3, -2],
            ellipse95([
              [xx, xy],
              [xy, yy],
            ]),
            1,
          );
          for (const [x, y] of ring) {
            const [u, v] = [x - 3, y + 2];
            const form = (yy * u * u - 2 * xy * u * v + xx * v * v) / det;
            expect(form / q95).toBeCloseTo(1, 5);
          }
        },
      ),
      { seed: 3, numRuns: 100 },
    );
  });

  it('is drawn larger on request', () => {
    const one = { major: 0.02, minor: 0.01, direction: 0 };
    expect(ellipseRing([0, 0], one, 10)[0][0]).toBeCloseTo(0.2, 12);
  });
});
