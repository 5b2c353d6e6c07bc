import { EngineError } from '../errors';
import type { Random } from './random';

/** What is known of an input, as a distribution (JCGM 101:2008, table 1). */
export type Distribution =
  | { readonly kind: 'normal'; readonly mean: number; readonly sigma: number }
  | { readonly kind: 'rectangular'; readonly low: number; readonly high: number }
  | {
      readonly kind: 'triangular';
      readonly low: number;
      readonly high: number;
      /** Where the density is greatest; the middle when left out. */
      readonly mode?: number;
    }
  | {
      readonly kind: 't';
      readonly mean: number;
      readonly sigma: number;
      readonly degreesOfFreedom: number;
    }
  | {
      /** A normal cut off at bounds that the quantity cannot pass. */
      readonly kind: 'truncated';
      readonly mean: number;
      readonly sigma: number;
      readonly low: number;
      readonly high: number;
    };

/** Fills `into` with one draw of every input. */
export type Sampler = (random: Random, into: Float64Array) => void;

/**
 * χ² with any positive degrees of freedom, as twice a gamma variate of half of them.
 * Source: G. Marsaglia and W. W. Tsang, ACM Trans. Math. Softw. 26 (2000) 363, from memory.
 */
function chiSquared(random: Random, degreesOfFreedom: number): number {
  const shape = degreesOfFreedom / 2;
  if (shape < 1) return chiSquared(random, degreesOfFreedom + 2) * random.uniform() ** (1 / shape);
  const d = shape - 1 / 3;
  const c = 1 / Math.sqrt(9 * d);
  for (;;) {
    const x = random.normal();
    const v = (1 + c * x) ** 3;
    if (v > 0 && Math.log(random.uniform()) < 0.5 * x * x + d - d * v + d * Math.log(v))
      return 2 * d * v;
  }
}

const student = (random: Random, degreesOfFreedom: number): number =>
  random.normal() / Math.sqrt(chiSquared(random, degreesOfFreedom) / degreesOfFreedom);

/** One draw of a distribution. */
export function draw(distribution: Distribution, random: Random): number {
  switch (distribution.kind) {
    case 'normal':
      return distribution.mean + distribution.sigma * random.normal();
    case 'rectangular':
      return distribution.low + (distribution.high - distribution.low) * random.uniform();
    case 'triangular': {
      const { low, high, mode = (low + high) / 2 } = distribution;
      const u = random.uniform();
      const turn = (mode - low) / (high - low);
      return u < turn
        ? low + Math.sqrt(u * (high - low) * (mode - low))
        : high - Math.sqrt((1 - u) * (high - low) * (high - mode));
    }
    case 't':
      return (
        distribution.mean + distribution.sigma * student(random, distribution.degreesOfFreedom)
      );
    case 'truncated':
      for (let i = 0; i < 10_000; i++) {
        const value = distribution.mean + distribution.sigma * random.normal();
        if (value >= distribution.low && value <= distribution.high) return value;
      }
      throw new EngineError(
        'unsupported',
        'distribution',
        'The bounds leave next to nothing of the normal distribution.',
      );
  }
}

/** Independent inputs. */
export const independent =
  (distributions: readonly Distribution[]): Sampler =>
  (random, into) => {
    for (let i = 0; i < distributions.length; i++) into[i] = draw(distributions[i], random);
  };

/** Jointly normal inputs with the given covariance, which may be singular. */
export function jointlyNormal(
  means: readonly number[],
  covariance: readonly (readonly number[])[],
): Sampler {
  const n = means.length;
  const factor = choleskyOf(covariance);
  const z = new Float64Array(n);
  return (random, into) => {
    for (let i = 0; i < n; i++) z[i] = random.normal();
    for (let i = 0; i < n; i++) {
      let sum = means[i];
      for (let j = 0; j <= i; j++) sum += factor[i][j] * z[j];
      into[i] = sum;
    }
  };
}

function choleskyOf(covariance: readonly (readonly number[])[]): number[][] {
  const l = covariance.map((row) => row.map(() => 0));
  covariance.forEach((row, i) => {
    for (let j = 0; j <= i; j++) {
      let sum = row[j];
      for (let k = 0; k < j; k++) sum -= l[i][k] * l[j][k];
      if (i === j) {
        if (sum < -1e-12 * Math.abs(row[i]))
          throw new EngineError(
            'not-a-covariance',
            'covariance',
            'The covariance is not positive semi-definite.',
          );
        l[i][i] = Math.sqrt(Math.max(0, sum));
      } else l[i][j] = l[j][j] > 0 ? sum / l[j][j] : 0;
    }
  });
  return l;
}
