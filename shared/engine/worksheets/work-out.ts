import type { WorksheetProblem, WorksheetResult, WorksheetSolution } from '../documents/worksheet';
import { EngineError } from '../errors';
import { intervalsAgree, monteCarlo } from '../uncertainty/monte-carlo';
import { propagate, type Input } from '../uncertainty/propagation';
import { roundToUncertainty } from '../uncertainty/rounding';
import { jointlyNormal } from '../uncertainty/sampling';
import { readExpression, type Expression, type Scope } from './expression';
import { standardGravity, type GivenQuantity, type Result, type Worksheet } from './worksheet';

/**
 * Works a worksheet out: every result with its first-order uncertainty, interval and budget, and by
 * Monte Carlo when asked.
 *
 * Throws EngineError: `unknown-reference` (`values.SYMBOL`) for a value that is missing or not
 * asked for, `not-finite`, `empty` for a table without rows, `unsupported` (`worksheet`) when the
 * inputs are outside what the formula can answer.
 */
export function workOut(sheet: Worksheet, problem: WorksheetProblem): WorksheetSolution {
  const warnings: string[] = [];
  const inputs = inputsOf(sheet, problem, warnings);
  const formulas = formulasOf(sheet, inputs, problem.rows.length);
  const values = inputs.map(({ value }) => value);
  for (const { formula, message, needed } of sheet.conditions) {
    const margin = formulas.read(formula).evaluate(values);
    if (margin >= 0) continue;
    if (needed) throw new EngineError('unsupported', 'worksheet', message);
    warnings.push(message);
  }
  return {
    format: 'centrode.worksheet-solution/1',
    worksheet: sheet.id,
    results: sheet.results.map((result) => resultOf(result, formulas.definitions, inputs, problem)),
    warnings,
  };
}

function inputsOf(sheet: Worksheet, problem: WorksheetProblem, warnings: string[]): Input[] {
  const take = (
    quantity: GivenQuantity,
    from: WorksheetProblem['values'],
    id: string,
    field: string,
  ): Input => {
    if (!Object.hasOwn(from, quantity.symbol))
      throw new EngineError('unknown-reference', field, `A value is missing: ${quantity.meaning}.`);
    const { value, sigma = 0 } = from[quantity.symbol];
    if (!Number.isFinite(value) || !Number.isFinite(sigma))
      throw new EngineError('not-finite', field, 'This must be a finite number.');
    const [low, high] = quantity.usual ?? [-Infinity, Infinity];
    if (value < low || value > high)
      warnings.push(
        `${quantity.symbol} = ${value} is outside what is usual, ${low} to ${high}${quantity.unit === '1' ? '' : ` ${quantity.unit}`} (${quantity.meaning}).`,
      );
    return { id, value, sigma };
  };
  refuseUnknown(problem.values, sheet.inputs, 'values');
  const inputs = sheet.inputs.map((quantity) =>
    take(quantity, problem.values, quantity.symbol, `values.${quantity.symbol}`),
  );
  if (sheet.table === undefined) return inputs;
  if (problem.rows.length === 0)
    throw new EngineError('empty', 'rows', `${sheet.table.title}: at least one row is needed.`);
  const { columns } = sheet.table;
  problem.rows.forEach((row, i) => {
    refuseUnknown(row, columns, `rows.${i}`);
    for (const quantity of columns)
      inputs.push(
        take(quantity, row, `${quantity.symbol}_${i + 1}`, `rows.${i}.${quantity.symbol}`),
      );
  });
  return inputs;
}

function refuseUnknown(
  given: WorksheetProblem['values'],
  known: readonly GivenQuantity[],
  field: string,
): void {
  for (const symbol of Object.keys(given))
    if (!known.some((quantity) => quantity.symbol === symbol))
      throw new EngineError(
        'unknown-reference',
        `${field}.${symbol}`,
        `This worksheet has no quantity "${symbol}".`,
      );
}

/** The formulas of a sheet, each in terms of its inputs alone. */
function formulasOf(
  sheet: Worksheet,
  inputs: readonly Input[],
  rows: number,
): { definitions: ReadonlyMap<string, Expression>; read: (text: string) => Expression } {
  const symbols = inputs.map(({ id }) => id);
  const definitions = new Map<string, Expression>();
  const scope: Scope = {
    constants: { g: standardGravity },
    definitions,
    ...(sheet.table !== undefined && {
      rows: { columns: sheet.table.columns.map(({ symbol }) => symbol), count: rows },
    }),
  };
  const read = (text: string): Expression =>
    readExpression(text, symbols, `worksheet.${sheet.id}`, scope);
  for (const { symbol, formula } of sheet.results) definitions.set(symbol, read(formula));
  return { definitions, read };
}

function resultOf(
  { symbol, meaning, unit, formula }: Result,
  definitions: ReadonlyMap<string, Expression>,
  inputs: readonly Input[],
  problem: WorksheetProblem,
): WorksheetResult {
  const expression = definitions.get(symbol);
  if (expression === undefined) throw new RangeError(`no formula for ${symbol}`);
  const model = (values: readonly number[]) => expression.differentiate(values);
  const { value, sigma, interval, budget } = propagate(model, inputs, problem.correlations);
  return {
    symbol,
    meaning,
    unit,
    formula,
    value,
    sigma,
    interval: { ...interval },
    budget: budget
      .filter(({ contribution }) => contribution > 0)
      .map((entry) => ({ ...entry, span: [entry.span[0], entry.span[1]] })),
    simulated:
      problem.simulation === null || sigma === 0
        ? null
        : simulate(expression, inputs, problem, { ...interval, sigma }),
  };
}

function simulate(
  expression: Expression,
  inputs: readonly Input[],
  { correlations, simulation }: WorksheetProblem,
  firstOrder: { low: number; high: number; sigma: number },
): WorksheetResult['simulated'] {
  const covariance = inputs.map((a, i) =>
    inputs.map((b, j) => {
      if (i === j) return a.sigma * a.sigma;
      const link = correlations.find(
        ({ between }) => between.includes(a.id) && between.includes(b.id),
      );
      return (link?.coefficient ?? 0) * a.sigma * b.sigma;
    }),
  );
  const sampler = jointlyNormal(
    inputs.map(({ value }) => value),
    covariance,
  );
  const { draws, mean, sigma, symmetric } = monteCarlo(
    (values) => expression.evaluate(Array.from(values)),
    sampler,
    inputs.length,
    simulation ?? {},
  );
  const { places } = roundToUncertainty(firstOrder.sigma, firstOrder.sigma);
  return {
    draws,
    mean,
    sigma,
    low: symmetric[0],
    high: symmetric[1],
    agrees: intervalsAgree(firstOrder, symmetric, 0.5 * 10 ** -places),
  };
}
