import type { ReconstructionKnown } from '#shared/engine/documents/reconstruction';
import type { PointRef } from './point-select';

/** What a known speaks of. */
export const quantities = {
  velocity: 'Velocity of a point',
  acceleration: 'Acceleration of a point',
  'angular-velocity': 'Turning of a body, ω',
  'angular-acceleration': 'Change of turning of a body, α',
} as const;
export type Quantity = keyof typeof quantities;

/** How much of a vector is known. */
export const extents = {
  magnitude: 'Magnitude only',
  direction: 'Direction only',
  both: 'Magnitude and direction',
  components: 'Both components',
} as const;
export type Extent = keyof typeof extents;

export const quantityNames = Object.keys(quantities) as Quantity[];
export const extentNames = Object.keys(extents) as Extent[];

export function quantityOf(known: ReconstructionKnown): Quantity {
  switch (known.quantity) {
    case 'velocity-components':
      return 'velocity';
    case 'acceleration-components':
      return 'acceleration';
    default:
      return known.quantity;
  }
}

/** null for a known of a body, which is one number. */
export function extentOf(known: ReconstructionKnown): Extent | null {
  if ('value' in known) return null;
  if ('x' in known) return 'components';
  if (known.magnitude === null) return 'direction';
  return known.direction === null ? 'magnitude' : 'both';
}

/** "known, direction only": the same words on the sheet and in the form. */
export function extentWords(known: ReconstructionKnown): string {
  switch (extentOf(known)) {
    case 'magnitude':
      return 'known, magnitude only';
    case 'direction':
      return 'known, direction only';
    case 'both':
    case 'components':
      return 'known, both';
    case null:
      return 'known, value';
  }
}

const usual = {
  speed: { value: 10, sigma: 0.5 },
  acceleration: { value: 0, sigma: 0.5 },
  direction: { value: 0, sigma: 0.02 },
  turning: { value: 0, sigma: 0.1 },
};

/** A known of this kind, keeping the point or body and the basis of the one before. */
export function knownOf(
  quantity: Quantity,
  extent: Extent,
  id: string,
  at: PointRef,
  basis: string,
): ReconstructionKnown {
  if (quantity === 'angular-velocity' || quantity === 'angular-acceleration') {
    return { quantity, id, body: at.body, value: usual.turning, basis };
  }
  const magnitude = quantity === 'velocity' ? usual.speed : usual.acceleration;
  if (extent === 'components') {
    const x = { ...magnitude, value: 0 };
    return { quantity: `${quantity}-components`, id, at, x, y: x, basis };
  }
  return {
    quantity,
    id,
    at,
    magnitude: extent === 'direction' ? null : magnitude,
    direction: extent === 'magnitude' ? null : usual.direction,
    line: false,
    basis,
  };
}
