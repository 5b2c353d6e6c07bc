import type * as z from 'zod';
import { markEntry, type RejectedRow, type SurveyMapping } from '#shared/contracts/survey';
import { csvRows, SurveyFileProblem, type CsvRow } from './csv-rows';
import { readLength } from './exact-length';

export interface SurveyRow {
  /** Line of the file, the header being 1 when the file begins with it. */
  readonly row: number;
  /** The row word for word. */
  readonly raw: string;
  readonly entry: z.output<typeof markEntry>;
}

export interface SurveyReading {
  readonly headers: readonly string[];
  readonly rows: readonly SurveyRow[];
  readonly rejected: readonly RejectedRow[];
  /** Codes that the mapping does not explain; their marks are kept as 'other'. */
  readonly unknownCodes: readonly { readonly code: string; readonly count: number }[];
}

/** Words of a rejected row that are kept; a broken quotation mark can make one row of a whole file. */
const mostOfRaw = 2000;

/**
 * Reads the marks of a survey file as the mapping says. The same code previews a file in the browser
 * and imports it on the server, so what was shown is what is kept.
 *
 * A row is taken whole or rejected with its reason; nothing in it is guessed or mended.
 * @throws SurveyFileProblem when the file as a whole cannot be read this way
 */
export function readSurveyCsv(text: string, mapping: SurveyMapping): SurveyReading {
  const [header, ...body] = csvRows(text, mapping.delimiter);
  const columns = columnsOf(header.cells, mapping);
  if (body.length === 0) throw new SurveyFileProblem('file', 'has a header but no rows');
  const rows: SurveyRow[] = [];
  const rejected: RejectedRow[] = [];
  const unknown = new Map<string, number>();
  const lineOf = new Map<string, number>();
  for (const row of body) {
    try {
      const cells = cellsOf(row, header.cells.length, columns, mapping);
      const entry = readEntry(cells, mapping);
      const first = lineOf.get(entry.label);
      if (first !== undefined) {
        const message = `the label "${entry.label}" stands already in row ${first}`;
        throw new Refusal(mapping.label, message);
      }
      lineOf.set(entry.label, row.line);
      rows.push({ row: row.line, raw: row.raw, entry });
      const code = cells.cell('code');
      if (columns.code !== null && !Object.hasOwn(mapping.kinds, code)) {
        unknown.set(code, (unknown.get(code) ?? 0) + 1);
      }
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      rejected.push(rejection(row, error));
    }
  }
  return {
    headers: header.cells,
    rows,
    rejected,
    unknownCodes: [...unknown].map(([code, count]) => ({ code, count })),
  };
}

/** The same reading, the rows whose label a standing mark of the case has already rejected too. */
export function apartFromStanding(
  reading: SurveyReading,
  standing: ReadonlySet<string>,
  mapping: SurveyMapping,
): SurveyReading {
  const known = reading.rows.filter((row) => standing.has(row.entry.label));
  if (known.length === 0) return reading;
  const rejected = known.map(({ row, raw, entry }) => ({
    row,
    raw,
    field: mapping.label,
    message: `a mark of the case has the label "${entry.label}" already`,
  }));
  return {
    ...reading,
    rows: reading.rows.filter((row) => !standing.has(row.entry.label)),
    rejected: [...reading.rejected, ...rejected].sort((a, b) => a.row - b.row),
  };
}

const columnFields = [
  'label',
  'x',
  'y',
  'height',
  'sigmaX',
  'sigmaY',
  'code',
  'trace',
  'order',
  'note',
] as const;
type ColumnField = (typeof columnFields)[number];
type Columns = Record<ColumnField, number | null>;

function columnsOf(headers: readonly string[], mapping: SurveyMapping): Columns {
  if (headers.length > 1 && headers.every((header) => /^[\d.,+\-−e]*$/i.test(header))) {
    throw new SurveyFileProblem('file', 'has no header: its first row holds numbers only');
  }
  const column = (field: ColumnField): number | null => {
    const name = mapping[field];
    if (name === null) return null;
    const at = headers.indexOf(name.trim());
    if (at < 0) throw new SurveyFileProblem(field, noSuchColumn(name, headers, mapping.delimiter));
    if (headers.includes(name.trim(), at + 1)) {
      throw new SurveyFileProblem(field, `the column "${name}" stands twice in the header`);
    }
    return at;
  };
  return Object.fromEntries(columnFields.map((field) => [field, column(field)])) as Columns;
}

function noSuchColumn(name: string, headers: readonly string[], delimiter: string): string {
  const other = [',', ';', '\t'].find((sign) => sign !== delimiter && headers[0].includes(sign));
  if (headers.length === 1 && other !== undefined) {
    const sign = { ',': 'comma', ';': 'semicolon', '\t': 'tab' }[other] ?? other;
    return `the file has no column "${name}"; its columns seem to be divided by a ${sign}`;
  }
  return `the file has no column "${name}"; it has ${headers.map((one) => `"${one}"`).join(', ')}`;
}

/** Why a row is not taken. */
class Refusal extends Error {
  constructor(
    readonly field: string,
    message: string,
  ) {
    super(message);
  }
}

interface Cells {
  /** Empty where the mapping has no such column. */
  readonly cell: (field: ColumnField) => string;
  /** The column as the file calls it. */
  readonly header: (field: ColumnField) => string;
}

function cellsOf(row: CsvRow, width: number, columns: Columns, mapping: SurveyMapping): Cells {
  if (row.fault !== null) throw new Refusal('row', row.fault);
  if (row.cells.length !== width) {
    throw new Refusal('row', `has ${row.cells.length} cells where the header has ${width}`);
  }
  return {
    cell: (field) => row.cells[columns[field] ?? -1] ?? '',
    header: (field) => mapping[field] ?? field,
  };
}

function readEntry(cells: Cells, mapping: SurveyMapping): z.output<typeof markEntry> {
  const { cell, header } = cells;
  if (cell('label') === '') throw new Refusal(header('label'), 'has no label');
  const order = cell('order');
  if (!/^\d{0,9}$/.test(order)) {
    throw new Refusal(header('order'), `"${order}" is not a place in a trace: 0, 1, 2 …`);
  }
  const code = cell('code');
  const parsed = markEntry.safeParse({
    label: cell('label'),
    kind: Object.hasOwn(mapping.kinds, code) ? mapping.kinds[code] : 'other',
    at: [coordinate('x', cells, mapping), coordinate('y', cells, mapping)],
    sigma: sigmas(cells, mapping),
    height: cell('height') === '' ? null : coordinate('height', cells, mapping),
    trace: cell('trace') || null,
    order: order === '' ? null : Number(order),
    note: cell('note'),
  });
  if (parsed.success) return parsed.data;
  const [issue] = parsed.error.issues;
  const field = columnFields.find((name) => name === issue.path[0]);
  throw new Refusal(
    field ? header(field) : String(issue.path[0]),
    issue.code === 'too_big' && issue.origin === 'string'
      ? `is longer than ${issue.maximum} characters`
      : issue.message,
  );
}

function coordinate(field: 'x' | 'y' | 'height', cells: Cells, mapping: SurveyMapping): number {
  const text = cells.cell(field);
  if (text === '') throw new Refusal(cells.header(field), `has no ${field} coordinate`);
  const read = readLength(text, mapping.unit, mapping.decimal);
  if (!read.ok) throw new Refusal(cells.header(field), read.message);
  return read.metres;
}

/** Standard uncertainties along x and y; a file with one such column states the same for both. */
function sigmas({ cell, header }: Cells, mapping: SurveyMapping): [number, number] {
  const read = (field: 'sigmaX' | 'sigmaY'): number => {
    const stated = cell(field);
    if (stated === '' && mapping.sigma === null) {
      throw new Refusal(mapping[field] ?? 'uncertainty', 'has no uncertainty');
    }
    const length =
      stated === ''
        ? readLength(String(mapping.sigma), mapping.sigmaUnit, '.')
        : readLength(stated, mapping.sigmaUnit, mapping.decimal);
    if (!length.ok) throw new Refusal(header(field), length.message);
    if (length.metres <= 0) {
      throw new Refusal(header(field), 'has an uncertainty that is not over zero');
    }
    return length.metres;
  };
  return [
    read(mapping.sigmaX === null ? 'sigmaY' : 'sigmaX'),
    read(mapping.sigmaY === null ? 'sigmaX' : 'sigmaY'),
  ];
}

const rejection = (row: CsvRow, { field, message }: Refusal): RejectedRow => ({
  row: row.line,
  raw: row.raw.length > mostOfRaw ? `${row.raw.slice(0, mostOfRaw)}…` : row.raw,
  field,
  message,
});
