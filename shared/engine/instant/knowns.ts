import { writeSlideRow } from './joints/index';
import type { Level, ModelKnown, Place, State } from './model';
import { armX, armY } from './model';
import type { Rows } from './rows';
import { centripetal, noOther, pointTerm } from './rows';

/** Scalar equations that the known gives at its own level. */
export const knownEquations = (k: ModelKnown): number => {
  if (k.kind === 'components') return 2;
  if (k.kind === 'polar') return (k.magnitudeAt < 0 ? 0 : 1) + (k.directionAt < 0 ? 0 : 1);
  return 1;
};

/** Whether the last equation is |v| = m with v's direction (or sense) open: quadratic, two branches. */
export const isQuadratic = (k: ModelKnown): boolean =>
  k.kind === 'polar' && k.magnitudeAt >= 0 && (k.directionAt < 0 || k.line);

const pointRow = (
  a: Place,
  cx: number,
  cy: number,
  level: Level,
  s: State,
  rows: Rows,
  at: number,
  ground: number,
): void => {
  const rx = armX(s, a);
  const ry = armY(s, a);
  pointTerm(rows, at, a.body, cx, cy, rx, ry);
  noOther(rows, at, ground);
  rows.right[at] = level === 'velocity' ? 0 : centripetal(s, a.body, cx, cy, rx, ry);
};

/** Velocity, or acceleration, of a place for the motion in `s`. */
export const pointMotion = (level: Level, s: State, a: Place): [number, number] => {
  const rx = armX(s, a);
  const ry = armY(s, a);
  const o = 3 * a.body;
  if (level === 'velocity') {
    const v = s.velocity;
    return [v[o] - v[o + 2] * ry, v[o + 1] + v[o + 2] * rx];
  }
  const q = s.acceleration;
  const square = s.velocity[o + 2] ** 2;
  return [q[o] - q[o + 2] * ry - square * rx, q[o + 1] + q[o + 2] * rx - square * ry];
};

/** Writes the known's rows from row `at` on. A quadratic row is written about the motion in `s`. */
export const writeKnown = (
  k: ModelKnown,
  ground: number,
  level: Level,
  s: State,
  rows: Rows,
  at: number,
): void => {
  switch (k.kind) {
    case 'components':
      for (let i = 0; i < 2; i++) {
        pointRow(k.a, 1 - i, i, level, s, rows, at + i, ground);
        rows.right[at + i] += s.g[k.xAt + i];
      }
      return;
    case 'polar': {
      const row = (i: number, cx: number, cy: number, value: number): void => {
        pointRow(k.a, cx, cy, level, s, rows, at + i, ground);
        rows.right[at + i] += value;
      };
      const angle = k.directionAt < 0 ? 0 : s.g[k.directionAt];
      const ux = Math.cos(angle);
      const uy = Math.sin(angle);
      if (isQuadratic(k)) {
        if (k.directionAt >= 0) row(0, -uy, ux, 0);
        const [vx, vy] = pointMotion(level, s, k.a);
        const length = Math.hypot(vx, vy);
        const last = k.directionAt < 0 ? 0 : 1;
        if (length > 0) row(last, vx / length, vy / length, s.g[k.magnitudeAt]);
        else row(last, 1, 0, s.g[k.magnitudeAt]);
      } else if (k.magnitudeAt < 0) row(0, -uy, ux, 0);
      else {
        row(0, 1, 0, s.g[k.magnitudeAt] * ux);
        row(1, 0, 1, s.g[k.magnitudeAt] * uy);
      }
      return;
    }
    case 'curvature': {
      const angle = s.g[k.directionAt];
      pointRow(k.a, -Math.sin(angle), Math.cos(angle), level, s, rows, at, ground);
      const [vx, vy] = pointMotion('velocity', s, k.a);
      rows.right[at] += s.g[k.curvatureAt] * (vx * vx + vy * vy);
      return;
    }
    case 'angular':
      pointTerm(rows, at, k.body, 0, 0, 0, 0);
      noOther(rows, at, ground);
      rows.coefficients[6 * at + 2] = 1;
      rows.right[at] = s.g[k.valueAt];
      return;
    case 'slide':
      writeSlideRow(k.joint, ground, level, s, rows, at);
      rows.right[at] += s.g[k.valueAt];
      return;
  }
};
