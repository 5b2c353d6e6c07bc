import { type Quantity, quantitiesOf } from '#shared/engine/documents/motion-quantities';
import type { MotionBranch } from '#shared/engine/documents/motion-solution';
import type { ReconstructionDocument } from '#shared/engine/documents/reconstruction';
import { type Ranged, type ShownFigure, showRanged } from '#shared/units/show-quantity';
import type { UnitSymbol } from '#shared/units/units';
import { keyOf } from '../names';

export interface PointRow {
  readonly key: string;
  readonly name: string;
  readonly body: string;
  /** In each of the asked units; empty when the speed is not fixed. */
  readonly figures: readonly ShownFigure[];
  /** In m/s, for the graphic. */
  readonly speed: Ranged | null;
  readonly acceleration: ShownFigure | null;
}

/** A quantity with its 95 % interval; one without uncertainty is its own interval. */
export const rangedOf = (quantity: Quantity): Ranged => ({
  value: quantity.value,
  low: quantity.low ?? quantity.value,
  high: quantity.high ?? quantity.value,
});

/** "Speed of which point?": every named point of every body, the fastest first. */
export function pointRows(
  document: ReconstructionDocument,
  branch: MotionBranch,
  speedUnits: readonly UnitSymbol[],
): PointRow[] {
  const found = new Map(
    quantitiesOf(branch).map((one) => [`${one.name} ${one.body}.${one.point ?? ''}`, one]),
  );
  const rows = document.bodies.flatMap((body) =>
    body.points.map((point): PointRow => {
      const key = keyOf({ body: body.id, point: point.id });
      const speed = found.get(`speed ${key}`);
      const acceleration = found.get(`acceleration ${key}`);
      const ranged = speed === undefined ? null : rangedOf(speed);
      return {
        key,
        name: point.name,
        body: body.name,
        speed: ranged,
        figures: ranged === null ? [] : speedUnits.map((unit) => showRanged(ranged, unit)),
        acceleration:
          acceleration === undefined ? null : showRanged(rangedOf(acceleration), 'm/s²'),
      };
    }),
  );
  return rows.sort((a, b) => (b.speed?.value ?? -1) - (a.speed?.value ?? -1));
}

/** The common scale of the dots: a little below the lowest bound to a little above the highest. */
export function scaleOf(rows: readonly PointRow[]): { low: number; high: number } {
  const speeds = rows.flatMap((row) => (row.speed === null ? [] : [row.speed]));
  if (speeds.length === 0) return { low: 0, high: 1 };
  const low = Math.min(...speeds.map((speed) => speed.low));
  const high = Math.max(...speeds.map((speed) => speed.high));
  const room = Math.max(high - low, 0.1 * high, 1e-9) * 0.05;
  return { low: Math.max(0, low - room), high: high + room };
}
