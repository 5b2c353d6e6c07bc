import { EngineError } from '../errors';
import { coverageInterval, type CoverageInterval } from './interval';

/** An input quantity: its estimate, standard uncertainty and degrees of freedom of the latter. */
export interface Input {
  readonly id: string;
  readonly value: number;
  readonly sigma: number;
  /** Infinite when left out: σ is taken as known. */
  readonly degreesOfFreedom?: number;
}

export interface Correlation {
  readonly between: readonly [id: string, id: string];
  readonly coefficient: number;
}

/** A measurement model with its derivative by each input, in the order of the inputs. */
export type Model = (values: readonly number[]) => {
  readonly value: number;
  readonly gradient: ArrayLike<number>;
};

export interface BudgetEntry {
  readonly id: string;
  readonly sensitivity: number;
  /** |c·u|, in the unit of the result. */
  readonly contribution: number;
  /**
   * Share of the variance, uᵢcᵢ·Σⱼ rᵢⱼ·uⱼcⱼ over u²: sums to 1; negative where a correlation
   * takes more away than the input brings.
   */
  readonly share: number;
  /** Change of the result when this input alone moves by ±u, computed with the model itself. */
  readonly span: readonly [down: number, up: number];
}

export interface Propagated {
  readonly value: number;
  readonly sigma: number;
  /** Welch–Satterthwaite; null when correlated inputs have finite ones, where it does not apply. */
  readonly degreesOfFreedom: number | null;
  readonly interval: CoverageInterval;
  /** Largest share first. */
  readonly budget: readonly BudgetEntry[];
}

/**
 * Law of propagation of uncertainty, first order, with correlations, effective degrees of freedom
 * and a budget.
 *
 * Throws EngineError `not-finite` (the result has no value there), `not-positive` (a negative σ),
 * `unknown-reference` and `not-a-covariance` for a bad correlation.
 * Source: JCGM 100:2008, equations 13 and G.2b.
 */
export function propagate(
  model: Model,
  inputs: readonly Input[],
  correlations: readonly Correlation[] = [],
  coverage = 0.95,
): Propagated {
  for (const { id, value, sigma } of inputs) {
    if (!Number.isFinite(value) || !Number.isFinite(sigma))
      throw new EngineError('not-finite', `inputs.${id}`, 'This must be a finite number.');
    if (sigma < 0)
      throw new EngineError('not-positive', `inputs.${id}.sigma`, 'This cannot be negative.');
  }
  const values = inputs.map(({ value }) => value);
  const at = model(values);
  if (!Number.isFinite(at.value))
    throw new EngineError('not-finite', 'inputs', 'The formula has no value for these inputs.');
  const parts = inputs.map(({ sigma }, i) => (sigma === 0 ? 0 : at.gradient[i] * sigma));
  const r = correlationMatrix(inputs, correlations);
  const shares = parts.map((part, i) => part * parts.reduce((sum, p, j) => sum + r[i][j] * p, 0));
  const variance = Math.max(
    0,
    shares.reduce((sum, share) => sum + share, 0),
  );
  const sigma = Math.sqrt(variance);
  const degreesOfFreedom = effectiveDegrees(inputs, parts, variance, correlations);
  return {
    value: at.value,
    sigma,
    degreesOfFreedom,
    interval: coverageInterval(at.value, sigma, {
      coverage,
      degreesOfFreedom: degreesOfFreedom ?? Infinity,
    }),
    budget: inputs
      .map((input, i) => ({
        id: input.id,
        sensitivity: at.gradient[i],
        contribution: Math.abs(parts[i]),
        share: variance > 0 ? shares[i] / variance : 0,
        span: span(model, values, i, input.sigma, at.value),
      }))
      .sort((a, b) => b.share - a.share),
  };
}

/** Sensitivities by central differences, for a model without derivatives. */
export const withDifferences =
  (model: (values: readonly number[]) => number, inputs: readonly Input[]): Model =>
  (values) => ({
    value: model(values),
    gradient: inputs.map(({ sigma }, i) => {
      // σ itself is too wide a step for a curved model, rounding too much for a tiny one
      const step = Math.max(1e-4 * sigma, 1e-6 * Math.abs(values[i])) || 1e-6;
      const moved = (by: number): number =>
        model(values.map((value, j) => (j === i ? value + by : value)));
      return (moved(step) - moved(-step)) / (2 * step);
    }),
  });

function span(
  model: Model,
  values: readonly number[],
  i: number,
  sigma: number,
  centre: number,
): readonly [number, number] {
  if (sigma === 0) return [0, 0];
  const moved = (by: number): number =>
    model(values.map((value, j) => (j === i ? value + by : value))).value - centre;
  return [moved(-sigma), moved(sigma)];
}

function correlationMatrix(
  inputs: readonly Input[],
  correlations: readonly Correlation[],
): readonly (readonly number[])[] {
  const r: number[][] = inputs.map((_, i) => inputs.map((__, j) => (i === j ? 1 : 0)));
  for (const { between, coefficient } of correlations) {
    const [i, j] = between.map((id) => inputs.findIndex((input) => input.id === id));
    if (i < 0 || j < 0 || i === j)
      throw new EngineError(
        'unknown-reference',
        'correlations',
        `A correlation needs two different inputs, not "${between.join('" and "')}".`,
      );
    if (!(Math.abs(coefficient) <= 1))
      throw new EngineError('not-a-covariance', 'correlations', 'A correlation is within ±1.');
    r[i][j] = coefficient;
    r[j][i] = coefficient;
  }
  return r;
}

function effectiveDegrees(
  inputs: readonly Input[],
  parts: readonly number[],
  variance: number,
  correlations: readonly Correlation[],
): number | null {
  let sum = 0;
  inputs.forEach(({ degreesOfFreedom = Infinity }, i) => {
    sum += parts[i] ** 4 / degreesOfFreedom;
  });
  if (sum === 0) return Infinity;
  return correlations.some(({ coefficient }) => coefficient !== 0) ? null : variance ** 2 / sum;
}
