import type { Level, ModelWheel, State } from '../model';
import { armX, armY } from '../model';
import type { Rows } from '../rows';
import { centripetal, noOther, pointTerm } from '../rows';

const planeOf = (j: ModelWheel, s: State) => {
  const angle = s.g[3 * j.a.body + 2] + s.g[j.steerAt];
  return { ux: Math.cos(angle), uy: Math.sin(angle), rx: armX(s, j.a), ry: armY(s, j.a) };
};

/**
 * No side-slip: n·v_P = 0 with n to the left of the wheel's plane, which turns with the body and
 * the steering, so that n·a_P = (ω + δ̇) u·v_P. Source: engine checks A13, A14.
 */
export const writeWheel = (
  j: ModelWheel,
  ground: number,
  level: Level,
  s: State,
  rows: Rows,
  at: number,
): void => {
  const body = j.a.body;
  const { ux, uy, rx, ry } = planeOf(j, s);
  pointTerm(rows, at, body, -uy, ux, rx, ry);
  noOther(rows, at, ground);
  if (level === 'velocity') {
    rows.right[at] = 0;
    return;
  }
  const v = s.velocity;
  const omega = v[3 * body + 2];
  const along = ux * (v[3 * body] - omega * ry) + uy * (v[3 * body + 1] + omega * rx);
  rows.right[at] = (omega + s.g[j.steerRateAt]) * along + centripetal(s, body, -uy, ux, rx, ry);
};

/** One row: the speed u·v_P in the wheel's plane, whose rate is u·a_P as n·v_P is zero. */
export const writeWheelSpeed = (
  j: ModelWheel,
  ground: number,
  level: Level,
  s: State,
  rows: Rows,
  at: number,
): void => {
  const { ux, uy, rx, ry } = planeOf(j, s);
  pointTerm(rows, at, j.a.body, ux, uy, rx, ry);
  noOther(rows, at, ground);
  rows.right[at] = level === 'velocity' ? 0 : centripetal(s, j.a.body, ux, uy, rx, ry);
};
