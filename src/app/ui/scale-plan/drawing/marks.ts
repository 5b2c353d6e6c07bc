import type { PlanColours } from '../plan-colours';
import type { PlanMark } from '../plan-content';
import type { Label } from './labels';
import { onSheet, type Sheet } from './sheet';

/** Rings of the selected and the highlighted marks. */
export function drawRings(
  sheet: Sheet,
  marks: readonly PlanMark[],
  selected: string | null,
  colours: PlanColours,
): void {
  const { context } = sheet;
  for (const mark of marks) {
    const [x, y] = onSheet(sheet, mark.at);
    const chosen = mark.id === selected;
    context.lineWidth = chosen ? 2.5 : 1.5;
    context.strokeStyle = chosen ? colours.ink : colours.spruce;
    context.beginPath();
    context.arc(x, y, chosen ? 12 : 10, 0, 2 * Math.PI);
    context.stroke();
  }
}

/** More labels than this cover the drawing. */
const mostLabels = 120;

/** Labels of the marks in sight, the selected one first; none when there are too many to read. */
export function markLabels(
  sheet: Sheet,
  inSight: readonly PlanMark[],
  selected: string | null,
): Label[] {
  const shown =
    inSight.length > mostLabels ? inSight.filter((mark) => mark.id === selected) : inSight;
  return shown
    .map((mark) => ({
      text: mark.label,
      at: onSheet(sheet, mark.at),
      gap: mark.id === selected ? 15 : 10,
      colour: mark.id === selected ? ('ink' as const) : ('muted' as const),
      strong: mark.id === selected,
    }))
    .sort((a, b) => Number(b.strong) - Number(a.strong));
}
