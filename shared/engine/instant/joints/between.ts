import type { Level, Place, State } from '../model';
import { armX, armY } from '../model';
import type { Rows } from '../rows';
import { centripetal, otherTerm, pointTerm } from '../rows';

/** Row k: c · (v_A − v_B) = 0 for two body points; at acceleration level c · (a_A − a_B) = 0. */
export const writeBetween = (
  j: { readonly a: Place; readonly b: Place },
  cx: number,
  cy: number,
  level: Level,
  s: State,
  rows: Rows,
  k: number,
): void => {
  const ax = armX(s, j.a);
  const ay = armY(s, j.a);
  const bx = armX(s, j.b);
  const by = armY(s, j.b);
  pointTerm(rows, k, j.a.body, cx, cy, ax, ay);
  otherTerm(rows, k, j.b.body, -cx, -cy, bx, by);
  rows.right[k] =
    level === 'velocity'
      ? 0
      : centripetal(s, j.a.body, cx, cy, ax, ay) - centripetal(s, j.b.body, cx, cy, bx, by);
};

/** c · (v_A − v_B) of two body points. */
export const rateBetween = (
  j: { readonly a: Place; readonly b: Place },
  cx: number,
  cy: number,
  s: State,
): number => {
  const v = s.velocity;
  const a = 3 * j.a.body;
  const b = 3 * j.b.body;
  return (
    cx * (v[a] - v[a + 2] * armY(s, j.a) - v[b] + v[b + 2] * armY(s, j.b)) +
    cy * (v[a + 1] + v[a + 2] * armX(s, j.a) - v[b + 1] - v[b + 2] * armX(s, j.b))
  );
};
