import { denseRows, rowNorms, unknownScales } from '../assemble';
import { zeros } from '../../linear/dense';
import type { Dense } from '../../linear/dense';
import { pivotedQr } from '../../linear/pivoted-qr';
import type { Equations, Owner } from '../equations';
import { writeEquations } from '../equations';
import type { Model, State } from '../model';

/** Bodies that are solved together, and the joints and knowns that are enough for it. */
export interface Group {
  readonly bodies: readonly number[];
  readonly owners: readonly Owner[];
}

/** More bodies than this are solved all at once rather than looked for in parts. */
const mostTogether = 4;

/**
 * The shortest order in which the bodies that the asked one depends on can be solved: from the
 * ground outwards, at each turn the smallest groups that what is solved already decides. Null when
 * the asked body is not decided.
 */
export const planGroups = (
  model: Model,
  equations: Equations,
  s: State,
  asked: number,
  tolerance: number,
): Group[] | null => {
  const rows = writeEquations(equations, model.ground, s);
  const scales = unknownScales(model);
  const all = Array.from({ length: rows.count }, (_, k) => k);
  const a = denseRows(model, rows, all, scales, rowNorms(rows, scales, model.ground));
  const solved = new Set<number>([model.ground]);
  const groups: Group[] = [];
  while (!solved.has(asked)) {
    const found = nextGroups(model, equations, a, solved, tolerance);
    if (found.length === 0) return null;
    for (const group of found) {
      groups.push(group);
      group.bodies.forEach((b) => solved.add(b));
    }
  }
  return neededFor(groups, asked);
};

const nextGroups = (
  model: Model,
  equations: Equations,
  a: Dense,
  solved: ReadonlySet<number>,
  tolerance: number,
): Group[] => {
  const open = model.bodies.flatMap((_, b) => (solved.has(b) ? [] : [b]));
  for (let size = 1; size <= Math.min(mostTogether, open.length); size++) {
    const found: Group[] = [];
    const taken = new Set<number>();
    for (const bodies of connected(equations, open, size)) {
      if (bodies.some((b) => taken.has(b))) continue;
      const group = solvable(equations, a, bodies, solved, tolerance);
      if (group === null) continue;
      found.push(group);
      bodies.forEach((b) => taken.add(b));
    }
    if (found.length > 0) return found;
  }
  const rest = open.length > mostTogether ? solvable(equations, a, open, solved, tolerance) : null;
  return rest === null ? [] : [rest];
};

/** Sets of open bodies of a size that joints or knowns tie together. */
const connected = (equations: Equations, open: readonly number[], size: number): number[][] => {
  if (size === 1) return open.map((b) => [b]);
  const neighbours = new Map<number, Set<number>>(open.map((b) => [b, new Set()]));
  for (const { bodies } of equations.owners)
    for (const b of bodies)
      for (const c of bodies) if (b !== c && neighbours.has(c)) neighbours.get(b)?.add(c);
  const grown = new Map<string, number[]>();
  for (const set of connected(equations, open, size - 1))
    for (const b of set)
      for (const c of neighbours.get(b) ?? []) {
        if (set.includes(c)) continue;
        const bigger = [...set, c].sort((x, y) => x - y);
        grown.set(bigger.join(), bigger);
      }
  return [...grown.values()];
};

/** The group with owners chosen so that none repeats another; null when they do not decide it. */
const solvable = (
  equations: Equations,
  a: Dense,
  bodies: readonly number[],
  solved: ReadonlySet<number>,
  tolerance: number,
): Group | null => {
  const inside = (b: number): boolean => solved.has(b) || bodies.includes(b);
  const candidates = equations.owners
    .filter((o) => o.bodies.every(inside) && o.bodies.some((b) => bodies.includes(b)))
    .map((owner) => ({ owner, order: preference(owner, solved) }))
    .sort((x, y) => x.order - y.order);
  const columns = bodies.flatMap((b) => [3 * b, 3 * b + 1, 3 * b + 2]);
  const chosen: Owner[] = [];
  let rank = 0;
  for (const { owner } of candidates) {
    if (rank === columns.length) break;
    const more = rankOf(a, [...chosen, owner], columns, tolerance);
    if (more === rank) continue;
    rank = more;
    chosen.push(owner);
  }
  return rank === columns.length ? { bodies, owners: chosen } : null;
};

const rankOf = (
  a: Dense,
  owners: readonly Owner[],
  columns: readonly number[],
  tolerance: number,
): number => {
  const rows = owners.flatMap((o) => Array.from({ length: o.count }, (_, k) => o.from + k));
  const part = zeros(rows.length, columns.length);
  rows.forEach((r, i) =>
    columns.forEach((c, j) => {
      part.values[i * columns.length + j] = a.values[r * a.columns + c];
    }),
  );
  return pivotedQr(part, tolerance).rank;
};

/** What a person would use first. */
const preference = ({ joint, known, bodies }: Owner, solved: ReadonlySet<number>): number => {
  const toSolved = bodies.some((b) => solved.has(b));
  if (joint !== null)
    return { pin: toSolved ? 1 : 3, weld: toSolved ? 0 : 3, path: 4, wheel: 5, gear: 7, link: 8 }[
      joint.kind
    ];
  if (known.kind === 'angular') return 0;
  if (known.kind === 'components') return 2;
  if (known.kind === 'polar')
    return known.directionAt < 0 ? 9 : known.magnitudeAt < 0 || known.line ? 6 : 2;
  return known.kind === 'slide' ? 5 : 6;
};

/** Groups on which the last depends, in the same order. */
const neededFor = (groups: readonly Group[], asked: number): Group[] => {
  const wanted = new Set([asked]);
  return [...groups]
    .reverse()
    .filter((group) => {
      if (!group.bodies.some((b) => wanted.has(b))) return false;
      for (const owner of group.owners) owner.bodies.forEach((b) => wanted.add(b));
      return true;
    })
    .reverse();
};
