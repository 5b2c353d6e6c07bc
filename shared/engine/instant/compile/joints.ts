import type { Joint, JointOf, MotionProblem, PointReference } from '../../documents/motion-problem';
import { EngineError } from '../../errors';
import type { Vector } from '../../geometry/vector';
import { add, norm, rotate, scale, subtract, turnLeft, unit } from '../../geometry/vector';
import type { ModelBody, ModelJoint, Place } from '../model';
import type { Layout } from './layout';
import { smallStep } from './layout';

/** Finds what documents refer to, and says which field names something that is not there. */
export class References {
  private readonly index: ReadonlyMap<string, number>;

  constructor(
    private readonly bodies: readonly ModelBody[],
    private readonly layout: Layout,
    private readonly centre: Vector,
  ) {
    this.index = new Map(bodies.map((b, i) => [b.id, i]));
  }

  get ground(): number {
    return this.bodies.length;
  }

  body(id: string, field: string): number {
    const i = this.index.get(id);
    if (i === undefined)
      throw new EngineError('unknown-reference', field, `There is no body ${id}.`);
    return i;
  }

  place(reference: PointReference, field: string): Place {
    const body = this.bodies[this.body(reference.body, `${field}.body`)];
    const place = body.points.get(reference.point);
    if (place === undefined)
      throw new EngineError(
        'unknown-reference',
        `${field}.point`,
        `The body ${reference.body} has no point ${reference.point}.`,
      );
    return place;
  }

  /** Distance of two places, m; 0 where rounding alone keeps them apart. */
  distance(a: Place, b: Place): number {
    const apart = norm(subtract(this.position(b), this.position(a)));
    const largest = this.bodies.reduce((most, { length }) => Math.max(most, length), 0);
    return apart > 1e-9 * largest ? apart : 0;
  }

  /** Whether the body's pose follows from its joints. */
  follows(body: number): boolean {
    return body < this.ground && this.bodies[body].follows;
  }

  /** A point of the ground, given where it is in the scene. */
  groundPlace(at: Vector): Place {
    const [x, y] = subtract(at, this.centre);
    return this.layout.place(this.ground, x, y, smallStep);
  }

  /** Where a place is in the scene by the values laid out so far. */
  position(place: Place): Vector {
    const v = this.layout.values;
    const o = 3 * place.body;
    const arm = rotate(v[o + 2], [v[place.at], v[place.at + 1]]);
    return add(add([v[o], v[o + 1]], arm), this.centre);
  }

  /** Differentiates with care where a joint is small against the bodies that it joins. */
  limitSteps(place: Place, length: number): void {
    if (place.body === this.ground) return;
    const { steps, values } = this.layout;
    const limit = smallStep * length;
    const turn = 3 * place.body + 2;
    for (const at of [turn - 2, turn - 1, place.at, place.at + 1])
      steps[at] = Math.min(steps[at], limit);
    const arm = Math.hypot(values[place.at], values[place.at + 1]);
    if (arm > 0) steps[turn] = Math.min(steps[turn], limit / arm);
  }
}

export const compileJoints = (
  problem: MotionProblem,
  layout: Layout,
  references: References,
): ModelJoint[] =>
  problem.joints.map((j, index): ModelJoint => {
    const field = `joints.${j.id}`;
    return { id: j.id, index, ...compileJoint(j, field, layout, references) };
  });

type Compiled = ModelJoint extends infer J
  ? J extends unknown
    ? Omit<J, 'id' | 'index'>
    : never
  : never;

const compileJoint = (
  j: Joint,
  field: string,
  layout: Layout,
  references: References,
): Compiled => {
  const a = references.place(j.a, `${field}.a`);
  switch (j.kind) {
    case 'pin':
    case 'weld': {
      const b =
        j.b !== undefined
          ? references.place(j.b, `${field}.b`)
          : references.groundPlace(j.groundPoint ?? references.position(a));
      differ(a, b, field);
      return { kind: j.kind, a, b };
    }
    case 'guide': {
      const b = references.groundPlace(j.through ?? references.position(a));
      const path = { ...j, placed: j.through !== undefined };
      return compilePath('guide', path, a, b, undefined, field, layout, references);
    }
    case 'slot': {
      const b = references.place(j.b, `${field}.b`);
      differ(a, b, field);
      return compilePath(
        'slot',
        { ...j, placed: true },
        a,
        b,
        undefined,
        field,
        layout,
        references,
      );
    }
    case 'link':
      return compileLink(j, a, field, layout, references);
    case 'wheel': {
      const steerAt = layout.angle(j.steer ?? 0);
      const steerRateAt = layout.linear(j.steerRate ?? 0);
      layout.uncertain('joint', j.id, steerAt, j.sigma?.steer, `${field}.sigma.steer`);
      layout.uncertain('joint', j.id, steerRateAt, j.sigma?.steerRate, `${field}.sigma.steerRate`);
      return { kind: 'wheel', a, steerAt, steerRateAt };
    }
    case 'roll':
      return j.surface === undefined
        ? compileGear(j, a, field, layout, references)
        : compileRoll(j, j.surface, a, field, layout, references);
  }
};

const differ = (a: Place, b: Place, field: string): void => {
  if (a.body === b.body)
    throw new EngineError('unsupported', field, `${field} joins a body to itself.`);
};

const compilePath = (
  document: 'guide' | 'slot' | 'roll',
  j: {
    readonly id: string;
    readonly direction: number;
    readonly radius?: number | null;
    readonly sigma?: { readonly direction?: number; readonly radius?: number };
    /** Whether it is said where the path runs. */
    readonly placed: boolean;
  },
  a: Place,
  b: Place,
  rollingAt: number | undefined,
  field: string,
  layout: Layout,
  references: References,
): Compiled => {
  const directionAt = layout.angle(j.direction);
  layout.uncertain('joint', j.id, directionAt, j.sigma?.direction, `${field}.sigma.direction`);
  const rolling = rollingAt === undefined ? 0 : layout.values[rollingAt];
  let radiusAt = -1;
  if (j.radius !== undefined && j.radius !== null) {
    const effective = j.radius - rolling;
    if (j.radius === 0 || effective === 0)
      throw new EngineError('zero-length', `${field}.radius`, `The path of ${j.id} has no radius.`);
    radiusAt = layout.push(j.radius, smallStep * Math.abs(effective));
    layout.uncertain('joint', j.id, radiusAt, j.sigma?.radius, `${field}.sigma.radius`);
    references.limitSteps(a, Math.abs(effective));
    references.limitSteps(b, Math.abs(effective));
  }
  return {
    kind: 'path',
    document,
    a,
    b,
    directionAt,
    radiusAt,
    rollingAt: rollingAt ?? -1,
    atPoint: !j.placed && !references.follows(a.body),
  };
};

const compileLink = (
  j: JointOf<'link'>,
  a: Place,
  field: string,
  layout: Layout,
  references: References,
): Compiled => {
  if (j.b === undefined && j.groundPoint === undefined)
    throw new EngineError('unknown-reference', `${field}.b`, `The link ${j.id} has one end only.`);
  const b =
    j.b !== undefined
      ? references.place(j.b, `${field}.b`)
      : references.groundPlace(j.groundPoint ?? [0, 0]);
  differ(a, b, field);
  const length = references.distance(a, b);
  if (length === 0)
    throw new EngineError('zero-length', field, `The ends of the link ${j.id} coincide.`);
  references.limitSteps(a, length);
  references.limitSteps(b, length);
  const rateAt = j.rate === null ? -1 : layout.linear(j.rate ?? 0);
  const free = j.rateChange === null || (j.rate === null && j.rateChange === undefined);
  const rateChangeAt = free ? -1 : layout.linear(j.rateChange ?? 0);
  if (rateAt >= 0) layout.uncertain('joint', j.id, rateAt, j.sigma?.rate, `${field}.sigma.rate`);
  if (rateChangeAt >= 0)
    layout.uncertain('joint', j.id, rateChangeAt, j.sigma?.rateChange, `${field}.sigma.rateChange`);
  return { kind: 'link', a, b, rateAt, rateChangeAt };
};

const rollingRadius = (j: JointOf<'roll'>, field: string, layout: Layout, step: number): number => {
  if (!(j.radius > 0))
    throw new EngineError(
      'not-positive',
      `${field}.radius`,
      `The radius of ${j.id} is not positive.`,
    );
  const at = layout.push(j.radius, smallStep * Math.min(step, j.radius));
  layout.uncertain('joint', j.id, at, j.sigma?.radius, `${field}.sigma.radius`);
  return at;
};

const compileRoll = (
  j: JointOf<'roll'>,
  surface: number,
  a: Place,
  field: string,
  layout: Layout,
  references: References,
): Compiled => {
  const curved = j.surfaceRadius ?? null;
  const rollingAt = rollingRadius(
    j,
    field,
    layout,
    curved === null ? j.radius : Math.abs(curved - j.radius) || j.radius,
  );
  const down = scale(j.radius, turnLeft(unit(surface)));
  const b =
    j.b !== undefined
      ? references.place(j.b, `${field}.b`)
      : references.groundPlace(subtract(references.position(a), down));
  differ(a, b, field);
  const path = {
    id: j.id,
    direction: surface,
    radius: curved,
    sigma: { direction: j.sigma?.surface },
    placed: j.b !== undefined,
  };
  return compilePath('roll', path, a, b, rollingAt, field, layout, references);
};

const compileGear = (
  j: JointOf<'roll'>,
  a: Place,
  field: string,
  layout: Layout,
  references: References,
): Compiled => {
  if (j.b === undefined)
    throw new EngineError(
      'unknown-reference',
      `${field}.surface`,
      `The rolling contact ${j.id} needs the direction of a surface, or the body that it rolls on.`,
    );
  const b = references.place(j.b, `${field}.b`);
  differ(a, b, field);
  const distance = references.distance(a, b);
  if (distance === 0)
    throw new EngineError('coincident-points', field, `The centres of ${j.id} coincide.`);
  references.limitSteps(a, distance);
  references.limitSteps(b, distance);
  const other = j.otherRadius ?? distance - j.radius;
  if (other === 0)
    throw new EngineError(
      'zero-length',
      `${field}.otherRadius`,
      `One part of ${j.id} has no radius.`,
    );
  const radiusAt = rollingRadius(j, field, layout, j.radius);
  const otherRadiusAt = layout.push(other, smallStep * Math.abs(other));
  return { kind: 'gear', a, b, radiusAt, otherRadiusAt };
};
