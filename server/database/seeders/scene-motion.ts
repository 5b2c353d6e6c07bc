import type { Mark } from '#shared/contracts/survey';
import type {
  ReconstructionDocument,
  ReconstructionJoint,
  ReconstructionKnown,
} from '#shared/engine/documents/reconstruction';
import type { Scene } from './scene';

type Joint = Scene['reconstruction']['joints'][number];
type Known = Scene['reconstruction']['stations'][number]['knowns'][number];

/** The reconstruction of a sample scene as the document that an investigator would have made. */
export function reconstructionOf(scene: Scene, marks: readonly Mark[]): ReconstructionDocument {
  const { bodies, joints, stations } = scene.reconstruction;
  const byLabel = new Map(marks.map((mark) => [mark.label, mark]));
  return {
    format: 'centrode.reconstruction/1',
    bodies: bodies.map((body) => ({
      id: body.id,
      name: body.name,
      points: Object.entries(body.points).map(([id, { at, sigma, title }]) => ({
        id,
        name: title,
        at,
        sigma,
      })),
      outline: body.outline,
    })),
    joints: joints.map(jointOf),
    stations: stations.map((station) => ({
      id: station.id,
      name: station.title.slice(0, 80),
      marks: station.marks.flatMap(({ survey, body, point }) => {
        const mark = byLabel.get(survey);
        if (!mark) throw new Error(`${scene.title}: no mark ${survey}`);
        // A mark on a trace tells where the point was and which way it went.
        return [{ markId: mark.id, body, point, position: true, direction: mark.trace !== null }];
      }),
      poses: [],
      joints: {
        off: joints
          .filter((joint) => joint.stations && !joint.stations.includes(station.id))
          .map((joint) => joint.id),
      },
      knowns: station.knowns.map(knownOf),
    })),
  };
}

function jointOf(joint: Joint): ReconstructionJoint {
  const { id, a, b } = joint;
  const measured = { at: joint.at ?? null, sigma: joint.sigma ?? 0 };
  if (joint.kind === 'pin' && joint.ground) {
    return { kind: 'ground-pin', id, a, ...measured };
  }
  if (joint.kind === 'pin' && b) return { kind: 'pin', id, a, b };
  if (joint.kind === 'guide') {
    return {
      kind: 'guide',
      id,
      a,
      direction: joint.direction ?? 0,
      radius: joint.radius ?? null,
      ...measured,
    };
  }
  return { kind: 'wheel', id, a, steer: joint.steer ?? 0, steerRate: 0 };
}

function knownOf(known: Known): ReconstructionKnown {
  const { id, title: basis, at, body } = known;
  const sigma = typeof known.sigma === 'object' ? known.sigma : {};
  const uncertain = (value: number | undefined, s: number | undefined) =>
    value === undefined ? null : { value, sigma: s ?? 0 };
  if (known.quantity === 'angular-velocity' || known.quantity === 'angular-acceleration') {
    return {
      quantity: known.quantity,
      id,
      body: body ?? '',
      value: {
        value: known.value ?? 0,
        sigma: typeof known.sigma === 'number' ? known.sigma : 0,
      },
      basis,
    };
  }
  if (!at) throw new Error(`known ${id} names no point`);
  if (known.components) {
    const [x, y] = known.components;
    const s = typeof known.sigma === 'number' ? known.sigma : 0;
    return {
      quantity: `${known.quantity}-components`,
      id,
      at,
      x: { value: x, sigma: s },
      y: { value: y, sigma: s },
      basis,
    };
  }
  return {
    quantity: known.quantity,
    id,
    at,
    magnitude: uncertain(known.magnitude, sigma.magnitude),
    direction: uncertain(known.direction, sigma.direction),
    line: false,
    basis,
  };
}
