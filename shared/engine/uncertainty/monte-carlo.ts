import { EngineError } from '../errors';
import { Random } from './random';
import type { Sampler } from './sampling';

export interface MonteCarloResult {
  readonly draws: number;
  readonly mean: number;
  readonly sigma: number;
  readonly coverage: number;
  /** Equal probability on both sides. */
  readonly symmetric: readonly [low: number, high: number];
  /** The shortest interval of that coverage. */
  readonly shortest: readonly [low: number, high: number];
  /** Draws for which the model had no value; they are left out and must be few. */
  readonly refused: number;
}

/** Draws of one random stream: a chunk gives the same numbers wherever it is computed. */
export const chunkSize = 2048;

/**
 * Propagation of distributions by Monte Carlo.
 *
 * Draws come in chunks, each with a random stream of its own, so that the result depends on the
 * seed and the number of draws alone. A draw for which the model is not finite is left out and
 * counted; EngineError `not-finite` when that is more than one in a hundred.
 * Source: JCGM 101:2008, clause 7.
 */
export function monteCarlo(
  model: (values: Float64Array) => number,
  sampler: Sampler,
  inputs: number,
  { draws = 100_000, seed = 1, coverage = 0.95 } = {},
): MonteCarloResult {
  const results = new Float64Array(draws);
  let count = 0;
  for (let from = 0; from < draws; from += chunkSize)
    count += fillChunk(
      model,
      sampler,
      inputs,
      seed,
      from / chunkSize,
      results.subarray(count, count + Math.min(chunkSize, draws - from)),
    );
  return summarise(results.subarray(0, count), draws - count, coverage);
}

/** Results of one chunk; gives how many were finite, those being first. */
export function fillChunk(
  model: (values: Float64Array) => number,
  sampler: Sampler,
  inputs: number,
  seed: number,
  chunk: number,
  results: Float64Array,
): number {
  const random = new Random(seed, chunk);
  const values = new Float64Array(inputs);
  let count = 0;
  for (let i = 0; i < results.length; i++) {
    sampler(random, values);
    const value = model(values);
    if (Number.isFinite(value)) results[count++] = value;
  }
  return count;
}

/** Mean, standard deviation and coverage intervals of draws (which are sorted in place). */
export function summarise(
  results: Float64Array,
  refused: number,
  coverage: number,
): MonteCarloResult {
  const draws = results.length;
  if (draws < 2 || refused > draws / 100)
    throw new EngineError(
      'not-finite',
      'model',
      'The model has no value for more than one draw in a hundred.',
    );
  results.sort();
  let sum = 0;
  for (const value of results) sum += value;
  const mean = sum / draws;
  let square = 0;
  for (const value of results) square += (value - mean) ** 2;
  const held = Math.min(draws - 1, Math.round(coverage * draws));
  const below = Math.floor((draws - held) / 2);
  let best = 0;
  for (let i = 0; i + held < draws; i++)
    if (results[i + held] - results[i] < results[best + held] - results[best]) best = i;
  return {
    draws,
    mean,
    sigma: Math.sqrt(square / (draws - 1)),
    coverage,
    symmetric: [results[below], results[below + held]],
    shortest: [results[best], results[best + held]],
    refused,
  };
}

export interface AdaptiveResult extends MonteCarloResult {
  /** True when the asked digits were reached within the most draws allowed. */
  readonly settled: boolean;
  /** Half of the last digit asked for, in the unit of the result. */
  readonly tolerance: number;
}

/**
 * Monte Carlo until the mean, the standard deviation and both ends of the interval are settled to
 * the asked significant digits of the standard deviation: blocks of 10⁴ draws are added until twice
 * the standard deviation of each of them over the blocks is under the tolerance.
 * Source: JCGM 101:2008, clause 7.9.
 */
export function monteCarloToDigits(
  model: (values: Float64Array) => number,
  sampler: Sampler,
  inputs: number,
  { digits = 2, seed = 1, coverage = 0.95, mostDraws = 2_000_000 } = {},
): AdaptiveResult {
  const block = Math.max(Math.ceil(100 / (1 - coverage)), 10_000);
  const blocks: MonteCarloResult[] = [];
  const all: Float64Array[] = [];
  let refused = 0;
  for (;;) {
    const results = new Float64Array(block);
    // streams far apart, so that blocks share none with the chunks of a plain run
    const count = fillChunk(model, sampler, inputs, seed, 0x40000000 + blocks.length, results);
    refused += block - count;
    all.push(results.slice(0, count));
    blocks.push(summarise(results.subarray(0, count), block - count, coverage));
    if (blocks.length < 2) continue;
    const spread = blocks.reduce((sum, { sigma }) => sum + sigma, 0) / blocks.length;
    const exponent = spread > 0 ? Math.floor(Math.log10(spread)) - digits + 1 : 0;
    const tolerance = spread > 0 ? 0.5 * 10 ** exponent : 0;
    const settled = [
      (b: MonteCarloResult) => b.mean,
      (b: MonteCarloResult) => b.sigma,
      (b: MonteCarloResult) => b.symmetric[0],
      (b: MonteCarloResult) => b.symmetric[1],
    ].every((of) => 2 * errorOfMean(blocks.map(of)) <= tolerance);
    if (settled || (blocks.length + 1) * block > mostDraws)
      return { ...summarise(joined(all), refused, coverage), settled, tolerance };
  }
}

function errorOfMean(values: readonly number[]): number {
  const n = values.length;
  const mean = values.reduce((sum, value) => sum + value, 0) / n;
  const square = values.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  return Math.sqrt(square / (n * (n - 1)));
}

function joined(parts: readonly Float64Array[]): Float64Array {
  const result = new Float64Array(parts.reduce((sum, part) => sum + part.length, 0));
  let at = 0;
  for (const part of parts) {
    result.set(part, at);
    at += part.length;
  }
  return result;
}

/** Whether first-order and Monte Carlo intervals agree to the tolerance (JCGM 101:2008, clause 8). */
export const intervalsAgree = (
  firstOrder: { readonly low: number; readonly high: number },
  simulated: readonly [low: number, high: number],
  tolerance: number,
): boolean =>
  Math.abs(firstOrder.low - simulated[0]) <= tolerance &&
  Math.abs(firstOrder.high - simulated[1]) <= tolerance;
