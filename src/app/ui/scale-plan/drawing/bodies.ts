import type { PlanColours } from '../plan-colours';
import type { PlanBody, PlanCentre, PlanGuide, PlanJoint } from '../plan-content';
import type { Label } from './labels';
import { onSheet, strokePath, type Sheet } from './sheet';

export function drawBodies(
  sheet: Sheet,
  bodies: readonly PlanBody[],
  colours: PlanColours,
): Label[] {
  const { context } = sheet;
  // Ghosts first: the body at the station in question lies over them.
  const ordered = [...bodies].sort((a, b) => Number(b.ghost) - Number(a.ghost));
  return ordered.flatMap((body) => {
    context.save();
    context.lineJoin = 'round';
    context.strokeStyle = body.ghost ? colours.muted : colours.ink;
    context.lineWidth = body.ghost ? 1.2 : 2;
    context.setLineDash(body.ghost ? [5, 4] : []);
    strokePath(sheet, body.outline, body.outline.length > 2);
    if (!body.ghost && body.outline.length > 2) {
      context.globalAlpha = 0.12;
      context.fillStyle = colours.muted;
      context.fill();
      context.globalAlpha = 1;
    }
    context.setLineDash([]);
    context.fillStyle = body.ghost ? colours.muted : colours.ink;
    for (const point of body.points) dot(sheet, onSheet(sheet, point.at), body.ghost ? 1.6 : 2.4);
    context.restore();
    const colour = body.ghost ? ('muted' as const) : ('ink' as const);
    return [
      { text: body.label, at: below(sheet, body), gap: 10, colour, strong: !body.ghost },
      ...(body.ghost
        ? []
        : body.points.map((point) => ({
            text: point.label,
            at: onSheet(sheet, point.at),
            gap: 7,
            colour,
          }))),
    ];
  });
}

/** The lowest corner on the sheet, where the name is out of the way. */
function below(sheet: Sheet, body: PlanBody): [number, number] {
  const corners = [...body.outline, ...body.points.map((point) => point.at)];
  return corners
    .map((corner) => onSheet(sheet, corner))
    .reduce<[number, number]>(
      (lowest, corner) => (corner[1] > lowest[1] ? corner : lowest),
      [0, -Infinity],
    );
}

export function drawGuides(
  sheet: Sheet,
  guides: readonly PlanGuide[],
  colours: PlanColours,
): Label[] {
  const { context } = sheet;
  context.save();
  context.strokeStyle = colours.muted;
  context.lineWidth = 1.2;
  context.setLineDash([10, 3, 2, 3]);
  for (const guide of guides) strokePath(sheet, guide.path);
  context.restore();
  return guides.flatMap((guide) =>
    guide.path.length === 0
      ? []
      : [
          {
            text: guide.label,
            at: onSheet(sheet, guide.path[guide.path.length - 1]),
            gap: 8,
            colour: 'muted' as const,
          },
        ],
  );
}

export function drawJoints(
  sheet: Sheet,
  joints: readonly PlanJoint[],
  colours: PlanColours,
): Label[] {
  const { context } = sheet;
  return joints.map((joint) => {
    const at = onSheet(sheet, joint.at);
    const [x, y] = at;
    context.save();
    context.strokeStyle = colours.ink;
    context.fillStyle = colours.sheet;
    context.lineWidth = 1.6;
    context.beginPath();
    if (joint.kind === 'slot') context.rect(x - 6, y - 3.5, 12, 7);
    else if (joint.kind === 'weld') context.rect(x - 4, y - 4, 8, 8);
    else context.arc(x, y, joint.kind === 'wheel' || joint.kind === 'roll' ? 6 : 4, 0, 2 * Math.PI);
    context.fill();
    context.stroke();
    if (joint.kind === 'ground-pin') {
      // Short strokes under it: it is fixed to the ground.
      context.beginPath();
      for (const dx of [-6, -1, 4]) {
        context.moveTo(x + dx + 2, y + 6);
        context.lineTo(x + dx - 1, y + 10);
      }
      context.moveTo(x - 7, y + 6);
      context.lineTo(x + 7, y + 6);
      context.stroke();
    }
    context.restore();
    return { text: joint.label, at, gap: 9, colour: 'muted' as const };
  });
}

/** A ring with a dot, joined by a dotted line with its body. */
export function drawCentres(
  sheet: Sheet,
  centres: readonly PlanCentre[],
  colours: PlanColours,
): Label[] {
  const { context } = sheet;
  return centres.map((centre) => {
    const at = onSheet(sheet, centre.at);
    context.save();
    context.strokeStyle = context.fillStyle = colours.spruce;
    if (centre.of !== null) {
      context.lineWidth = 1;
      context.globalAlpha = 0.7;
      context.setLineDash([1.5, 4]);
      strokePath(sheet, [centre.at, centre.of]);
      context.setLineDash([]);
      context.globalAlpha = 1;
    }
    context.lineWidth = 1.8;
    context.beginPath();
    context.arc(at[0], at[1], 7, 0, 2 * Math.PI);
    context.stroke();
    dot(sheet, at, 2.4);
    context.restore();
    return { text: centre.label, at, gap: 12, colour: 'spruce' as const };
  });
}

function dot({ context }: Sheet, [x, y]: readonly [number, number], radius: number): void {
  context.beginPath();
  context.arc(x, y, radius, 0, 2 * Math.PI);
  context.fill();
}
