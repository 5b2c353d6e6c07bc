import { describe, expect, it } from '@jest/globals';
import { compute, recompute } from '#shared/engine/computation/index';
import { readExpression } from '#shared/engine/worksheets/expression';
import { solveWorksheet, worksheets } from '#shared/engine/worksheets/index';
import { expectClose } from './case-file';
import { work } from './worksheet-work';

describe('every worksheet', () => {
  it('has an id of its own, sources, validity and formulas that can be read', () => {
    expect(new Set(worksheets.map(({ id }) => id)).size).toBe(worksheets.length);
    for (const sheet of worksheets) {
      expect(sheet.sources.length).toBeGreaterThan(0);
      expect(sheet.validity.length).toBeGreaterThan(0);
      const symbols = [...sheet.inputs, ...sheet.results].map(({ symbol }) => symbol);
      expect(new Set([...symbols, 'g']).size).toBe(symbols.length + 1);
    }
  });

  it('refuses a missing value, one too many, NaN, and no rows, naming the field', () => {
    const refusal = (run: () => unknown) => {
      try {
        run();
        return null;
      } catch (error) {
        return error;
      }
    };
    const bare = (given: object) => () =>
      solveWorksheet({
        format: 'centrode.worksheet-problem/1',
        worksheet: 'slide-to-stop',
        values: {},
        rows: [],
        correlations: [],
        simulation: null,
        ...given,
      });
    const f = { value: 0.7 };
    expect(refusal(bare({ values: { f } }))).toMatchObject({
      code: 'unknown-reference',
      field: 'values.d',
    });
    expect(refusal(bare({ values: { f, d: f, x: f } }))).toMatchObject({ field: 'values.x' });
    expect(refusal(bare({ values: { f, d: { value: NaN } } }))).toMatchObject({
      code: 'not-finite',
      field: 'values.d',
    });
    expect(refusal(bare({ worksheet: 'surfaces', values: { ve: f } }))).toMatchObject({
      code: 'empty',
      field: 'rows',
    });
    expect(refusal(bare({ worksheet: 'none' }))).toMatchObject({ field: 'worksheet' });
  });

  it('warns beside the number where an input is unusual, and refuses where there is no answer', () => {
    expect(work('slide-to-stop', { f: 1.4, d: 20 }).warnings.join()).toContain('outside');
    expect(() => work('grade', { mu: 0.1, n: 1, G: -0.14, d: 20 })).toThrow('would not stop');
  });

  it('is recorded and computed again to the same bytes, its simulation too', () => {
    const kept = compute('worksheet', {
      format: 'centrode.worksheet-problem/1',
      worksheet: 'slide-to-stop',
      values: { f: { value: 0.7, sigma: 0.05 }, d: { value: 25, sigma: 0.3 } },
      simulation: { draws: 5000, seed: 12 },
    });
    expect(recompute(JSON.parse(kept.text)).identical).toBe(true);
  });
});

describe('formulas', () => {
  it('take nothing but arithmetic', () => {
    for (const text of [
      'import("x")',
      'config({})',
      'a = 2',
      '[1, 2]',
      '"text"',
      'x.constructor',
      'f(x) = x',
      'evaluate("1")',
      'random()',
      'true',
      'x!',
      '2 m',
      'sqrt(1, 2)',
      'sum(x)',
      '(',
      'x; x',
      'x > 1 ? 1 : 2',
      'toString',
      '1e999',
      `${'x + '.repeat(200)}x`,
    ])
      expect(() => readExpression(text, ['x'], 'formula')).toThrow(
        expect.objectContaining({ code: 'unsupported', field: 'formula' }),
      );
  });

  it('carry exact derivatives', () => {
    const formula =
      'x^3 * sin(y) / (1 + sqrt(x)) - atan2(y, x) + exp(-x) * log(y) + tan(x / y) + max(x, y) - x^y';
    const expression = readExpression(formula, ['x', 'y'], 'formula');
    const at = [1.3, 0.7];
    const { value, gradient } = expression.differentiate(at);
    expect(value).toBe(expression.evaluate(at));
    at.forEach((_, i) => {
      const moved = (by: number) =>
        expression.evaluate(at.map((entry, j) => (i === j ? entry + by : entry)));
      expectClose(gradient[i], (moved(1e-5) - moved(-1e-5)) / 2e-5, { rel: 1e-7 });
    });
  });
});
