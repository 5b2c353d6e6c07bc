import type { PlanColours } from '../plan-colours';
import { gridStep } from '../plan-scale';
import { onSheet, type Sheet } from './sheet';

/** Lines of constant x and y, a round distance apart; every fifth is a little stronger. */
export function drawGrid(sheet: Sheet, colours: PlanColours): void {
  const { context, width, height, centre, resolution } = sheet;
  const step = gridStep(resolution);
  const halfWidth = (width / 2) * resolution;
  const halfHeight = (height / 2) * resolution;
  context.strokeStyle = colours.line;
  const from = (low: number): number => Math.ceil(low / step);
  const to = (high: number): number => Math.floor(high / step);
  for (let i = from(centre[0] - halfWidth); i <= to(centre[0] + halfWidth); i++) {
    const x = Math.round(onSheet(sheet, [i * step, 0])[0]) + 0.5;
    rule(context, i, [x, 0], [x, height]);
  }
  for (let i = from(centre[1] - halfHeight); i <= to(centre[1] + halfHeight); i++) {
    const y = Math.round(onSheet(sheet, [0, i * step])[1]) + 0.5;
    rule(context, i, [0, y], [width, y]);
  }
  context.globalAlpha = 1;
}

function rule(
  context: CanvasRenderingContext2D,
  index: number,
  from: readonly [number, number],
  to: readonly [number, number],
): void {
  context.globalAlpha = index % 5 === 0 ? 0.9 : 0.45;
  context.lineWidth = 1;
  context.beginPath();
  context.moveTo(...from);
  context.lineTo(...to);
  context.stroke();
}
