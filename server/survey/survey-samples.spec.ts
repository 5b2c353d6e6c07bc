import { readFileSync } from 'node:fs';
import { describe, expect, it } from '@jest/globals';
import type { SurveyMapping } from '#shared/contracts/survey';
import { guessMapping } from '#shared/survey/guess-mapping';
import { readSurveyCsv, type SurveyReading } from '#shared/survey/read-survey-csv';
import { decodeText } from '../store/text';

/** What each file is meant to do is told in evidence-samples/README.md. */
function textOf(name: string): string {
  const decoded = decodeText(readFileSync(`evidence-samples/${name}`));
  if (!decoded) throw new Error('is no text');
  return decoded.text;
}

/** Reads a file as it is guessed; `told` answers what the guess asks. */
function read(name: string, told: Partial<SurveyMapping> = {}): SurveyReading {
  const text = textOf(name);
  const { columns, delimiter, decimal, unit, sigmaUnit } = guessMapping(text);
  const mapping = { ...columns, delimiter, decimal, unit, sigmaUnit, sigma: null, kinds: {} };
  return readSurveyCsv(text, { ...mapping, ...told } as SurveyMapping);
}

describe('the sample surveys', () => {
  it.each([['spin-on-a-bend'], ['jack-knife'], ['press']])(
    'of %s are read whole, by the guess alone, with millimetres as millimetres',
    (scene) => {
      const name = `${scene}/survey.csv`;
      expect(guessMapping(textOf(name)).questions).toEqual([]);
      const { rows, rejected } = read(name);
      expect(rejected).toEqual([]);
      const lines = textOf(name).trimEnd().split('\r\n');
      expect(rows).toHaveLength(lines.length - 1);
      const cells = lines[1].split(',');
      const scale = scene === 'press' ? 1000 : 1;
      expect(rows[0].raw).toBe(lines[1]);
      expect(rows[0].entry.at[0] * scale).toBeCloseTo(Number(cells[4]), 9);
      expect(rows[0].entry.at[1] * scale).toBeCloseTo(Number(cells[5]), 9);
    },
  );

  it('with bad rows have two good ones, and a reason for each bad one', () => {
    const { rows, rejected } = read('bad-input/survey-bad-rows.csv');
    expect(rows).toHaveLength(2);
    expect(rejected.map((row) => row.message)).toEqual([
      '"three point seven" is not a number',
      'has no y coordinate',
      '"NaN" is not a number',
      '"1e400" is too large',
      'the label "101" stands already in row 2',
      'has an uncertainty that is not over zero',
      'has an uncertainty that is not over zero',
      'has 13 cells where the header has 11',
      'has 3 cells where the header has 11',
    ]);
  });

  it('with decimal commas are asked about, then read', () => {
    const name = 'bad-input/survey-decimal-commas.csv';
    expect(guessMapping(textOf(name)).questions).toEqual([
      'Is the comma in "3,218" the decimal sign? A comma alone can mean two things.',
    ]);
    const { rows, rejected } = read(name, { decimal: ',' });
    expect(rows[0].entry.at[0]).toBe(3.218);
    expect(rejected).toHaveLength(1);
    expect(rejected[0].message).toMatch(/has a point/);
  });

  it('that are none are refused', () => {
    expect(() => textOf('bad-input/survey-binary-junk.csv')).toThrow('is no text');
    const { questions } = guessMapping(textOf('bad-input/survey-wrong-columns.csv'));
    expect(questions[0]).toMatch(/^Which columns hold the labels, x and y/);
    expect(() => read('bad-input/survey-wrong-columns.csv', { x: 'E', unit: 'm' })).toThrow(
      /has no column "E"/,
    );
  });

  it('keep what a spreadsheet would run as the text that it is, and letters of older code pages', () => {
    const formulas = read('bad-input/survey-formulas.csv');
    expect(formulas.rejected).toEqual([]);
    const raw = textOf('bad-input/survey-formulas.csv').trimEnd().split('\r\n').slice(1);
    expect(formulas.rows.map((row) => row.raw)).toEqual(raw);
    const old = read('bad-input/survey-windows-1252.csv');
    expect(old.rejected).toEqual([]);
    expect(old.rows.map((row) => row.entry.note).join()).toMatch(/[^\x00-\x7f]/);
    expect(old.rows.map((row) => row.entry.note).join()).not.toContain('\uFFFD');
  });
});
