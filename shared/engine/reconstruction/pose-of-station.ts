import type { PoseBody, PoseJoint, PoseProblem } from '../documents/pose-problem';
import type { ReconstructionBody, ReconstructionJoint } from '../documents/reconstruction';
import type { StationProblem } from '../documents/station';
import { EngineError } from '../errors';
import { fitPoses } from '../pose/index';
import type { PoseSolution } from '../documents/pose-solution';

export interface StationPose {
  readonly problem: PoseProblem;
  readonly solution: PoseSolution;
  /** Bodies that nothing places at this station. */
  readonly unplaced: readonly string[];
}

/**
 * Fits the poses of the bodies at a station. A body without marks or a stated pose, which no joint
 * holds either, is left out and named; a body with too few marks is an error.
 */
export function poseOfStation(given: StationProblem): StationPose {
  const whole = poseProblemOf(given);
  const unplaced: string[] = [];
  for (;;) {
    const problem = without(whole, unplaced);
    if (problem.marks.length === 0 && !problem.bodies.some(({ stated }) => stated !== undefined))
      throw new EngineError(
        'empty',
        'station.marks',
        'No mark says where a body stood at this station, and no pose is stated.',
      );
    try {
      return { problem, solution: fitPoses(problem), unplaced };
    } catch (error) {
      const loose = looseBody(error, problem);
      if (loose === null) throw error;
      unplaced.push(loose);
    }
  }
}

/** The body that a failed fit names, when it has no evidence of its own. */
function looseBody(error: unknown, problem: PoseProblem): string | null {
  if (!(error instanceof EngineError) || error.code !== 'not-enough-marks') return null;
  const body = problem.bodies.find(({ id }) => error.field === `bodies.${id}`);
  if (body === undefined || body.stated !== undefined) return null;
  return problem.marks.some((mark) => mark.body === body.id) ? null : body.id;
}

function without(problem: PoseProblem, bodies: readonly string[]): PoseProblem {
  if (bodies.length === 0) return problem;
  const stays = (ref: { body: string } | undefined): boolean =>
    ref === undefined || !bodies.includes(ref.body);
  return {
    ...problem,
    bodies: problem.bodies.filter(({ id }) => !bodies.includes(id)),
    joints: problem.joints.filter(
      (joint) => stays(joint.a) && stays('b' in joint ? joint.b : undefined),
    ),
  };
}

export function poseProblemOf({ bodies, joints, station, marks }: StationProblem): PoseProblem {
  const byId = new Map(marks.map((mark) => [mark.id, mark]));
  return {
    format: 'centrode.pose-problem/1',
    bodies: bodies.map((body) => poseBody(body, station.poses)),
    joints: joints
      .filter(({ id }) => !station.joints.off.includes(id))
      .flatMap((joint) => poseJoint(joint)),
    marks: station.marks
      .filter(({ position }) => position)
      .map(({ markId, body, point }) => {
        const mark = byId.get(markId);
        if (mark === undefined)
          throw new EngineError(
            'unknown-reference',
            `station.marks.${markId}`,
            'This mark is not among the marks of the survey.',
          );
        const { id, label, at, covariance } = mark;
        return { id, label, at, covariance, body, point };
      }),
    loss: 'squares',
  };
}

function poseBody(body: ReconstructionBody, poses: StationProblem['station']['poses']): PoseBody {
  const stated = poses.find((pose) => pose.body === body.id);
  return {
    id: body.id,
    label: body.name,
    points: Object.fromEntries(
      body.points.map(({ id, at, sigma }) => [
        id,
        sigma[0] > 0 || sigma[1] > 0 ? { at, sigma } : at,
      ]),
    ),
    ...(stated !== undefined && {
      stated: { x: stated.x, y: stated.y, heading: stated.heading },
    }),
  };
}

/** The joints that say something of where bodies stand; a wheel or a link of any length does not. */
function poseJoint(joint: ReconstructionJoint): PoseJoint[] {
  const { id, a } = joint;
  switch (joint.kind) {
    case 'pin':
    case 'weld':
      return [{ kind: joint.kind, id, a, b: joint.b }];
    case 'ground-pin':
      return joint.at === null
        ? []
        : [{ kind: 'pin', id, a, ground: true, at: joint.at, sigma: joint.sigma }];
    case 'guide': {
      const { at, direction, radius, sigma } = joint;
      return at === null ? [] : [{ kind: 'guide', id, a, at, direction, radius, sigma }];
    }
    case 'slot':
      return [
        { kind: 'slot', id, a, b: joint.b, direction: joint.direction, radius: joint.radius },
      ];
    case 'link':
    case 'wheel':
    case 'roll':
      return [];
  }
}
