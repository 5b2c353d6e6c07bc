import type { MotionBranch } from '#shared/engine/documents/motion-solution';
import type {
  ReconstructionBody,
  ReconstructionDocument,
  Station,
} from '#shared/engine/documents/reconstruction';
import { type Pose, rotate, toScene, unit } from '#shared/engine/geometry/vector';
import type {
  PlanBody,
  PlanCentre,
  PlanGuide,
  PlanJoint,
  PlanPoint,
  PlanVector,
} from '../../ui/scale-plan/plan-content';
import { keyOf } from './names';

/** Poses of the bodies at one station, by body id. */
export type Poses = Readonly<Record<string, Pose>>;

/** Where the bodies stand at a station. A body without an outline is drawn through its points. */
export function planBodies(
  document: ReconstructionDocument,
  station: Pick<Station, 'id' | 'name'>,
  poses: Poses,
  ghost: boolean,
): PlanBody[] {
  return document.bodies.flatMap((body) => {
    const pose = poses[body.id];
    if (pose === undefined) return [];
    return [
      {
        id: `${station.id}.${body.id}`,
        label: document.bodies.length > 1 ? `${station.id} ${body.name}` : station.id,
        outline: outlineOf(body).map((corner) => toScene(pose, corner)),
        points: ghost
          ? []
          : body.points.map((point) => ({ label: point.id, at: toScene(pose, point.at) })),
        ghost,
      },
    ];
  });
}

function outlineOf(body: ReconstructionBody): readonly PlanPoint[] {
  return body.outline.length > 0 ? body.outline : body.points.map((point) => point.at);
}

/** Velocities of the named points; those of the asked one stand out by their label. */
export function planVectors(
  document: ReconstructionDocument,
  branch: MotionBranch,
  shows: { readonly velocity: boolean; readonly acceleration: boolean },
): PlanVector[] {
  return document.bodies.flatMap((body) =>
    body.points.flatMap((point): PlanVector[] => {
      const key = keyOf({ body: body.id, point: point.id });
      const motion = branch.points[key];
      if (motion === undefined) return [];
      const vectors: PlanVector[] = [];
      if (shows.velocity && motion.velocity !== null) {
        vectors.push({
          id: `v ${key}`,
          kind: 'velocity',
          from: motion.position,
          value: motion.velocity,
          label: '',
        });
      }
      if (shows.acceleration && motion.acceleration !== null) {
        vectors.push({
          id: `a ${key}`,
          kind: 'acceleration',
          from: motion.position,
          value: motion.acceleration,
          label: '',
        });
      }
      return vectors;
    }),
  );
}

/** The instantaneous centres, each tied to the origin of its body. */
export function planCentres(
  document: ReconstructionDocument,
  station: Pick<Station, 'id'>,
  branch: MotionBranch,
  poses: Poses,
): PlanCentre[] {
  return document.bodies.flatMap((body) => {
    const pole = branch.bodies[body.id]?.pole ?? null;
    const pose = poses[body.id];
    if (pole === null || pose === undefined) return [];
    const name = document.bodies.length > 1 ? ` of ${body.name}` : '';
    return [
      {
        id: body.id,
        label: `instantaneous centre${name}, ${station.id}`,
        at: pole,
        of: [pose.x, pose.y],
      },
    ];
  });
}

const jointSigns: Readonly<Record<string, PlanJoint['kind']>> = {
  pin: 'pin',
  'ground-pin': 'ground-pin',
  weld: 'weld',
  slot: 'slot',
  wheel: 'wheel',
  roll: 'roll',
};

/** The joints that hold at the station, where their points stand. */
export function planJoints(
  document: ReconstructionDocument,
  station: Station,
  poses: Poses,
): PlanJoint[] {
  return document.joints.flatMap((joint) => {
    const kind = jointSigns[joint.kind];
    const at = scenePoint(document, poses, joint.a);
    if (kind === undefined || at === null || station.joints.off.includes(joint.id)) return [];
    return [{ id: joint.id, kind, at, label: joint.id }];
  });
}

/** Guides and links as lines of construction. */
export function planGuides(
  document: ReconstructionDocument,
  station: Station,
  poses: Poses,
): PlanGuide[] {
  return document.joints.flatMap((joint): PlanGuide[] => {
    const a = scenePoint(document, poses, joint.a);
    if (a === null || station.joints.off.includes(joint.id)) return [];
    if (joint.kind === 'guide') {
      const at = joint.at ?? a;
      return [{ id: joint.id, label: joint.id, path: pathOf(at, joint.direction, joint.radius) }];
    }
    const b = joint.kind === 'link' ? scenePoint(document, poses, joint.b) : null;
    return b === null ? [] : [{ id: joint.id, label: joint.id, path: [a, b] }];
  });
}

/** Two metres of a straight path to each side, or a quarter of a curved one. */
function pathOf(at: PlanPoint, direction: number, radius: number | null): PlanPoint[] {
  const along = unit(direction);
  if (radius === null) {
    return [-2, 2].map((s) => [at[0] + s * along[0], at[1] + s * along[1]]);
  }
  const centre = [at[0] - radius * along[1], at[1] + radius * along[0]];
  return Array.from({ length: 17 }, (_, i) => {
    const [x, y] = rotate(((i - 8) * Math.PI) / 32, [at[0] - centre[0], at[1] - centre[1]]);
    return [centre[0] + x, centre[1] + y];
  });
}

function scenePoint(
  document: ReconstructionDocument,
  poses: Poses,
  ref: { body: string; point: string },
): PlanPoint | null {
  const body = document.bodies.find((one) => one.id === ref.body);
  const point = body?.points.find((one) => one.id === ref.point);
  const pose = poses[ref.body];
  return point === undefined || pose === undefined ? null : toScene(pose, point.at);
}

/** The named point that lies nearest to a place of the plan, within `reach` metres. */
export function nearestPoint(
  document: ReconstructionDocument,
  poses: Poses,
  place: PlanPoint,
  reach: number,
): string | null {
  let best: { key: string; distance: number } | null = null;
  for (const body of document.bodies) {
    for (const point of body.points) {
      const at = scenePoint(document, poses, { body: body.id, point: point.id });
      if (at === null) continue;
      const distance = Math.hypot(at[0] - place[0], at[1] - place[1]);
      if (distance <= reach && distance < (best?.distance ?? Infinity)) {
        best = { key: keyOf({ body: body.id, point: point.id }), distance };
      }
    }
  }
  return best?.key ?? null;
}
