import { readFileSync } from 'node:fs';
import { describe, expect, it } from '@jest/globals';
import { csv, textField } from './csv';

const vectors = JSON.parse(
  readFileSync('test/reference/vectors/csv_formula_injection.json', 'utf8'),
) as { cases: { input: string; safe_field: string }[] };

describe('csv', () => {
  it.each(vectors.cases)(
    'writes $input so that no spreadsheet runs it',
    ({ input, safe_field }) => {
      expect(textField(input)).toBe(safe_field);
    },
  );

  it('leaves negative numbers as numbers', () => {
    expect(csv(['a', 'b', 'c'], [[-1.5, '-1.5', null]])).toBe("a,b,c\r\n-1.5,'-1.5,\r\n");
  });

  it('refuses a number that is none, and a row that does not fit its header', () => {
    expect(() => csv(['a'], [[Number.NaN]])).toThrow('finite');
    expect(() => csv(['a', 'b'], [['x']])).toThrow('1 cells');
  });
});
