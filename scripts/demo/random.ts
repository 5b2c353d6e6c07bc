/** Seeded random numbers, so that the demo world is the same on every machine and every run. */
export interface Random {
  /** Uniform in [0, 1). */
  uniform(): number;
  /** Normal with mean 0 and the given standard deviation. */
  normal(sigma: number): number;
}

/** mulberry32 with a Box-Muller normal: enough for demo noise, nothing else. */
export function seededRandom(seed: number): Random {
  let state = seed >>> 0;
  const uniform = (): number => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296;
  };
  const normal = (sigma: number): number => {
    const radius = Math.sqrt(-2 * Math.log(1 - uniform()));
    return sigma * radius * Math.cos(2 * Math.PI * uniform());
  };
  return { uniform, normal };
}
