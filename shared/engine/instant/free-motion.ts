import type { FreeMotion } from '../documents/motion-solution';
import type { Level, Model, Place, State } from './model';
import { positionX, positionY } from './model';
import { rigid } from './starts';

/** Bodies named in a sentence before the rest are only counted. */
const named = 4;

/** Free motions in words and numbers, each apart from the others as far as they allow. */
export const describeFree = (
  model: Model,
  s: State,
  level: Level,
  free: readonly Float64Array[],
): FreeMotion[] => apart(model, free).map((z) => describeOne(model, s, level, z));

/**
 * Another basis of the same motions (reduced echelon form, turning first): those in which nothing
 * turns are by themselves, and of the others each turns a body that the rest do not.
 */
const apart = (model: Model, free: readonly Float64Array[]): Float64Array[] => {
  const basis = free.map((z) => Float64Array.from(z));
  const bodies = model.bodies.map((_, b) => b);
  const columns = [...bodies.map((b) => 3 * b + 2), ...bodies.flatMap((b) => [3 * b, 3 * b + 1])];
  const scale = (c: number): number => (c % 3 === 2 ? model.bodies[(c - 2) / 3].length : 1);
  let done = 0;
  for (const c of columns) {
    let best = done;
    for (let k = done; k < basis.length; k++)
      if (Math.abs(basis[k][c]) > Math.abs(basis[best][c])) best = k;
    if (done === basis.length) break;
    if (Math.abs(basis[best][c]) * scale(c) < 1e-7 * sizeOf(basis[best], scale)) continue;
    [basis[done], basis[best]] = [basis[best], basis[done]];
    const pivot = basis[done];
    basis.forEach((other, k) => {
      if (k === done) return;
      const by = other[c] / pivot[c];
      for (let i = 0; i < other.length; i++) other[i] -= by * pivot[i];
      other[c] = 0;
    });
    done++;
  }
  basis.forEach((z) => {
    const size = sizeOf(z, scale);
    for (let i = 0; i < z.length; i++)
      if (Math.abs(z[i]) * (i < columns.length ? scale(i) : 1) < 1e-11 * size) z[i] = 0;
  });
  return basis;
};

const sizeOf = (z: Float64Array, scale: (c: number) => number): number =>
  z.reduce((most, v, i) => (v === 0 ? most : Math.max(most, Math.abs(v) * scale(i))), 0);

/** One free motion; rates are per unit of its largest. */
const describeOne = (model: Model, s: State, level: Level, z: Float64Array): FreeMotion => {
  const unit = scaled(model, z);
  const bodies: FreeMotion['bodies'] = {};
  const phrases: string[] = [];
  model.bodies.forEach((b, i) => {
    const own = unit.subarray(3 * i, 3 * i + 3);
    if (own.every((v) => v === 0)) return;
    const [vx, vy] = rigid(s, unit, b.origin);
    bodies[b.id] = [clean(vx), clean(vy), own[2]];
    phrases.push(`the ${b.name} may ${phrase(model, s, i, own)}`);
  });
  const shown = phrases.slice(0, named);
  if (phrases.length > named) shown.push(`${phrases.length - named} more bodies move with them`);
  const [first = 'nothing moves', ...rest] = shown;
  const motion = [first, ...rest.map((p) => p.replace(' may ', ' with it may '))].join(', ');
  return {
    motion: level === 'velocity' ? motion : `accelerations only: ${motion}`,
    level,
    bodies,
  };
};

const clean = (v: number): number => (Math.abs(v) < 1e-12 ? 0 : v);

/** The motion with its largest ω as 1 rad/s, or its largest speed as 1 m/s where nothing turns. */
const scaled = (model: Model, z: Float64Array): Float64Array => {
  let turn = 0;
  let speed = 0;
  for (let b = 0; b < model.ground; b++) {
    if (Math.abs(z[3 * b + 2]) > Math.abs(turn) * (1 + 1e-9)) turn = z[3 * b + 2];
    for (const v of [z[3 * b], z[3 * b + 1]])
      if (Math.abs(v) > Math.abs(speed) * (1 + 1e-9)) speed = v;
  }
  const by = turn !== 0 ? turn : speed;
  return z.map((v) => clean(v / by));
};

const phrase = (model: Model, s: State, body: number, own: Float64Array): string => {
  const [vx, vy, omega] = own;
  if (omega === 0) {
    const degrees = (Math.atan2(vy, vx) * 180) / Math.PI;
    return `move in the direction ${((degrees + 360) % 180).toFixed(1)}° or back`;
  }
  const x = s.g[3 * body] - vy / omega;
  const y = s.g[3 * body + 1] + vx / omega;
  const { length, points } = model.bodies[body];
  for (const [name, place] of points)
    if (near(s, place, x, y, 1e-6 * length)) return `turn about ${name}`;
  const at = [x + model.centre[0], y + model.centre[1]].map((v) => v.toFixed(2));
  return `turn about (${at[0]}, ${at[1]})`;
};

const near = (s: State, place: Place, x: number, y: number, within: number): boolean =>
  Math.hypot(positionX(s, place) - x, positionY(s, place) - y) <= within;
