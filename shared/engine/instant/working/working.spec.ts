import { describe, expect, it } from '@jest/globals';
import * as fc from 'fast-check';
import katex from 'katex';
import type { MotionProblem } from '../../documents/motion-problem';
import type { MotionSolution } from '../../documents/motion-solution';
import { solveInstant, workInstant } from '../index';
import { drawFrom, randomLinkage } from '../testing/random-linkage';
import type { Term, Working, WorkingStep } from './working';

/** Every equation of the sheet holds for the values that the sheet itself states. */
const expectConsistent = (working: Working, solution: MotionSolution): void => {
  for (const level of ['velocity', 'acceleration'] as const) {
    const steps = working.steps.filter((s) => s.level === level);
    const values = new Map<string, number>();
    for (const step of steps)
      for (const r of step.results) if (step.kind !== 'known') values.set(r.symbol.tex, r.value);
    for (const step of steps) {
      if (step.kind === 'known' || step.kind === 'adjusted') continue;
      for (const e of step.equations) {
        if (e.role === 'vector') continue;
        const value = (t: Term): number =>
          t.factors.reduce<number>((product, f) => {
            if ('number' in f) return product * f.number;
            const angle = /^\\(cos|sin)/.exec(f.symbol.tex);
            const found =
              angle === null
                ? values.get(f.symbol.tex)
                : directionCosine(solution, working.branch, level, f.symbol.of.id, angle[1]);
            return product * (found ?? NaN);
          }, t.sign);
        const terms = [...e.left.map(value), ...e.right.map((t) => -value(t))];
        const gap = Math.abs(terms.reduce((sum, v) => sum + v, 0));
        const size = terms.reduce((sum, v) => sum + Math.abs(v), 0);
        expect(gap).toBeLessThanOrEqual(1e-8 * Math.max(1, size));
      }
    }
  }
};

const directionCosine = (
  solution: MotionSolution,
  branch: number,
  level: 'velocity' | 'acceleration',
  point: string,
  f: string,
): number => {
  const v = solution.branches[branch].points[point][level] ?? [NaN, NaN];
  return v[f === 'cos' ? 0 : 1] / Math.hypot(...v);
};

/** The sheet's own arithmetic ends at the solver's numbers. */
const expectSolvers = (
  working: Working,
  solution: MotionSolution,
  level: 'velocity' | 'acceleration',
  tolerance = 1e-8,
): void => {
  const { body, point } = working.asked;
  const want = solution.branches[working.branch].points[`${body}.${point}`][level];
  const last = working.steps.filter((s) => s.level === level && s.kind === 'result').at(-1);
  expect(last).toBeDefined();
  if (want === null || last === undefined) throw new Error('nothing to compare');
  const size = Math.max(1, Math.hypot(...want));
  want.forEach((v, i) =>
    expect(Math.abs(last.results[i].value - v)).toBeLessThan(tolerance * size),
  );
};

const expectReadable = (steps: readonly WorkingStep[]): void => {
  for (const step of steps) {
    expect(step.text).toMatch(/[.:]$/);
    expect(step.text).not.toContain('undefined');
    for (const { tex } of [...step.equations, ...step.results, ...step.unknowns]) {
      expect(tex).not.toContain('NaN');
      katex.renderToString(tex, { throwOnError: true, strict: 'error' });
    }
  }
};

const at = (body: string, point: string) => ({ body, point });

/** Crank 0.15 m at 40°, rod 0.5 m, slider along x. */
const sliderCrank = (): MotionProblem => {
  const theta = (40 * Math.PI) / 180;
  const [x, y] = [0.15 * Math.cos(theta), 0.15 * Math.sin(theta)];
  return {
    format: 'centrode.motion-problem/1',
    bodies: [
      { id: 'crank', pose: { x: 0, y: 0, heading: theta }, points: { O: [0, 0], A: [0.15, 0] } },
      {
        id: 'rod',
        pose: { x, y, heading: -Math.asin(y / 0.5) },
        points: { A: [0, 0], B: [0.5, 0], G: [0.2, 0] },
      },
    ],
    joints: [
      { id: 'j1', kind: 'pin', a: at('crank', 'O'), ground: true },
      { id: 'j2', kind: 'pin', a: at('crank', 'A'), b: at('rod', 'A') },
      { id: 'j3', kind: 'guide', a: at('rod', 'B'), direction: 0 },
    ],
    knowns: [
      { id: 'k1', quantity: 'angular-velocity', body: 'crank', value: 30, sigma: 0.3 },
      { id: 'k2', quantity: 'angular-acceleration', body: 'crank', value: 0 },
    ],
  };
};

describe('the working of an instant', () => {
  it('goes from the ground along the shortest chain to the asked point', () => {
    const problem = sliderCrank();
    const solution = solveInstant(problem);
    const working = workInstant(problem, solution, at('rod', 'G'));
    expect(working.chain).toEqual(['crank', 'rod']);
    const kinds = working.steps.filter((s) => s.level === 'velocity').map((s) => s.kind);
    expect(kinds).toEqual(['known', 'held', 'step', 'held', 'step', 'solve', 'step', 'result']);
    const [, , toA, , toB, solve] = working.steps;
    expect(toA.equations[0].tex).toBe(
      String.raw`\mathbf v_{A} = \mathbf v_{O} + \omega_{\text{crank}}\,\mathbf k\times\mathbf r_{A/O}`,
    );
    expect(toB.scalarEquations).toBe(2);
    expect(toB.unknowns.map((u) => u.text)).toEqual([
      'speed along j3',
      'angular velocity of the rod',
    ]);
    expect(solve.uses).toEqual([{ kind: 'body', id: 'rod' }]);
    expect(working.steps[0].uses).toEqual([{ kind: 'known', id: 'k1' }]);
    expectConsistent(working, solution);
    expectReadable(working.steps);
    expectSolvers(working, solution, 'velocity', 1e-12);
    expectSolvers(working, solution, 'acceleration', 1e-12);
  });

  it('leaves out bodies on which the asked one does not depend', () => {
    const problem = sliderCrank();
    const solution = solveInstant(problem);
    expect(workInstant(problem, solution, at('crank', 'A')).chain).toEqual(['crank']);
  });

  it('writes the loop of a four-bar linkage as one vector equation with two unknowns', () => {
    const bar = (
      id: string,
      a: [number, number],
      b: [number, number],
      names: [string, string],
    ) => ({
      id,
      pose: { x: a[0], y: a[1], heading: Math.atan2(b[1] - a[1], b[0] - a[0]) },
      points: {
        [names[0]]: [0, 0] as [number, number],
        [names[1]]: [Math.hypot(b[0] - a[0], b[1] - a[1]), 0] as [number, number],
      },
    });
    const problem: MotionProblem = {
      ...sliderCrank(),
      bodies: [
        bar('crank', [0, 0], [0.1, 0.3], ['O', 'A']),
        bar('coupler', [0.1, 0.3], [0.8, 0.5], ['A', 'B']),
        bar('rocker', [0.8, 0.5], [0.9, 0], ['B', 'C']),
      ],
      joints: [
        { id: 'o', kind: 'pin', a: at('crank', 'O'), ground: true },
        { id: 'a', kind: 'pin', a: at('crank', 'A'), b: at('coupler', 'A') },
        { id: 'b', kind: 'pin', a: at('coupler', 'B'), b: at('rocker', 'B') },
        { id: 'c', kind: 'pin', a: at('rocker', 'C'), ground: true },
      ],
    };
    const solution = solveInstant(problem);
    const working = workInstant(problem, solution, at('rocker', 'B'));
    const loop = working.steps.find((s) => s.uses.some((u) => u.id === 'b'));
    expect(loop?.unknowns.map((u) => u.text).sort()).toEqual([
      'angular velocity of the coupler',
      'angular velocity of the rocker',
    ]);
    expectConsistent(working, solution);
    expectSolvers(working, solution, 'velocity', 1e-11);
    expectSolvers(working, solution, 'acceleration', 1e-11);
  });

  it('takes each root of a known magnitude in its own branch', () => {
    const problem: MotionProblem = {
      ...sliderCrank(),
      bodies: [
        { id: 'rod', pose: { x: 0, y: 0, heading: 0 }, points: { A: [0, 0], B: [1.6, 0.7] } },
      ],
      joints: [],
      knowns: [
        { id: 'a', quantity: 'velocity', at: at('rod', 'A'), components: [4, -1] },
        { id: 'b', quantity: 'velocity', at: at('rod', 'B'), magnitude: 6 },
      ],
    };
    const solution = solveInstant(problem);
    for (const branch of [0, 1]) {
      const working = workInstant(problem, solution, at('rod', 'B'), branch);
      expectConsistent(working, solution);
      expectReadable(working.steps);
      expectSolvers(working, solution, 'velocity', 1e-12);
    }
  });

  it('states given and adjusted values where there are more knowns than needed', () => {
    const problem = sliderCrank();
    problem.knowns.push({
      id: 'k3',
      quantity: 'velocity',
      at: at('rod', 'B'),
      magnitude: 3.7,
      direction: Math.PI,
      sigma: { magnitude: 0.1 },
    });
    const solution = solveInstant(problem);
    const working = workInstant(problem, solution, at('rod', 'G'));
    const adjusted = working.steps.find((s) => s.kind === 'adjusted');
    const given = working.steps[working.steps.indexOf(adjusted ?? working.steps[0]) - 1];
    expect(given).toMatchObject({ kind: 'known', uses: [{ kind: 'known', id: 'k1' }] });
    expect(given.results[0].value).toBe(30);
    expect(adjusted?.results[0].value).toBeCloseTo(
      solution.branches[0].bodies['crank'].omega ?? NaN,
      9,
    );
    expectConsistent(working, solution);
    expectSolvers(working, solution, 'velocity');
  });

  it('says what is still free where the problem does not fix the asked point', () => {
    const problem = { ...sliderCrank(), knowns: [] };
    const solution = solveInstant(problem);
    const working = workInstant(problem, solution, at('rod', 'G'));
    expect(working.steps.map((s) => s.kind)).toEqual(['open']);
    expect(working.steps[0].text).toContain('may turn about O');
  });

  it('names the point that is not there', () => {
    const problem = sliderCrank();
    const solution = solveInstant(problem);
    expect(() => workInstant(problem, solution, at('rod', 'X'))).toThrow(
      expect.objectContaining({ code: 'unknown-reference', field: 'asked.point' }),
    );
  });

  it('is consistent and ends at the solver’s numbers for random linkages with all joints', () => {
    let compared = 0;
    const drawn = fc.record({ seed: fc.integer(), count: fc.integer({ min: 1, max: 5 }) });
    fc.assert(
      fc.property(drawn, ({ seed, count }) => {
        const { problem } = randomLinkage(drawFrom(seed), count);
        const solution = solveInstant(problem);
        if (solution.status !== 'determined' || (solution.condition ?? Infinity) > 100) return;
        for (const { id, points } of problem.bodies) {
          const point = Object.keys(points).at(-1);
          if (point === undefined) continue;
          const working = workInstant(problem, solution, at(id, point));
          expectConsistent(working, solution);
          expectSolvers(working, solution, 'velocity');
          expectSolvers(working, solution, 'acceleration');
          if (id === 'b0') expectReadable(working.steps);
          // No value was taken over from the solver.
          expect(working.steps.filter((s) => s.text.includes('solved together'))).toEqual([]);
          compared++;
        }
      }),
      { seed: 7, numRuns: 50 },
    );
    expect(compared).toBeGreaterThan(50);
  });
});
