import Papa from 'papaparse';

/** A survey file that cannot be read at all; `field` is the part of the mapping at fault, or `file`. */
export class SurveyFileProblem extends Error {
  override readonly name = 'SurveyFileProblem';

  constructor(
    readonly field: string,
    message: string,
  ) {
    super(message);
  }
}

export interface CsvRow {
  /** Line of the file on which the row begins, from 1. */
  readonly line: number;
  /** The row word for word, without its line end. */
  readonly raw: string;
  readonly cells: readonly string[];
  /** What is wrong with its quotation marks, if anything is. */
  readonly fault: string | null;
}

const mostRows = 50_000;

/**
 * The rows of a delimited text, empty ones left out, each with its line and its words as they stand.
 * @throws SurveyFileProblem for what is not text, is empty, or is longer than 50 000 rows
 */
export function csvRows(text: string, delimiter: string): CsvRow[] {
  const lines = text.replace(/^\uFEFF/, '').replace(/\r\n?/g, '\n');
  refuseWhatIsNotText(lines);
  const rows: CsvRow[] = [];
  let line = 1;
  let from = 0;
  Papa.parse<string[]>(lines, {
    delimiter,
    newline: '\n',
    step: ({ data, errors, meta }, parser) => {
      const raw = lines.slice(from, meta.cursor).replace(/\n$/, '');
      if (data.some((cell) => cell.trim() !== '')) {
        rows.push({
          line,
          raw,
          cells: data.map((cell) => cell.trim()),
          fault:
            errors.length > 0 ? 'has a quotation mark that is not closed as it should be' : null,
        });
      }
      line += raw.split('\n').length;
      from = meta.cursor;
      if (rows.length > mostRows + 1) parser.abort();
    },
  });
  if (rows.length > mostRows + 1) {
    throw new SurveyFileProblem('file', 'has more than 50 000 rows; divide it');
  }
  return rows;
}

function refuseWhatIsNotText(text: string): void {
  if (text.trim() === '') throw new SurveyFileProblem('file', 'is empty');
  const sample = text.slice(0, 100_000);
  const strange = sample.match(/[\u0000-\u0008\u000E-\u001F\uFFFD]/g)?.length ?? 0;
  if (sample.includes('\u0000') || strange > sample.length / 200) {
    throw new SurveyFileProblem('file', 'is not a text file: it holds bytes that no text has');
  }
}
