import type { ReconstructionDocument } from '#shared/engine/documents/reconstruction';
import type { StationAnswer, StationMark, StationProblem } from '#shared/engine/documents/station';
import type { relativeMotion, Working } from '#shared/engine/instant/index';
import type { Poses } from './plan-scene';

export type RelativeMotion = ReturnType<typeof relativeMotion>;

/** What the page and the engine's worker say to each other. */
interface PointRef {
  readonly body: string;
  readonly point: string;
}

/** What is derived and shown of an answer, beside the answer itself. */
export interface Asked {
  /** The point whose motion is derived. */
  readonly point: PointRef | null;
  /** A second point, and the normal of the contact (rad) when it is given. */
  readonly against: PointRef | null;
  readonly normal: number | null;
}

/** What is on the table now. */
interface Table {
  readonly document: ReconstructionDocument;
  readonly marks: readonly StationMark[];
}

export interface StationRequest extends Asked, Table {
  readonly kind: 'station';
  readonly stationId: string;
}

/** The same of an answer that was recorded, beside what is on the table now. */
export interface RecordedRequest extends Asked {
  readonly kind: 'recorded';
  readonly problem: StationProblem;
  readonly answer: StationAnswer;
  readonly now: Table | null;
}

export type LiveRequest = StationRequest | RecordedRequest;

export interface LiveData {
  readonly stationId: string;
  readonly answer: StationAnswer;
  /** The derivation for the asked point, one for each branch. */
  readonly workings: readonly Working[];
  /** Motion against the second point, one for each branch; null without one, or where it has no direction. */
  readonly relative: readonly (RelativeMotion | null)[] | null;
  /** Poses at the other stations, where they can be had. */
  readonly others: Readonly<Record<string, Poses>>;
  /** Of a recorded answer: what the same station says now; null when it is not there any more. */
  readonly now: { readonly sameInput: boolean; readonly answer: StationAnswer } | null;
}

export interface LiveFault {
  readonly code: string;
  /** Path into what was given, for the message beside its field. */
  readonly field: string;
  readonly message: string;
}

export type LiveReply =
  | { readonly ok: true; readonly data: LiveData }
  | { readonly ok: false; readonly fault: LiveFault };
