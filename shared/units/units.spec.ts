import { readFileSync } from 'node:fs';
import { describe, expect, it } from '@jest/globals';
import { unit as mathUnit } from 'mathjs';
import { type UnitSymbol, fromSi, toSi, units } from './units';

const constants = JSON.parse(
  readFileSync(
    new URL('../../test/reference/cases/E03_trade_constants.json', import.meta.url),
    'utf8',
  ),
) as { expected: Record<string, number> };

/** What mathjs calls the unit and its SI counterpart; it is an independent table of factors. */
const inMathjs: Partial<Record<UnitSymbol, [string, string]>> = {
  cm: ['cm', 'm'],
  mm: ['mm', 'm'],
  km: ['km', 'm'],
  ft: ['ft', 'm'],
  in: ['in', 'm'],
  'km/h': ['km/h', 'm/s'],
  mph: ['mi/h', 'm/s'],
  'ft/s': ['ft/s', 'm/s'],
  g: ['gravity', 'm/s^2'],
  '°': ['deg', 'rad'],
  '°/s': ['deg/s', 'rad/s'],
  'r/min': ['cycle/minute', 'rad/s'],
  ms: ['ms', 's'],
  min: ['minute', 's'],
  t: ['tonne', 'kg'],
  lb: ['lb', 'kg'],
};

describe('units', () => {
  it.each(Object.entries(inMathjs))('%s has the factor that mathjs has', (symbol, [name, si]) => {
    const expected = name === 'gravity' ? 9.80665 : mathUnit(1, name).toNumber(si);
    expect(toSi(1, symbol as UnitSymbol) / expected).toBeCloseTo(1, 12);
  });

  it.each([
    ['mph', 'mph_to_m_s'],
    ['ft', 'ft_to_m'],
    ['in', 'in_to_m'],
    ['lb', 'lb_to_kg'],
  ] as const)('%s has the factor of the reference table', (symbol, entry) => {
    expect(toSi(1, symbol) / (constants.expected[entry] ?? NaN)).toBeCloseTo(1, 9);
  });

  it('standard gravity in feet per second squared agrees with the reference table', () => {
    expect(fromSi(toSi(1, 'g'), 'ft/s²')).toBeCloseTo(constants.expected['g_ft_s2'] ?? NaN, 9);
  });

  it('no symbol and no name stands for two units of one dimension', () => {
    const all = units.flatMap((one) =>
      [one.symbol, ...one.names].map((name) => `${one.dimension} ${name.toLowerCase()}`),
    );
    expect(new Set(all).size).toBe(all.length);
  });

  it('a value goes to SI and comes back', () => {
    for (const { symbol } of units)
      expect(fromSi(toSi(12.34, symbol), symbol)).toBeCloseTo(12.34, 12);
  });
});
