import type { MarkDirection, StationMark, StationProblem } from '../documents/station';
import { EngineError } from '../errors';
import { alongTrace } from '../geometry/trace-order';
import { traceTangent } from '../geometry/trace-tangent';

/** Points of its trace that the tangent at each mark takes. */
export type Windows = ReadonlyMap<string, number>;

/**
 * The tangents of the traces at the marks whose direction the station uses. `windows` fixes how many
 * points each takes; without it the traces themselves decide.
 * Throws EngineError `not-enough-marks` when a mark is on no trace, or is alone on it.
 */
export function markDirections(
  { station, marks }: StationProblem,
  windows: Windows | null = null,
): MarkDirection[] {
  const byId = new Map(marks.map((mark) => [mark.id, mark]));
  return station.marks
    .filter(({ direction }) => direction)
    .map(({ markId, body, point }) => {
      const mark = byId.get(markId);
      const points = mark === undefined ? [] : traceOf(mark, marks);
      if (mark === undefined || mark.trace === null || points.length < 2)
        throw new EngineError(
          'not-enough-marks',
          `station.marks.${markId}.direction`,
          `The mark "${mark?.label ?? markId}" has no direction: it takes a trace of at least two points.`,
        );
      const window = windows?.get(markId);
      const tangent = traceTangent(points, mark.at, { window, shrinks: window === undefined });
      return {
        mark: markId,
        body,
        point,
        trace: mark.trace,
        foot: [tangent.foot[0], tangent.foot[1]],
        direction: tangent.direction,
        sigma: tangent.sigma,
        curvature: tangent.curvature,
        curvatureSigma: tangent.curvatureSigma,
        used: tangent.used,
        pValue: tangent.pValue,
      };
    });
}

function traceOf(mark: StationMark, marks: readonly StationMark[]): readonly StationMark[] {
  if (mark.trace === null) return [];
  return alongTrace(marks.filter(({ trace }) => trace === mark.trace));
}
