import { describe, expect, it } from '@jest/globals';
import { type ParseOptions, parseQuantity } from './parse-quantity';
import type { Dimension } from './units';

const value = (text: string, dimension: Dimension, options?: ParseOptions): number => {
  const parsed = parseQuantity(text, dimension, options);
  if (!parsed.ok) throw new Error(parsed.message);
  return parsed.value;
};
const code = (text: string, dimension: Dimension, options?: ParseOptions): string => {
  const parsed = parseQuantity(text, dimension, options);
  return parsed.ok ? 'read' : parsed.code;
};

describe('a typed quantity', () => {
  it.each<[string, Dimension, number]>([
    ['12.5 m/s', 'speed', 12.5],
    ['45 mph', 'speed', 45 * 0.44704],
    ['72km/h', 'speed', 20],
    ['3\'-6"', 'length', 1.0668],
    ['3\' 6"', 'length', 1.0668],
    ["3'6", 'length', 1.0668],
    ['3 ft 6 in', 'length', 1.0668],
    ['3\' 6 1/2"', 'length', 1.0795],
    ['3\' 1/2"', 'length', 0.9271],
    ['-2\'-0"', 'length', -0.6096],
    ['42"', 'length', 1.0668],
    ['3.5 ft', 'length', 1.0668],
    ["3.5'", 'length', 1.0668],
    ['2.4 deg', 'angle', 0.0418879020478639],
    ['90°', 'angle', Math.PI / 2],
    ['0.7 g', 'acceleration', 6.864655],
    ['−1.5e-2 m', 'length', -0.015],
    ['0.68', 'ratio', 0.68],
    ['68 %', 'ratio', 0.68],
    ['60 rpm', 'angular velocity', 2 * Math.PI],
  ])('%s is read', (text, dimension, expected) => {
    expect(value(text, dimension)).toBeCloseTo(expected, 12);
  });

  it('takes the stated unit where none is typed', () => {
    expect(value('250', 'length', { unit: 'cm' })).toBeCloseTo(2.5, 12);
  });

  it('is refused without a unit where none is stated', () => {
    expect(code('250', 'length')).toBe('unit-missing');
  });

  it('is refused with a unit of another dimension', () => {
    expect(code('12 kg', 'length')).toBe('unit-unknown');
  });

  it.each(['12,5 m', '1,250 m', '1,250.5 m'])('%s: a comma is never guessed', (text) => {
    expect(code(text, 'length')).toBe('comma');
  });

  it('a comma is a decimal sign for those who write it so', () => {
    expect(value('12,5 m', 'length', { decimal: ',' })).toBe(12.5);
    expect(code('1.250,5 m', 'length', { decimal: ',' })).toBe('comma');
  });

  it.each(['', '   '])('an empty text asks for a value', (text) => {
    expect(code(text, 'speed')).toBe('empty');
  });

  it.each(['fast', '1.2.3 m', '--3 m', 'NaN m', '1e999 m', '3\'-14"', '3\' 1/0"'])(
    '%s is not a quantity',
    (text) => {
      expect(code(text, 'length')).not.toBe('read');
    },
  );
});
