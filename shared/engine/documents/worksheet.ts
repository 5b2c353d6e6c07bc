import * as z from 'zod';

/**
 * A worksheet filled in, `centrode.worksheet-problem/1`, and its answer,
 * `centrode.worksheet-solution/1`. SI units. A value without `sigma` is exact.
 */
const number = z.number();
const uncertain = z.strictObject({
  value: number,
  sigma: z.number().nonnegative().optional(),
  source: z.string().optional(),
});
const values = z.record(z.string(), uncertain);

export const worksheetProblem = z.strictObject({
  format: z.literal('centrode.worksheet-problem/1'),
  /** Id of the worksheet. */
  worksheet: z.string().min(1),
  /** By symbol. */
  values,
  /** Of the table, if the worksheet has one; in formulas `d_2` is d of the second row. */
  rows: z.array(values).max(50).default([]),
  correlations: z
    .array(
      z.strictObject({
        between: z.tuple([z.string(), z.string()]),
        coefficient: z.number().min(-1).max(1),
      }),
    )
    .default([]),
  /** Monte Carlo beside the first-order answer, with normal inputs. */
  simulation: z
    .strictObject({
      draws: z.int().min(1000).max(5_000_000),
      seed: z.int().min(0).max(0xffffffff),
    })
    .nullable()
    .default(null),
});

const interval = z.object({ low: number, high: number, coverage: number });

export const worksheetResult = z.object({
  symbol: z.string(),
  meaning: z.string(),
  unit: z.string(),
  formula: z.string(),
  value: number,
  sigma: number,
  interval,
  budget: z.array(
    z.object({
      id: z.string(),
      sensitivity: number,
      contribution: number,
      share: number,
      span: z.tuple([number, number]),
    }),
  ),
  simulated: z
    .object({
      draws: z.int(),
      mean: number,
      sigma: number,
      low: number,
      high: number,
      /** With the first-order interval, to two digits of the uncertainty (JCGM 101, clause 8). */
      agrees: z.boolean(),
    })
    .nullable(),
});

export const worksheetSolution = z.object({
  format: z.literal('centrode.worksheet-solution/1'),
  worksheet: z.string(),
  results: z.array(worksheetResult),
  /** Beside the number: what is unusual in the inputs, and where the method is outside its range. */
  warnings: z.array(z.string()),
});

export type WorksheetProblem = z.infer<typeof worksheetProblem>;
export type WorksheetSolution = z.infer<typeof worksheetSolution>;
export type WorksheetResult = z.infer<typeof worksheetResult>;
