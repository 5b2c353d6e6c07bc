import type { Level, ModelPath, State } from '../model';
import { armX, armY, positionX, positionY } from '../model';
import type { Rows } from '../rows';
import { centripetal, otherTerm, pointTerm } from '../rows';

/**
 * Point a on a path fixed in another body (slot), in the scene (guide), or at a rolling radius
 * from it (the centre of a wheel).
 *
 * With u along the path, n to its left, s the rate of sliding relative to the body of the path, Ω
 * the rate of that body and ρ the radius of the path (centre at its left when positive):
 *   v_A = v_A' + s u                              A' the coincident point of the body
 *   a_A = a_A' + 2 Ω k × s u + ṡ u + s²/ρ n      (Coriolis; normal acceleration)
 * so that along n: 0 = n·(v_A − v_A') and n·(a_A − a_A') = 2 Ω s + s²/ρ. Rolling without slip adds
 * s + (ω − Ω) R = 0 and ṡ + (α − ω̇_path) R = 0. Source: any textbook of dynamics; see engine checks
 * A06, A07, A10, A11.
 */
export interface PathFrame {
  readonly ux: number;
  readonly uy: number;
  /** 1/ρ of the path of the point a, signed. */
  readonly curvature: number;
}

export const pathFrame = (j: ModelPath, s: State): PathFrame => {
  const c = s.cos[j.b.body];
  const n = s.sin[j.b.body];
  const direction = s.g[j.directionAt];
  const dx = Math.cos(direction);
  const dy = Math.sin(direction);
  const ux = c * dx - n * dy;
  const uy = n * dx + c * dy;
  if (j.radiusAt < 0) return { ux, uy, curvature: 0 };
  const radius = s.g[j.radiusAt];
  const rolling = j.rollingAt < 0 ? 0 : s.g[j.rollingAt];
  if (j.atPoint) return { ux, uy, curvature: 1 / (radius - rolling) };
  const toX = positionX(s, j.b) - uy * radius - positionX(s, j.a);
  const toY = positionY(s, j.b) + ux * radius - positionY(s, j.a);
  const length = Math.hypot(toX, toY);
  const sign = Math.sign(radius - rolling);
  const nx = (sign * toX) / length;
  const ny = (sign * toY) / length;
  return { ux: ny, uy: -nx, curvature: 1 / (radius - rolling) };
};

/** Row c · (v_A − v_A'), c any direction, with the known part of the accelerations on the right. */
const relativeRow = (
  j: ModelPath,
  level: Level,
  s: State,
  rows: Rows,
  k: number,
  cx: number,
  cy: number,
): void => {
  const ax = armX(s, j.a);
  const ay = armY(s, j.a);
  const bx = s.g[3 * j.a.body] + ax - s.g[3 * j.b.body];
  const by = s.g[3 * j.a.body + 1] + ay - s.g[3 * j.b.body + 1];
  pointTerm(rows, k, j.a.body, cx, cy, ax, ay);
  otherTerm(rows, k, j.b.body, -cx, -cy, bx, by);
  rows.right[k] =
    level === 'velocity'
      ? 0
      : centripetal(s, j.a.body, cx, cy, ax, ay) - centripetal(s, j.b.body, cx, cy, bx, by);
};

/** Rate of sliding along the path, m/s; `motion` holds velocities (or their free part). */
export const slideRate = (j: ModelPath, s: State, motion: Float64Array): number => {
  const { ux, uy } = pathFrame(j, s);
  const ax = armX(s, j.a);
  const ay = armY(s, j.a);
  const bx = s.g[3 * j.a.body] + ax - s.g[3 * j.b.body];
  const by = s.g[3 * j.a.body + 1] + ay - s.g[3 * j.b.body + 1];
  const a = 3 * j.a.body;
  const b = 3 * j.b.body;
  return (
    ux * (motion[a] - motion[a + 2] * ay - motion[b] + motion[b + 2] * by) +
    uy * (motion[a + 1] + motion[a + 2] * ax - motion[b + 1] - motion[b + 2] * bx)
  );
};

export const writePath = (j: ModelPath, level: Level, s: State, rows: Rows, at: number): void => {
  const { ux, uy, curvature } = pathFrame(j, s);
  relativeRow(j, level, s, rows, at, -uy, ux);
  if (level === 'acceleration') {
    const rate = slideRate(j, s, s.velocity);
    rows.right[at] += 2 * s.velocity[3 * j.b.body + 2] * rate + curvature * rate * rate;
  }
  if (j.rollingAt < 0) return;
  relativeRow(j, level, s, rows, at + 1, ux, uy);
  const radius = s.g[j.rollingAt];
  rows.coefficients[6 * (at + 1) + 2] += radius;
  rows.coefficients[6 * (at + 1) + 5] -= radius;
};

/** One row: the rate of sliding, or its change, as a function of the motion. */
export const writeSlide = (j: ModelPath, level: Level, s: State, rows: Rows, at: number): void => {
  const { ux, uy } = pathFrame(j, s);
  relativeRow(j, level, s, rows, at, ux, uy);
};
