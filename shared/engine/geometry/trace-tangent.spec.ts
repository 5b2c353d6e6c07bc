import { describe, expect, it } from '@jest/globals';
import fc from 'fast-check';
import { traceTangent, type TracePoint } from './trace-tangent';
import { add, direction, rotate, subtract, wrap, type Vector } from './vector';

const sigma = 0.02;
const point = (at: Vector): TracePoint => ({
  at,
  covariance: [
    [sigma ** 2, 0],
    [0, sigma ** 2],
  ],
});

const arc = (radius: number, count: number, step: number): TracePoint[] =>
  Array.from({ length: count }, (_, i) => {
    const angle = ((i - (count - 1) / 2) * step) / radius;
    return point([radius * Math.sin(angle), radius * (1 - Math.cos(angle))]);
  });

describe('tangent of a trace', () => {
  it('is that of the straight line through two points, with √2·σ/L', () => {
    const {
      direction: along,
      sigma: u,
      curvature,
    } = traceTangent([point([0, 0]), point([3, 4])], [0, 0]);
    expect(along).toBeCloseTo(Math.atan2(4, 3), 12);
    expect(u).toBeCloseTo((Math.SQRT2 * sigma) / 5, 12);
    expect(curvature).toBeNull();
  });

  it('is that of a circle, and the curvature 1/R, positive where it bends left', () => {
    const left = traceTangent(arc(80, 9, 1), [0, 0]);
    expect(left.direction).toBeCloseTo(0, 9);
    // the next term of the circle, s⁴/(8R³), is under 2 % of the curvature here
    expect(left.curvature).toBeCloseTo(1 / 80, 4);
    const right = traceTangent(arc(80, 9, 1).reverse(), [0, 0]);
    expect(Math.abs(right.direction)).toBeCloseTo(Math.PI, 9);
    expect(right.curvature).toBeCloseTo(-1 / 80, 4);
  });

  it('turns with the scene', () => {
    const points = arc(50, 9, 0.8).map(({ at }, i) => point(add(at, [0, 0.01 * Math.cos(7 * i)])));
    const straight = traceTangent(points, points[4].at);
    fc.assert(
      fc.property(
        fc.double({ min: -3, max: 3, noNaN: true }),
        fc.double({ min: -1e3, max: 1e3, noNaN: true }),
        (turn, shift) => {
          const moved = points.map(({ at }) => point(add(rotate(turn, at), [shift, -shift])));
          const turned = traceTangent(moved, moved[4].at);
          expect(Math.abs(wrap(turned.direction - straight.direction - turn))).toBeLessThan(1e-8);
          expect(turned.sigma).toBeCloseTo(straight.sigma, 9);
          expect(turned.curvature).toBeCloseTo(straight.curvature ?? NaN, 7);
        },
      ),
      { numRuns: 50, seed: 3 },
    );
  });

  it('takes fewer points where the trace bends more than a parabola', () => {
    const wave = Array.from({ length: 25 }, (_, i) => point([i, 2 * Math.sin(i / 2)]));
    const tangent = traceTangent(wave, wave[12].at);
    expect(tangent.used).toBeLessThan(9);
    expect(tangent.direction).toBeCloseTo(Math.atan(Math.cos(6)), 1);
  });

  it('is wider at an end of the trace than in its middle', () => {
    const points = arc(60, 9, 1);
    const [end, middle] = [points[0].at, points[4].at].map((foot) => traceTangent(points, foot));
    expect(end.sigma).toBeGreaterThan(2 * middle.sigma);
  });

  it('weighs an error along the trace as none', () => {
    const long: TracePoint[] = arc(60, 7, 1).map(({ at }) => ({
      at,
      covariance: [
        [100 * sigma ** 2, 0],
        [0, sigma ** 2],
      ],
    }));
    const [wide, usual] = [long, arc(60, 7, 1)].map((points) => traceTangent(points, [0, 0]));
    expect(wide.direction).toBeCloseTo(direction(subtract([1, 0], [0, 0])), 8);
    expect(wide.sigma / usual.sigma).toBeGreaterThan(1);
    expect(wide.sigma / usual.sigma).toBeLessThan(1.2);
  });

  it('refuses one point, and points at one place', () => {
    expect(() => traceTangent([point([1, 1])], [1, 1])).toThrow(
      expect.objectContaining({ code: 'not-enough-marks', field: 'trace' }),
    );
    expect(() => traceTangent([point([1, 1]), point([1, 1])], [1, 1])).toThrow(
      expect.objectContaining({ code: 'coincident-points', field: 'trace' }),
    );
  });
});
