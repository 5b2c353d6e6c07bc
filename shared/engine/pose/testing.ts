import type { PoseProblem } from '../documents/pose-problem';
import { add, toScene, type Pose } from '../geometry/vector';

export type Pair = [number, number];
export type Covariance = PoseProblem['marks'][number]['covariance'];

export const round = (sigma: number): Covariance => [
  [sigma * sigma, 0],
  [0, sigma * sigma],
];
export const slanted: Covariance = [
  [4e-4, 1e-4],
  [1e-4, 9e-4],
];
export const car: Record<string, Pair> = {
  LF: [1.3, 0.75],
  RF: [1.3, -0.75],
  LR: [-1.4, 0.75],
  RR: [-1.4, -0.75],
};
export const offsets: Pair[] = [
  [0.011, -0.02],
  [-0.03, 0.012],
  [0.004, 0.018],
  [0.021, 0.009],
];

export const pair = ([x, y]: readonly [number, number]): Pair => [x, y];

export const carProblem = (
  pose: Pose,
  noise: readonly Pair[],
  covariance: Covariance,
): PoseProblem => ({
  format: 'centrode.pose-problem/1',
  bodies: [{ id: 'car', points: car }],
  joints: [],
  marks: Object.entries(car).map(([point, b], i) => ({
    id: point,
    at: pair(add(toScene(pose, b), noise[i])),
    covariance,
    body: 'car',
    point,
  })),
  loss: 'squares',
});

/** A tractor and a trailer on its kingpin; the trailer left a single mark. */
export const lorry = (play?: number): PoseProblem => ({
  format: 'centrode.pose-problem/1',
  bodies: [
    { id: 'tractor', points: { LF: [3.8, 1], RR: [0, -1], K: [0.5, 0] } },
    { id: 'trailer', points: { K: [0, 0], RL: [-8, 1.2] } },
  ],
  joints: [
    {
      id: 'kingpin',
      kind: 'pin',
      a: { body: 'tractor', point: 'K' },
      b: { body: 'trailer', point: 'K' },
      ...(play !== undefined && { sigma: play }),
    },
  ],
  marks: [
    { id: 'a', at: [13.81, 6.02], covariance: slanted, body: 'tractor', point: 'LF' },
    { id: 'b', at: [10.02, 4.01], covariance: slanted, body: 'tractor', point: 'RR' },
    { id: 'c', at: [2.94, 8.75], covariance: round(0.05), body: 'trailer', point: 'RL' },
  ],
  loss: 'squares',
});
