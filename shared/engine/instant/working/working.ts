import type { Level } from '../model';

/**
 * The derivation of one point's motion, as a person writes it by hand: data for the calculation
 * sheet. Numbers are in SI units and not rounded; `tex` strings are rounded for reading.
 */
export interface Working {
  readonly asked: { readonly body: string; readonly point: string };
  readonly branch: number;
  /** Bodies in the order in which they are solved, the asked one last. */
  readonly chain: readonly string[];
  readonly steps: readonly WorkingStep[];
}

export interface WorkingStep {
  readonly kind: WorkingKind;
  readonly level: Level;
  /** What is done, in plain words, without numbers that the equations give. */
  readonly text: string;
  /** A vector equation is followed by its x and y equations. */
  readonly equations: readonly WorkingEquation[];
  /** Scalar equations written in this step, and what they leave to be found. */
  readonly scalarEquations: number;
  readonly unknowns: readonly WorkingSymbol[];
  readonly results: readonly WorkingQuantity[];
  /** Where the step's numbers come from. */
  readonly uses: readonly Reference[];
  /** The step's vector equation as a polygon: tail of the first arrow at the pole of the drawing. */
  readonly arrows: readonly Arrow[];
}

/**
 * - known: something that was given, as given;
 * - adjusted: a given value as the least-squares adjustment changed it, used from here on;
 * - held: a point that the ground holds, or that moves as another body's point does;
 * - step: a vector equation from one point to another, with its x and y equations;
 * - solve: what the equations of the step before give for the unknowns;
 * - result: the motion of the asked point;
 * - open: the problem does not fix what is asked, and why.
 */
export type WorkingKind = 'known' | 'adjusted' | 'held' | 'step' | 'solve' | 'result' | 'open';

/** A known, a joint, a body, or a point as `body.point`. */
export interface Reference {
  readonly kind: 'known' | 'joint' | 'body' | 'point';
  readonly id: string;
}

export interface WorkingSymbol {
  readonly tex: string;
  /** The same in plain text, for tables and screen readers: "angular velocity of the rod". */
  readonly text: string;
  readonly unit: Unit;
  readonly of: Reference;
}

export type Unit = 'm/s' | 'rad/s' | 'm/s²' | 'rad/s²' | 'm' | 'rad' | '1/m' | '';

export type Factor =
  | { readonly number: number; readonly unit: Unit; readonly from: Reference | null }
  | { readonly symbol: WorkingSymbol };

/** A product with its sign. A factor that occurs twice is a square. */
export interface Term {
  readonly sign: 1 | -1;
  readonly factors: readonly Factor[];
}

export type WorkingEquation =
  | { readonly role: 'vector'; readonly tex: string }
  | {
      readonly role: 'x' | 'y' | 'scalar';
      readonly left: readonly Term[];
      readonly right: readonly Term[];
      readonly tex: string;
    };

export interface WorkingQuantity {
  readonly symbol: WorkingSymbol;
  readonly value: number;
  /** Standard uncertainty; null where it is not asked of this quantity. */
  readonly sigma: number | null;
  readonly tex: string;
}

export interface Arrow {
  readonly tex: string;
  readonly role: 'absolute' | 'relative' | 'result';
  readonly from: readonly [number, number];
  readonly to: readonly [number, number];
}
