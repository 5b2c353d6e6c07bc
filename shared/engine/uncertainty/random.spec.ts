import { describe, expect, it } from '@jest/globals';
import { chiSquaredQuantile, normalQuantile } from './distributions';
import { Random, Xoshiro128 } from './random';

describe('random numbers', () => {
  it('are those of the reference implementation of xoshiro128** from state 1, 2, 3, 4', () => {
    // the vector that the rand_xoshiro crate's tests print for the authors' C code
    const generator = new Xoshiro128(1, 2, 3, 4);
    expect(Array.from({ length: 10 }, () => generator.bits())).toEqual([
      11520, 0, 5927040, 70819200, 2031721883, 1637235492, 1287239034, 3734860849, 3729100597,
      4258142804,
    ]);
  });

  /** χ² of counts in cells of equal probability, whose edges are the quantiles. */
  const statistic = (draw: () => number, edges: readonly number[], draws: number): number => {
    const counts = new Array<number>(edges.length + 1).fill(0);
    for (let i = 0; i < draws; i++) {
      const value = draw();
      let cell = 0;
      while (cell < edges.length && value > edges[cell]) cell++;
      counts[cell]++;
    }
    const each = draws / counts.length;
    return counts.reduce((sum, count) => sum + (count - each) ** 2 / each, 0);
  };
  const cells = 40;
  const shares = Array.from({ length: cells - 1 }, (_, i) => (i + 1) / cells);
  const limit = chiSquaredQuantile(0.999, cells - 1);

  it('are uniform, and normal in the tails too (χ² test at 0.1 %)', () => {
    const random = new Random(2026);
    expect(statistic(() => random.uniform(), shares, 100_000)).toBeLessThan(limit);
    const edges = shares.map(normalQuantile);
    expect(statistic(() => random.normal(), edges, 100_000)).toBeLessThan(limit);
    // the outer thousandth apart, where the ziggurat draws from its tail
    const far = [0.0005, 0.9995].map(normalQuantile);
    let beyond = 0;
    for (let i = 0; i < 200_000; i++) {
      const z = random.normal();
      if (z < far[0] || z > far[1]) beyond++;
    }
    expect(Math.abs(beyond - 200)).toBeLessThan(4 * Math.sqrt(200));
  });

  it('of neighbouring streams have nothing to do with each other', () => {
    const draws = 20_000;
    const [one, other] = [new Random(5, 7), new Random(5, 8)];
    let sum = 0;
    for (let i = 0; i < draws; i++) sum += one.normal() * other.normal();
    expect(Math.abs(sum / draws)).toBeLessThan(4 / Math.sqrt(draws));
  });
});
