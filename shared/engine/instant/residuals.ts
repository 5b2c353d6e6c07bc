import type { Residual } from '../documents/motion-solution';
import type { ModelKnown, Model } from './model';
import type { LevelResult } from './task';

/** Critical value of Baarda's test at 0.1 %. Source: Baarda (1968); engine check B14. */
const critical = 3.290526731;

/** What each known says less what the answer says. Source of the test: Baarda (1968), as in B13. */
export const residualsOf = (
  model: Model,
  velocity: LevelResult,
  acceleration: LevelResult | null,
): Residual[] =>
  model.knowns.flatMap((known) => {
    const result = known.level === 'velocity' ? velocity : acceleration;
    return result === null ? [] : partsOf(model, known, result);
  });

const partsOf = (model: Model, known: ModelKnown, result: LevelResult): Residual[] =>
  known.parts.map(({ part, at }) => {
    const entry = { known: known.id, part, level: known.level };
    const weights = model.noises.map((n) => n.entries.find((e) => e.at === at)?.amount ?? 0);
    const prior = weights.reduce((sum, w) => sum + w * w, 0);
    const { adjustment } = result;
    if (adjustment === null || prior === 0 || result.redundancy === 0)
      return { ...entry, residual: 0, normalised: null, redundancy: 0 };
    let residual = 0;
    let variance = 0;
    weights.forEach((w, i) => {
      if (w === 0) return;
      residual -= w * adjustment.n[i];
      weights.forEach((u, j) => {
        if (u !== 0) variance += w * u * adjustment.control.values[i * weights.length + j];
      });
    });
    const redundancy = Math.max(0, variance / prior);
    const normalised = redundancy > 1e-9 ? residual / Math.sqrt(variance) : null;
    return { ...entry, residual, normalised, redundancy };
  });

/** Ids of knowns whose normalised residual is beyond the critical value, worst first. */
export const suspectsOf = (residuals: readonly Residual[]): string[] => {
  const worst = new Map<string, number>();
  for (const { known, normalised } of residuals)
    if (normalised !== null && Math.abs(normalised) > critical)
      worst.set(known, Math.max(worst.get(known) ?? 0, Math.abs(normalised)));
  return [...worst].sort((a, b) => b[1] - a[1]).map(([id]) => id);
};
