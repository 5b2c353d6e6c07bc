import { quantitiesOf } from '#shared/engine/documents/motion-quantities';
import { csv, type CsvCell } from './csv';
import { motionOf } from './computation-text';
import type { SnapshotComputation } from './snapshot';

const header = [
  'computation',
  'reconstruction',
  'station',
  'solution',
  'body',
  'point',
  'quantity',
  'unit',
  'value',
  'standard_uncertainty',
  'low_95',
  'high_95',
];

/**
 * Every velocity, acceleration and rate of turning of every recorded computation, one a row, SI
 * units, scene frame, at full precision. "solution" counts the motions that agree with the knowns,
 * best first, from 1; a body's own quantities have no point.
 */
export function velocitiesCsv(
  computations: readonly SnapshotComputation[],
  textOf: (hash: string) => string,
): string {
  return csv(
    header,
    computations.flatMap(({ hash, reconstruction, station }) =>
      (motionOf(textOf(hash))?.branches ?? []).flatMap((branch, place) =>
        quantitiesOf(branch).map((each): CsvCell[] => [
          hash,
          reconstruction,
          station,
          place + 1,
          each.body,
          each.point,
          each.name,
          each.unit,
          each.value,
          each.sigma,
          each.low,
          each.high,
        ]),
      ),
    ),
  );
}
