import { describe, expect, it } from '@jest/globals';
import { compute, recompute } from '../computation/index';
import type { ReconstructionDocument, Station } from '../documents/reconstruction';
import { reconstructionDocument } from '../documents/reconstruction';
import { stationAnswer, stationProblem, type StationMark } from '../documents/station';
import { toScene, wrap, type Vector } from '../geometry/vector';
import { coverageInterval } from '../uncertainty/interval';
import { Random } from '../uncertainty/random';
import { answerStation, stationProblemOf } from './index';

type Pair = [number, number];

const uuid = (n: number): string => `01890000-0000-7000-8000-${String(n).padStart(12, '0')}`;
const sigma = 0.015;
const wheels: Record<string, Pair> = {
  LF: [1.3, 0.75],
  RF: [1.3, -0.75],
  LR: [-1.4, 0.75],
  RR: [-1.4, -0.75],
};
const points = { ...wheels, G: [0, 0] as Pair };

/** A car that turns while it slides: a motion given in closed form. */
const poseAt = (t: number) => ({ x: 12 * t - 2 * t * t, y: 0.8 * t * t, heading: 0.3 + 0.9 * t });
const omega = 0.9;
const velocityOf = (point: Pair): Vector => {
  const { heading } = poseAt(0.5);
  const [c, s] = [Math.cos(heading), Math.sin(heading)];
  const r: Vector = [c * point[0] - s * point[1], s * point[0] + c * point[1]];
  return [10 - omega * r[1], 0.8 + omega * r[0]];
};

/** The four traces around t = 0.5 s, measured with noise. */
function survey(random: Random): StationMark[] {
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

const assignments = (use: { position: boolean; direction: boolean }): Station['marks'] =>
  Object.keys(wheels).map((point, w) => ({ markId: uuid(10 * w + 4), body: 'car', point, ...use }));

const speed: Station['knowns'][number] = {
  quantity: 'velocity',
  id: 'recorder',
  at: { body: 'car', point: 'G' },
  magnitude: { value: Math.hypot(10, 0.8), sigma: 0.3 },
  direction: null,
  line: false,
  basis: 'invented recorder',
};

const carDocument = (change: Partial<Station> = {}): ReconstructionDocument =>
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

describe('a station, from marks to speeds', () => {
  const marks = survey(new Random(4));
  const answer = answerStation(carDocument(), 's1', marks);

  it('places the bodies, and names those that nothing places', () => {
    expect(answer.failure).toBeNull();
    expect(Object.keys(answer.pose?.bodies ?? {})).toEqual(['car']);
    expect(answer.unplaced).toEqual(['trailer']);
    expect(answer.problem?.bodies.map(({ id }) => id)).toEqual(['car']);
    expect(answer.problem?.joints).toEqual([]);
  });

  it('takes the tangents of the traces as directions, with their uncertainty', () => {
    expect(answer.directions).toHaveLength(4);
    for (const { point, direction, sigma: u } of answer.directions) {
      const v = velocityOf(wheels[point]);
      expect(Math.abs(wrap(direction - Math.atan2(v[1], v[0])))).toBeLessThan(4 * u);
    }
    expect(answer.problem?.knowns.map(({ source }) => source)).toContain(uuid(4));
  });

  it('finds the motion within its uncertainty', () => {
    const [branch] = answer.solution?.branches ?? [];
    expect(answer.solution?.status).toBe('over-determined');
    const { omega: found, sigma: u } = branch.bodies['car'];
    expect(Math.abs((found ?? NaN) - omega)).toBeLessThan(3 * (u.omega ?? NaN));
    expect(answer.speeds.map(({ point }) => point)).toEqual([...Object.keys(wheels), 'G']);
    for (const { point, speed: v, interval, rough } of answer.speeds) {
      const truth = Math.hypot(...velocityOf(points[point as keyof typeof points]));
      const [low, high] = interval ?? [NaN, NaN];
      expect((low + high) / 2).toBeCloseTo(v ?? NaN, 9);
      expect(Math.abs((v ?? NaN) - truth)).toBeLessThan(1.5 * (high - low));
      expect(rough).toBe(false);
    }
  });

  it('follows its schemas and is recorded and computed again to the same bytes', () => {
    const problem = stationProblemOf(carDocument(), 's1', marks);
    expect(stationProblem.parse(problem)).toEqual(problem);
    expect(() => stationAnswer.parse(answer)).not.toThrow();
    const kept = compute('station', problem);
    expect(kept.status).toBe('over-determined');
    expect(recompute(JSON.parse(kept.text)).identical).toBe(true);
  });

  it('keeps of the survey only what it uses', () => {
    const idle = { ...marks[0], id: uuid(999), trace: 'another' };
    const whole = stationProblemOf(carDocument(), 's1', [...marks, idle]);
    expect(whole.marks).toHaveLength(36);
    const places = carDocument({ marks: assignments({ position: true, direction: false }) });
    expect(stationProblemOf(places, 's1', marks).marks).toHaveLength(4);
  });

  it('holds the truth in 95 % of 200 noisy surveys (99.9 % band of the binomial)', () => {
    const random = new Random(11);
    let held = 0;
    const scenes = 200;
    for (let k = 0; k < scenes; k++) {
      const noisy: Station['knowns'][number] = {
        ...speed,
        magnitude: { value: Math.hypot(10, 0.8) + 0.3 * random.normal(), sigma: 0.3 },
      };
      const { solution } = answerStation(carDocument({ knowns: [noisy] }), 's1', survey(random));
      const { omega: found, sigma: u } = solution?.branches[0].bodies['car'] ?? {
        omega: NaN,
        sigma: { omega: NaN },
      };
      const { low, high } = coverageInterval(found ?? NaN, u.omega ?? NaN);
      if (low <= omega && omega <= high) held++;
    }
    expect(held / scenes).toBeGreaterThanOrEqual(0.895);
    expect(held / scenes).toBeLessThanOrEqual(0.995);
  }, 240_000);
});

describe('what a station lacks', () => {
  const marks = survey(new Random(4));

  it('is said with its field, at the pose', () => {
    const one = carDocument({
      marks: assignments({ position: true, direction: false }).slice(0, 1),
    });
    expect(answerStation(one, 's1', marks)).toMatchObject({
      pose: null,
      failure: { stage: 'pose', code: 'not-enough-marks', field: 'bodies.car' },
    });
    const none = carDocument({ marks: [] });
    expect(answerStation(none, 's1', marks).failure).toMatchObject({ code: 'empty' });
  });

  it('is said at the motion, the poses being kept', () => {
    const loose = marks.map((mark) => ({ ...mark, trace: null, order: null }));
    const { pose, failure } = answerStation(carDocument(), 's1', loose);
    expect(pose).not.toBeNull();
    expect(failure).toMatchObject({
      stage: 'motion',
      code: 'not-enough-marks',
      field: `station.marks.${uuid(4)}.direction`,
    });
  });

  it('leaves out a known of a body without a pose, and says so', () => {
    const known: Station['knowns'][number] = {
      quantity: 'angular-velocity',
      id: 'w',
      body: 'trailer',
      value: { value: 1, sigma: 0 },
      basis: '',
    };
    const { warnings, failure } = answerStation(
      carDocument({ knowns: [speed, known] }),
      's1',
      marks,
    );
    expect(failure).toBeNull();
    expect(warnings.join()).toContain('"w" is left out');
  });

  it('is an error when the station or a mark does not exist', () => {
    expect(() => answerStation(carDocument(), 's9', marks)).toThrow(
      expect.objectContaining({ code: 'unknown-reference', field: 'stations' }),
    );
    expect(() => answerStation(carDocument(), 's1', [])).toThrow(
      expect.objectContaining({ code: 'unknown-reference', field: `station.marks.${uuid(4)}` }),
    );
  });
});
