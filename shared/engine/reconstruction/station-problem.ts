import type { ReconstructionDocument } from '../documents/reconstruction';
import type { StationMark, StationProblem } from '../documents/station';
import { EngineError } from '../errors';

/**
 * One station of a reconstruction as a problem of its own, with only the marks that it uses: those
 * assigned, and the other points of the traces whose direction is used.
 * Throws EngineError `unknown-reference` for a station or a mark that is not there.
 */
export function stationProblemOf(
  reconstruction: ReconstructionDocument,
  stationId: string,
  marks: readonly StationMark[],
): StationProblem {
  const station = reconstruction.stations.find(({ id }) => id === stationId);
  if (station === undefined)
    throw new EngineError(
      'unknown-reference',
      'stations',
      `The reconstruction has no station "${stationId}".`,
    );
  const known = new Map(marks.map((mark) => [mark.id, mark]));
  const wanted = new Set<string>();
  const traces = new Set<string>();
  for (const { markId, direction } of station.marks) {
    const mark = known.get(markId);
    if (mark === undefined)
      throw new EngineError(
        'unknown-reference',
        `station.marks.${markId}`,
        'This mark is not among the marks of the survey.',
      );
    wanted.add(markId);
    if (direction && mark.trace !== null) traces.add(mark.trace);
  }
  return {
    format: 'centrode.station-problem/1',
    bodies: reconstruction.bodies,
    joints: reconstruction.joints,
    station,
    marks: marks
      .filter(({ id, trace }) => wanted.has(id) || (trace !== null && traces.has(trace)))
      .map(({ id, label, at, covariance, trace, order }) => ({
        id,
        label,
        at,
        covariance,
        trace,
        order,
      })),
  };
}
