import { describe, expect, it } from '@jest/globals';
import { compute, recompute } from '../computation/index';
import type { Station } from '../documents/reconstruction';
import { stationAnswer, stationProblem } from '../documents/station';
import { wrap } from '../geometry/vector';
import { coverageInterval } from '../uncertainty/interval';
import { Random } from '../uncertainty/random';
import { answerStation, stationProblemOf } from './index';
import {
  assignments,
  carDocument,
  omega,
  points,
  speed,
  survey,
  uuid,
  velocityOf,
  wheels,
} from './testing';

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
