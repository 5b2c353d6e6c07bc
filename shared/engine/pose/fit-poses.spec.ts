import { describe, expect, it } from '@jest/globals';
import fc from 'fast-check';
import type { PoseProblem } from '../documents/pose-problem';
import { add, norm, rotate, subtract, wrap } from '../geometry/vector';
import { fitPoses } from './index';
import {
  car,
  carProblem,
  lorry,
  offsets,
  pair,
  round,
  slanted,
  type Covariance,
  type Pair,
} from './testing';

const angle = fc.double({ min: -3.1, max: 3.1, noNaN: true });
const place = fc.double({ min: -500, max: 500, noNaN: true });

describe('pose fit', () => {
  it('finds the pose of marks without error, wherever it is', () => {
    fc.assert(
      fc.property(place, place, angle, (x, y, heading) => {
        const { bodies, chiSquared } = fitPoses(
          carProblem({ x, y, heading }, Array(4).fill([0, 0]), slanted),
        );
        const { pose } = bodies['car'];
        expect(Math.hypot(pose.x - x, pose.y - y)).toBeLessThan(1e-9);
        expect(Math.abs(wrap(pose.heading - heading))).toBeLessThan(1e-10);
        expect(chiSquared).toBeLessThan(1e-12);
      }),
      { numRuns: 60, seed: 1 },
    );
  });

  it('does not depend on the frame of the scene', () => {
    const turnCovariance = (turn: number): Covariance => {
      const [c, s] = [Math.cos(turn), Math.sin(turn)];
      const [[a, b], [, d]] = slanted;
      const cross = c * s * (a - d) + (c * c - s * s) * b;
      return [
        [c * c * a - 2 * c * s * b + s * s * d, cross],
        [cross, s * s * a + 2 * c * s * b + c * c * d],
      ];
    };
    const straight = fitPoses(carProblem({ x: 3, y: 2, heading: 0.4 }, offsets, slanted));
    fc.assert(
      fc.property(angle, place, place, (turn, dx, dy) => {
        const given = carProblem({ x: 3, y: 2, heading: 0.4 }, offsets, slanted);
        const turned = fitPoses({
          ...given,
          marks: given.marks.map((mark) => ({
            ...mark,
            at: pair(add(rotate(turn, mark.at), [dx, dy])),
            covariance: turnCovariance(turn),
          })),
        });
        const [a, b] = [straight.bodies['car'].pose, turned.bodies['car'].pose];
        const moved = add(rotate(turn, [a.x, a.y]), [dx, dy]);
        expect(norm(subtract(moved, [b.x, b.y]))).toBeLessThan(1e-8);
        expect(Math.abs(wrap(b.heading - a.heading - turn))).toBeLessThan(1e-9);
        expect(turned.chiSquared).toBeCloseTo(straight.chiSquared, 7);
        turned.residuals.forEach(({ w, leverage, detectable }, i) => {
          expect(w).toBeCloseTo(straight.residuals[i].w ?? NaN, 6);
          expect(leverage).toBeCloseTo(straight.residuals[i].leverage, 7);
          expect(detectable).toBeCloseTo(straight.residuals[i].detectable ?? NaN, 6);
        });
      }),
      { numRuns: 40, seed: 2 },
    );
  });

  it('does not depend on the order of bodies and marks', () => {
    const given = lorry();
    const one = fitPoses(given);
    const other = fitPoses({
      ...given,
      bodies: [...given.bodies].reverse(),
      marks: [...given.marks].reverse(),
    });
    for (const id of ['tractor', 'trailer']) {
      expect(other.bodies[id].pose.x).toBeCloseTo(one.bodies[id].pose.x, 9);
      expect(other.bodies[id].pose.heading).toBeCloseTo(one.bodies[id].pose.heading, 9);
      expect(other.bodies[id].covariance[2][2]).toBeCloseTo(one.bodies[id].covariance[2][2], 10);
    }
  });

  it('uses as much of the marks as it has unknowns: leverages sum to them', () => {
    const { residuals, redundancy } = fitPoses(
      carProblem({ x: 3, y: 2, heading: 0.4 }, offsets, slanted),
    );
    expect(redundancy).toBe(5);
    expect(residuals.reduce((sum, { leverage }) => sum + 2 * leverage, 0)).toBeCloseTo(3, 9);
  });
});

describe('kinds of evidence', () => {
  const one = (mark: Partial<PoseProblem['marks'][number]>): PoseProblem => ({
    ...carProblem({ x: 0, y: 0, heading: 0 }, offsets, round(0.02)),
    marks: [{ id: 'm', at: [5, 5], covariance: round(0.02), body: 'car', point: 'LF', ...mark }],
  });

  it('one point and a tangent fix a pose; its uncertainty is that of the tangent', () => {
    const { bodies, points, redundancy, warnings } = fitPoses(
      one({ tangent: { direction: 0.8, sigma: 0.03 } }),
    );
    expect(bodies['car'].pose.heading).toBeCloseTo(0.8, 10);
    expect(Math.sqrt(bodies['car'].covariance[2][2])).toBeCloseTo(0.03, 10);
    expect(points['car.LF'].at[0]).toBeCloseTo(5, 9);
    expect(redundancy).toBe(0);
    expect(warnings.join()).toContain('redundant');
  });

  it('a tangent without sense leaves two headings, half a turn apart', () => {
    const { bodies, alternatives } = fitPoses(
      one({ tangent: { direction: 0.8, sigma: 0.03, along: 0.1, line: true } }),
    );
    const headings = [bodies['car'].pose.heading, alternatives[0].bodies['car'].heading];
    headings.forEach((heading) => expect(Math.sin(2 * (heading - 0.7))).toBeCloseTo(0, 8));
    expect(Math.abs(wrap(headings[0] - headings[1]))).toBeCloseTo(Math.PI, 8);
  });

  it('a mark on a line counts across the line only', () => {
    const pose = { x: 2, y: 1, heading: 0.5 };
    const given = carProblem(pose, Array(4).fill([0, 0]), slanted);
    const lined: PoseProblem = {
      ...given,
      marks: given.marks.map((mark, i) =>
        i === 3
          ? { ...mark, at: pair(add(mark.at, rotate(1.1, [7, 0]))), line: { direction: 1.1 } }
          : mark,
      ),
    };
    const { bodies, redundancy, residuals } = fitPoses(lined);
    expect(bodies['car'].pose.x).toBeCloseTo(2, 9);
    expect(bodies['car'].pose.heading).toBeCloseTo(0.5, 9);
    expect(redundancy).toBe(4);
    expect(norm(residuals[3].residual)).toBeLessThan(1e-9);
  });

  it('three lines fix a pose', () => {
    const pose = { x: 2, y: 1, heading: 0.5 };
    const given = carProblem(pose, Array(4).fill([0, 0]), round(0.02));
    const { bodies, redundancy } = fitPoses({
      ...given,
      marks: given.marks
        .slice(0, 3)
        .map((mark, i) => ({ ...mark, line: { direction: [0.1, 1.2, 2.4][i] } })),
    });
    expect(redundancy).toBe(0);
    expect(norm(subtract([bodies['car'].pose.x, bodies['car'].pose.y], [2, 1]))).toBeLessThan(20);
  });

  it('an uncertain dimension weighs as an uncertain mark, where the two are alike', () => {
    const pose = { x: 2, y: 1, heading: 0.5 };
    const given = carProblem(pose, offsets, round(0.03));
    const soft = fitPoses({
      ...given,
      bodies: [
        {
          id: 'car',
          points: Object.fromEntries(
            Object.entries(car).map(([id, at]) => [id, { at, sigma: [0.04, 0.04] as Pair }]),
          ),
        },
      ],
    });
    const hard = fitPoses(carProblem(pose, offsets, round(0.05)));
    expect(soft.bodies['car'].pose.x).toBeCloseTo(hard.bodies['car'].pose.x, 9);
    expect(soft.bodies['car'].pose.heading).toBeCloseTo(hard.bodies['car'].pose.heading, 9);
    expect(soft.chiSquared).toBeCloseTo(hard.chiSquared, 9);
    expect(soft.redundancy).toBe(hard.redundancy);
    // its lever arms are the fitted ones, a hundredth longer or shorter
    const ratio = soft.bodies['car'].covariance[2][2] / hard.bodies['car'].covariance[2][2];
    expect(Math.abs(ratio - 1)).toBeLessThan(0.03);
    expect(Object.keys(soft.dimensions)).toHaveLength(4);
  });

  it('a stated pose is a prior, exact without an uncertainty', () => {
    const given = one({});
    const [body] = given.bodies;
    const { bodies, priors } = fitPoses({
      ...given,
      bodies: [{ ...body, stated: { heading: { value: 1 }, x: { value: 4.4, sigma: 0.5 } } }],
    });
    expect(bodies['car'].pose.heading).toBeCloseTo(1, 12);
    expect(bodies['car'].covariance[2][2]).toBe(0);
    expect(priors.map(({ of }) => of)).toEqual(['bodies.car.stated.x']);
  });
});
