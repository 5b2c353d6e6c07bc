import type { ReconstructionJoint } from '#shared/engine/documents/reconstruction';
import type { PointRef } from './point-select';

export type JointKind = ReconstructionJoint['kind'];

/** What each kind of joint says, in the trade's words. */
export const jointKinds: Readonly<Record<JointKind, { name: string; says: string }>> = {
  pin: { name: 'Pin', says: 'Two bodies share a point and turn about it.' },
  'ground-pin': { name: 'Pin to the ground', says: 'A body turns about a fixed point.' },
  weld: { name: 'Weld', says: 'Two bodies move as one.' },
  guide: { name: 'Guide', says: 'A point moves along a path that is fixed in the scene.' },
  slot: { name: 'Slot', says: 'A point moves along a slot in another body.' },
  link: {
    name: 'Link',
    says: 'Two points keep their distance, or change it at a known rate (a strut, a ram).',
  },
  wheel: { name: 'Wheel', says: 'The point does not slip sideways.' },
  roll: { name: 'Rolling contact', says: 'A round part rolls on the ground without slip.' },
};

export const jointKindNames = Object.keys(jointKinds) as JointKind[];

/** A joint of a kind, keeping what the one before already says. */
export function jointOf(
  kind: JointKind,
  id: string,
  a: PointRef,
  b: PointRef,
): ReconstructionJoint {
  switch (kind) {
    case 'pin':
    case 'weld':
      return { kind, id, a, b };
    case 'ground-pin':
      return { kind, id, a, at: null, sigma: 0.01 };
    case 'guide':
      return { kind, id, a, direction: 0, radius: null, at: null, sigma: 0.01 };
    case 'slot':
      return { kind, id, a, b, direction: 0, radius: null };
    case 'link':
      return { kind, id, a, b, rate: 0, rateChange: 0 };
    case 'wheel':
      return { kind, id, a, steer: 0, steerRate: 0 };
    case 'roll':
      return { kind, id, a, radius: 0.3, surface: 0 };
  }
}
