import type { Mark } from '#shared/contracts/survey';
import { csv, type CsvCell } from './csv';

const header = [
  'label',
  'kind',
  'x_m',
  'y_m',
  'sigma_x_m',
  'sigma_y_m',
  'covariance_xy_m2',
  'height_m',
  'trace',
  'order',
  'note',
  'source',
  'source_row',
  'source_text',
  'mark_id',
];

/** Where a mark comes from, in one line. */
export function sourceOf(mark: Mark): string {
  return mark.source.kind === 'import'
    ? `exhibit ${mark.source.exhibitNumber}, ${mark.source.fileName}`
    : `entered by ${mark.source.by}`;
}

/** Every mark with its uncertainty (standard, 1 sigma) and the row it came from, word for word. */
export function marksCsv(marks: readonly Mark[]): string {
  return csv(
    header,
    marks.map((mark): CsvCell[] => [
      mark.label,
      mark.kind,
      mark.at[0],
      mark.at[1],
      Math.sqrt(mark.covariance[0][0]),
      Math.sqrt(mark.covariance[1][1]),
      mark.covariance[0][1],
      mark.height,
      mark.trace ?? '',
      mark.order,
      mark.note,
      sourceOf(mark),
      mark.source.kind === 'import' ? mark.source.row : null,
      mark.source.raw,
      mark.id,
    ]),
  );
}

/** Marks that are one line, in order along it; marks without a place come last, by label. */
export function tracesOf(marks: readonly Mark[]): Map<string, Mark[]> {
  const traces = new Map<string, Mark[]>();
  for (const mark of marks) {
    if (mark.trace === null) continue;
    const trace = traces.get(mark.trace);
    if (trace) trace.push(mark);
    else traces.set(mark.trace, [mark]);
  }
  for (const trace of traces.values()) {
    trace.sort(
      (a, b) => (a.order ?? Infinity) - (b.order ?? Infinity) || (a.label < b.label ? -1 : 1),
    );
  }
  return traces;
}

/**
 * Marks as points and traces as lines. The coordinates are metres in the scene's own frame, not
 * longitude and latitude; the file says so in its first member.
 */
export function marksGeoJson(marks: readonly Mark[]): string {
  const points = marks.map((mark) => ({
    type: 'Feature',
    id: mark.id,
    geometry: {
      type: 'Point',
      coordinates: mark.height === null ? mark.at : [...mark.at, mark.height],
    },
    properties: {
      label: mark.label,
      kind: mark.kind,
      trace: mark.trace,
      order: mark.order,
      covariance: mark.covariance,
      source: sourceOf(mark),
    },
  }));
  const lines = [...tracesOf(marks)]
    .filter(([, trace]) => trace.length > 1)
    .map(([name, trace]) => ({
      type: 'Feature',
      id: `trace ${name}`,
      geometry: { type: 'LineString', coordinates: trace.map((mark) => mark.at) },
      properties: { trace: name, kind: trace[0].kind },
    }));
  const collection = {
    coordinates: 'metres in the frame of the scene, x then y; not longitude and latitude',
    type: 'FeatureCollection',
    features: [...lines, ...points],
  };
  return `${JSON.stringify(collection, null, 1)}\n`;
}
