import { zeros } from '../linear/dense';
import { nullSpace, pivotedQr } from '../linear/pivoted-qr';
import { solveQuadratics } from './quadratics';

/** |V + Σ Z_i t_i| = m: a magnitude known of a vector that depends on free parameters t. */
export interface Magnitude {
  readonly fixed: readonly [number, number];
  /** One vector for each parameter. */
  readonly free: readonly (readonly [number, number])[];
  readonly magnitude: number;
}

/**
 * Every way in which the magnitudes fix the parameters that they can fix: lists of t. Parameters
 * that no set of magnitudes decides stay 0. An empty list means that some magnitude cannot be had.
 *
 * Works from the smallest set of magnitudes that decides as many parameters as it depends on, and
 * goes on with the rest in every branch; magnitudes beyond those needed are left for the
 * adjustment to judge.
 */
export const magnitudeBranches = (
  magnitudes: readonly Magnitude[],
  parameters: number,
): Float64Array[] => branch(magnitudes, parameters, 1);

const branch = (
  magnitudes: readonly Magnitude[],
  parameters: number,
  size: number,
): Float64Array[] => {
  if (parameters === 0 || size > magnitudes.length) return [new Float64Array(parameters)];
  for (const chosen of subsets(magnitudes.length, size)) {
    const set = chosen.map((i) => magnitudes[i]);
    const basis = dependence(set, parameters);
    const rank = basis.depends.length;
    if (rank === 0 || rank > size) continue;
    const reduced = set.map((m) => transform(m, basis.depends));
    const roots = solveQuadratics(independent(reduced, rank));
    const rest = magnitudes.filter((_, i) => !chosen.includes(i));
    return roots.flatMap((root) => {
      const t = combine(basis.depends, root, parameters);
      const moved = rest.map((m) => transform(shifted(m, t), basis.open));
      return branch(moved, basis.open.length, 1).map((inner) => {
        const more = combine(basis.open, inner, parameters);
        return t.map((v, i) => v + more[i]);
      });
    });
  }
  return branch(magnitudes, parameters, size + 1);
};

const subsets = (count: number, size: number): number[][] => {
  if (size === 0) return [[]];
  const found: number[][] = [];
  for (let last = size - 1; last < count; last++)
    for (const before of subsets(last, size - 1)) found.push([...before, last]);
  return found;
};

/** Directions of t on which the magnitudes depend, and directions that leave them alone. */
const dependence = (
  set: readonly Magnitude[],
  parameters: number,
): { depends: Float64Array[]; open: Float64Array[] } => {
  const rows = zeros(2 * set.length, parameters);
  set.forEach((m, i) =>
    m.free.forEach(([x, y], j) => {
      rows.values[2 * i * parameters + j] = x;
      rows.values[(2 * i + 1) * parameters + j] = y;
    }),
  );
  const qr = pivotedQr(rows, 1e-9);
  const depends = Array.from({ length: qr.rank }, (_, k) => {
    const unit = new Float64Array(parameters);
    unit[qr.order[k]] = 1;
    return unit;
  });
  return { depends, open: nullSpace(qr) };
};

const combine = (
  basis: readonly Float64Array[],
  amounts: ArrayLike<number>,
  parameters: number,
): Float64Array => {
  const t = new Float64Array(parameters);
  basis.forEach((vector, k) => {
    for (let i = 0; i < parameters; i++) t[i] += amounts[k] * vector[i];
  });
  return t;
};

const transform = (m: Magnitude, basis: readonly Float64Array[]): Magnitude => ({
  ...m,
  free: basis.map((vector) =>
    m.free.reduce<readonly [number, number]>(
      ([x, y], [fx, fy], i) => [x + vector[i] * fx, y + vector[i] * fy],
      [0, 0],
    ),
  ),
});

const shifted = (m: Magnitude, t: Float64Array): Magnitude => ({
  ...m,
  fixed: m.free.reduce<readonly [number, number]>(
    ([x, y], [fx, fy], i) => [x + t[i] * fx, y + t[i] * fy],
    m.fixed,
  ),
});

/** As many of the magnitudes as there are parameters, that together depend on all of them. */
const independent = (set: readonly Magnitude[], rank: number): readonly Magnitude[] => {
  if (set.length === rank) return set;
  for (const chosen of subsets(set.length, rank)) {
    const tried = chosen.map((i) => set[i]);
    if (dependence(tried, rank).depends.length === rank) return tried;
  }
  return set.slice(0, rank);
};
