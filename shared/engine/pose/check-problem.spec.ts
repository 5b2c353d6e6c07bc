import { describe, expect, it } from '@jest/globals';
import type { PoseProblem } from '../documents/pose-problem';
import { fitPoses } from './index';
import { carProblem, offsets, round, slanted, type Pair } from './testing';

describe('bad input', () => {
  const good = carProblem({ x: 2, y: 1, heading: 0.5 }, offsets, slanted);
  const withMark = (change: object): PoseProblem => ({
    ...good,
    marks: good.marks.map((mark, i) => (i === 1 ? { ...mark, ...change } : mark)),
  });
  const cases: readonly (readonly [string, PoseProblem, string, string])[] = [
    ['no body', { ...good, bodies: [] }, 'empty', 'bodies'],
    ['NaN', withMark({ at: [NaN, 0] }), 'not-finite', 'marks.RF.at.x'],
    ['an infinity', withMark({ at: [0, Infinity] }), 'not-finite', 'marks.RF.at.y'],
    ['a place outside any scene', withMark({ at: [1e9, 0] }), 'scale', 'marks.RF.at.x'],
    [
      'no uncertainty',
      withMark({ covariance: undefined }),
      'no-uncertainty',
      'marks.RF.covariance',
    ],
    [
      'zero uncertainty',
      withMark({ covariance: round(0) }),
      'no-uncertainty',
      'marks.RF.covariance',
    ],
    [
      'a covariance that is none',
      withMark({
        covariance: [
          [1, 2],
          [2, 1],
        ],
      }),
      'not-a-covariance',
      'marks.RF.covariance',
    ],
    [
      'uncertainties too far apart',
      withMark({ covariance: round(1e6) }),
      'scale',
      'marks.RF.covariance',
    ],
    ['an unknown point', withMark({ point: 'XX' }), 'unknown-reference', 'marks.RF'],
    ['an unknown body', withMark({ body: 'van' }), 'unknown-reference', 'marks.RF'],
    ['an id twice', withMark({ id: 'LF' }), 'duplicate-id', 'marks.LF'],
    ['one mark', { ...good, marks: good.marks.slice(0, 1) }, 'not-enough-marks', 'bodies.car'],
    ['no marks', { ...good, marks: [] }, 'not-enough-marks', 'bodies.car'],
    [
      'coincident points',
      {
        ...good,
        bodies: [{ id: 'car', points: { LF: [1, 0], RF: [1, 0], LR: [1, 0], RR: [1, 0] } }],
      },
      'coincident-points',
      'bodies.car.points.RF',
    ],
    [
      'marks too close together for their uncertainty',
      {
        ...good,
        bodies: [{ id: 'car', points: { LF: [0, 0], RF: [0.001, 0] } }],
        marks: good.marks.slice(0, 2).map((mark) => ({ ...mark, at: [0, 0] as Pair })),
      },
      'not-enough-marks',
      'bodies.car',
    ],
    [
      'a joint of a body with itself',
      {
        ...good,
        joints: [
          {
            id: 'j',
            kind: 'pin',
            a: { body: 'car', point: 'LF' },
            b: { body: 'car', point: 'RF' },
          },
        ],
      },
      'unsupported',
      'joints.j.b',
    ],
    [
      'a pin to nowhere',
      { ...good, joints: [{ id: 'j', kind: 'pin', a: { body: 'car', point: 'LF' } }] },
      'unknown-reference',
      'joints.j',
    ],
  ];
  for (const [name, problem, code, field] of cases)
    it(`${name}: ${code} at ${field}`, () => {
      expect(() => fitPoses(problem)).toThrow(expect.objectContaining({ code, field }));
    });
});
