import type { ReconstructionDocument, Station } from '../documents/reconstruction';
import { reconstructionDocument } from '../documents/reconstruction';
import type { StationMark } from '../documents/station';
import { toScene, type Vector } from '../geometry/vector';
import type { Random } from '../uncertainty/random';

type Pair = [number, number];

export const uuid = (n: number): string => `01890000-0000-7000-8000-${String(n).padStart(12, '0')}`;
const sigma = 0.015;
export const wheels: Record<string, Pair> = {
  LF: [1.3, 0.75],
  RF: [1.3, -0.75],
  LR: [-1.4, 0.75],
  RR: [-1.4, -0.75],
};
export const points = { ...wheels, G: [0, 0] as Pair };

/** A car that turns while it slides: a motion given in closed form. */
const poseAt = (t: number) => ({ x: 12 * t - 2 * t * t, y: 0.8 * t * t, heading: 0.3 + 0.9 * t });
export const omega = 0.9;
export const velocityOf = (point: Pair): Vector => {
  const { heading } = poseAt(0.5);
  const [c, s] = [Math.cos(heading), Math.sin(heading)];
  const r: Vector = [c * point[0] - s * point[1], s * point[0] + c * point[1]];
  return [10 - omega * r[1], 0.8 + omega * r[0]];
};

/** The four traces around t = 0.5 s, measured with noise. */
export function survey(random: Random): StationMark[] {
  return Object.entries(wheels).flatMap(([wheel, b], w) =>
    Array.from({ length: 9 }, (_, k) => {
      const [x, y] = toScene(poseAt(0.5 + 0.05 * (k - 4)), b);
      return {
        id: uuid(10 * w + k),
        label: `${wheel}${k}`,
        at: [x + sigma * random.normal(), y + sigma * random.normal()] as Pair,
        covariance: [
          [sigma ** 2, 0],
          [0, sigma ** 2],
        ] as [Pair, Pair],
        trace: wheel,
        order: k,
      };
    }),
  );
}

export const assignments = (use: { position: boolean; direction: boolean }): Station['marks'] =>
  Object.keys(wheels).map((point, w) => ({ markId: uuid(10 * w + 4), body: 'car', point, ...use }));

export const speed: Extract<Station['knowns'][number], { magnitude: unknown }> = {
  quantity: 'velocity',
  id: 'recorder',
  at: { body: 'car', point: 'G' },
  magnitude: { value: Math.hypot(10, 0.8), sigma: 0.3 },
  direction: null,
  line: false,
  basis: 'invented recorder',
};

export const carDocument = (change: Partial<Station> = {}): ReconstructionDocument =>
  reconstructionDocument.parse({
    format: 'centrode.reconstruction/1',
    bodies: [
      {
        id: 'car',
        name: 'the car',
        points: Object.entries(points).map(([id, at]) => ({ id, name: id, at, sigma: [0, 0] })),
        outline: [],
      },
      {
        id: 'trailer',
        name: 'the trailer',
        points: [
          { id: 'K', name: 'coupling', at: [0, 0], sigma: [0, 0] },
          { id: 'axle', name: 'axle', at: [-4, 0], sigma: [0, 0] },
        ],
        outline: [],
      },
    ],
    joints: [
      {
        kind: 'pin',
        id: 'coupling',
        a: { body: 'car', point: 'G' },
        b: { body: 'trailer', point: 'K' },
      },
    ],
    stations: [
      {
        id: 's1',
        name: 'first',
        marks: assignments({ position: true, direction: true }),
        poses: [],
        joints: { off: [] },
        knowns: [speed],
        ...change,
      },
    ],
  });
