import { describe, expect, it } from '@jest/globals';
import fc from 'fast-check';
import type { PoseProblem } from '../documents/pose-problem';
import { add, norm, rotate, subtract, toScene, wrap, type Pose } from '../geometry/vector';
import { fitPoses, pointEllipse, rankAssignments } from './index';

type Pair = [number, number];
type Covariance = PoseProblem['marks'][number]['covariance'];

const round = (sigma: number): Covariance => [
  [sigma * sigma, 0],
  [0, sigma * sigma],
];
const slanted: Covariance = [
  [4e-4, 1e-4],
  [1e-4, 9e-4],
];
const car: Record<string, Pair> = {
  LF: [1.3, 0.75],
  RF: [1.3, -0.75],
  LR: [-1.4, 0.75],
  RR: [-1.4, -0.75],
};
const offsets: Pair[] = [
  [0.011, -0.02],
  [-0.03, 0.012],
  [0.004, 0.018],
  [0.021, 0.009],
];

const pair = ([x, y]: readonly [number, number]): Pair => [x, y];

const carProblem = (pose: Pose, noise: readonly Pair[], covariance: Covariance): PoseProblem => ({
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
const lorry = (play?: number): PoseProblem => ({
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

describe('blunders', () => {
  const pose = { x: 2, y: 1, heading: 0.5 };
  const blunder: Pair[] = offsets.map(([x, y], i) => (i === 2 ? [x + 0.5, y] : [x, y]));

  it('are found by the w-test', () => {
    const { suspects, pValue, residuals, warnings } = fitPoses(
      carProblem(pose, blunder, round(0.02)),
    );
    expect(suspects[0]).toBe('LR');
    expect(pValue).toBeLessThan(1e-6);
    const worst = residuals.reduce((a, b) => ((a.w ?? 0) > (b.w ?? 0) ? a : b));
    expect(worst.mark).toBe('LR');
    expect(warnings.join()).toContain('disagree');
  });

  it('pull a Huber fit less than one of squares', () => {
    const truth = fitPoses(carProblem(pose, offsets, round(0.02))).bodies['car'].pose;
    const squares = fitPoses(carProblem(pose, blunder, round(0.02)));
    const robust = fitPoses({ ...carProblem(pose, blunder, round(0.02)), loss: 'huber' });
    const off = ({ bodies }: typeof robust) =>
      Math.hypot(bodies['car'].pose.x - truth.x, bodies['car'].pose.y - truth.y);
    expect(off(robust)).toBeLessThan(0.5 * off(squares));
    expect(robust.method).toBe('Huber');
    expect(robust.pValue).toBeNull();
    expect(robust.residuals.find(({ mark }) => mark === 'LR')?.weight).toBeLessThan(0.3);
  });

  it('leave a Huber fit of clean marks as it is', () => {
    const small = offsets.map(([x, y]): Pair => [x / 4, y / 4]);
    const squares = fitPoses(carProblem(pose, small, slanted));
    const robust = fitPoses({ ...carProblem(pose, small, slanted), loss: 'huber' });
    expect(robust.bodies['car'].pose).toEqual(squares.bodies['car'].pose);
  });
});

describe('assignments of marks to points', () => {
  it('are ranked with the right one first', () => {
    const given = carProblem({ x: 2, y: 1, heading: 0.5 }, offsets, slanted);
    // not the fourth: a rectangle turned by half a turn is itself
    const names = ['LF', 'RF', 'LR'];
    const ranked = rankAssignments(
      { ...given, marks: given.marks.slice(0, 3) },
      { LF: names, RF: names, LR: names },
    );
    expect(ranked[0].points).toEqual({ LF: 'LF', RF: 'RF', LR: 'LR' });
    expect(ranked).toHaveLength(6);
    expect(ranked[1].chiSquared).toBeGreaterThan(ranked[0].chiSquared);
  });
});

describe('error ellipse of a body point', () => {
  it('is the same by name and by place, and grows away from the marks', () => {
    const solution = fitPoses(carProblem({ x: 2, y: 1, heading: 0.5 }, offsets, slanted));
    const [named, placed] = [
      pointEllipse(solution, 'car', 'LF'),
      pointEllipse(solution, 'car', car['LF']),
    ];
    named.semiAxes.forEach((axis, i) => expect(axis).toBeCloseTo(placed.semiAxes[i], 12));
    const far = pointEllipse(solution, 'car', [30, 0]);
    expect(far.semiAxes[0]).toBeGreaterThan(3 * named.semiAxes[0]);
    expect(() => pointEllipse(solution, 'car', 'XX')).toThrow(
      expect.objectContaining({ code: 'unknown-reference' }),
    );
  });
});

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
