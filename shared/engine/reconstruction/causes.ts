import type { ReconstructionKnown } from '../documents/reconstruction';
import type { StationProblem } from '../documents/station';
import type { Contribution } from '../documents/station-uncertainty';
import { add, scale, turnLeft, unit, type Vector } from '../geometry/vector';

/**
 * One independent cause of uncertainty with unit variance: how the problem looks when it has the
 * value z instead of 0. A mark has two, along the axes of its covariance.
 */
export interface Cause {
  readonly kind: Contribution['kind'];
  readonly id: string;
  readonly label: string;
  readonly move: (problem: StationProblem, z: number) => StationProblem;
}

type Pair = [number, number];

const shifted = (at: Vector, by: Vector, z: number): Pair => {
  const [x, y] = add(at, scale(z, by));
  return [x, y];
};

const replaced = <T extends { id: string }>(
  items: readonly T[],
  id: string,
  change: (item: T) => T,
): T[] => items.map((item) => (item.id === id ? change(item) : item));

/** Every uncertain input of a station, as causes. */
export const causesOf = (problem: StationProblem): readonly Cause[] => [
  ...problem.marks.flatMap(markCauses),
  ...problem.bodies.flatMap((body) =>
    body.points.flatMap((point) =>
      point.sigma.flatMap((sigma, axis) =>
        sigma > 0 ? [dimensionCause(body.id, body.name, point.id, axis, sigma)] : [],
      ),
    ),
  ),
  ...problem.joints
    .filter(({ id }) => !problem.station.joints.off.includes(id))
    .flatMap(jointCauses),
  ...problem.station.poses.flatMap((pose) =>
    (['x', 'y', 'heading'] as const).flatMap((part) =>
      pose[part].sigma > 0 ? [statedCause(pose.body, part, pose[part].sigma)] : [],
    ),
  ),
  ...problem.station.knowns.flatMap(knownCauses),
];

/** Columns of the lower Cholesky factor of the mark's covariance. */
function markCauses({ id, label, covariance }: StationProblem['marks'][number]): Cause[] {
  const [[a, b], [, d]] = covariance;
  const first = Math.sqrt(a);
  const columns: Vector[] = [
    [first, b / first],
    [0, Math.sqrt(Math.max(0, d - (b / first) ** 2))],
  ];
  return columns.map((column) => ({
    kind: 'mark',
    id,
    label,
    move: (problem, z) => ({
      ...problem,
      marks: replaced(problem.marks, id, (mark) => ({ ...mark, at: shifted(mark.at, column, z) })),
    }),
  }));
}

function dimensionCause(
  body: string,
  bodyName: string,
  point: string,
  axis: number,
  sigma: number,
): Cause {
  const by: Vector = axis === 0 ? [sigma, 0] : [0, sigma];
  return {
    kind: 'dimension',
    id: `${body}.${point}`,
    label: `${point} of ${bodyName}`,
    move: (problem, z) => ({
      ...problem,
      bodies: replaced(problem.bodies, body, (found) => ({
        ...found,
        points: replaced(found.points, point, (one) => ({ ...one, at: shifted(one.at, by, z) })),
      })),
    }),
  };
}

function jointCauses(joint: StationProblem['joints'][number]): Cause[] {
  if ((joint.kind !== 'ground-pin' && joint.kind !== 'guide') || joint.at === null) return [];
  if (joint.sigma === 0) return [];
  const { at, sigma, id } = joint;
  const ways: Vector[] =
    joint.kind === 'guide'
      ? [turnLeft(unit(joint.direction))]
      : [
          [1, 0],
          [0, 1],
        ];
  return ways.map((way) => ({
    kind: 'joint',
    id,
    label: id,
    move: (problem, z) => ({
      ...problem,
      joints: replaced(problem.joints, id, (found) =>
        'at' in found ? { ...found, at: shifted(at, scale(sigma, way), z) } : found,
      ),
    }),
  }));
}

function statedCause(body: string, part: 'x' | 'y' | 'heading', sigma: number): Cause {
  return {
    kind: 'stated pose',
    id: body,
    label: `stated pose of ${body}`,
    move: (problem, z) => ({
      ...problem,
      station: {
        ...problem.station,
        poses: problem.station.poses.map((pose) =>
          pose.body === body
            ? { ...pose, [part]: { ...pose[part], value: pose[part].value + z * sigma } }
            : pose,
        ),
      },
    }),
  };
}

function knownCauses(known: ReconstructionKnown): Cause[] {
  const cause = (
    change: (known: ReconstructionKnown, z: number) => ReconstructionKnown,
  ): Cause => ({
    kind: 'known',
    id: known.id,
    label: known.id,
    move: (problem, z) => ({
      ...problem,
      station: {
        ...problem.station,
        knowns: replaced(problem.station.knowns, known.id, (found) => change(found, z)),
      },
    }),
  });
  const parts = Object.entries(known).filter(
    (entry): entry is [string, { value: number; sigma: number }] => isUncertain(entry[1]),
  );
  return parts.map(([part, { value, sigma }]) =>
    cause((found, z) => ({ ...found, [part]: { value: value + z * sigma, sigma } })),
  );
}

const isUncertain = (part: unknown): boolean =>
  typeof part === 'object' &&
  part !== null &&
  'sigma' in part &&
  typeof part.sigma === 'number' &&
  part.sigma > 0;
