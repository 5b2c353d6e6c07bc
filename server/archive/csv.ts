/** A cell: text is neutralised for spreadsheets, numbers are written as numbers. */
export type CsvCell = string | number | null;

/** First characters that make a spreadsheet run a cell, half and full width (OWASP ASVS 5.0 1.2.10). */
const runs = /^[=+\-@\t\r\n\0\uFF1D\uFF0B\uFF0D\uFF20]/;

/** Text that a spreadsheet would run gets an apostrophe in front; then RFC 4180 quoting. */
export function textField(text: string): string {
  const safe = runs.test(text) ? `'${text}` : text;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}

function field(cell: CsvCell): string {
  if (cell === null) return '';
  if (typeof cell === 'string') return textField(cell);
  if (!Number.isFinite(cell)) throw new RangeError('A table cell must be a finite number.');
  return String(cell);
}

/** RFC 4180 with a header, CRLF after every row, UTF-8. */
export function csv(header: readonly string[], rows: Iterable<readonly CsvCell[]>): string {
  let text = `${header.join(',')}\r\n`;
  for (const row of rows) {
    if (row.length !== header.length) {
      throw new RangeError(`A row has ${row.length} cells, the header ${header.length}.`);
    }
    text += `${row.map(field).join(',')}\r\n`;
  }
  return text;
}
