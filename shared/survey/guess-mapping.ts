import {
  markKinds,
  type LengthUnit,
  type MarkKind,
  type SurveyMapping,
} from '#shared/contracts/survey';
import { csvRows, SurveyFileProblem, type CsvRow } from './csv-rows';

/** A mapping as far as the file itself tells it; null and missing columns are for the person. */
export interface MappingGuess {
  readonly headers: readonly string[];
  readonly delimiter: SurveyMapping['delimiter'];
  readonly decimal: SurveyMapping['decimal'] | null;
  readonly unit: LengthUnit | null;
  readonly sigmaUnit: LengthUnit | null;
  readonly columns: Readonly<Record<SurveyColumn, string | null>>;
  /** Every code in the file, with its kind where its name says it; null: to be told. */
  readonly codes: readonly { code: string; count: number; kind: MarkKind | null }[];
  /** What the file does not tell, as questions to the person. */
  readonly questions: readonly string[];
}

export type SurveyColumn =
  'label' | 'x' | 'y' | 'height' | 'sigmaX' | 'sigmaY' | 'code' | 'trace' | 'order' | 'note';

/** Words of a header, in lower case and without its unit, that name a column; the first match wins. */
const headerWords: Record<SurveyColumn, RegExp> = {
  label: /^(mark|point|pt|id|label|name|no|nr|number)\b/,
  x: /^(x|e|east|easting)\b/,
  y: /^(y|n|north|northing)\b/,
  height: /^(z|h|height|elevation|elev|level|rl)\b/,
  sigmaX:
    /^(s|sd|su|u|sigma|std|stdev|std dev|σ|uncertainty) ?(x|e|east|easting|xy|plan|horizontal)?$/,
  sigmaY: /^(s|sd|su|u|sigma|std|stdev|std dev|σ|uncertainty) ?(y|n|north|northing)$/,
  code: /^(code|feature|kind|type)\b/,
  trace: /^(string|trace|line)\b/,
  order: /^(seq|sequence|order|place|vertex)\b/,
  note: /^(remark|remarks|note|notes|comment|comments|description|desc)\b/,
};

const unitWords: Record<string, LengthUnit> = {
  m: 'm',
  metre: 'm',
  metres: 'm',
  meter: 'm',
  meters: 'm',
  cm: 'cm',
  mm: 'mm',
  ft: 'ft',
  feet: 'ft',
  foot: 'ft',
  in: 'in',
  inch: 'in',
  inches: 'in',
};

/** Short codes that the trade commonly uses (common practice); the person confirms each of them. */
const codeKinds: Record<string, MarkKind> = {
  CP: 'control point',
  TM: 'tyre mark',
  SK: 'skid mark',
  YM: 'yaw mark',
  GO: 'gouge',
  SC: 'scrape',
  WM: 'witness mark',
  DB: 'debris',
  FL: 'fluid',
  POR: 'point of rest',
  RE: 'road edge',
  LM: 'line marking',
};

/**
 * What a survey file tells about how it is to be read. Nothing that could be read in two ways is
 * guessed: numbers whose only sign is a comma, and lengths without a stated unit, become questions.
 * @throws SurveyFileProblem when the file is no delimited text with a header
 */
export function guessMapping(
  text: string,
  delimiter: SurveyMapping['delimiter'] = delimiterOf(text),
): MappingGuess {
  const [header, ...body] = csvRows(text, delimiter);
  const headers = header.cells;
  if (headers.length < 3) {
    throw new SurveyFileProblem(
      'file',
      'has no columns that can be told apart: a header such as "Point, E [m], N [m]" is needed',
    );
  }
  if (headers.every((one) => /^[\d.,+\-−e]*$/i.test(one))) {
    throw new SurveyFileProblem('file', 'has no header: its first row holds numbers only');
  }
  const columns = columnsOf(headers);
  const questions: string[] = [];
  const cellsOf = (column: string | null): string[] =>
    column === null ? [] : body.map((row) => row.cells[headers.indexOf(column)] ?? '');

  const numbers = (['x', 'y', 'height', 'sigmaX', 'sigmaY'] as const).flatMap((field) =>
    cellsOf(columns[field]),
  );
  if ([columns.label, columns.x, columns.y].includes(null)) {
    questions.push('Which columns hold the labels, x and y? The header does not say it.');
  }
  const decimal = decimalOf(numbers);
  if (decimal === null) {
    const example = numbers.find((cell) => cell.includes(',')) ?? '';
    questions.push(
      `Is the comma in "${example}" the decimal sign? A comma alone can mean two things.`,
    );
  }
  const unit = unitOf([columns.x, columns.y, columns.height]);
  if (unit === null)
    questions.push('In which unit are the coordinates? The header does not say it.');
  const sigmaUnit = unitOf([columns.sigmaX, columns.sigmaY]);
  if (columns.sigmaX === null && columns.sigmaY === null) {
    questions.push('How uncertain are the coordinates? The file has no column for it.');
  } else if (sigmaUnit === null) {
    questions.push('In which unit are the uncertainties? The header does not say it.');
  }
  return {
    headers,
    delimiter,
    decimal,
    unit,
    sigmaUnit,
    columns,
    codes: codesOf(cellsOf(columns.code)),
    questions,
  };
}

/** Every code in a column, with its kind where its name says it. */
export function codesIn(
  text: string,
  delimiter: SurveyMapping['delimiter'],
  column: string,
): MappingGuess['codes'] {
  const [header, ...body] = csvRows(text, delimiter);
  const at = header.cells.indexOf(column);
  return at < 0 ? [] : codesOf(body.map((row) => row.cells[at] ?? ''));
}

/** The sign that divides the header into the most columns, as long as the rows agree with it. */
function delimiterOf(text: string): SurveyMapping['delimiter'] {
  const agreeing = ([';', '\t', ','] as const).map((delimiter) => {
    const rows = csvRows(text.slice(0, 200_000), delimiter).slice(0, 50);
    const width = rows[0].cells.length;
    return { delimiter, width, agree: rows.filter((row) => sameWidth(row, width)).length };
  });
  const best = agreeing
    .filter((one) => one.width > 1)
    .sort((a, b) => b.agree - a.agree || b.width - a.width);
  return best[0]?.delimiter ?? ',';
}

const sameWidth = (row: CsvRow, width: number): boolean => row.cells.length === width;

/** Lower case, the unit cut off, brackets and signs as spaces: "s(X) [mm]" is "s x". */
const wordsOf = (header: string): string =>
  header
    .toLowerCase()
    .replace(/[[(]\s*([a-z]+)\s*[\])]\s*$/, (whole, word: string) =>
      word in unitWords ? ' ' : whole,
    )
    .replace(/[^\p{L}\p{N}]+/gu, ' ')
    .trim();

function columnsOf(headers: readonly string[]): Record<SurveyColumn, string | null> {
  const free = new Set(headers);
  const find = (field: SurveyColumn): string | null => {
    const found = [...free].find((header) => headerWords[field].test(wordsOf(header))) ?? null;
    if (found !== null) free.delete(found);
    return found;
  };
  // Uncertainties first: their headers also hold the letters of the coordinates.
  const sigmaY = find('sigmaY');
  const sigmaX = find('sigmaX');
  return {
    x: find('x'),
    y: find('y'),
    height: find('height'),
    sigmaX,
    sigmaY,
    code: find('code'),
    trace: find('trace'),
    order: find('order'),
    note: find('note'),
    label: find('label'),
  };
}

/** Null when numbers have commas and nothing else says what a comma means. */
function decimalOf(cells: readonly string[]): SurveyMapping['decimal'] | null {
  return cells.some((cell) => cell.includes(',')) ? null : '.';
}

/** The unit that every one of these headers states; null when one does not, or they differ. */
function unitOf(headers: readonly (string | null)[]): LengthUnit | null {
  const stated = headers
    .filter((header) => header !== null)
    .map(
      (header) => /(?:[[(,/_]|\s)\s*([a-z]+)\s*[\])]?\s*$/i.exec(header)?.[1].toLowerCase() ?? '',
    )
    .map((word) => (Object.hasOwn(unitWords, word) ? unitWords[word] : null));
  const [first = null] = stated;
  return stated.every((unit) => unit === first) ? first : null;
}

function codesOf(cells: readonly string[]): MappingGuess['codes'] {
  const counts = new Map<string, number>();
  for (const cell of cells) counts.set(cell, (counts.get(cell) ?? 0) + 1);
  return [...counts].map(([code, count]) => ({ code, count, kind: kindOf(code) }));
}

function kindOf(code: string): MarkKind | null {
  const named = markKinds.find((kind) => kind === code.toLowerCase());
  const short = code.toUpperCase();
  return named ?? (Object.hasOwn(codeKinds, short) ? codeKinds[short] : null);
}
