import type { Level, ModelGear, State } from '../model';
import { positionX, positionY } from '../model';
import type { Rows } from '../rows';
import { rateBetween, writeBetween } from './between';

/** n, from a's centre toward the contact, and the distance of the centres. */
const contactNormal = (j: ModelGear, s: State) => {
  const side = Math.sign(s.g[j.otherRadiusAt]);
  const dx = positionX(s, j.b) - positionX(s, j.a);
  const dy = positionY(s, j.b) - positionY(s, j.a);
  const distance = Math.hypot(dx, dy);
  return { nx: (side * dx) / distance, ny: (side * dy) / distance, distance, side };
};

/**
 * Two round parts roll on each other without slip. R of a is positive, R' of b negative when a
 * runs inside b; n points from a's centre to the contact, t to its left, d is the distance of the
 * centres and w = v_A − v_B:
 *   n·w = 0, t·w + ω_a R + ω_b R' = 0, and their rates
 *   n·(a_A − a_B) = ± (t·w)²/d (minus inside), t·(a_A − a_B) + α_a R + α_b R' = 0.
 */
export const writeGear = (j: ModelGear, level: Level, s: State, rows: Rows, at: number): void => {
  const { nx, ny, distance, side } = contactNormal(j, s);
  writeBetween(j, nx, ny, level, s, rows, at);
  writeBetween(j, -ny, nx, level, s, rows, at + 1);
  rows.coefficients[6 * (at + 1) + 2] += s.g[j.radiusAt];
  rows.coefficients[6 * (at + 1) + 5] += s.g[j.otherRadiusAt];
  if (level === 'acceleration')
    rows.right[at] += (side * rateBetween(j, -ny, nx, s) ** 2) / distance;
};

/** One row: speed of a's centre relative to b's, along the common tangent. */
export const writeGearSlide = (
  j: ModelGear,
  level: Level,
  s: State,
  rows: Rows,
  at: number,
): void => {
  const { nx, ny } = contactNormal(j, s);
  writeBetween(j, -ny, nx, level, s, rows, at);
};
