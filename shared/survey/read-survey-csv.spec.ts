import { describe, expect, it } from '@jest/globals';
import fc from 'fast-check';
import Papa from 'papaparse';
import type { SurveyMapping } from '#shared/contracts/survey';
import { SurveyFileProblem } from './csv-rows';
import { apartFromStanding, readSurveyCsv } from './read-survey-csv';

const mapping: SurveyMapping = {
  delimiter: ',',
  decimal: '.',
  unit: 'm',
  sigmaUnit: 'mm',
  label: 'Point',
  x: 'E',
  y: 'N',
  height: null,
  sigmaX: 's',
  sigmaY: null,
  sigma: null,
  code: 'Code',
  trace: 'Line',
  order: 'Place',
  note: 'Note',
  kinds: { TM: 'tyre mark', CP: 'control point' },
};
const header = 'Point,E,N,s,Code,Line,Place,Note';
const read = (rows: string, over: Partial<SurveyMapping> = {}) =>
  readSurveyCsv(`${header}\n${rows}`, { ...mapping, ...over });
const problem = (text: string, over: Partial<SurveyMapping> = {}) => {
  try {
    readSurveyCsv(text, { ...mapping, ...over });
  } catch (error) {
    if (error instanceof SurveyFileProblem) return `${error.field}: ${error.message}`;
    throw error;
  }
  return 'none';
};

describe('a survey file', () => {
  it('gives its marks in metres, each with its row word for word', () => {
    const { rows, rejected } = read('101,1.25,-3.5,20,TM,T1,4,"start, left"\n');
    expect(rejected).toEqual([]);
    expect(rows).toEqual([
      {
        row: 2,
        raw: '101,1.25,-3.5,20,TM,T1,4,"start, left"',
        entry: {
          label: '101',
          kind: 'tyre mark',
          at: [1.25, -3.5],
          sigma: [0.02, 0.02],
          correlation: 0,
          height: null,
          trace: 'T1',
          order: 4,
          note: 'start, left',
          raw: '',
        },
      },
    ]);
  });

  it('is read alike with every line end, a byte order mark and empty lines', () => {
    const lines = [header, '1,1,2,5,TM,,,', '', '2,3,4,5,CP,,,'];
    const expected = readSurveyCsv(lines.join('\n'), mapping);
    expect(expected.rows.map((row) => row.row)).toEqual([2, 4]);
    for (const end of ['\r\n', '\r']) {
      expect(readSurveyCsv(`\uFEFF${lines.join(end)}${end}`, mapping)).toEqual(expected);
    }
  });

  it('counts lines, not records, so that a row can be found in the file', () => {
    const { rows, rejected } = read('1,1,2,5,TM,,,"two\nlines"\n2,x,4,5,CP,,,\n');
    expect(rows[0].entry.note).toBe('two\nlines');
    expect(rejected[0].row).toBe(4);
  });

  it('rejects a row without uncertainty, unless one is given for all', () => {
    const bare = '1,1,2,,TM,,,\n2,1,2,5,TM,,,\n';
    expect(read(bare).rejected).toEqual([
      { row: 2, raw: '1,1,2,,TM,,,', field: 's', message: 'has no uncertainty' },
    ]);
    expect(read(bare, { sigma: 30 }).rows.map((row) => row.entry.sigma)).toEqual([
      [0.03, 0.03],
      [0.005, 0.005],
    ]);
    expect(read(bare, { sigmaX: null }).rejected.map((row) => row.message)).toEqual([
      'has no uncertainty',
      'has no uncertainty',
    ]);
  });

  it('keeps unknown codes as other and reports them', () => {
    const { rows, unknownCodes } = read('1,1,2,5,QQ,,,\n2,1,2,5,QQ,,,\n3,1,2,5,,,,\n');
    expect(rows.map((row) => row.entry.kind)).toEqual(['other', 'other', 'other']);
    expect(unknownCodes).toEqual([
      { code: 'QQ', count: 2 },
      { code: '', count: 1 },
    ]);
    expect(read('1,1,2,5,toString,,,\n').unknownCodes).toEqual([{ code: 'toString', count: 1 }]);
  });

  it.each([
    ['1,1,2,5,TM,,\n', 'row', 'has 7 cells where the header has 8'],
    ['1,1,2,5,TM,,,,9\n', 'row', 'has 9 cells where the header has 8'],
    [',1,2,5,TM,,,\n', 'Point', 'has no label'],
    ['1,,2,5,TM,,,\n', 'E', 'has no x coordinate'],
    ['1,1,abc,5,TM,,,\n', 'N', '"abc" is not a number'],
    ['1,1,2,0,TM,,,\n', 's', 'has an uncertainty that is not over zero'],
    ['1,1,2,-4,TM,,,\n', 's', 'has an uncertainty that is not over zero'],
    ['1,1,2,100001,TM,,,\n', 'sigma', 'is over 100 m'],
    ['1,1,2,5,TM,T1,first,\n', 'Place', '"first" is not a place in a trace: 0, 1, 2 …'],
    [`${'9'.repeat(41)},1,2,5,TM,,,\n`, 'Point', 'is longer than 40 characters'],
  ])('rejects the row %j', (row, field, message) => {
    expect(read(row)).toMatchObject({ rows: [], rejected: [{ row: 2, field, message }] });
  });

  it('rejects the second of two rows with one label', () => {
    const { rows, rejected } = read('7,1,2,5,TM,,,\n7,3,4,5,TM,,,\n');
    expect(rows.map((row) => row.entry.at)).toEqual([[1, 2]]);
    expect(rejected).toMatchObject([
      { row: 3, field: 'Point', message: 'the label "7" stands already in row 2' },
    ]);
  });

  it('is told apart from the marks that stand in the case already', () => {
    const reading = read('7,1,2,5,TM,,,\n8,x,4,5,TM,,,\n9,3,4,5,TM,,,\n');
    expect(apartFromStanding(reading, new Set(['1']), mapping)).toBe(reading);
    expect(apartFromStanding(reading, new Set(['7']), mapping)).toMatchObject({
      rows: [{ row: 4 }],
      rejected: [
        { row: 2, field: 'Point', message: 'a mark of the case has the label "7" already' },
        { row: 3 },
      ],
    });
  });

  it('rejects what an open quotation mark swallows, and keeps a bounded piece of it', () => {
    const { rejected } = read(`1,1,2,5,TM,,,"open\n${'2,3,4,5,TM,,,\n'.repeat(1000)}`);
    expect(rejected).toHaveLength(1);
    expect(rejected[0].message).toMatch(/quotation mark/);
    expect(rejected[0].raw.length).toBeLessThan(2100);
  });

  it('is refused as a whole when it is no survey file', () => {
    expect(problem('')).toBe('file: is empty');
    expect(problem('PK\u0003\u0004\u0000\u0000binary')).toMatch(/^file: is not a text file/);
    expect(problem('\uFFFD'.repeat(50))).toMatch(/^file: is not a text file/);
    expect(problem('1,2,3\n4,5,6\n')).toBe('file: has no header: its first row holds numbers only');
    expect(problem(`${header}\n`)).toBe('file: has a header but no rows');
    expect(problem('Point,X,Y,s,Code,Line,Place,Note\n1,1,1,1,,,,\n')).toMatch(
      /^x: the file has no column "E"; it has "Point", "X"/,
    );
    expect(problem(`${header.replaceAll(',', ';')}\n`)).toMatch(/divided by a semicolon$/);
    expect(problem(`${header},E\n1,1,1,1,,,,,1\n`)).toBe(
      'x: the column "E" stands twice in the header',
    );
    expect(problem(`${header}\n${'1,1,1,1,,,,\n'.repeat(50_001)}`)).toMatch(/50 000 rows/);
  });

  it('never throws anything else, and every row is either taken or rejected', () => {
    fc.assert(
      fc.property(
        fc.array(fc.string({ unit: 'binary', maxLength: 40 }), { maxLength: 20 }),
        (lines) => {
          const told = problem(`${header}\n${lines.join('\n')}`);
          expect(told).toMatch(/^(none|file: )/);
        },
      ),
      { seed: 5, numRuns: 300 },
    );
  });

  it('written in any unit with any signs, reads back as the same marks', () => {
    const text = fc
      .string({
        unit: fc.constantFrom('a', 'B', '9', ' ', ',', ';', '"', "'", '\t', 'é', '.'),
        maxLength: 12,
      })
      .map((value) => value.trim());
    const length = fc.integer({ min: -50_000_000, max: 50_000_000 });
    const mark = fc.record({
      x: length,
      y: length,
      sigma: fc.integer({ min: 1, max: 900_000 }),
      code: fc.constantFrom('TM', 'CP', 'ZZ'),
      trace: text,
      order: fc.option(fc.integer({ min: 0, max: 500 })),
      note: text,
    });
    const shape = fc.record({
      marks: fc.array(mark, { minLength: 1, maxLength: 12 }),
      delimiter: fc.constantFrom(',' as const, ';' as const, '\t' as const),
      decimal: fc.constantFrom('.' as const, ',' as const),
      newline: fc.constantFrom('\n', '\r\n'),
    });
    // Tenths of a millimetre: whole numbers of them are metres, millimetres and centimetres by shifting the point.
    const units = { m: 4, cm: 2, mm: 1 } as const;
    const written = (value: number, places: number, decimal: string): string => {
      const digits = String(Math.abs(value)).padStart(places + 1, '0');
      const sign = value < 0 ? '-' : '';
      return `${sign}${digits.slice(0, -places)}${decimal}${digits.slice(-places)}`;
    };
    fc.assert(
      fc.property(shape, fc.constantFrom('m', 'cm', 'mm'), (file, unit) => {
        const cell = (value: number) => written(value, units[unit], file.decimal);
        const table = file.marks.map((one, i) => [
          `M${i}`,
          cell(one.x),
          cell(one.y),
          cell(one.sigma),
          one.code,
          one.trace,
          one.order ?? '',
          one.note,
        ]);
        const csv = Papa.unparse([header.split(','), ...table], {
          delimiter: file.delimiter,
          newline: file.newline,
        });
        const { rows, rejected } = readSurveyCsv(csv, {
          ...mapping,
          delimiter: file.delimiter,
          decimal: file.decimal,
          unit,
          sigmaUnit: unit,
        });
        expect(rejected).toEqual([]);
        rows.forEach(({ entry }, i) => {
          const one = file.marks[i];
          expect(entry.at).toEqual([one.x, one.y].map((value) => Number(`${value}e-4`)));
          expect(entry.sigma[0]).toBe(Number(`${one.sigma}e-4`));
          expect(entry.trace).toBe(one.trace === '' ? null : one.trace);
          expect(entry.order).toBe(one.order);
          expect(entry.note).toBe(one.note);
        });
        expect(rows).toHaveLength(file.marks.length);
      }),
      { seed: 11, numRuns: 200 },
    );
  });
});
