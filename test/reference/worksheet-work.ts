import { expect } from '@jest/globals';
import {
  worksheetProblem,
  worksheetSolution,
  type WorksheetResult,
} from '#shared/engine/documents/worksheet';
import { solveWorksheet } from '#shared/engine/worksheets/index';

export type Numbers = Record<string, number>;
export type Given = Record<string, number | readonly [value: number, sigma: number]>;

export const degree = Math.PI / 180;

const quantities = (given: Given) =>
  Object.fromEntries(
    Object.entries(given).map(([symbol, entry]) => {
      const [value, sigma] = typeof entry === 'number' ? [entry, 0] : entry;
      return [symbol, { value, sigma }];
    }),
  );

/** Results of a worksheet by symbol, and what it warns of. */
export function work(
  worksheet: string,
  given: Given,
  more: { rows?: readonly Given[]; simulation?: { draws: number; seed: number } } = {},
): { of: (symbol: string) => WorksheetResult; warnings: readonly string[] } {
  const solution = solveWorksheet(
    worksheetProblem.parse({
      format: 'centrode.worksheet-problem/1',
      worksheet,
      values: quantities(given),
      rows: more.rows?.map(quantities) ?? [],
      simulation: more.simulation ?? null,
    }),
  );
  expect(() => worksheetSolution.parse(solution)).not.toThrow();
  return {
    warnings: solution.warnings,
    of: (symbol) => {
      const result = solution.results.find((one) => one.symbol === symbol);
      if (result === undefined) throw new Error(`no result ${symbol}`);
      return result;
    },
  };
}

export const values = (sheet: ReturnType<typeof work>, ...symbols: string[]): number[] =>
  symbols.map((symbol) => sheet.of(symbol).value);

export interface Cases<Inputs> {
  readonly subcases: Record<string, Inputs>;
}
