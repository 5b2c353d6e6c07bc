import type { PlanColours } from '../plan-colours';
import type { PlanVector, PlanVectorKind } from '../plan-content';
import type { VectorScale } from '../plan-scale';
import type { Label } from './labels';
import { onSheet, type Sheet } from './sheet';

const looks: Record<
  PlanVectorKind,
  { colour: keyof PlanColours; dash: readonly number[]; double: boolean }
> = {
  velocity: { colour: 'spruce', dash: [], double: false },
  relative: { colour: 'ochre', dash: [6, 4], double: false },
  acceleration: { colour: 'plum', dash: [], double: true },
};

const headLength = 11;
const headHalfWidth = 4.5;

/** Draws the vectors and answers their labels, which stand at the heads. */
export function drawVectors(
  sheet: Sheet,
  vectors: readonly PlanVector[],
  scaleOf: (kind: PlanVectorKind) => VectorScale | null,
  colours: PlanColours,
): Label[] {
  return vectors.flatMap((vector) => {
    const scale = scaleOf(vector.kind);
    if (!scale) return [];
    const from = onSheet(sheet, vector.from);
    const to: [number, number] = [
      from[0] + vector.value[0] * scale.pixelsPerUnit,
      from[1] - vector.value[1] * scale.pixelsPerUnit,
    ];
    const { colour } = looks[vector.kind];
    drawArrow(sheet.context, from, to, vector.kind, colours);
    return [{ text: vector.label, at: to, gap: 8, colour }];
  });
}

export function drawArrow(
  context: CanvasRenderingContext2D,
  from: readonly [number, number],
  to: readonly [number, number],
  kind: PlanVectorKind,
  colours: PlanColours,
): void {
  const { colour, dash, double } = looks[kind];
  const length = Math.hypot(to[0] - from[0], to[1] - from[1]);
  context.save();
  context.strokeStyle = context.fillStyle = colours[colour];
  if (length < 1) {
    // A vector of (nearly) nothing is a dot, so that it is not taken for one that is missing.
    context.beginPath();
    context.arc(from[0], from[1], 2.5, 0, 2 * Math.PI);
    context.fill();
    context.restore();
    return;
  }
  context.translate(from[0], from[1]);
  context.rotate(Math.atan2(to[1] - from[1], to[0] - from[0]));
  const head = Math.min(headLength, length * 0.6);
  const half = (headHalfWidth * head) / headLength;
  context.lineWidth = double ? 1.3 : 2.2;
  context.setLineDash([...dash]);
  for (const offset of double ? [-1.7, 1.7] : [0]) {
    context.beginPath();
    context.moveTo(0, offset);
    context.lineTo(length - head + 1, offset);
    context.stroke();
  }
  context.setLineDash([]);
  context.beginPath();
  context.moveTo(length, 0);
  context.lineTo(length - head, half);
  context.lineTo(length - head, -half);
  context.closePath();
  context.fill();
  context.restore();
}
