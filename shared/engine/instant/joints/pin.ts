import type { Level, Place, State } from '../model';
import type { Rows } from '../rows';
import { otherTerm, pointTerm } from '../rows';
import { writeBetween } from './between';

interface Pinned {
  readonly a: Place;
  readonly b: Place;
}

/** Pin: v_P of both bodies agree, x and y; at acceleration level a_P agree. */
export const writePin = (j: Pinned, level: Level, s: State, rows: Rows, at: number): void => {
  writeBetween(j, 1, 0, level, s, rows, at);
  writeBetween(j, 0, 1, level, s, rows, at + 1);
};

/** Weld: a pin, and both bodies turn alike. */
export const writeWeld = (j: Pinned, level: Level, s: State, rows: Rows, at: number): void => {
  writePin(j, level, s, rows, at);
  const k = at + 2;
  pointTerm(rows, k, j.a.body, 0, 0, 0, 0);
  otherTerm(rows, k, j.b.body, 0, 0, 0, 0);
  rows.coefficients[6 * k + 2] = 1;
  rows.coefficients[6 * k + 5] = -1;
  rows.right[k] = 0;
};
