import { EngineError } from '../errors';

export interface Radius {
  readonly radius: number;
  /** Standard uncertainty, first order. */
  readonly sigma: number;
  /** ∂r/∂C and ∂r/∂M. */
  readonly sensitivity: readonly [chord: number, middleOrdinate: number];
  /** Beside the number where first order is rough. */
  readonly warnings: readonly string[];
}

/** Relative: above it the distribution of the radius is visibly skewed. */
const skewed = 0.1;

/**
 * Radius of an arc from its chord C and middle ordinate M: r = C²/(8M) + M/2, exact for a circle.
 *
 * All in m; `sigma` the standard uncertainties of C and M, independent. Throws EngineError
 * `zero-length` when M or C is not over zero. Example: C = 15, M = 0.33 gives r = 85.392.
 * Source: sagitta of a circular arc (geometry).
 */
export function radiusFromChord(
  chord: number,
  middleOrdinate: number,
  sigma: readonly [chord: number, middleOrdinate: number] = [0, 0],
): Radius {
  for (const [value, field] of [
    [chord, 'chord'],
    [middleOrdinate, 'middleOrdinate'],
  ] as const)
    if (!(value > 0 && Number.isFinite(value)))
      throw new EngineError('zero-length', field, 'This must be a length over zero.');
  const radius = chord ** 2 / (8 * middleOrdinate) + middleOrdinate / 2;
  const byChord = chord / (4 * middleOrdinate);
  const byOrdinate = 0.5 - chord ** 2 / (8 * middleOrdinate ** 2);
  const warnings: string[] = [];
  if (sigma[1] > skewed * middleOrdinate)
    warnings.push(
      'The middle ordinate is known to worse than 10 %: the radius is skewed to larger values, and Monte Carlo should replace the first-order interval.',
    );
  return {
    radius,
    sigma: Math.hypot(byChord * sigma[0], byOrdinate * sigma[1]),
    sensitivity: [byChord, byOrdinate],
    warnings,
  };
}
