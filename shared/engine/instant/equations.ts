import { jointEquations, writeJoint } from './joints/index';
import { isQuadratic, knownEquations, writeKnown } from './knowns';
import type { Level, Model, ModelJoint, ModelKnown, State } from './model';
import type { Rows } from './rows';
import { rowsFor } from './rows';

/** A joint or a known, with the rows that it gives at one level. */
export type Owner = { readonly from: number; readonly count: number; readonly bodies: number[] } & (
  | { readonly joint: ModelJoint; readonly known: null }
  | { readonly joint: null; readonly known: ModelKnown }
);

/** The equations of one level: which rows belong to what. */
export interface Equations {
  readonly level: Level;
  readonly owners: readonly Owner[];
  readonly count: number;
  /** Rows of magnitudes whose direction is open. */
  readonly quadratic: readonly number[];
}

const bodiesOfJoint = (j: ModelJoint): number[] => ('b' in j ? [j.a.body, j.b.body] : [j.a.body]);

const bodiesOfKnown = (k: ModelKnown): number[] =>
  k.kind === 'angular' ? [k.body] : k.kind === 'slide' ? bodiesOfJoint(k.joint) : [k.a.body];

/** Lists the rows of a level, joints first; items for which `without` is true are left out. */
export const equationsOf = (
  model: Model,
  level: Level,
  without: (id: string) => boolean = () => false,
): Equations => {
  const owners: Owner[] = [];
  const quadratic: number[] = [];
  let count = 0;
  for (const joint of model.joints) {
    const size = jointEquations(joint, level);
    if (size === 0 || without(joint.id)) continue;
    owners.push({ from: count, count: size, bodies: bodiesOfJoint(joint), joint, known: null });
    count += size;
  }
  for (const known of model.knowns) {
    if (known.level !== level || without(known.id)) continue;
    const size = knownEquations(known);
    owners.push({ from: count, count: size, bodies: bodiesOfKnown(known), joint: null, known });
    count += size;
    if (isQuadratic(known)) quadratic.push(count - 1);
  }
  return { level, owners, count, quadratic };
};

export const writeOwner = (
  owner: Owner,
  ground: number,
  level: Level,
  s: State,
  rows: Rows,
  at: number,
): void => {
  if (owner.joint !== null) writeJoint(owner.joint, ground, level, s, rows, at);
  else writeKnown(owner.known, ground, level, s, rows, at);
};

/** All rows of a level for the motion in `s`. */
export const writeEquations = (
  equations: Equations,
  ground: number,
  s: State,
  rows: Rows = rowsFor(equations.count),
): Rows => {
  for (const owner of equations.owners)
    writeOwner(owner, ground, equations.level, s, rows, owner.from);
  return rows;
};

export const ownerId = (owner: Owner): string =>
  owner.joint !== null ? owner.joint.id : owner.known.id;
