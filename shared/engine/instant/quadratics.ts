import { EngineError } from '../errors';
import { factor, solveFactored } from '../linear/lu';
import { trackPaths } from './homotopy';
import type { Magnitude } from './magnitudes';

/** Beyond this many together, 2ⁿ branches are no answer that anyone can use. */
const most = 8;

/** All real t with |V_i + Σ Z_ij t_j| = m_i, as many equations as parameters, in ascending order. */
export const solveQuadratics = (set: readonly Magnitude[]): Float64Array[] => {
  if (set.length > most)
    throw new EngineError(
      'unsupported',
      'knowns',
      `More than ${most} magnitudes without direction depend on each other.`,
    );
  const roots = set.length === 1 ? single(set[0]) : several(set);
  return roots.sort((a, b) => {
    for (let i = 0; i < a.length; i++) if (a[i] !== b[i]) return a[i] - b[i];
    return 0;
  });
};

const single = ({ fixed, free, magnitude }: Magnitude): Float64Array[] => {
  const [z] = free;
  const a = z[0] * z[0] + z[1] * z[1];
  const b = fixed[0] * z[0] + fixed[1] * z[1];
  // The part of V across Z cannot be changed: it must not exceed the magnitude.
  const across = (fixed[0] * z[1] - fixed[1] * z[0]) / Math.sqrt(a);
  const rest = (magnitude - across) * (magnitude + across);
  if (rest < -1e-12 * magnitude * magnitude) return [];
  const half = Math.sqrt(Math.max(rest, 0) / a);
  const middle = -b / a;
  if (half * Math.sqrt(a) <= 1e-9 * magnitude) return [Float64Array.of(middle)];
  return [Float64Array.of(middle - half), Float64Array.of(middle + half)];
};

const several = (set: readonly Magnitude[]): Float64Array[] => {
  const n = set.length;
  const scale = Math.max(...set.map((m) => m.magnitude));
  // Parameters in units in which every vector changes by about `scale`.
  const units = Array.from({ length: n }, (_, j) => {
    const size = Math.max(...set.map((m) => Math.hypot(m.free[j][0], m.free[j][1])));
    return scale / size;
  });
  const scaled = set.map((m) => ({
    fixed: [m.fixed[0] / scale, m.fixed[1] / scale] as const,
    free: m.free.map(([x, y], j) => [(x * units[j]) / scale, (y * units[j]) / scale] as const),
    magnitude: m.magnitude / scale,
  }));
  const quadratics = scaled.map(({ fixed, free, magnitude }) => {
    const basis = [fixed, ...free];
    const coefficients = basis.map((u) => basis.map((v) => u[0] * v[0] + u[1] * v[1]));
    coefficients[0][0] -= magnitude * magnitude;
    return coefficients;
  });
  const roots: Float64Array[] = [];
  for (const start of trackPaths(quadratics)) {
    const root = polish(scaled, start);
    if (root === null) continue;
    if (!roots.some((r) => r.every((v, i) => Math.abs(v - root[i]) < 1e-6))) roots.push(root);
  }
  return roots.map((r) => r.map((v, j) => v * units[j]));
};

/** Newton's method in real numbers; null when there is no real root at the start. */
const polish = (set: readonly Magnitude[], start: Float64Array): Float64Array | null => {
  const n = set.length;
  const t = Float64Array.from(start);
  for (let round = 0; round < 40; round++) {
    const matrix = { rows: n, columns: n, values: new Float64Array(n * n) };
    const f = new Float64Array(n);
    set.forEach(({ fixed, free, magnitude }, i) => {
      let x = fixed[0];
      let y = fixed[1];
      free.forEach(([zx, zy], j) => {
        x += zx * t[j];
        y += zy * t[j];
      });
      f[i] = x * x + y * y - magnitude * magnitude;
      free.forEach(([zx, zy], j) => {
        matrix.values[i * n + j] = 2 * (x * zx + y * zy);
      });
    });
    const size = f.reduce((m, v) => Math.max(m, Math.abs(v)), 0);
    if (size < 1e-15) return t;
    const factors = factor(matrix);
    if (factors.pivotRatio < 1e-14) return size < 1e-12 ? t : null;
    const step = solveFactored(factors, f);
    let length = 0;
    for (let j = 0; j < n; j++) {
      t[j] -= step[j];
      length = Math.max(length, Math.abs(step[j]));
    }
    if (length < 1e-14) return t;
    if (!(length < 1e3)) return null;
  }
  return t.every((v, j) => Math.abs(v - start[j]) < 1e-4) ? t : null;
};
