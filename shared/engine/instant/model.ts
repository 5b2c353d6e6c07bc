import type { Vector } from '../geometry/vector';

/**
 * A motion problem made ready for computing.
 *
 * Everything that has a value stands in one vector `g`: poses, body points, dimensions of joints
 * and the values of the knowns, so that uncertainty is propagated in one way from all of them.
 * Poses are kept at the centroid of each body's points, and the scene's origin at the centroid of
 * all bodies, so that a far origin costs no digits. The ground is the last body, which never moves.
 */
export interface Model {
  readonly bodies: readonly ModelBody[];
  /** Index of the ground, which is also the number of bodies. */
  readonly ground: number;
  readonly g: Float64Array;
  /** Step of each element of `g` that changes the equations by about a thousandth. */
  readonly steps: Float64Array;
  readonly joints: readonly ModelJoint[];
  readonly knowns: readonly ModelKnown[];
  readonly noises: readonly Noise[];
  /** Scene position of the point that is the origin here, m. */
  readonly centre: Vector;
}

export interface ModelBody {
  readonly id: string;
  readonly name: string;
  /** Length that makes ω comparable with velocities, m. */
  readonly length: number;
  readonly follows: boolean;
  readonly origin: Place;
  readonly points: ReadonlyMap<string, Place>;
}

/** A point fixed in a body: `at` is where its two body coordinates stand in `g`. */
export interface Place {
  readonly body: number;
  readonly at: number;
}

/** Numbers named `…At` are places in `g`; −1 stands for none. */
export type ModelJoint = { readonly id: string; readonly index: number } & (
  | { readonly kind: 'pin' | 'weld'; readonly a: Place; readonly b: Place }
  | ModelPath
  | ModelLink
  | ModelWheel
  | ModelGear
);

/** Guide, slot, or a wheel's centre along a surface: point a moves along a path fixed in b's body. */
export interface ModelPath {
  readonly kind: 'path';
  readonly document: 'guide' | 'slot' | 'roll';
  readonly a: Place;
  readonly b: Place;
  readonly directionAt: number;
  readonly radiusAt: number;
  /** Radius of the rolling part, for rolling contact. */
  readonly rollingAt: number;
  /**
   * The direction is that of the path where the point is, wherever that may be; otherwise the path
   * stands where it stands, and the direction at the point follows from its curvature.
   */
  readonly atPoint: boolean;
}

export interface ModelLink {
  readonly kind: 'link';
  readonly a: Place;
  readonly b: Place;
  readonly rateAt: number;
  readonly rateChangeAt: number;
}

export interface ModelWheel {
  readonly kind: 'wheel';
  readonly a: Place;
  readonly steerAt: number;
  readonly steerRateAt: number;
}

/** Two round parts that roll on each other. */
export interface ModelGear {
  readonly kind: 'gear';
  readonly a: Place;
  readonly b: Place;
  readonly radiusAt: number;
  readonly otherRadiusAt: number;
}

export type Level = 'velocity' | 'acceleration';

export interface KnownPart {
  readonly part: 'x' | 'y' | 'magnitude' | 'direction' | 'curvature' | 'value';
  readonly at: number;
}

export type ModelKnown = {
  readonly id: string;
  readonly index: number;
  readonly level: Level;
  readonly parts: readonly KnownPart[];
} & (
  | { readonly kind: 'components'; readonly a: Place; readonly xAt: number }
  | {
      readonly kind: 'polar';
      readonly a: Place;
      readonly magnitudeAt: number;
      readonly directionAt: number;
      readonly line: boolean;
    }
  /** Normal acceleration of a point whose mark has this curvature. */
  | {
      readonly kind: 'curvature';
      readonly a: Place;
      readonly directionAt: number;
      readonly curvatureAt: number;
    }
  | { readonly kind: 'angular'; readonly body: number; readonly valueAt: number }
  | { readonly kind: 'slide'; readonly joint: ModelJoint; readonly valueAt: number }
);

/** An independent cause of uncertainty of unit variance: how far it moves elements of `g`. */
export interface Noise {
  readonly source: { readonly kind: 'pose' | 'point' | 'joint' | 'known'; readonly id: string };
  readonly entries: readonly { readonly at: number; readonly amount: number }[];
}

/** Values, turned headings, and the motion about which the equations are written. */
export interface State {
  readonly g: Float64Array;
  readonly cos: Float64Array;
  readonly sin: Float64Array;
  /** v_x, v_y, ω of every body at its centroid, the ground last with zeros. */
  readonly velocity: Float64Array;
  /** a_x, a_y, α likewise. */
  readonly acceleration: Float64Array;
}

export const stateOf = (model: Model, g: Float64Array = model.g): State => {
  const size = model.ground + 1;
  const state: State = {
    g,
    cos: new Float64Array(size),
    sin: new Float64Array(size),
    velocity: new Float64Array(3 * size),
    acceleration: new Float64Array(3 * size),
  };
  for (let b = 0; b < size; b++) turn(state, b);
  return state;
};

/** Takes up a changed heading of body b. */
export const turn = (state: State, b: number): void => {
  state.cos[b] = Math.cos(state.g[3 * b + 2]);
  state.sin[b] = Math.sin(state.g[3 * b + 2]);
};

/** Scene vector from the centroid of the body to the place, x and y apart to spare allocation. */
export const armX = (s: State, p: Place): number =>
  s.cos[p.body] * s.g[p.at] - s.sin[p.body] * s.g[p.at + 1];
export const armY = (s: State, p: Place): number =>
  s.sin[p.body] * s.g[p.at] + s.cos[p.body] * s.g[p.at + 1];

export const positionX = (s: State, p: Place): number => s.g[3 * p.body] + armX(s, p);
export const positionY = (s: State, p: Place): number => s.g[3 * p.body + 1] + armY(s, p);
