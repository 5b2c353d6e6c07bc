import type { BodyPoint, Joint, Known, MotionProblem } from '../documents/motion-problem';
import type { PoseSolution } from '../documents/pose-solution';
import type {
  ReconstructionBody,
  ReconstructionJoint,
  ReconstructionKnown,
} from '../documents/reconstruction';
import type { MarkDirection, StationProblem } from '../documents/station';
import { add, direction, scale, subtract, turnLeft, unit, wrap } from '../geometry/vector';

export interface StationMotion {
  readonly problem: MotionProblem;
  readonly warnings: readonly string[];
}

/**
 * The motion problem of a station: fitted poses with their joint covariance, joints that act, what
 * is stated of the motion, and the tangents of traces as directions of the points that made them.
 *
 * One correlation is left out: that between a heading and a tangent that come from marks of the
 * same trace. A heading takes the places of single marks, a tangent the differences of neighbouring
 * ones, so that they share little.
 */
export function motionOfStation(
  { bodies, joints, station, marks }: StationProblem,
  pose: PoseSolution,
  directions: readonly MarkDirection[],
): StationMotion {
  const placed = (body: string): boolean => Object.hasOwn(pose.bodies, body);
  const warnings: string[] = [];
  const knowns: Known[] = [];
  for (const known of station.knowns) {
    const body = 'body' in known ? known.body : known.at.body;
    if (placed(body)) knowns.push(motionKnown(known));
    else warnings.push(`The known "${known.id}" is left out: nothing says where "${body}" stood.`);
  }
  const labels = new Map(marks.map(({ id, label }) => [id, label]));
  for (const { mark, body, point, trace, direction: along, sigma } of directions)
    if (placed(body))
      knowns.push({
        id: `${mark}:${body}.${point}`,
        label: `Tangent of trace ${trace} at ${labels.get(mark) ?? mark}`,
        source: mark,
        quantity: 'velocity',
        at: { body, point },
        direction: along,
        sigma: { direction: sigma },
      });
  const { matrix } = pose.covariance;
  const uncertain = matrix.some((row) => row.some((value) => value !== 0));
  return {
    warnings,
    problem: {
      format: 'centrode.motion-problem/1',
      bodies: bodies
        .filter(({ id }) => placed(id))
        .map((body) => ({
          id: body.id,
          label: body.name,
          pose: pose.bodies[body.id].pose,
          points: motionPoints(body, pose),
        })),
      joints: joints
        .filter(({ id }) => !station.joints.off.includes(id))
        .filter((joint) => placed(joint.a.body) && (!('b' in joint) || placed(joint.b.body)))
        .map((joint) => motionJoint(joint, pose)),
      knowns,
      ...(uncertain && { poseCovariance: pose.covariance }),
    },
  };
}

/**
 * Dimensions as the fit left them, since it is those that close the joints; their uncertainty is in
 * the joint covariance, with its correlation to the poses.
 */
function motionPoints(body: ReconstructionBody, pose: PoseSolution): Record<string, BodyPoint> {
  return Object.fromEntries(
    body.points.map(({ id, at }) => {
      const key = `${body.id}.${id}`;
      return [id, Object.hasOwn(pose.dimensions, key) ? pose.dimensions[key].at : at];
    }),
  );
}

function motionJoint(joint: ReconstructionJoint, pose: PoseSolution): Joint {
  const { id, a } = joint;
  switch (joint.kind) {
    case 'ground-pin':
      return { kind: 'pin', id, a, ground: true };
    case 'guide':
      return {
        kind: 'guide',
        id,
        a,
        direction: guideDirection(joint, pose),
        radius: joint.radius,
      };
    case 'pin':
    case 'weld':
    case 'slot':
    case 'link':
    case 'wheel':
      return joint;
    case 'roll':
      return { ...joint, ground: true };
  }
}

/** Direction of a curved guide where its point stands now; a straight one has the same everywhere. */
function guideDirection(
  { a, at, direction: along, radius }: Extract<ReconstructionJoint, { kind: 'guide' }>,
  pose: PoseSolution,
): number {
  if (radius === null || at === null) return along;
  const centre = add(at, scale(radius, turnLeft(unit(along))));
  const out = direction(subtract(pose.points[`${a.body}.${a.point}`].at, centre));
  return wrap(out + (Math.sign(radius) * Math.PI) / 2);
}

/** A known without uncertainty is exact, which the motion problem says by leaving σ out. */
const ifUncertain = (sigma: number): { sigma?: number } => (sigma > 0 ? { sigma } : {});

function motionKnown(known: ReconstructionKnown): Known {
  const named = { id: known.id, ...(known.basis !== '' && { source: known.basis }) };
  switch (known.quantity) {
    case 'velocity':
    case 'acceleration': {
      const { at, magnitude, direction: along, line } = known;
      const sigma = {
        ...(magnitude !== null && magnitude.sigma > 0 && { magnitude: magnitude.sigma }),
        ...(along !== null && along.sigma > 0 && { direction: along.sigma }),
      };
      return {
        ...named,
        quantity: known.quantity,
        at,
        ...(magnitude !== null && { magnitude: magnitude.value }),
        ...(along !== null && { direction: along.value, ...(line && { line }) }),
        ...(Object.keys(sigma).length > 0 && { sigma }),
      };
    }
    case 'velocity-components':
    case 'acceleration-components': {
      const { at, x, y } = known;
      const quantity = known.quantity === 'velocity-components' ? 'velocity' : 'acceleration';
      return {
        ...named,
        quantity,
        at,
        components: [x.value, y.value],
        ...((x.sigma > 0 || y.sigma > 0) && { sigma: [x.sigma, y.sigma] }),
      };
    }
    case 'angular-velocity':
    case 'angular-acceleration':
      return {
        ...named,
        quantity: known.quantity,
        body: known.body,
        value: known.value.value,
        ...ifUncertain(known.value.sigma),
      };
  }
}
