import { describe, expect, it } from '@jest/globals';
import type { Working, WorkingStep, WorkingSymbol } from '#shared/engine/instant/working/working';
import { labelOf } from './polygons';
import { stepsOf } from './working-steps';

const omega: WorkingSymbol = {
  tex: '\\omega',
  text: 'angular velocity of the rod',
  unit: 'rad/s',
  of: { kind: 'body', id: 'rod' },
};

const step = (over: Partial<WorkingStep>): WorkingStep => ({
  kind: 'step',
  level: 'velocity',
  text: 'From A to B, on the rod:',
  equations: [],
  scalarEquations: 0,
  unknowns: [],
  results: [],
  uses: [],
  arrows: [],
  ...over,
});

const working = (...steps: WorkingStep[]): Working => ({
  asked: { body: 'rod', point: 'B' },
  branch: 0,
  chain: ['rod'],
  steps,
});

describe('the steps of a derivation', () => {
  it('are numbered through and say how much of a known is known', () => {
    const known = (id: string) => step({ kind: 'known', uses: [{ kind: 'known', id }] });
    const steps = stepsOf(working(known('K1'), known('K2'), known('K3'), known('K4')), [
      { quantity: 'velocity', id: 'K1', at: { body: 'rod', point: 'B' }, direction: 0 },
      { quantity: 'velocity', id: 'K2', at: { body: 'rod', point: 'B' }, magnitude: 2 },
      { quantity: 'velocity', id: 'K3', at: { body: 'rod', point: 'B' }, components: [1, 2] },
      { quantity: 'angular-velocity', id: 'K4', body: 'rod', value: 1 },
    ]);
    expect(steps.map((one) => one.number)).toEqual([1, 2, 3, 4]);
    expect(steps.map((one) => one.label)).toEqual([
      'known, direction only',
      'known, magnitude only',
      'known, both',
      'known, value',
    ]);
    expect(steps[0].from).toEqual(['K1']);
  });

  it('count their equations and unknowns', () => {
    const [one] = stepsOf(working(step({ scalarEquations: 2, unknowns: [omega] })), []);
    expect(one.count).toBe('2 equations · 1 unknown here:');
  });

  it('show a result no finer than its interval, and an exact one without', () => {
    // 1.96 times 0.092 is 0.18: two digits, so the value has two decimals.
    const [one] = stepsOf(
      working(
        step({
          kind: 'result',
          results: [
            { symbol: omega, value: 1.9234, sigma: 0.092, tex: '' },
            { symbol: omega, value: 1.9234, sigma: null, tex: '' },
          ],
        }),
      ),
      [],
    );
    expect(one.results[0]).toMatchObject({ value: '1.92 rad/s', interval: '[1.74, 2.10]' });
    expect(one.results[1]).toMatchObject({ value: '1.923 rad/s', interval: '' });
  });

  it('give directions in degrees', () => {
    const theta: WorkingSymbol = { ...omega, unit: 'rad' };
    const [one] = stepsOf(
      working(step({ results: [{ symbol: theta, value: Math.PI / 6, sigma: 0.01, tex: '' }] })),
      [],
    );
    expect(one.results[0].value).toBe('30.0°');
  });
});

describe('the label of an arrow', () => {
  it.each([
    ['\\mathbf v_{G}', 'v', 'G'],
    ['\\mathbf v_{\\text{LR}/G}', 'v', 'LR/G'],
    ['\\mathbf a_{B}', 'a', 'B'],
  ])('%s is %s with the index %s', (tex, symbol, index) => {
    expect(labelOf(tex)).toEqual({ symbol, index });
  });

  it('calls a term of a rotation by what it is', () => {
    expect(labelOf('\\omega\\,\\mathbf k\\times\\mathbf r_{B/A}')).toEqual({
      symbol: 'v',
      index: 'B/A',
    });
    expect(labelOf('\\alpha\\,\\mathbf k\\times\\mathbf r_{B/A}').symbol).toBe('aᵗ');
    expect(labelOf('-\\omega^2\\,\\mathbf r_{B/A}').symbol).toBe('aⁿ');
  });
});
