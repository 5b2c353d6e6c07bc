import { describe, expect, it } from '@jest/globals';
import type { PoseProblem } from '../documents/pose-problem';
import { norm, rotate, subtract } from '../geometry/vector';
import { fitPoses } from './index';
import { lorry, round, type Pair } from './testing';

describe('jointed bodies', () => {
  it('keep a pin closed, in place and in covariance', () => {
    const { points, redundancy, covariance } = fitPoses(lorry());
    const [a, b] = [points['tractor.K'], points['trailer.K']];
    expect(norm(subtract(a.at, b.at))).toBeLessThan(1e-9);
    a.covariance
      .flat()
      .forEach((value, i) => expect(b.covariance.flat()[i]).toBeCloseTo(value, 12));
    expect(redundancy).toBe(2);
    expect(covariance.bodies).toEqual(['tractor', 'trailer']);
    expect(covariance.matrix).toHaveLength(6);
  });

  it('approach the constraint as the play of the pin goes to zero', () => {
    const exact = fitPoses(lorry()).bodies['trailer'];
    const loose = fitPoses(lorry(1e-6)).bodies['trailer'];
    expect(loose.pose.x).toBeCloseTo(exact.pose.x, 7);
    expect(loose.covariance[2][2]).toBeCloseTo(exact.covariance[2][2], 9);
    expect(fitPoses(lorry(0.02)).priors.map(({ of }) => of)).toContain('joints.kingpin');
  });

  const slider = (guideAt: Pair): PoseProblem => ({
    format: 'centrode.pose-problem/1',
    bodies: [
      { id: 'crank', points: { O: [0, 0], A: [0.15, 0] } },
      { id: 'rod', points: { A: [0, 0], B: [0.5, 0] } },
    ],
    joints: [
      { id: 'o', kind: 'pin', ground: true, at: [0, 0], a: { body: 'crank', point: 'O' } },
      { id: 'a', kind: 'pin', a: { body: 'crank', point: 'A' }, b: { body: 'rod', point: 'A' } },
      { id: 'g', kind: 'guide', at: guideAt, direction: 0, a: { body: 'rod', point: 'B' } },
    ],
    marks: [{ id: 'm', at: [0.61, 0.001], covariance: round(0.002), body: 'rod', point: 'B' }],
    loss: 'squares',
  });

  it('show both ways in which a slider-crank can stand (law of cosines)', () => {
    const { bodies, alternatives, redundancy, warnings } = fitPoses(slider([0, 0]));
    const cosine = (0.15 ** 2 + 0.61 ** 2 - 0.5 ** 2) / (2 * 0.15 * 0.61);
    expect(Math.cos(bodies['crank'].pose.heading)).toBeCloseTo(cosine, 10);
    expect(alternatives).toHaveLength(1);
    expect(alternatives[0].bodies['crank'].heading).toBeCloseTo(-bodies['crank'].pose.heading, 8);
    expect(redundancy).toBe(1);
    expect(warnings.join()).toContain('Another pose');
  });

  it('that cannot be closed are refused with the gap', () => {
    expect(() => fitPoses(slider([0, 5]))).toThrow(
      expect.objectContaining({
        code: 'joint-does-not-close',
        message: expect.stringMatching(/\d mm open/),
      }),
    );
  });

  it('follow a slot, a curved guide, a weld and a link', () => {
    const { points, bodies } = fitPoses({
      format: 'centrode.pose-problem/1',
      bodies: [
        { id: 'base', points: { O: [0, 0], S: [1, 0], L: [0, 1] } },
        { id: 'arm', points: { P: [0, 0], Q: [2, 0] } },
        { id: 'tool', points: { T: [0, 0], U: [0.5, 0] } },
        { id: 'wheel', points: { C: [0, 0], R: [0.4, 0] } },
      ],
      joints: [
        {
          id: 'slot',
          kind: 'slot',
          a: { body: 'arm', point: 'P' },
          b: { body: 'base', point: 'S' },
          direction: Math.PI / 2,
        },
        {
          id: 'link',
          kind: 'link',
          a: { body: 'base', point: 'L' },
          b: { body: 'arm', point: 'Q' },
          length: 3,
        },
        {
          id: 'weld',
          kind: 'weld',
          a: { body: 'arm', point: 'Q' },
          b: { body: 'tool', point: 'T' },
          angle: 0.3,
        },
        {
          id: 'arc',
          kind: 'guide',
          a: { body: 'wheel', point: 'C' },
          at: [6, 0],
          direction: 0,
          radius: 2,
        },
      ],
      marks: [
        { id: 'b1', at: [0, 0], covariance: round(0.01), body: 'base', point: 'O' },
        { id: 'b2', at: [0.995, 0.1], covariance: round(0.01), body: 'base', point: 'S' },
        { id: 'a1', at: [0.97, 0.5], covariance: round(0.02), body: 'arm', point: 'P' },
        { id: 'a2', at: [2.9, 0.9], covariance: round(0.02), body: 'arm', point: 'Q' },
        { id: 'w1', at: [7.42, 0.6], covariance: round(0.02), body: 'wheel', point: 'C' },
        { id: 'w2', at: [7.82, 0.6], covariance: round(0.02), body: 'wheel', point: 'R' },
      ],
      loss: 'squares',
    });
    const { base, arm, tool } = bodies;
    const along = rotate(-base.pose.heading, subtract(points['arm.P'].at, points['base.S'].at));
    expect(along[0]).toBeCloseTo(0, 9);
    expect(norm(subtract(points['arm.Q'].at, points['base.L'].at))).toBeCloseTo(3, 9);
    expect(tool.pose.heading - arm.pose.heading).toBeCloseTo(0.3, 9);
    expect(norm(subtract(points['wheel.C'].at, [6, 2]))).toBeCloseTo(2, 9);
  });
});
