/**
 * The generator xoshiro128**, from its four words of state (not all 0).
 * Source: D. Blackman and S. Vigna, "Scrambled linear pseudorandom number generators", ACM Trans.
 * Math. Softw. 47 (2021) 36, from memory.
 */
export class Xoshiro128 {
  constructor(
    private a: number,
    private b: number,
    private c: number,
    private d: number,
  ) {}

  /** The next 32 bits, as a whole number. */
  bits(): number {
    const s1 = this.b;
    const five = Math.imul(s1, 5);
    const result = Math.imul((five << 7) | (five >>> 25), 9) >>> 0;
    this.c ^= this.a;
    this.d ^= s1;
    this.b = s1 ^ this.c;
    this.a ^= this.d;
    this.c ^= s1 << 9;
    this.d = (this.d << 11) | (this.d >>> 21);
    return result;
  }
}

/**
 * Reproducible random numbers: the same seed gives the same draws on every machine.
 *
 * `seed` and `stream` are whole numbers from 0 to 2³² − 1; streams of one seed are unrelated. The
 * state comes from SplitMix32. Source of the normal: the ziggurat of G. Marsaglia and W. W. Tsang, J.
 * Stat. Softw. 5 (2000) 8, in the form of J. A. Doornik (2005), which draws the layer and the value
 * apart; from memory.
 */
export class Random extends Xoshiro128 {
  constructor(seed: number, stream = 0) {
    // seed and stream are each scattered first: streams that began side by side would overlap
    let state = scatter((scatter(seed) + Math.imul(stream, 0x85ebca6b)) >>> 0);
    const next = (): number => {
      state = (state + 0x9e3779b9) >>> 0;
      return scatter(state);
    };
    super(next(), next(), next(), next() | 1);
  }

  /** Uniform in (0, 1), 53 bits, never 0. */
  uniform(): number {
    return ((this.bits() >>> 5) * 67108864 + (this.bits() >>> 6) + 0.5) / 9007199254740992;
  }

  /** Standard normal. */
  normal(): number {
    for (;;) {
      const layer = this.bits() & 127;
      const u = 2 * this.uniform() - 1;
      if (Math.abs(u) < ratios[layer]) return u * edges[layer];
      if (layer === 0) return this.tail(u < 0);
      const x = u * edges[layer];
      const inner = Math.exp(-0.5 * (edges[layer] ** 2 - x * x));
      const outer = Math.exp(-0.5 * (edges[layer + 1] ** 2 - x * x));
      if (outer + this.uniform() * (inner - outer) < 1) return x;
    }
  }

  /** Beyond the ziggurat's base, by Marsaglia's exact method. */
  private tail(negative: boolean): number {
    for (;;) {
      const x = Math.log(this.uniform()) / base;
      const y = Math.log(this.uniform());
      if (-2 * y >= x * x) return negative ? x - base : base - x;
    }
  }
}

/** The output function of SplitMix32. */
function scatter(bits: number): number {
  let z = bits;
  z = Math.imul(z ^ (z >>> 16), 0x21f0aaad);
  z = Math.imul(z ^ (z >>> 15), 0x735a2d97);
  return (z ^ (z >>> 15)) >>> 0;
}

/** Right edge of the lowest layer and the area of each of the 128 layers. */
const base = 3.442619855899;
const area = 9.91256303526217e-3;
const layers = 128;

const edges = layerEdges();
const ratios = Float64Array.from({ length: layers }, (_, i) => edges[i + 1] / edges[i]);

function layerEdges(): Float64Array {
  const x = new Float64Array(layers + 1);
  let density = Math.exp(-0.5 * base * base);
  x[0] = area / density;
  x[1] = base;
  for (let i = 2; i < layers; i++) {
    x[i] = Math.sqrt(-2 * Math.log(area / x[i - 1] + density));
    density = Math.exp(-0.5 * x[i] * x[i]);
  }
  return x;
}
