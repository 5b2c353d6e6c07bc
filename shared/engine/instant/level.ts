import { unknownScales } from './assemble';
import type { Column } from './derivative';
import { noiseColumns, readersOf, velocityDerivatives } from './derivative';
import type { Direct } from './direct';
import { conditionOf, factorDirect, planBand, solveDirect } from './direct';
import type { Equations } from './equations';
import { writeEquations } from './equations';
import { pointMotion } from './knowns';
import type { Model, State } from './model';
import { refine } from './refine';
import { findStarts, isDirectionOnly, rigid } from './starts';
import type { LevelResult, Task } from './task';
import { motionOf } from './task';

export type LevelOutcome =
  | { readonly found: readonly LevelResult[]; readonly refused: null }
  | { readonly found: readonly []; readonly refused: Refusal };

/** Why no motion satisfies the equations. */
export type Refusal =
  'exact equations contradict' | 'no such magnitude' | 'only rest' | 'sense' | 'too large';

/**
 * Bodies up to which equations that are more or fewer than the unknowns are judged; the work grows
 * with the cube. Just determined problems may be of any size.
 */
const mostJudged = 100;

/** The velocities' equations. */
export const velocityTask = (model: Model, equations: Equations, tolerance: number): Task => {
  const readers = readersOf(equations, model.noises.length);
  return {
    model,
    equations,
    readers,
    scales: unknownScales(model),
    tolerance,
    columns: (s) => noiseColumns(model, equations, readers, s),
    adjusts: model.noises.map(() => true),
  };
};

/**
 * The accelerations' equations for velocities found before: what is uncertain in those, and in the
 * values that went into them, comes through their errors.
 */
export const accelerationTask = (
  model: Model,
  equations: Equations,
  tolerance: number,
  velocity: LevelResult,
): Task => {
  const readers = readersOf(equations, model.noises.length);
  const own = new Set<number>();
  model.knowns.forEach((k) => {
    if (k.level === 'acceleration' && k.kind !== 'curvature') k.parts.forEach((p) => own.add(p.at));
  });
  return {
    model,
    equations,
    readers,
    scales: unknownScales(model),
    tolerance,
    columns: (s) => {
      const direct = afterAdjustment(noiseColumns(model, equations, readers, s), velocity);
      return throughVelocities(model, equations, s, direct, velocity);
    },
    adjusts: model.noises.map((n) => n.entries.every((e) => own.has(e.at))),
  };
};

/** Noises that the velocities have already judged are less free than before: I − BᵀPB. */
export const afterAdjustment = (columns: Column[], velocity: LevelResult): Column[] => {
  if (velocity.adjustment === null || velocity.redundancy === 0) return columns;
  const { control } = velocity.adjustment;
  return columns.map((column, j) => {
    const sums = new Map<number, number>();
    columns.forEach((other, i) => {
      const share = (i === j ? 1 : 0) - control.values[i * control.columns + j];
      if (share === 0) return;
      other.rows.forEach((row, k) => sums.set(row, (sums.get(row) ?? 0) + share * other.values[k]));
    });
    return sums.size === 0 ? column : { rows: [...sums.keys()], values: [...sums.values()] };
  });
};

const throughVelocities = (
  model: Model,
  equations: Equations,
  s: State,
  columns: Column[],
  velocity: LevelResult,
): Column[] => {
  if (columns.length === 0) return columns;
  const derivatives = velocityDerivatives(model, equations, s);
  const rows = writeEquations(equations, model.ground, s);
  return columns.map((column, j) => {
    const sums = new Float64Array(equations.count);
    column.rows.forEach((row, k) => {
      sums[row] += column.values[k];
    });
    const error = velocity.errors[j];
    for (let k = 0; k < equations.count; k++) {
      const a = 3 * rows.first[k];
      const b = 3 * rows.second[k];
      for (let c = 0; c < 3; c++)
        sums[k] +=
          derivatives[6 * k + c] * error[a + c] + derivatives[6 * k + 3 + c] * error[b + c];
    }
    const touched: Column = { rows: [], values: [] };
    sums.forEach((v, k) => {
      if (v === 0) return;
      touched.rows.push(k);
      touched.values.push(v);
    });
    return touched;
  });
};

/** Solves a level; `s` holds the values and, for accelerations, the velocities. */
export const solveLevel = (task: Task, s: State): LevelOutcome => {
  const direct = solveSquare(task, s);
  if (direct !== null && senseViolation(task, s, direct) === null)
    return { found: [direct], refused: null };
  if (task.model.ground > mostJudged) return { found: [], refused: 'too large' };
  const base = Float64Array.from(s.g);
  const starts = findStarts(task, s);
  if (typeof starts === 'string') return { found: [], refused: starts };
  const found: LevelResult[] = [];
  let refused: Refusal = 'exact equations contradict';
  for (const start of starts.motions) {
    s.g.set(base);
    const result = refine(task, s, start, starts.held);
    if (result === null) continue;
    if (senseViolation(task, s, result) !== null) refused = 'sense';
    else if (!found.some((other) => sameMotion(task, other, result))) found.push(result);
  }
  if (found.length === 0) return { found: [], refused };
  found.sort((a, b) => a.chiSquared - b.chiSquared);
  return { found, refused: null };
};

const sameMotion = (task: Task, a: LevelResult, b: LevelResult): boolean => {
  let size = 0;
  let apart = 0;
  task.scales.forEach((scale, i) => {
    size = Math.max(size, Math.abs(a.motion[i] * scale));
    apart = Math.max(apart, Math.abs((a.motion[i] - b.motion[i]) * scale));
  });
  return apart <= 1e-7 * size;
};

/** The first known whose sense the motion goes against, if any. */
const senseViolation = (task: Task, s: State, result: LevelResult): string | null => {
  motionOf(task, s).set(result.motion);
  for (const { known } of task.equations.owners) {
    if (known === null || !isDirectionOnly(known) || known.line) continue;
    const open = result.free.some((z) => {
      const [x, y] = rigid(s, z, known.a);
      return Math.hypot(x, y) > 1e-9 && !parallelMotion(result.motion, z);
    });
    if (open) continue;
    const [vx, vy] = pointMotion(task.equations.level, s, known.a);
    const angle = result.g[known.directionAt];
    if (vx * Math.cos(angle) + vy * Math.sin(angle) < -1e-9 * Math.hypot(vx, vy)) return known.id;
  }
  return null;
};

/** Whether the free motion is the motion itself on another scale. */
const parallelMotion = (q: Float64Array, z: Float64Array): boolean => {
  let dot = 0;
  let qq = 0;
  let zz = 0;
  z.forEach((v, i) => {
    if (v === 0) return;
    dot += v * q[i];
    qq += q[i] * q[i];
    zz += v * v;
  });
  return qq > 0 && dot * dot >= (1 - 1e-12) * qq * zz;
};

/** As many equations as unknowns, and all linear: solved without further ado, or null. */
const solveSquare = (task: Task, s: State): LevelResult | null => {
  const { model, equations, scales, tolerance } = task;
  if (equations.count !== 3 * model.ground || equations.quadratic.length > 0) return null;
  const motion = motionOf(task, s);
  motion.fill(0);
  const rows = writeEquations(equations, model.ground, s);
  if (equations.owners.some((o) => o.known !== null && isDirectionOnly(o.known)))
    if (rows.right.every((v) => v === 0)) return null;
  const direct = factorDirect(planBand(model, rows, scales), rows);
  const condition = conditionOf(direct, tolerance);
  if (condition === null) return null;
  solveDirect(direct, rows.right, motion);
  return {
    motion: Float64Array.from(motion),
    errors: squareErrors(task, s, direct),
    g: s.g,
    adjustment: null,
    free: [],
    rank: rows.count,
    redundancy: 0,
    chiSquared: 0,
    condition,
  };
};

const squareErrors = (task: Task, s: State, direct: Direct): Float64Array[] => {
  const right = new Float64Array(direct.plan.size);
  const work = new Float64Array(direct.plan.size);
  return task.columns(s).map((column) => {
    const error = new Float64Array(3 * (task.model.ground + 1));
    if (column.rows.length === 0) return error;
    right.fill(0);
    column.rows.forEach((row, k) => {
      right[row] = -column.values[k];
    });
    solveDirect(direct, right, error, work);
    return error;
  });
};
