import type { Owner } from '../equations';
import type { Place } from '../model';
import { allowedByJoint, allowedByKnown, scalarsOfJoint, slideEquation } from './constraints';
import type { Allowed } from './constraints';
import { eliminate } from './eliminate';
import { alongJoint, writeKnownSteps } from './givens';
import type { Group } from './plan';
import type { Part, Sheet } from './sheet';
import { linearOf, term } from './terms';
import type { Linear } from './terms';
import { quadraticStep } from './quadratic';
import type { Reference, WorkingEquation, WorkingSymbol } from './working';

/** Writes the steps that solve a group of bodies from what is solved already. */
export const writeGroup = (sheet: Sheet, group: Group, given: Float64Array): void => {
  for (const { known } of group.owners) if (known !== null) writeKnownSteps(sheet, known, given);
  settleRates(sheet, group);
  const used = chooseBases(sheet, group);
  const equations: WorkingEquation[] = [];
  for (const owner of group.owners)
    if (!used.has(owner)) equations.push(...writeClosing(sheet, owner, group));
  solveFor(sheet, group, equations);
  for (const body of group.bodies) {
    const { place, parts } = sheet.baseOf(body);
    const tex = sheet.notation.vectorTex(sheet.level, place);
    const known = sheet.numeric(tex, sheet.evaluate(parts), sheet.notation.pointReference(place));
    sheet.setBase(body, { place, parts: [known] });
  }
};

/** Rates that knowns give by themselves: of turning, and along joints. */
const settleRates = (sheet: Sheet, group: Group): void => {
  const { state, level, model } = sheet;
  for (const { known, joint } of group.owners) {
    if (known?.kind === 'angular')
      sheet.settle(sheet.notation.turn(level, known.body), state.g[known.valueAt]);
    if (known?.kind === 'slide' && ['path', 'wheel'].includes(known.joint.kind))
      sheet.settle(alongJoint(sheet, known.joint.id), state.g[known.valueAt]);
    if (joint?.kind !== 'weld') continue;
    for (const [own, other] of [
      [joint.a.body, joint.b.body],
      [joint.b.body, joint.a.body],
    ]) {
      if (!group.bodies.includes(own) || group.bodies.includes(other)) continue;
      const motion = level === 'velocity' ? state.velocity : state.acceleration;
      const symbol = sheet.notation.turn(level, own);
      const value = other === model.ground ? 0 : motion[3 * other + 2];
      sheet.settle(symbol, value);
      sheet.add({
        kind: 'held',
        text: `The ${sheet.notation.bodyName(own)} turns as the ${sheet.notation.bodyName(other)} does.`,
        results: [sheet.result(symbol, value)],
        uses: [{ kind: 'joint', id: joint.id }],
      });
    }
  }
};

/** Gives every body of the group a point from which its motion is written; returns what that used. */
const chooseBases = (sheet: Sheet, group: Group): Set<Owner> => {
  const used = new Set<Owner>();
  for (const owner of group.owners) {
    const { joint, known } = owner;
    if (known?.kind === 'angular') used.add(owner);
    if (joint !== null && baseFromSolved(sheet, owner, group)) used.add(owner);
  }
  for (const owner of group.owners) {
    const { known } = owner;
    if (known === null || used.has(owner) || !(known.kind === 'components' || isWhole(known)))
      continue;
    const allowed = allowedByKnown(sheet, known);
    if (allowed !== null && takeBase(sheet, allowed, group)) used.add(owner);
  }
  for (;;) {
    if (spread(sheet, group, used)) continue;
    const next = group.bodies.find((b) => !sheet.hasBase(b));
    if (next === undefined) return used;
    if (!baseOnLine(sheet, group, used)) baseUnknown(sheet, next, group);
  }
};

const isWhole = (known: NonNullable<Owner['known']>): boolean =>
  known.kind === 'polar' && known.magnitudeAt >= 0 && known.directionAt >= 0 && !known.line;

/** A pin, or weld, to the ground or to a body that is solved. */
const baseFromSolved = (sheet: Sheet, { joint }: Owner, group: Group): boolean => {
  if (joint === null || (joint.kind !== 'pin' && joint.kind !== 'weld')) return false;
  for (const [own, other] of [
    [joint.a, joint.b],
    [joint.b, joint.a],
  ]) {
    if (!group.bodies.includes(own.body) || group.bodies.includes(other.body)) continue;
    if (sheet.hasBase(own.body)) continue;
    const tex = sheet.notation.vectorTex(sheet.level, own);
    const from = sheet.notation.pointReference(own);
    if (other.body === sheet.model.ground) {
      sheet.add({
        kind: 'held',
        text: `${sheet.notation.pointName(own)} is held by the ground at ${joint.id}.`,
        equations: [{ role: 'vector', tex: `${tex} = \\mathbf 0` }],
        uses: [{ kind: 'joint', id: joint.id }],
      });
      sheet.setBase(own.body, { place: own, parts: [sheet.numeric(tex, [0, 0], from)] });
    } else {
      const carried = sheet.carry(other);
      const v = sheet.evaluate([carried]);
      sheet.add({
        kind: 'held',
        text: `The pin ${joint.id} joins ${sheet.notation.pointName(own)} of the ${sheet.notation.bodyName(own.body)} to the ${sheet.notation.bodyName(other.body)}: it moves alike on both.`,
        uses: [{ kind: 'joint', id: joint.id }],
      });
      sheet.setBase(own.body, { place: own, parts: [sheet.numeric(tex, v, from)] });
    }
    return true;
  }
  return false;
};

const takeBase = (sheet: Sheet, allowed: Allowed, group: Group): boolean => {
  const { body } = allowed.place;
  if (!group.bodies.includes(body) || sheet.hasBase(body)) return false;
  sheet.setBase(body, { place: allowed.place, parts: allowed.parts });
  return true;
};

/** Passes bases on through pins within the group. */
const spread = (sheet: Sheet, group: Group, used: Set<Owner>): boolean => {
  for (const owner of group.owners) {
    const { joint } = owner;
    if (joint === null || used.has(owner) || (joint.kind !== 'pin' && joint.kind !== 'weld'))
      continue;
    for (const [own, other] of [
      [joint.a, joint.b],
      [joint.b, joint.a],
    ]) {
      if (!group.bodies.includes(own.body) || !group.bodies.includes(other.body)) continue;
      if (sheet.hasBase(own.body) || !sheet.hasBase(other.body)) continue;
      sheet.setBase(own.body, { place: own, parts: sheet.expression(other) });
      if (joint.kind === 'pin') used.add(owner);
      return true;
    }
  }
  return false;
};

/** A point whose line of motion is given serves as base, with its speed still unknown. */
const baseOnLine = (sheet: Sheet, group: Group, used: Set<Owner>): boolean => {
  for (const owner of group.owners) {
    if (used.has(owner)) continue;
    const body =
      owner.joint !== null ? owner.joint.a.body : 'a' in owner.known ? owner.known.a.body : -1;
    if (!group.bodies.includes(body) || sheet.hasBase(body)) continue;
    const other = owner.joint !== null && 'b' in owner.joint ? owner.joint.b.body : -1;
    if (group.bodies.includes(other)) continue;
    const allowed = allowedOf(sheet, owner);
    if (allowed === null) continue;
    if (owner.known?.kind === 'polar' && owner.known.directionAt < 0) continue;
    sheet.add({ kind: 'held', text: `${allowed.text}.`, uses: allowed.uses });
    sheet.setBase(body, { place: allowed.place, parts: allowed.parts });
    used.add(owner);
    return true;
  }
  return false;
};

const baseUnknown = (sheet: Sheet, body: number, group: Group): void => {
  const { model, level, notation } = sheet;
  const held = group.owners
    .flatMap(({ joint, known }): Place[] => {
      if (joint !== null) return 'b' in joint ? [joint.a, joint.b] : [joint.a];
      return 'a' in known ? [known.a] : [];
    })
    .find((p) => p.body === body);
  const place = held ?? model.bodies[body].origin;
  const [vx, vy] = sheet.motionOf(place);
  const [x, y] = [notation.component(level, place, 'x'), notation.component(level, place, 'y')];
  const part: Part = {
    tex: notation.vectorTex(level, place),
    role: 'absolute',
    x: [term(1, sheet.scalar(x, vx))],
    y: [term(1, sheet.scalar(y, vy))],
  };
  sheet.setBase(body, { place, parts: [part] });
};

const allowedOf = (sheet: Sheet, { joint, known }: Owner): Allowed | null => {
  if (joint !== null) return allowedByJoint(sheet, joint);
  if (known.kind !== 'slide') return allowedByKnown(sheet, known);
  return ['path', 'wheel'].includes(known.joint.kind) ? allowedByJoint(sheet, known.joint) : null;
};

/** The equations of a joint or known that closes the group. */
const writeClosing = (sheet: Sheet, owner: Owner, group: Group): WorkingEquation[] => {
  const { joint, known } = owner;
  const settled =
    known?.kind === 'slide' &&
    group.owners.some((o) => o.joint !== null && o.joint === known.joint);
  if (settled && ['path', 'wheel'].includes(known.joint.kind)) return [];
  if (joint?.kind === 'pin') {
    const text = `The pin ${joint.id}: reached from both sides, ${sheet.notation.pointName(joint.a)} moves alike.`;
    const sides = [sheet.expression(joint.a), sheet.expression(joint.b)] as const;
    return addStep(sheet, text, sheet.vectorEquation(...sides), joint.id, 'joint', sides[0]);
  }
  const allowed = allowedOf(sheet, owner);
  if (allowed !== null) {
    const base = sheet.baseOf(allowed.place.body).place;
    const { notation } = sheet;
    const from =
      base.at === allowed.place.at
        ? ''
        : ` From ${notation.pointName(base)} to ${notation.pointName(allowed.place)} on the ${notation.bodyName(base.body)}:`;
    const expression = sheet.expression(allowed.place);
    return addStep(
      sheet,
      `${allowed.text}.${from}`,
      sheet.vectorEquation(
        allowed.parts,
        expression,
        notation.vectorTex(sheet.level, allowed.place),
      ),
      allowed.uses[0].id,
      allowed.uses[0].kind,
      expression,
    );
  }
  const scalars =
    joint !== null
      ? scalarsOfJoint(sheet, joint)
      : known?.kind === 'slide'
        ? slideEquation(sheet, known.joint, sheet.state.g[known.valueAt], known.id)
        : null;
  if (scalars === null) return [];
  return addStep(
    sheet,
    `${scalars.text}.`,
    scalars.equations,
    owner.joint?.id ?? known?.id ?? '',
    joint !== null ? 'joint' : 'known',
    [],
  );
};

const addStep = (
  sheet: Sheet,
  text: string,
  equations: WorkingEquation[],
  id: string,
  kind: Reference['kind'],
  parts: readonly Part[],
): WorkingEquation[] => {
  const scalars = equations.filter((e) => e.role !== 'vector');
  sheet.add({
    kind: 'step',
    text,
    equations,
    scalarEquations: scalars.length,
    unknowns: sheet.unknownsOf(equations),
    uses: [{ kind, id }],
    arrows: parts.length > 1 ? sheet.arrows('', parts) : [],
  });
  return scalars;
};

const solveFor = (sheet: Sheet, group: Group, equations: WorkingEquation[]): void => {
  const unknowns = sheet.unknownsOf(equations);
  if (unknowns.length === 0) return;
  const linear = equations.flatMap((e): (Linear | null)[] =>
    e.role === 'vector' ? [] : [linearOf(e.left, e.right)],
  );
  const angles = unknowns.filter(isAngle);
  const uses = group.bodies.map((b) => sheet.notation.bodyReference(b));
  if (angles.length > 0 && quadraticStep(sheet, equations, unknowns, uses)) return;
  const system = linear.filter((e): e is Linear => e !== null);
  const solved =
    angles.length === 0 && system.length === linear.length ? eliminate(system, unknowns) : null;
  const values = unknowns.map((s) => solved?.values.get(s.tex) ?? sheet.truthOf(s));
  unknowns.forEach((s, i) => sheet.settle(s, values[i]));
  sheet.add({
    kind: 'solve',
    text:
      solved !== null
        ? `${equations.length} equations for ${unknowns.length} unknowns, solved one after the other.`
        : `${equations.length} equations for ${unknowns.length} unknowns, solved together.`,
    equations: solved?.equations ?? [],
    scalarEquations: equations.length,
    unknowns,
    results: unknowns.flatMap((s, i) => (isAngle(s) ? [] : [sheet.result(s, values[i])])),
    uses,
  });
};

/** Sine or cosine of an unknown direction. */
export const isAngle = (s: WorkingSymbol): boolean => /^\\(cos|sin)/.test(s.tex);
