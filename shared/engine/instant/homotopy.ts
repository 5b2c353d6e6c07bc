/**
 * All roots of n quadratic equations in n unknowns by homotopy continuation.
 *
 * Equation i is Σ q_i[j][k] x_j x_k = 0 over homogeneous unknowns x = (x_0 … x_n), where x_0 = 1 at
 * a finite root. From the 2ⁿ roots of x_j² = x_0² the paths of
 * γ (1 − τ)(x_j² − x_0²) + τ q_j(x) = 0 are followed to τ = 1 by Euler predictor and Newton
 * corrector in complex numbers, on the patch a·x = 1. With a generic γ no path meets another
 * before its end, so every isolated root is the end of one. Source: Sommese and Wampler, The
 * Numerical Solution of Systems of Polynomials (2005), chapters 2 and 3.
 *
 * Returns real parts of the ends that are finite and nearly real, to be made exact by the caller.
 */
export const trackPaths = (
  quadratics: readonly (readonly (readonly number[])[])[],
): Float64Array[] => {
  const n = quadratics.length;
  const ends: Float64Array[] = [];
  for (let signs = 0; signs < 2 ** n; signs++) {
    const x = startOf(n, signs);
    follow(quadratics, x);
    const end = finiteReal(x, n);
    if (end !== null) ends.push(end);
  }
  return ends;
};

/** Complex numbers by pairs: x[2 j] + i x[2 j + 1]. */
type Complex = Float64Array;

/** A number of the unit circle that no problem will single out. */
const gamma = [Math.cos(2.1371), Math.sin(2.1371)] as const;

const patch = (n: number): Complex => {
  const a = new Float64Array(2 * (n + 1));
  for (let j = 0; j <= n; j++) {
    a[2 * j] = Math.cos(1.3 + 1.7 * j);
    a[2 * j + 1] = Math.sin(1.3 + 1.7 * j);
  }
  return a;
};

const startOf = (n: number, signs: number): Complex => {
  const x = new Float64Array(2 * (n + 1));
  for (let j = 0; j <= n; j++) x[2 * j] = j > 0 && (signs >> (j - 1)) & 1 ? -1 : 1;
  const a = patch(n);
  let re = 0;
  let im = 0;
  for (let j = 0; j <= n; j++) {
    re += a[2 * j] * x[2 * j];
    im += a[2 * j + 1] * x[2 * j];
  }
  const size = re * re + im * im;
  for (let j = 0; j <= n; j++) {
    const v = x[2 * j];
    x[2 * j] = (v * re) / size;
    x[2 * j + 1] = (-v * im) / size;
  }
  return x;
};

/** Values (last column) and derivatives of the equations at τ, with those by τ after them. */
const evaluate = (
  quadratics: readonly (readonly (readonly number[])[])[],
  x: Complex,
  tau: number,
): { system: Complex; width: number } => {
  const n = quadratics.length;
  const width = n + 3;
  const m = new Float64Array(2 * (n + 1) * width);
  const set = (r: number, c: number, re: number, im: number): void => {
    m[2 * (r * width + c)] += re;
    m[2 * (r * width + c) + 1] += im;
  };
  quadratics.forEach((q, i) => {
    let fr = 0;
    let fi = 0;
    for (let j = 0; j <= n; j++) {
      let dr = 0;
      let di = 0;
      for (let k = 0; k <= n; k++) {
        dr += q[j][k] * x[2 * k];
        di += q[j][k] * x[2 * k + 1];
      }
      fr += dr * x[2 * j] - di * x[2 * j + 1];
      fi += dr * x[2 * j + 1] + di * x[2 * j];
      set(i, j, 2 * tau * dr, 2 * tau * di);
    }
    const [gr, gi] = gamma;
    const a = 2 * (i + 1);
    const square = (o: number): [number, number] => [
      x[o] * x[o] - x[o + 1] * x[o + 1],
      2 * x[o] * x[o + 1],
    ];
    const [ar, ai] = square(a);
    const [br, bi] = square(0);
    const sr = gr * (ar - br) - gi * (ai - bi);
    const si = gr * (ai - bi) + gi * (ar - br);
    const rest = 1 - tau;
    set(i, i + 1, 2 * rest * (gr * x[a] - gi * x[a + 1]), 2 * rest * (gr * x[a + 1] + gi * x[a]));
    set(i, 0, -2 * rest * (gr * x[0] - gi * x[1]), -2 * rest * (gr * x[1] + gi * x[0]));
    set(i, n + 1, tau * fr + rest * sr, tau * fi + rest * si);
    set(i, n + 2, fr - sr, fi - si);
  });
  const a = patch(n);
  let pr = -1;
  let pi = 0;
  for (let j = 0; j <= n; j++) {
    set(n, j, a[2 * j], a[2 * j + 1]);
    pr += a[2 * j] * x[2 * j] - a[2 * j + 1] * x[2 * j + 1];
    pi += a[2 * j] * x[2 * j + 1] + a[2 * j + 1] * x[2 * j];
  }
  set(n, n + 1, pr, pi);
  return { system: m, width };
};

/** Solves the square part for the last two columns, in place; false when it is singular. */
const eliminate = (m: Complex, n: number, width: number): boolean => {
  const abs2 = (o: number): number => m[o] * m[o] + m[o + 1] * m[o + 1];
  for (let k = 0; k < n; k++) {
    let pivot = k;
    for (let r = k + 1; r < n; r++)
      if (abs2(2 * (r * width + k)) > abs2(2 * (pivot * width + k))) pivot = r;
    const size = abs2(2 * (pivot * width + k));
    if (size < 1e-60) return false;
    for (let c = 0; c < 2 * width; c++) {
      const swap = m[2 * k * width + c];
      m[2 * k * width + c] = m[2 * pivot * width + c];
      m[2 * pivot * width + c] = swap;
    }
    const o = 2 * (k * width + k);
    const ir = m[o] / size;
    const ii = -m[o + 1] / size;
    for (let c = k; c < width; c++) {
      const p = 2 * (k * width + c);
      const re = m[p] * ir - m[p + 1] * ii;
      m[p + 1] = m[p] * ii + m[p + 1] * ir;
      m[p] = re;
    }
    for (let r = 0; r < n; r++) {
      if (r === k) continue;
      const fr = m[2 * (r * width + k)];
      const fi = m[2 * (r * width + k) + 1];
      if (fr === 0 && fi === 0) continue;
      for (let c = k; c < width; c++) {
        const p = 2 * (k * width + c);
        const q = 2 * (r * width + c);
        m[q] -= fr * m[p] - fi * m[p + 1];
        m[q + 1] -= fr * m[p + 1] + fi * m[p];
      }
    }
  }
  return true;
};

/** Newton's correction at τ: how far the last step moved, or Infinity. */
const correct = (
  quadratics: readonly (readonly (readonly number[])[])[],
  x: Complex,
  tau: number,
): number => {
  let moved = Infinity;
  for (let round = 0; round < 3; round++) {
    const { system, width } = evaluate(quadratics, x, tau);
    const size = width - 2;
    if (!eliminate(system, size, width)) return Infinity;
    moved = 0;
    for (let j = 0; j < size; j++) {
      const o = 2 * (j * width + size);
      x[2 * j] -= system[o];
      x[2 * j + 1] -= system[o + 1];
      moved = Math.max(moved, Math.hypot(system[o], system[o + 1]));
    }
    if (moved < 1e-12) break;
  }
  return moved;
};

const follow = (quadratics: readonly (readonly (readonly number[])[])[], x: Complex): void => {
  let tau = 0;
  let step = 0.02;
  while (tau < 1 && step > 1e-10) {
    const next = Math.min(1, tau + step);
    const trial = Float64Array.from(x);
    const { system, width } = evaluate(quadratics, x, tau);
    const size = width - 2;
    if (!eliminate(system, size, width)) return;
    for (let j = 0; j < size; j++) {
      const o = 2 * (j * width + size + 1);
      trial[2 * j] -= (next - tau) * system[o];
      trial[2 * j + 1] -= (next - tau) * system[o + 1];
    }
    const before = Float64Array.from(trial);
    const moved = correct(quadratics, trial, next);
    let drift = 0;
    for (let j = 0; j < trial.length; j++) drift = Math.max(drift, Math.abs(trial[j] - before[j]));
    if (moved < 1e-7 && drift < 1e-2) {
      x.set(trial);
      tau = next;
      if (drift < 1e-3) step = Math.min(2 * step, 0.05);
    } else step /= 2;
  }
};

const finiteReal = (x: Complex, n: number): Float64Array | null => {
  const size = x[0] * x[0] + x[1] * x[1];
  let largest = 0;
  for (const v of x) largest = Math.max(largest, Math.abs(v));
  if (Math.sqrt(size) < 1e-6 * largest) return null;
  const t = new Float64Array(n);
  for (let j = 1; j <= n; j++) {
    t[j - 1] = (x[2 * j] * x[0] + x[2 * j + 1] * x[1]) / size;
    const imaginary = (x[2 * j + 1] * x[0] - x[2 * j] * x[1]) / size;
    if (Math.abs(imaginary) > 1e-3 * (1 + Math.abs(t[j - 1]))) return null;
  }
  return t;
};
