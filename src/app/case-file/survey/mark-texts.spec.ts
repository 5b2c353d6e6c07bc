import { describe, expect, it } from '@jest/globals';
import fc from 'fast-check';
import { markEntry } from '#shared/contracts/survey';
import { changedFields, emptyTexts, entryOf, textsOf } from './mark-texts';
import { aMark } from './testing';

describe('a mark in the form', () => {
  it('is sent in metres with what was typed word for word', () => {
    const entry = entryOf({
      ...emptyTexts,
      label: ' G1 ',
      kind: 'gouge',
      x: `3'-6"`,
      y: '450 mm',
      sigmaX: '2 cm',
      sigmaY: '30 mm',
      order: '4',
    });
    // 3 ft 6 in are 42 in of 25.4 mm.
    expect(entry.at[0]).toBeCloseTo(1.0668, 12);
    expect(entry).toMatchObject({
      label: 'G1',
      sigma: [0.02, 0.03],
      height: null,
      trace: null,
      order: 4,
      raw: `x: 3'-6"; y: 450 mm; uncertainty x: 2 cm; uncertainty y: 30 mm`,
    });
  });

  it('has the same uncertainty along y when none is typed', () => {
    expect(entryOf({ ...emptyTexts, label: 'a', x: '1', y: '2', sigmaX: '5 mm' }).sigma).toEqual([
      0.005, 0.005,
    ]);
  });

  it('comes back from the form as it was', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -1000, max: 1000, noNaN: true }),
        fc.integer({ min: 1, max: 3000 }),
        fc.integer({ min: 1, max: 3000 }),
        fc.constantFrom(0, 0.5, -0.25),
        (x, sx, sy, rho) => {
          const [a, b] = [sx / 1000, sy / 1000];
          const at: [number, number] = [x + 0, 1 - x];
          const mark = aMark({
            at,
            covariance: [
              [a * a, rho * a * b],
              [rho * a * b, b * b],
            ],
          });
          const texts = textsOf(mark);
          const entry = markEntry.parse(entryOf(texts));
          expect(entry.at).toEqual(at);
          expect(entry.sigma[0]).toBeCloseTo(a, 12);
          expect(entry.sigma[1]).toBeCloseTo(b, 12);
          expect(entry.correlation).toBeCloseTo(rho, 9);
          expect(changedFields(texts, textsOf(mark))).toEqual([]);
        },
      ),
      { seed: 7, numRuns: 100 },
    );
  });
});
