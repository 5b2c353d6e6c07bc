import { compute } from '#shared/engine/computation/index';
import type { ReconstructionDocument } from '#shared/engine/documents/reconstruction';
import { stationAnswer, type StationMark } from '#shared/engine/documents/station';
import { EngineError } from '#shared/engine/errors';
import { stationProblemOf } from '#shared/engine/reconstruction/index';

export interface ComputeTask {
  readonly document: ReconstructionDocument;
  readonly marks: readonly StationMark[];
  readonly stationId: string;
}

export type ComputeAnswer =
  | {
      readonly ok: true;
      readonly kind: string;
      readonly status: string;
      /** The canonical text to keep, and its SHA-256. */
      readonly text: string;
      readonly hash: string;
    }
  | { readonly ok: false; readonly field: string; readonly message: string };

/**
 * Computes a station of a reconstruction, in a thread of the pool. What the engine refuses comes
 * back as a value, since an error's class does not cross over. An answer that ends early is no
 * computation to keep; one that is under-determined or contradictory is, and says so.
 */
export default function computeStation({ document, marks, stationId }: ComputeTask): ComputeAnswer {
  try {
    const made = compute('station', stationProblemOf(document, stationId, marks));
    const { failure } = stationAnswer.parse(made.document.result);
    if (failure !== null) return { ok: false, field: failure.field, message: failure.message };
    return {
      ok: true,
      kind: made.document.kind,
      status: made.status,
      text: made.text,
      hash: made.address,
    };
  } catch (error) {
    if (error instanceof EngineError) {
      return { ok: false, field: error.field, message: error.message };
    }
    throw error;
  }
}
