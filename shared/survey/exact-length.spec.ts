import { describe, expect, it } from '@jest/globals';
import fc from 'fast-check';
import { readLength } from './exact-length';

const metres = (text: string, unit: Parameters<typeof readLength>[1], decimal: '.' | ',' = '.') => {
  const read = readLength(text, unit, decimal);
  return read.ok ? read.metres : read.message;
};

describe('a length of a survey file', () => {
  it('is converted by the definitions of the units', () => {
    // 1 ft = 0.3048 m and 1 in = 25.4 mm exactly (NIST SP 811, appendix B); products by hand.
    expect(metres('1', 'ft')).toBe(0.3048);
    expect(metres('100', 'ft')).toBe(30.48);
    expect(metres('3.5', 'ft')).toBe(1.0668);
    expect(metres('1', 'in')).toBe(0.0254);
    expect(metres('-12', 'in')).toBe(-0.3048);
    expect(metres('12345', 'mm')).toBe(12.345);
    expect(metres('7', 'cm')).toBe(0.07);
    expect(metres('+.5', 'm')).toBe(0.5);
    expect(metres('1.5e3', 'mm')).toBe(1.5);
    expect(metres('−2.25', 'm')).toBe(-2.25);
  });

  it('is the double nearest to the written decimal', () => {
    fc.assert(
      fc.property(fc.integer({ min: -9_999_999, max: 9_999_999 }), (whole) => {
        expect(metres(String(whole), 'mm')).toBe(Number(`${whole}e-3`));
      }),
    );
  });

  it('reads a decimal comma only where the file is said to have it', () => {
    expect(metres('12,5', 'm', ',')).toBe(12.5);
    expect(metres('12,5', 'm')).toMatch(
      /has a comma, but the decimal sign of this file is the point/,
    );
    expect(metres('12.5', 'm', ',')).toMatch(/has a point/);
    expect(metres('1.234,5', 'm', ',')).toMatch(/has a point/);
    expect(metres('1,234,5', 'm', ',')).toMatch(/not a number/);
  });

  it('is refused when it is no number, and says so shortly', () => {
    for (const text of ['', '-', '.', 'e5', '1 2', '0x10', 'NaN', 'Infinity', '1e', '12m']) {
      expect(metres(text, 'm')).toMatch(/is not a number/);
    }
    expect(metres('1e999', 'm')).toMatch(/too large/);
    expect(String(metres('z'.repeat(5000), 'm')).length).toBeLessThan(80);
  });
});
