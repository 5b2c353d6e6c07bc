import { describe, expect, it } from '@jest/globals';
import { gridStep, metres, scaleBar, stepAtLeast, stepAtMost, vectorScale } from './plan-scale';

describe('the scales of the plan', () => {
  it('go in steps of 1, 2 and 5', () => {
    expect([0.3, 1, 1.1, 2.5, 7, 10, 1000, 0.001].map(stepAtLeast)).toEqual([
      0.5, 1, 2, 5, 10, 10, 1000, 0.001,
    ]);
    expect([0.3, 1, 1.9, 2.5, 7, 10, 1000, 0.001].map(stepAtMost)).toEqual([
      0.2, 1, 1, 2, 5, 10, 1000, 0.001,
    ]);
  });

  it('have a bar whose length on the screen is its length in the scene', () => {
    // 0.05 m in a pixel: 5 m are 100 pixels.
    expect(scaleBar(0.05, 'm', 150)).toEqual({ pixels: 100, text: '5 m', middle: '2.5' });
    // 20 ft are 6.096 m, so 121.92 pixels.
    const feet = scaleBar(0.05, 'ft', 150);
    expect(feet.text).toBe('20 ft');
    expect(feet.pixels).toBeCloseTo(121.92, 9);
    expect(scaleBar(0.001, 'm', 150).text).toBe('100 mm');
  });

  it('keep grid lines apart', () => {
    expect(gridStep(0.05)).toBe(2);
    expect(metres(gridStep(0.001))).toBe('50 mm');
  });

  it('draw the longest vector within its room and do not follow every small change', () => {
    const scale = vectorScale(16.4);
    expect(scale).toEqual({ pixelsPerUnit: 4.8, sample: 10, samplePixels: 48 });
    expect(vectorScale(16.5)).toEqual(scale);
    expect(vectorScale(0)).toBeNull();
    expect(vectorScale(Number.NaN)).toBeNull();
  });
});
