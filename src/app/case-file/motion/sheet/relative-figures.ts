import { coverage95 } from '#shared/engine/documents/motion-quantities';
import { type Ranged, showRanged } from '#shared/units/show-quantity';
import type { UnitSymbol } from '#shared/units/units';
import type { RelativeMotion } from '../live-messages';

export interface RelativeRow {
  readonly name: string;
  readonly says: string;
  readonly figures: readonly { value: string; low: string; high: string; unit: string }[];
}

/** The parts of a relative motion as rows of a table. */
export function relativeRows(
  motion: RelativeMotion,
  speedUnits: readonly UnitSymbol[],
): RelativeRow[] {
  const part = (
    index: number,
    value: number | null,
    name: string,
    says: string,
    units: readonly UnitSymbol[],
  ): RelativeRow => {
    const ranged = value === null ? null : rangedOf(value, motion.covariance[index]?.[index] ?? 0);
    return {
      name,
      says,
      figures: ranged === null ? [] : units.map((unit) => showRanged(ranged, unit)),
    };
  };
  return [
    part(0, motion.closing, 'closing', 'along the normal, positive when they approach', speedUnits),
    part(1, motion.sliding, 'sliding', 'across it, to the left of the normal', speedUnits),
    part(2, motion.closingRate, 'change of closing', '', ['m/s²']),
    part(3, motion.slidingRate, 'change of sliding', '', ['m/s²']),
  ];
}

function rangedOf(value: number, variance: number): Ranged {
  const half = coverage95 * Math.sqrt(Math.max(0, variance));
  return { value, low: value - half, high: value + half };
}
