import { describe, expect, it } from '@jest/globals';
import fc from 'fast-check';
import { coverageInterval } from './interval';
import { roundToUncertainty } from './rounding';

describe('rounding for display', () => {
  it('shows two digits of the uncertainty, and the value to the same place', () => {
    expect(roundToUncertainty(17.4382, 0.2371)).toEqual({
      value: '17.44',
      sigma: '0.24',
      places: 2,
    });
    expect(roundToUncertainty(17438.2, 237)).toEqual({ value: '17440', sigma: '240', places: -1 });
    expect(roundToUncertainty(5, 0.0996)).toEqual({ value: '5.00', sigma: '0.10', places: 2 });
    expect(roundToUncertainty(-0.001, 0.2)).toEqual({ value: '0.00', sigma: '0.20', places: 2 });
  });

  it('leaves an exact value as it is', () => {
    expect(roundToUncertainty(0.1 + 0.2, 0).value).toBe('0.3');
  });

  it('moves no value by more than a twentieth of its uncertainty', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -1e6, max: 1e6, noNaN: true }),
        fc.double({ min: 1e-6, max: 1e4, noNaN: true }),
        (value, sigma) => {
          const shown = roundToUncertainty(value, sigma);
          expect(Math.abs(Number(shown.value) - value)).toBeLessThanOrEqual(0.0501 * sigma);
          expect(Math.abs(Number(shown.sigma) - sigma)).toBeLessThanOrEqual(0.0501 * sigma);
        },
      ),
      { numRuns: 300, seed: 4 },
    );
  });
});

describe('coverage interval', () => {
  it('is value ± 1.96 σ at 95 %, wider with few degrees of freedom, and stops at a bound', () => {
    expect(coverageInterval(10, 1).high).toBeCloseTo(11.95996, 5);
    // t for 4 degrees of freedom, 2.776 (JCGM 100:2008, table G.2)
    expect(coverageInterval(10, 1, { degreesOfFreedom: 4 }).high).toBeCloseTo(12.776, 3);
    expect(coverageInterval(1, 1, { least: 0 }).low).toBe(0);
  });
});
