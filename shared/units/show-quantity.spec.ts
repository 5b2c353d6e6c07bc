import { describe, expect, it } from '@jest/globals';
import { roundingStep, showPlain, showTo } from './rounding';
import { showRanged, showUncertain, showValue } from './show-quantity';

describe('rounding to the range', () => {
  it.each([
    [4, 1],
    [0.5, 0.1],
    [1.05, 0.1],
    [0.18, 0.01],
    [2.94, 0.1],
    [2.96, 1],
    [9.97, 1],
    [0.0997, 0.01],
    [31, 10],
    [120, 10],
    [3e-16, 1e-6],
  ])('a half-width of %d is shown in steps of %d', (half, step) => {
    expect(roundingStep(half)).toBeCloseTo(step, 12);
  });

  it.each([0, -1, NaN, Infinity])('a half-width of %d has no step', (half) => {
    expect(() => roundingStep(half)).toThrow(RangeError);
  });

  it('a number is shown to its place with a true minus sign', () => {
    expect(showTo(-12.34, 0.1)).toBe('−12.3');
    expect(showTo(1234, 10)).toBe('1230');
    expect(showTo(-0.04, 0.1)).toBe('0.0');
    expect(showTo(NaN, 1)).toBe('–');
  });

  it('a stated number has no idle zeros', () => {
    expect(showPlain(1.5)).toBe('1.5');
    expect(showPlain(12345.678)).toBe('12350');
  });
});

describe('a figure with its range', () => {
  it('is shown in the unit of the case with digits no finer than the range', () => {
    // 71 km/h between 67 and 75: half-width 4, so whole km/h.
    const figure = { value: 71.2 / 3.6, low: 67.1 / 3.6, high: 75.3 / 3.6 };
    expect(showRanged(figure, 'km/h')).toEqual({
      value: '71',
      low: '67',
      high: '75',
      half: '4',
      unit: 'km/h',
    });
  });

  it('is shown in m/s to the place that its range in m/s allows', () => {
    const { value, low, high } = showRanged({ value: 16.682, low: 15.63, high: 17.73 }, 'm/s');
    expect([value, low, high]).toEqual(['16.7', '15.6', '17.7']);
  });

  it('without a width is shown as stated', () => {
    expect(showRanged({ value: 0, low: 0, high: 0 }, 'm/s').value).toBe('0');
  });

  it('standard uncertainty stands after ±', () => {
    expect(showUncertain(16.4123, 0.512, 'm/s')).toBe('16.4 ± 0.5 m/s');
    expect(showUncertain(Math.PI / 2, Math.PI / 180, '°')).toBe('90.0 ± 1.0°');
    expect(showUncertain(3, 0, 'm')).toBe('3 m');
  });

  it('a length on a plan is shown with its unit', () => {
    expect(showValue(1.0668, 'ft')).toBe('3.5 ft');
  });
});
