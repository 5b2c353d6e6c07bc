import { describe, expect, it } from '@jest/globals';
import { sizeText } from '../size/size-text';
import { daysBetween, showDay, showExactMoment, showMoment } from './dates';

describe('dates', () => {
  it('a day is shown as it is written, in every zone', () => {
    expect(showDay('2026-03-01')).toBe('1 Mar 2026');
  });

  it('days are counted over the end of a year, a leap day and a change of clocks', () => {
    expect(daysBetween('2026-12-01', '2027-01-12')).toBe(42);
    expect(daysBetween('2028-02-28', '2028-03-01')).toBe(2);
    expect(daysBetween('2026-03-28', '2026-03-30')).toBe(2);
    expect(daysBetween('2026-12-01', '2026-11-27')).toBe(-4);
  });

  it('a moment is shown in UTC', () => {
    expect(showMoment('2026-12-01T13:24:07.123456Z')).toBe('1 Dec 2026, 13:24 UTC');
    expect(showExactMoment('2026-12-01T13:24:07.123456Z')).toBe('1 Dec 2026, 13:24:07 UTC');
  });
});

describe('sizes', () => {
  it.each([
    [0, '0 B'],
    [999, '999 B'],
    [1500, '1.5 kB'],
    [3_857_000, '3.86 MB'],
    [2_000_000_000, '2 GB'],
  ])('%d bytes are %s', (bytes, text) => {
    expect(sizeText(bytes)).toBe(text);
  });

  it('an unknown size is not shown', () => {
    expect(sizeText(null)).toBe('');
  });
});
