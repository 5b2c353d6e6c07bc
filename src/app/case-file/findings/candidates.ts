import * as z from 'zod';
import type { Figure, figureChoice } from '#shared/contracts/findings';
import { quantitiesOf } from '#shared/engine/documents/motion-quantities';
import { type MotionSolution, motionSolution } from '#shared/engine/documents/motion-solution';
import type { ReconstructionDocument } from '#shared/engine/documents/reconstruction';

export type Choice = z.output<typeof figureChoice>;

/** A figure that a recorded computation offers; the server reads it anew when the findings are saved. */
export interface Candidate extends Figure {
  readonly key: string;
}

const titles: Record<Figure['quantity'], string> = {
  speed: 'Speed',
  acceleration: 'Acceleration',
  'angular-velocity': 'Rate of turning',
};

const isPublished = (name: string): name is Figure['quantity'] => name in titles;

/** The motion in a recorded computation; null when it holds none. */
export function solutionIn(document: unknown): MotionSolution | null {
  const result = z.object({ result: z.unknown() }).safeParse(document).data?.result;
  const parts =
    typeof result === 'object' && result !== null
      ? [result, ...(Object.values(result) as unknown[])]
      : [];
  for (const part of parts) {
    const solution = motionSolution.safeParse(part);
    if (solution.success) return solution.data;
  }
  return null;
}

/** Every figure with a range that a computation fixes, in the order of the document. */
export function candidatesOf(
  solution: MotionSolution,
  computation: { readonly hash: string; readonly stationName: string },
  names: ReconstructionDocument | null,
): Candidate[] {
  const solutions = solution.branches.length;
  return solution.branches.flatMap((branch, index) =>
    quantitiesOf(branch).flatMap(({ body, point, name, value, low, high }): Candidate[] => {
      if (!isPublished(name) || low === null || high === null) return [];
      const choice: Choice = {
        computation: computation.hash,
        quantity: name,
        body,
        point,
        branch: index,
      };
      return [
        {
          ...choice,
          key: keyOf(choice),
          title:
            solutions > 1
              ? `${titles[name]} (solution ${index + 1} of ${solutions})`
              : titles[name],
          pointName: nameOf(names, body, point),
          stationName: computation.stationName,
          value,
          low,
          high,
        },
      ];
    }),
  );
}

export const keyOf = ({ computation, quantity, body, point, branch }: Choice): string =>
  [computation, quantity, body, point ?? '', branch].join('/');

export const choiceOf = ({ computation, quantity, body, point, branch }: Choice): Choice => ({
  computation,
  quantity,
  body,
  point,
  branch,
});

function nameOf(
  names: ReconstructionDocument | null,
  bodyId: string,
  pointId: string | null,
): string {
  const body = names?.bodies.find((one) => one.id === bodyId);
  const bodyName = body?.name ?? bodyId;
  if (pointId === null) return bodyName;
  return `${body?.points.find((one) => one.id === pointId)?.name ?? pointId}, ${bodyName}`;
}
