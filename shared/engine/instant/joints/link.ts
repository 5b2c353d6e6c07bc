import type { Level, ModelLink, State } from '../model';
import { positionX, positionY } from '../model';
import type { Rows } from '../rows';
import { rateBetween, writeBetween } from './between';

/**
 * The distance L of two points: with e from b to a and t to its left,
 * e·(v_A − v_B) = L̇ and e·(a_A − a_B) + (t·(v_A − v_B))²/L = L̈.
 */
export const writeLinkLength = (
  j: ModelLink,
  level: Level,
  s: State,
  rows: Rows,
  at: number,
): void => {
  const dx = positionX(s, j.a) - positionX(s, j.b);
  const dy = positionY(s, j.a) - positionY(s, j.b);
  const length = Math.hypot(dx, dy);
  const ex = dx / length;
  const ey = dy / length;
  writeBetween(j, ex, ey, level, s, rows, at);
  if (level === 'acceleration') rows.right[at] -= rateBetween(j, -ey, ex, s) ** 2 / length;
};

export const writeLink = (j: ModelLink, level: Level, s: State, rows: Rows, at: number): void => {
  writeLinkLength(j, level, s, rows, at);
  rows.right[at] += s.g[level === 'velocity' ? j.rateAt : j.rateChangeAt];
};
