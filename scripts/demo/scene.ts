/**
 * `scene.json`: one whole demo case as plain data, so that a seeder needs nothing but the folder.
 * SI units and radians throughout (survey files keep the units that their headers state); times are
 * ISO 8601 with the offset of the place. The parts named as in the engine's documents mean the same.
 */
import type { Vec2 } from './plane-motion';

export type Covariance2 = readonly [readonly [number, number], readonly [number, number]];

export interface Party {
  id: string;
  name: string;
  role: 'claimant' | 'defendant';
  attorney: string;
}

export interface SceneFileEntry {
  path: string;
  title: string;
  mediaType: string;
  bytes: number;
  sha256: string;
}

export interface Exhibit {
  number: number;
  kind:
    'physical-item' | 'photograph-set' | 'document' | 'survey-data' | 'recorder-data' | 'sample';
  title: string;
  description: string;
  source: string;
  collectedBy: string;
  collectedAt: string;
  condition: string;
  packaging: string | null;
  seal: string | null;
  sensitivity: 'ordinary' | 'sensitive';
  parent: number | null;
  location: string;
  files: SceneFileEntry[];
}

export interface CustodyEntry {
  exhibit: number;
  kind:
    | 'collected'
    | 'received'
    | 'stored'
    | 'handed-over'
    | 'accepted'
    | 'opened'
    | 'sealed'
    | 'examined';
  at: string;
  from: string | null;
  to: string | null;
  purpose: string;
  sealBefore: string | null;
  sealAfter: string | null;
  location: string;
}

export interface PhotographEntry {
  file: string;
  number: number;
  title: string;
  takenAt: string;
  takenBy: string;
  sensitive: boolean;
  /** Survey points that can be seen, with their pixel (from the top left corner), for rectifying. */
  visible: { survey: string; pixel: Vec2 }[];
}

export interface SurveyDescription {
  file: string;
  lengthUnit: 'm' | 'mm';
  delimiter: ',' | ';';
  /** Column header of each meaning; null where the file has no such column. */
  columns: {
    id: string;
    code: string;
    string: string | null;
    sequence: string | null;
    x: string;
    y: string;
    height: string | null;
    sigmaX: string;
    sigmaY: string;
    remark: string;
  };
  sigmaUnit: 'mm';
  instrument: string;
  surveyedBy: string;
  surveyedAt: string;
  codes: Record<string, string>;
  controlPoints: string[];
  /** Lines of the plan that are not traces: edges, centre line, machine outlines. */
  lines: { string: string; title: string; points: string[] }[];
}

export interface SceneBody {
  id: string;
  name: string;
  colour: string;
  points: Record<string, { at: Vec2; sigma: Vec2; title: string }>;
  outline: Vec2[];
  mass: { value: number; sigma: number } | null;
  inertia: { value: number; sigma: number } | null;
}

/** Joints and knowns have the fields of `centrode.motion-problem/1`, with a title for people. */
export interface Joint {
  id: string;
  title: string;
  kind: 'pin' | 'guide' | 'wheel';
  a: { body: string; point: string };
  b?: { body: string; point: string };
  ground?: true;
  direction?: number;
  radius?: number | null;
  steer?: number;
  /** Where a joint to ground lies in the scene, with its standard uncertainty, and the points it is from. */
  at?: Vec2;
  sigma?: number;
  survey?: string[];
  /** Stations at which the joint holds; absent when it always does. */
  stations?: string[];
}

export type Known = {
  id: string;
  title: string;
  /** Where it came from: survey points, files, exhibits. */
  source: { survey?: string[]; file?: string; exhibit: number };
} & (
  | {
      quantity: 'velocity';
      at: { body: string; point: string };
      magnitude?: number;
      direction?: number;
      sigma: { magnitude?: number; direction?: number };
    }
  | {
      quantity: 'angular-velocity' | 'angular-acceleration';
      body: string;
      value: number;
      sigma: number;
    }
  | {
      quantity: 'acceleration';
      at: { body: string; point: string };
      components: Vec2;
    }
);

export interface Station {
  id: string;
  title: string;
  /** How the evidence fixes one instant for all these marks. */
  basis: string;
  marks: { survey: string; body: string; point: string }[];
  /**
   * Directions of travel as a hand fit of the traces gives them, for checks. A program that takes the
   * tangent from the trace itself must not count these as well.
   */
  tangents: Known[];
  knowns: Known[];
  /** Held out of the solution, to check it by. */
  checks: Known[];
}

export interface TraceDescription {
  id: string;
  title: string;
  kind: 'yaw mark' | 'skid mark' | 'rolling print' | 'scrub';
  body: string;
  point: string;
  sigma: number;
  /** Survey points in order of travel. */
  points: string[];
}

export interface Alternative {
  id: string;
  title: string;
  assumption: string;
  /** Which body point makes each trace and station mark under this alternative, where it differs. */
  traces: Record<string, { body: string; point: string }>;
  marks: Record<string, { body: string; point: string }>;
  droppedJoints: string[];
}

/** The time bases of `centrode.run-problem/1`; a speed series names its file instead of samples. */
export type TimeBase =
  | { kind: 'stations'; times: Record<string, { time: number; sigma: number }> }
  | {
      kind: 'speed-series';
      file: string;
      columns: { time: string; speed: string };
      speedUnit: 'km/h';
      at: { body: string; point: string };
      sigma: number;
      offset: { value: number; sigma: number };
    }
  | {
      kind: 'walk-back';
      end: { speed: number; sigma: number };
      mass: Record<string, number>;
      inertia: Record<string, number>;
      gravity: number;
      grade: Vec2;
      wheels: {
        body: string;
        point: string;
        load: number;
        state: 'locked' | 'free' | 'braked';
        braking?: number;
        steer: number;
      }[];
      surfaces: { polygon: Vec2[] | null; dragFactor: number; sigma: number }[];
    };

export interface Reconstruction {
  title: string;
  /** What the main reconstruction assumes, in one sentence. */
  assumption: string;
  bodies: SceneBody[];
  joints: Joint[];
  stations: Station[];
  traces: TraceDescription[];
  timeBase: TimeBase[];
  alternatives: Alternative[];
  /** What the questions of the brief ask of the motion. */
  asked: {
    station: string;
    body: string;
    point: string | null;
    quantity: string;
    question: number;
  }[];
}

export interface Scene {
  format: 'centrode.demo-scene/1';
  notice: string;
  number: string;
  title: string;
  kind: 'road' | 'machine';
  place: { name: string; latitude: number; longitude: number; utcOffset: string };
  incidentAt: string;
  /** Clockwise from north, degrees; null for the elevation of a machine. */
  bearingOfX: number | null;
  frame: string;
  brief: {
    instructedBy: string;
    instructedAt: string;
    dueAt: string;
    background: string;
    questions: { number: number; text: string }[];
    cautions: string[];
  };
  parties: Party[];
  people: {
    name: string;
    role: 'lead-investigator' | 'investigator' | 'technical-reviewer' | 'evidence-custodian';
  }[];
  exhibits: Exhibit[];
  custody: CustodyEntry[];
  photographs: PhotographEntry[];
  survey: SurveyDescription;
  reconstruction: Reconstruction;
}

export const NOTICE =
  'Invented demonstration data with a known truth (truth.json). No real person, place, firm, make or event.';
