import { describe, expect, it } from '@jest/globals';
import type { PoseProblem } from '#shared/engine/documents/pose-problem';
import { add, toScene, wrap, type Vector } from '#shared/engine/geometry/vector';
import { traceTangent } from '#shared/engine/geometry/trace-tangent';
import { fitPoses } from '#shared/engine/pose/index';
import { chiSquaredQuantile } from '#shared/engine/uncertainty/distributions';
import { coverageInterval } from '#shared/engine/uncertainty/interval';
import { Random } from '#shared/engine/uncertainty/random';
import { caseFile, nameOf } from './case-file';

type Pair = [number, number];

interface Expected {
  readonly acceptance: Record<string, { readonly accept_fraction: readonly [number, number] }>;
}
const d30 = caseFile<unknown, Expected>('D30_coverage');
const scenes = 500;
/** Two-sided 99.9 % band of a binomial share of 0.95 among so many scenes. */
const [least, most] = d30.expected.acceptance[`N=${scenes},p=0.95`].accept_fraction;

/** A correlated error of a mark, larger along a direction than across it. */
function noisyMark(random: Random, at: Vector) {
  const [along, across, turn] = [
    0.02 + 0.08 * random.uniform(),
    0.01 + 0.02 * random.uniform(),
    7 * random.uniform(),
  ];
  const [c, s] = [Math.cos(turn), Math.sin(turn)];
  const [e1, e2] = [along * random.normal(), across * random.normal()];
  const cross = c * s * (along ** 2 - across ** 2);
  return {
    at: [at[0] + c * e1 - s * e2, at[1] + s * e1 + c * e2] as Pair,
    covariance: [
      [c * c * along ** 2 + s * s * across ** 2, cross],
      [cross, s * s * along ** 2 + c * c * across ** 2],
    ] as [Pair, Pair],
  };
}

/** A tractor with its trailer, dimensions uncertain, four marks on the first and two on the second. */
function lorryScene(random: Random): { problem: PoseProblem; truth: Record<string, number[]> } {
  const u = 0.02;
  const tractorPoints: Record<string, Pair> = {
    LF: [3.8, 1],
    RF: [3.8, -1],
    LR: [0, 1],
    RR: [0, -1],
    K: [0.5, 0],
  };
  const trailerPoints: Record<string, Pair> = { K: [0, 0], RL: [-8, 1.2], RR: [-8, -1.2] };
  const real = (points: Record<string, Pair>) =>
    Object.fromEntries(
      Object.entries(points).map(([id, [x, y]]): [string, Pair] =>
        id === 'K' ? [id, [x, y]] : [id, [x + u * random.normal(), y + u * random.normal()]],
      ),
    );
  const told = (points: Record<string, Pair>) =>
    Object.fromEntries(
      Object.entries(points).map(([id, at]) => [
        id,
        id === 'K' ? at : { at, sigma: [u, u] as Pair },
      ]),
    );
  const first = {
    x: 200 * random.uniform(),
    y: 200 * random.uniform(),
    heading: 6 * random.uniform(),
  };
  const kingpin = toScene(first, tractorPoints['K']);
  const second = {
    x: kingpin[0],
    y: kingpin[1],
    heading: first.heading - 1 + 2 * random.uniform(),
  };
  const tractorReal = real(tractorPoints);
  const trailerReal = real(trailerPoints);
  const marks = [
    ...['LF', 'RF', 'LR', 'RR'].map((point) => ({
      body: 'tractor',
      point,
      at: toScene(first, tractorReal[point]),
    })),
    ...['RL', 'RR'].map((point) => ({
      body: 'trailer',
      point,
      at: toScene(second, trailerReal[point]),
    })),
  ];
  return {
    truth: {
      tractor: [first.x, first.y, first.heading],
      trailer: [second.x, second.y, second.heading],
    },
    problem: {
      format: 'centrode.pose-problem/1',
      bodies: [
        { id: 'tractor', points: told(tractorPoints) },
        { id: 'trailer', points: told(trailerPoints) },
      ],
      joints: [
        {
          id: 'k',
          kind: 'pin',
          a: { body: 'tractor', point: 'K' },
          b: { body: 'trailer', point: 'K' },
        },
      ],
      marks: marks.map(({ body, point, at }, i) => ({
        id: `m${i}`,
        body,
        point,
        ...noisyMark(random, at),
      })),
      loss: 'squares',
    },
  };
}

describe('coverage: 95 % intervals hold the truth', () => {
  it(`of poses of a jointed pair with uncertain dimensions, ${nameOf(d30)}`, () => {
    const random = new Random(20261201);
    const held = new Map<string, number>();
    let fits = 0;
    let wide = 0;
    for (let k = 0; k < scenes; k++) {
      const { problem, truth } = lorryScene(random);
      const solution = fitPoses(problem);
      for (const [id, values] of Object.entries(truth)) {
        const { pose, covariance } = solution.bodies[id];
        [pose.x, pose.y, pose.heading].forEach((value, i) => {
          const off = i === 2 ? wrap(values[i] - value) : values[i] - value;
          const { low, high } = coverageInterval(0, Math.sqrt(covariance[i][i]));
          const key = `${id} ${['x', 'y', 'heading'][i]}`;
          held.set(key, (held.get(key) ?? 0) + (off >= low && off <= high ? 1 : 0));
        });
      }
      if (solution.chiSquared <= chiSquaredQuantile(0.95, solution.redundancy)) fits++;
      wide += solution.suspects.length;
    }
    for (const [key, count] of held) {
      expect({ key, ok: count / scenes >= least }).toEqual({ key, ok: true });
      expect({ key, ok: count / scenes <= most }).toEqual({ key, ok: true });
    }
    expect(fits / scenes).toBeGreaterThanOrEqual(least);
    expect(fits / scenes).toBeLessThanOrEqual(most);
    // one good mark in a thousand is suspected; of 3000 marks more than 12 would be a fault
    expect(wide).toBeLessThanOrEqual(12);
  }, 240_000);

  it(`of directions of traces along an arc, ${nameOf(d30)}`, () => {
    const random = new Random(77);
    let held = 0;
    for (let k = 0; k < scenes; k++) {
      const radius = 40 + 60 * random.uniform();
      const turn = 6 * random.uniform();
      const on = (s: number): Vector => [
        radius * Math.sin(turn + s / radius),
        -radius * Math.cos(turn + s / radius),
      ];
      const step = 0.5 + random.uniform();
      const points = Array.from({ length: 11 }, (_, i) => {
        const sigma = 0.02;
        const error: Vector = [sigma * random.normal(), sigma * random.normal()];
        return {
          at: add(on((i - 5) * step), error),
          covariance: [
            [sigma ** 2, 0],
            [0, sigma ** 2],
          ] as [Pair, Pair],
        };
      });
      const { direction, sigma } = traceTangent(points, on(0));
      if (Math.abs(wrap(direction - turn)) <= coverageInterval(0, sigma).high) held++;
    }
    expect(held / scenes).toBeGreaterThanOrEqual(least);
    expect(held / scenes).toBeLessThanOrEqual(most);
  }, 240_000);
});
