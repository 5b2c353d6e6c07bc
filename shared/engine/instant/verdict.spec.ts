import { describe, expect, it } from '@jest/globals';
import type { Joint, Known, MotionBody, MotionProblem } from '../documents/motion-problem';
import { type EngineError } from '../errors';
import { solveInstant } from './index';

const problemOf = (bodies: MotionBody[], joints: Joint[], knowns: Known[]): MotionProblem => ({
  format: 'centrode.motion-problem/1',
  bodies,
  joints,
  knowns,
});

const at = (body: string, point: string) => ({ body, point });

const car = (points: MotionBody['points'] = {}): MotionBody => ({
  id: 'car',
  pose: { x: 0, y: 0, heading: 0 },
  points: { G: [0, 0], F: [1.4, 0], L: [0, 0.8], ...points },
});

const trailer = (heading = 0.2): MotionBody => ({
  id: 'trailer',
  pose: { x: 0, y: 0, heading },
  points: { K: [0, 0], axle: [-8, 0] },
});

const kingpin: Known = {
  id: 'k',
  quantity: 'velocity',
  at: at('trailer', 'K'),
  components: [7, 2],
};

const wheels: Joint = { id: 'wheels', kind: 'wheel', a: at('trailer', 'axle') };

describe('a verdict', () => {
  it('of too few knowns says what may still move, what is fixed, and what would settle it', () => {
    const solution = solveInstant(problemOf([trailer()], [], [kingpin]));
    expect(solution.status).toBe('under-determined');
    expect(solution.free).toEqual([
      {
        motion: 'the trailer may turn about K',
        level: 'velocity',
        bodies: { trailer: [0, 0, 1] },
      },
    ]);
    expect(solution.helps).toContain('velocity direction at trailer.axle');
    expect(solution.helps).toContain('angular velocity of trailer');
    const [branch] = solution.branches;
    expect(branch.bodies['trailer']).toMatchObject({ omega: null, pole: null, alpha: null });
    expect(branch.points['trailer.K'].velocity).toEqual([7, 2]);
    expect(branch.points['trailer.axle'].velocity).toBeNull();
  });

  it.each([0, 1, 2])('takes each suggestion at its word: suggestion %d settles the motion', (k) => {
    const problem = problemOf([trailer()], [], [kingpin]);
    const suggestion = solveInstant(problem).suggestions[k];
    const further: Known =
      'body' in suggestion
        ? { id: 'more', quantity: 'angular-velocity', body: suggestion.body, value: 0.3 }
        : {
            id: 'more',
            quantity: 'velocity',
            at: suggestion.at,
            ...(suggestion.part === 'direction' && { direction: 0.1, line: true }),
            ...(suggestion.part === 'magnitude' && { magnitude: 9 }),
            ...(suggestion.part === 'components' && { components: [7.4, 0] }),
          };
    const settled = solveInstant({ ...problem, knowns: [kingpin, further] });
    expect(settled.free.filter((f) => f.level === 'velocity')).toEqual([]);
  });

  it('of bodies that hang together tells how they move together', () => {
    const tractor: MotionBody = {
      id: 'tractor',
      pose: { x: 0, y: 0, heading: 0.2 },
      points: { K: [0, 0], rear: [-0.6, 0] },
    };
    const pin: Joint = { id: 'p', kind: 'pin', a: at('tractor', 'K'), b: at('trailer', 'K') };
    const rear: Joint = { id: 'rear', kind: 'wheel', a: at('tractor', 'rear') };
    const solution = solveInstant(problemOf([tractor, trailer()], [pin, rear, wheels], []));
    expect(solution.status).toBe('under-determined');
    expect(solution.free).toHaveLength(2);
    expect(solution.free.map((f) => f.motion).join('; ')).toMatch(/direction 11\.5° or back/);
  });

  it('that the velocities are fixed but not the accelerations says so', () => {
    const solution = solveInstant(problemOf([trailer()], [wheels], [kingpin]));
    expect(solution.status).toBe('determined');
    expect(solution.levels.acceleration?.status).toBe('under-determined');
    expect(solution.branches[0].bodies['trailer'].alpha).toBeNull();
    expect(solution.free.length).toBeGreaterThan(0);
    for (const { motion, level } of solution.free) {
      expect(level).toBe('acceleration');
      expect(motion).toMatch(/^accelerations only: /);
    }
  });

  it('of contradicting exact knowns names the fewest that clash', () => {
    const knowns: Known[] = [
      kingpin,
      { id: 'w', quantity: 'angular-velocity', body: 'trailer', value: 1 },
      { id: 'other', quantity: 'velocity', at: at('trailer', 'K'), components: [7, 2.5] },
    ];
    const solution = solveInstant(problemOf([trailer()], [wheels], knowns));
    expect(solution).toMatchObject({ status: 'contradictory', branches: [], condition: null });
    // Kingpin and wheels fix ω, which the third contradicts; but two velocities of K alone do.
    expect(solution.clash).toEqual(['k', 'other']);
  });

  it('of a joint that contradicts the knowns names the joint', () => {
    const pin: Joint = { id: 'hinge', kind: 'pin', a: at('trailer', 'K'), ground: true };
    const solution = solveInstant(problemOf([trailer()], [pin, wheels], [kingpin]));
    expect(solution.clash).toEqual(['hinge', 'k']);
  });

  it('of repeated exact equations that agree is determined', () => {
    const twice: Known = { ...kingpin, id: 'again' };
    const solution = solveInstant(problemOf([trailer()], [wheels], [kingpin, twice]));
    expect(solution).toMatchObject({ status: 'determined', redundancy: 0, clash: [] });
  });

  it('of many knowns names the suspect, and leaves the others alone', () => {
    const omega = -0.7;
    const corners: Record<string, [number, number]> = {
      LF: [1.3, 0.7],
      RF: [1.3, -0.7],
      LR: [-1.3, 0.7],
      RR: [-1.3, -0.7],
    };
    const wrong = 0.8;
    const knowns = Object.entries(corners).map(([id, [x, y]]): Known => ({
      id,
      quantity: 'velocity',
      at: at('car', id),
      components: [8 - omega * y + (id === 'LR' ? wrong : 0), 1 + omega * x],
      sigma: 0.1,
    }));
    const solution = solveInstant(problemOf([car(corners)], [], knowns));
    expect(solution).toMatchObject({ status: 'over-determined', redundancy: 5 });
    expect(solution.suspects).toEqual(['LR']);
    expect(solution.pValue).toBeLessThan(1e-4);
    // A component's share of redundancy, and w = ε √r / σ for a lone error ε (Baarda 1968).
    const residual = solution.residuals.find((r) => r.known === 'LR' && r.part === 'x');
    expect(residual?.residual).toBeCloseTo(wrong * (residual?.redundancy ?? NaN), 10);
    expect(residual?.normalised).toBeCloseTo(
      (wrong / 0.1) * Math.sqrt(residual?.redundancy ?? NaN),
      9,
    );
    const total = solution.residuals.reduce((sum, r) => sum + r.redundancy, 0);
    expect(total).toBeCloseTo(5, 9);
  });
});

describe('branches', () => {
  it('of two magnitudes on two bodies are all found, and each satisfies every known', () => {
    const bodies: MotionBody[] = [
      { id: 'a', pose: { x: 0, y: 0, heading: 0 }, points: { O: [0, 0], P: [1, 0] } },
      { id: 'b', pose: { x: 1, y: 0, heading: 0.9 }, points: { P: [0, 0], Q: [1.2, 0] } },
    ];
    const joints: Joint[] = [{ id: 'p', kind: 'pin', a: at('a', 'P'), b: at('b', 'P') }];
    const knowns: Known[] = [
      { id: 'o', quantity: 'velocity', at: at('a', 'O'), components: [1, 0.5] },
      { id: 'm', quantity: 'velocity', at: at('a', 'P'), magnitude: 2 },
      { id: 'n', quantity: 'velocity', at: at('b', 'Q'), magnitude: 2.5 },
    ];
    const solution = solveInstant(problemOf(bodies, joints, knowns));
    expect(solution.branches).toHaveLength(4);
    for (const { points } of solution.branches) {
      expect(points['a.P'].speed).toBeCloseTo(2, 10);
      expect(points['b.Q'].speed).toBeCloseTo(2.5, 10);
    }
    expect(solution.warnings.join(' ')).toMatch(/4 motions agree/);
  });

  it('of magnitudes that depend on each other are all found', () => {
    // One body, its velocity at no point known: three speeds, two of them decide v and ω in part.
    const points: MotionBody['points'] = { A: [0, 0], B: [2, 0.3], C: [0.4, 1.7] };
    const body: MotionBody = { id: 'car', pose: { x: 0, y: 0, heading: 0 }, points };
    const [vx, vy, omega] = [5, 1, 0.8];
    const knowns = Object.entries(points).map(([id, p]): Known => {
      const [x, y] = Array.isArray(p) ? p : p.at;
      const magnitude = Math.hypot(vx - omega * y, vy + omega * x);
      return { id, quantity: 'velocity', at: at('car', id), magnitude };
    });
    const solution = solveInstant(problemOf([body], [], knowns));
    // A motion and its reverse have the same speeds.
    expect(solution.branches.length % 2).toBe(0);
    const found = solution.branches.map((b) => b.bodies['car']);
    const has = (sign: number): boolean =>
      found.some(
        (b) =>
          Math.abs((b.omega ?? NaN) - sign * omega) < 1e-8 &&
          Math.abs((b.velocity?.[0] ?? NaN) - sign * vx) < 1e-8,
      );
    expect([has(1), has(-1)]).toEqual([true, true]);
    for (const branch of solution.branches)
      knowns.forEach((k) => {
        if (k.quantity !== 'velocity') return;
        expect(branch.points[`car.${k.id}`].speed).toBeCloseTo(k.magnitude ?? NaN, 9);
      });
  });

  it('of a speed along a line of unknown sense are two', () => {
    const knowns: Known[] = [
      {
        id: 'g',
        quantity: 'velocity',
        at: at('car', 'G'),
        magnitude: 3,
        direction: 0.4,
        line: true,
      },
      { id: 'w', quantity: 'angular-velocity', body: 'car', value: 0.5 },
    ];
    const { branches } = solveInstant(problemOf([car()], [], knowns));
    const speeds = branches.map((b) => b.points['car.G'].velocity?.[0]).sort();
    expect(speeds).toHaveLength(2);
    expect(speeds[0]).toBeCloseTo(-3 * Math.cos(0.4), 12);
    expect(speeds[1]).toBeCloseTo(3 * Math.cos(0.4), 12);
  });

  it('with an uncertain speed carry its uncertainty', () => {
    const knowns: Known[] = [
      { id: 'g', quantity: 'velocity', at: at('car', 'G'), components: [4, -1] },
      { id: 'f', quantity: 'velocity', at: at('car', 'L'), magnitude: 5, sigma: 0.1 },
    ];
    const { branches } = solveInstant(problemOf([car()], [], knowns));
    expect(branches).toHaveLength(2);
    for (const b of branches) {
      expect(b.points['car.L'].speed).toBeCloseTo(5, 10);
      expect(b.points['car.L'].sigma.speed).toBeCloseTo(0.1, 10);
    }
  });
});

describe('what an instant needs', () => {
  const faults: [string, MotionProblem, Partial<EngineError>][] = [
    ['bodies', problemOf([], [], []), { code: 'empty', field: 'bodies' }],
    [
      'finite numbers',
      problemOf([{ ...car(), pose: { x: NaN, y: 0, heading: 0 } }], [], []),
      { code: 'not-finite', field: 'bodies.car.pose.x' },
    ],
    [
      'numbers of a possible size',
      problemOf([car()], [], [{ id: 'w', quantity: 'angular-velocity', body: 'car', value: 1e13 }]),
      { code: 'scale', field: 'knowns.w.value' },
    ],
    [
      'distinct ids',
      problemOf([car(), car()], [], []),
      { code: 'duplicate-id', field: 'bodies.car' },
    ],
    [
      'points that exist',
      problemOf([trailer()], [{ ...wheels, a: at('trailer', 'nose') }], []),
      { code: 'unknown-reference', field: 'joints.wheels.a.point' },
    ],
    [
      'bodies that exist',
      problemOf([car()], [], [{ id: 'w', quantity: 'angular-velocity', body: 'van', value: 1 }]),
      { code: 'unknown-reference', field: 'knowns.w.body' },
    ],
    [
      'links with a length',
      problemOf(
        [car(), { ...trailer(), pose: { x: 1.4, y: 0, heading: 0 } }],
        [{ id: 'l', kind: 'link', a: at('car', 'F'), b: at('trailer', 'K') }],
        [],
      ),
      { code: 'zero-length', field: 'joints.l' },
    ],
    [
      'guides with a radius',
      problemOf(
        [car()],
        [{ id: 'g', kind: 'guide', a: at('car', 'G'), direction: 0, radius: 0 }],
        [],
      ),
      { code: 'zero-length', field: 'joints.g.radius' },
    ],
    [
      'poses at which joints close',
      problemOf(
        [car(), { ...trailer(), pose: { x: 1.412, y: 0, heading: 0 } }],
        [{ id: 'hitch', kind: 'pin', a: at('car', 'F'), b: at('trailer', 'K') }],
        [],
      ),
      {
        code: 'joint-does-not-close',
        field: 'joints.hitch',
        message: 'The joint hitch does not close: its parts are 12.0 mm apart.',
      },
    ],
    [
      'uncertainties that are not negative',
      problemOf(
        [car()],
        [],
        [{ id: 'w', quantity: 'angular-velocity', body: 'car', value: 1, sigma: -1 }],
      ),
      { code: 'not-positive', field: 'knowns.w.sigma' },
    ],
    [
      'knowns that say something',
      problemOf([car()], [], [{ id: 'v', quantity: 'velocity', at: at('car', 'G') }]),
      { code: 'empty', field: 'knowns.v' },
    ],
    [
      'rolling that says on what',
      problemOf([car()], [{ id: 'r', kind: 'roll', a: at('car', 'G'), radius: 0.3 }], []),
      { code: 'unknown-reference', field: 'joints.r.surface' },
    ],
  ];

  it.each(faults)('are %s', (_, problem, fault) => {
    expect(() => solveInstant(problem)).toThrow(expect.objectContaining(fault));
  });

  it('is not a common scale: a body of 1 mm beside one of 1 km', () => {
    const bodies: MotionBody[] = [
      { id: 'arm', pose: { x: 0, y: 0, heading: 0.3 }, points: { O: [0, 0], A: [1000, 0] } },
      {
        id: 'pin',
        pose: { x: 1000 * Math.cos(0.3), y: 1000 * Math.sin(0.3), heading: 1 },
        points: { A: [0, 0], B: [0.001, 0] },
      },
    ];
    const joints: Joint[] = [
      { id: 'o', kind: 'pin', a: at('arm', 'O'), ground: true },
      { id: 'a', kind: 'pin', a: at('arm', 'A'), b: at('pin', 'A') },
    ];
    const knowns: Known[] = [
      { id: 'w', quantity: 'angular-velocity', body: 'arm', value: 0.01 },
      { id: 'v', quantity: 'angular-velocity', body: 'pin', value: 500 },
    ];
    const solution = solveInstant(problemOf(bodies, joints, knowns));
    expect(solution.status).toBe('determined');
    const { points } = solution.branches[0];
    const [a, b] = [points['pin.A'].velocity ?? [], points['pin.B'].velocity ?? []];
    expect(b[0] - a[0]).toBeCloseTo(-0.5 * Math.sin(1), 9);
    expect(b[1] - a[1]).toBeCloseTo(0.5 * Math.cos(1), 9);
  });

  it('is no particular size: a thousand pinned bodies are solved when they are just determined', () => {
    const count = 1000;
    const place = (k: number) => ({ x: k * Math.cos(0.2), y: k * Math.sin(0.2), heading: 0.2 });
    const bodies = Array.from({ length: count }, (_, k): MotionBody => ({
      id: `b${k}`,
      pose: place(k),
      points: { A: [0, 0], B: [1, 0] },
    }));
    const joints = bodies.map(({ id }, k): Joint =>
      k === 0
        ? { id: `j${k}`, kind: 'pin', a: at(id, 'A'), ground: true }
        : { id: `j${k}`, kind: 'pin', a: at(`b${k - 1}`, 'B'), b: at(id, 'A') },
    );
    const knowns = bodies.map(({ id }): Known => ({
      id,
      quantity: 'angular-velocity',
      body: id,
      value: 0.01,
    }));
    const solution = solveInstant(problemOf(bodies, joints, knowns));
    // All turn alike, so the chain is one rigid body about its first pin.
    const [x, y] = solution.branches[0].points['b999.B'].velocity ?? [NaN, NaN];
    expect(x).toBeCloseTo(-0.01 * count * Math.sin(0.2), 9);
    expect(y).toBeCloseTo(0.01 * count * Math.cos(0.2), 9);
    expect(solution.levels.acceleration).toBeNull();
    expect(solution.warnings).toContain(
      'Accelerations: With so many bodies they are sought only where the knowns just fix them.',
    );
    const lacking = problemOf(bodies, joints, knowns.slice(1));
    expect(() => solveInstant(lacking)).toThrow(
      expect.objectContaining({ code: 'unsupported', field: 'bodies' }),
    );
  });
});
