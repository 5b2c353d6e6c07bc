import type { Dense } from '../linear/dense';
import { fromRows } from '../linear/dense';
import { cholesky } from '../linear/cholesky';
import { EngineError } from '../errors';
import type { Noise } from './model';

/**
 * Independent causes, of unit variance, that together give the covariance of some elements of
 * `g`. `directions[i]` says how the i-th covariate moves `g`.
 */
export const noisesOf = (
  source: Noise['source'],
  directions: readonly Noise['entries'][],
  covariance: Dense,
  field: string,
): Noise[] => {
  const n = covariance.rows;
  for (let i = 0; i < n; i++)
    for (let j = 0; j < i; j++) {
      const a = covariance.values[i * n + j];
      const b = covariance.values[j * n + i];
      if (Math.abs(a - b) > 1e-6 * (Math.abs(a) + Math.abs(b)) + Number.MIN_VALUE)
        throw new EngineError('not-a-covariance', field, `${field} is not symmetric.`);
    }
  const factor = cholesky(covariance, 1e-6);
  if (factor === null)
    throw new EngineError('not-a-covariance', field, `${field} is not positive semi-definite.`);
  const noises: Noise[] = [];
  for (let j = 0; j < n; j++) {
    const amounts = new Map<number, number>();
    for (let i = j; i < n; i++) {
      const l = factor.values[i * n + j];
      if (l === 0) continue;
      for (const { at, amount } of directions[i])
        amounts.set(at, (amounts.get(at) ?? 0) + l * amount);
    }
    if (amounts.size > 0)
      noises.push({ source, entries: [...amounts].map(([at, amount]) => ({ at, amount })) });
  }
  return noises;
};

/** Two independent or correlated elements, from a pair of sigmas or a 2 × 2 covariance. */
export const pairNoises = (
  source: Noise['source'],
  at: readonly [number, number],
  spread: {
    sigma?: readonly [number, number];
    covariance?: readonly (readonly [number, number])[];
  },
  field: string,
): Noise[] => {
  const { sigma, covariance } = spread;
  const directions = at.map((place) => [{ at: place, amount: 1 }]);
  if (covariance !== undefined)
    return noisesOf(source, directions, fromRows(covariance), `${field}.covariance`);
  if (sigma === undefined) return [];
  return sigma.flatMap((s, i) => (s > 0 ? [{ source, entries: [{ at: at[i], amount: s }] }] : []));
};
