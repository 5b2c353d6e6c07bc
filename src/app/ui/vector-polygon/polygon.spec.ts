import { describe, expect, it } from '@jest/globals';
import { fitArrows, roundLength } from './polygon';

describe('a polygon to scale', () => {
  const arrows = [
    { from: [0, 0], to: [3, 0] },
    { from: [3, 0], to: [3, 4] },
  ] as const;

  it('fits its frame with the same scale along both axes, y up', () => {
    const { scale, height, toPage } = fitArrows(arrows, 120, 100, { x: 10, y: 10 });
    // The height decides: 80 pixels for 4 m/s.
    expect(scale).toBe(20);
    expect(height).toBe(100);
    const [a, b] = [toPage([0, 0]), toPage([3, 4])];
    expect(b[0] - a[0]).toBe(60);
    expect(a[1] - b[1]).toBe(80);
  });

  it('has a scale when every arrow is of no length', () => {
    const { scale, toPage } = fitArrows([{ from: [0, 0], to: [0, 0] }], 100, 100, { x: 5, y: 5 });
    expect(scale).toBe(1);
    expect(toPage([0, 0])[0]).toBe(50);
  });

  it('keeps within its frame when it is flat', () => {
    const flat = [{ from: [0, 0], to: [10, 0] }] as const;
    const { height, toPage } = fitArrows(flat, 120, 100, { x: 10, y: 10 });
    expect(height).toBe(56);
    expect(toPage([10, 0])).toEqual([110, 28]);
  });

  it.each([
    [7, 5],
    [5, 5],
    [4.9, 2],
    [0.19, 0.1],
    [1, 1],
  ])('the bar for at most %d is %d long', (most, length) => {
    expect(roundLength(most)).toBeCloseTo(length, 12);
  });
});
