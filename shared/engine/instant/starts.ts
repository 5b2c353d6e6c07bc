import { Matrix, SingularValueDecomposition } from 'ml-matrix';
import type { Dense } from '../linear/dense';
import { zeros } from '../linear/dense';
import { nullSpace, pivotedQr } from '../linear/pivoted-qr';
import { adjust, structureOf } from './adjustment';
import { denseColumns, denseRows, rowNorms } from './assemble';
import { writeEquations } from './equations';
import type { Owner } from './equations';
import { isQuadratic, pointMotion } from './knowns';
import type { Magnitude } from './magnitudes';
import { magnitudeBranches } from './magnitudes';
import type { ModelKnown, Place, State } from './model';
import { armX, armY } from './model';
import { contradicts } from './refine';
import { rowResidual } from './rows';
import type { Held, Task } from './task';
import { motionOf } from './task';

/** Where adjustments begin: one motion for each branch. */
export interface Starts {
  readonly motions: readonly Float64Array[];
  /** Unknowns to be held, where directions alone are known and so no scale. */
  readonly held: readonly Held[];
}

/** Why there is none. */
export type NoStart = 'exact equations contradict' | 'no such magnitude' | 'only rest';

type Polar = Extract<ModelKnown, { kind: 'polar' }>;

export const isDirectionOnly = (k: ModelKnown): k is Polar =>
  k.kind === 'polar' && k.directionAt >= 0 && (k.magnitudeAt < 0 || k.line);

/** The motion of a place that a body motion gives, without terms of other levels. */
export const rigid = (s: State, q: Float64Array, a: Place): readonly [number, number] => {
  const o = 3 * a.body;
  return [q[o] - q[o + 2] * armY(s, a), q[o + 1] + q[o + 2] * armX(s, a)];
};

/** Finds the starts from the linear equations, then from the magnitudes. */
export const findStarts = (task: Task, s: State): Starts | NoStart => {
  const { model, equations, scales } = task;
  const motion = motionOf(task, s);
  motion.fill(0);
  const chosen: number[] = [];
  for (let k = 0; k < equations.count; k++) if (!equations.quadratic.includes(k)) chosen.push(k);
  const rows = writeEquations(equations, model.ground, s);
  const norms = rowNorms(rows, scales, model.ground);
  const speed = chosen.reduce((m, k) => Math.max(m, Math.abs(rows.right[k]) / norms[k]), 0);
  const a = denseRows(model, rows, chosen, scales, norms);
  const columns = denseColumns(task.columns(s), equations.count, chosen, norms);
  supposeSpeed(task, columns, chosen, norms, speed > 0 ? speed : 1);

  const directed = scaleFree(task, s, a, columns, chosen, rows.right);
  if (directed === 'only rest') return directed;
  const used = chosen.map((_, r) => r).filter((r) => !directed.rows.has(r));
  const w = Float64Array.from(used, (r) => rowResidual(rows, chosen[r], motion) / norms[chosen[r]]);
  const usedA = pickRows(a, used);
  const usedB = pickRows(columns, used);
  const structure = structureOf(usedA, usedB, task.tolerance);
  const right = Float64Array.from(used, (r) => rows.right[chosen[r]]);
  const usedNorms = Float64Array.from(used, (r) => norms[chosen[r]]);
  if (contradicts(task, structure, w, right, usedNorms, 0)) return 'exact equations contradict';
  const { x } = adjust(usedA, usedB, w, structure);
  const unscaled = (v: Float64Array): Float64Array => {
    const q = new Float64Array(motion.length);
    for (let i = 0; i < v.length; i++) q[i] = v[i] / scales[i];
    return q;
  };
  const still = structure.free.filter(
    (z) => !z.some((v, i) => v !== 0 && directed.unknowns.has(i)),
  );
  const free = [...still.map(unscaled), ...directed.motions.map((d) => d.motion)];
  const base = unscaled(x);
  motion.set(base);

  const magnitudes = magnitudesOf(task, s, free);
  const decided = magnitudeBranches(magnitudes, free.length);
  if (decided.length === 0) return 'no such magnitude';
  const held: Held[] = [];
  const motions = decided.map((t) => {
    const q = Float64Array.from(base);
    free.forEach((z, k) => {
      const scale = k >= still.length && t[k] === 0 ? 1 : t[k];
      for (let i = 0; i < q.length; i++) q[i] += scale * z[i];
    });
    return q;
  });
  directed.motions.forEach((d, k) => {
    if (d.held !== null && decided.every((t) => t[still.length + k] === 0)) held.push(d.held);
  });
  return { motions, held };
};

const pickRows = (a: Dense, rows: readonly number[]): Dense => {
  const picked = zeros(rows.length, a.columns);
  rows.forEach((r, i) =>
    picked.values.set(a.values.subarray(r * a.columns, (r + 1) * a.columns), i * a.columns),
  );
  return picked;
};

/** A direction's uncertainty acts through a speed, which at the start is only supposed. */
const supposeSpeed = (
  task: Task,
  columns: Dense,
  chosen: readonly number[],
  norms: Float64Array,
  speed: number,
): void => {
  for (const { known, from } of task.equations.owners) {
    if (known === null || !isDirectionOnly(known)) continue;
    const r = chosen.indexOf(from);
    task.model.noises.forEach((noise, j) => {
      const entry = noise.entries.find((e) => e.at === known.directionAt);
      if (entry !== undefined)
        columns.values[r * columns.columns + j] = (speed * entry.amount) / norms[from];
    });
  }
};

const magnitudesOf = (task: Task, s: State, free: readonly Float64Array[]): Magnitude[] =>
  task.equations.owners.flatMap(({ known }) => {
    if (known === null || known.kind !== 'polar' || !isQuadratic(known)) return [];
    return [
      {
        fixed: pointMotion(task.equations.level, s, known.a),
        free: free.map((z) => rigid(s, z, known.a)),
        magnitude: s.g[known.magnitudeAt],
      },
    ];
  });

interface ScaleFree {
  /** Rows (among the chosen) that belong to parts of which only directions are known. */
  readonly rows: ReadonlySet<number>;
  readonly unknowns: ReadonlySet<number>;
  readonly motions: readonly { readonly motion: Float64Array; readonly held: Held | null }[];
}

/**
 * Parts of the scene (bodies tied by joints) in which every known is a direction. Rest satisfies
 * their equations, but is not what is sought: sought is the motion, up to its scale, that the
 * directions allow, or fit best.
 */
const scaleFree = (
  task: Task,
  s: State,
  a: Dense,
  columns: Dense,
  chosen: readonly number[],
  right: Float64Array,
): ScaleFree | 'only rest' => {
  const rows = new Set<number>();
  const unknowns = new Set<number>();
  const motions: { motion: Float64Array; held: Held | null }[] = [];
  for (const part of partsOf(task)) {
    const owners = part.owners.filter((o) => o.known !== null && isDirectionOnly(o.known));
    if (owners.length === 0) continue;
    const own = part.owners.flatMap((o) =>
      Array.from({ length: o.count }, (_, k) => chosen.indexOf(o.from + k)).filter((r) => r >= 0),
    );
    if (own.some((r) => right[chosen[r]] !== 0)) continue;
    const at = part.bodies.flatMap((b) => [3 * b, 3 * b + 1, 3 * b + 2]);
    const found = directedMotion(restrict(a, own, at), pickRows(columns, own), task.tolerance);
    if (found === 'only rest') return found;
    if (found === null) continue;
    const motion = new Float64Array(3 * (task.model.ground + 1));
    found.forEach((v, i) => {
      motion[at[i]] = v / task.scales[at[i]];
    });
    normalise(motion, owners, s);
    const exact = pivotedQr(restrict(a, own, at), task.tolerance).rank < at.length;
    const held = exact ? null : { unknown: at[indexOfLargest(found)], bodies: part.bodies };
    own.forEach((r) => rows.add(r));
    at.forEach((i) => unknowns.add(i));
    motions.push({ motion, held });
  }
  return { rows, unknowns, motions };
};

const restrict = (a: Dense, rows: readonly number[], columns: readonly number[]): Dense => {
  const part = zeros(rows.length, columns.length);
  rows.forEach((r, i) =>
    columns.forEach((c, j) => {
      part.values[i * columns.length + j] = a.values[r * a.columns + c];
    }),
  );
  return part;
};

const indexOfLargest = (v: Float64Array): number =>
  v.reduce((best, x, i) => (Math.abs(x) > Math.abs(v[best]) + 1e-12 ? i : best), 0);

/** The one motion that the rows allow, or fit best; null when they allow several. */
const directedMotion = (
  a: Dense,
  b: Dense,
  tolerance: number,
): Float64Array | null | 'only rest' => {
  const all = nullSpace(pivotedQr(a, tolerance));
  if (all.length > 0) return all.length === 1 ? all[0] : null;
  const noise = Array.from({ length: a.rows }, (_, r) =>
    Math.hypot(...b.values.subarray(r * b.columns, (r + 1) * b.columns)),
  );
  const exact = noise.flatMap((v, r) => (v === 0 ? [r] : []));
  const loose = noise.flatMap((v, r) => (v === 0 ? [] : [r]));
  const open =
    exact.length === 0
      ? Array.from({ length: a.columns }, (_, i) => {
          const unit = new Float64Array(a.columns);
          unit[i] = 1;
          return unit;
        })
      : nullSpace(pivotedQr(pickRows(a, exact), tolerance));
  if (open.length === 0) return 'only rest';
  const weighted = new Matrix(Math.max(loose.length, open.length), open.length);
  loose.forEach((r, i) =>
    open.forEach((z, k) => {
      let sum = 0;
      for (let c = 0; c < a.columns; c++) sum += a.values[r * a.columns + c] * z[c];
      weighted.set(i, k, sum / noise[r]);
    }),
  );
  const v = new SingularValueDecomposition(weighted).rightSingularVectors;
  const best = new Float64Array(a.columns);
  open.forEach((z, k) => {
    const amount = v.get(k, open.length - 1);
    for (let c = 0; c < a.columns; c++) best[c] += amount * z[c];
  });
  return best;
};

/** Brings the speeds at the known directions to about 1 m/s, in the sense of most of them. */
const normalise = (motion: Float64Array, owners: readonly Owner[], s: State): void => {
  let along = 0;
  let speed = 0;
  for (const { known } of owners) {
    if (known === null || known.kind !== 'polar') continue;
    const [vx, vy] = rigid(s, motion, known.a);
    const angle = s.g[known.directionAt];
    speed += Math.hypot(vx, vy);
    if (!known.line) along += vx * Math.cos(angle) + vy * Math.sin(angle);
  }
  if (!(speed > 0)) return;
  const factor = ((along < 0 ? -1 : 1) * owners.length) / speed;
  for (let i = 0; i < motion.length; i++) motion[i] *= factor;
};

interface Part {
  readonly bodies: number[];
  readonly owners: Owner[];
}

/** Bodies that joints or knowns of this level tie together. */
const partsOf = (task: Task): Part[] => {
  const { ground } = task.model;
  const leader = Int32Array.from({ length: ground }, (_, b) => b);
  const find = (b: number): number => {
    let root = b;
    while (leader[root] !== root) root = leader[root];
    return root;
  };
  for (const { bodies } of task.equations.owners) {
    const own = bodies.filter((b) => b < ground);
    for (const b of own) leader[find(b)] = find(own[0]);
  }
  const parts = new Map<number, Part>();
  for (let b = 0; b < ground; b++) {
    const root = find(b);
    const part = parts.get(root) ?? { bodies: [], owners: [] };
    part.bodies.push(b);
    parts.set(root, part);
  }
  for (const owner of task.equations.owners) {
    const own = owner.bodies.find((b) => b < ground);
    if (own !== undefined) parts.get(find(own))?.owners.push(owner);
  }
  return [...parts.values()];
};
