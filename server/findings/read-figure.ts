import * as z from 'zod';
import type { Figure, figureChoice } from '#shared/contracts/findings';
import { findQuantity } from '#shared/engine/documents/motion-quantities';
import { motionOf } from '../archive/computation-text';
import type { CaseScope } from '../cases/scope';
import { ComputationRecord } from '../database/models/computation';

type Choice = z.output<typeof figureChoice>;

const titles: Readonly<Record<Choice['quantity'], string>> = {
  speed: 'Speed',
  acceleration: 'Acceleration',
  'angular-velocity': 'Rate of turning',
};

/**
 * Reads a figure from the recorded computation of this case: value and 95 % interval, never typed.
 * Where that cannot be, says why in words for the one who chose it.
 */
export async function readFigure(scope: CaseScope, choice: Choice): Promise<Figure | string> {
  const { caseId } = scope;
  const record = await ComputationRecord.findOne({ where: { caseId, hash: choice.computation } });
  if (!record) return 'This computation is not recorded in this case.';
  const solution = motionOf(record.document);
  if (!solution) return 'This computation holds no motion.';
  const ofBody = choice.quantity === 'angular-velocity';
  if (!ofBody && choice.point === null) return 'Say of which point: body and point.';
  const point = ofBody ? null : choice.point;
  if (!solution.branches.at(choice.branch)) return 'The computation has no such solution.';
  const found = findQuantity(solution, choice.branch, choice.body, point, choice.quantity);
  const what = `${titles[choice.quantity]} of ${[choice.body, point].filter(Boolean).join('.')}`;
  if (!found) return `${what}: the computation does not fix it.`;
  if (found.low === null || found.high === null) {
    return `${what}: the computation gives it no range, and a figure without a range is not published.`;
  }
  const solutions = solution.branches.length;
  return {
    ...choice,
    point,
    title:
      titles[choice.quantity] +
      (solutions > 1 ? ` (solution ${choice.branch + 1} of ${solutions})` : ''),
    pointName: nameOf(record.document, choice.body, point),
    stationName: record.stationName,
    value: found.value,
    low: found.low,
    high: found.high,
  };
}

/** What the recorded input calls its bodies and points. */
const named = z.object({
  input: z.object({
    bodies: z.array(
      z.object({
        id: z.string(),
        name: z.string(),
        points: z.array(z.object({ id: z.string(), name: z.string() })),
      }),
    ),
  }),
});

/** "centre of gravity, car": as people call point and body; their keys where there are no names. */
function nameOf(document: string, bodyId: string, pointId: string | null): string {
  const { data } = named.safeParse(JSON.parse(document));
  const body = data?.input.bodies.find(({ id }) => id === bodyId);
  const bodyName = body?.name ?? bodyId;
  if (pointId === null) return bodyName;
  return `${body?.points.find(({ id }) => id === pointId)?.name ?? pointId}, ${bodyName}`;
}
