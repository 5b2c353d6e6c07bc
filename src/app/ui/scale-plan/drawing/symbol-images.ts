import type { MarkKind } from '#shared/contracts/survey';
import { markSymbols } from '../mark-symbols';
import type { PlanColours } from '../plan-colours';

/** Pictures have twice the pixels of the page, for sharp lines on fine screens. */
export const symbolDensity = 2;
const side = 18;

/** The symbol of a kind as a picture, on a halo that keeps it legible over traces. */
export function symbolImage(kind: MarkKind, colours: PlanColours): HTMLCanvasElement {
  const canvas = document.createElement('canvas');
  canvas.width = canvas.height = side * symbolDensity;
  const context = canvas.getContext('2d');
  if (!context) return canvas;
  const { path, filled } = markSymbols[kind];
  const shape = new Path2D(path);
  context.scale(symbolDensity, symbolDensity);
  context.translate((side - 16) / 2, (side - 16) / 2);
  context.lineJoin = context.lineCap = 'round';
  context.strokeStyle = colours.sheet;
  context.lineWidth = 4;
  context.stroke(shape);
  context.strokeStyle = context.fillStyle = colours.chalk;
  context.lineWidth = filled ? 1 : 1.7;
  if (filled) context.fill(shape);
  context.stroke(shape);
  return canvas;
}
