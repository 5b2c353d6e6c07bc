import type { Joint, Known, MotionBody, MotionProblem } from '../../documents/motion-problem';
import type { Vector } from '../../geometry/vector';
import {
  add,
  dot,
  norm,
  rotate,
  scale,
  subtract,
  toBody,
  toScene,
  turnLeft,
  unit,
} from '../../geometry/vector';
import type { Pose } from '../../geometry/vector';

/**
 * Linkages with a motion that is known beforehand, for the property tests: every body's pose is a
 * function of time, made so that the joints hold at all times, and what the joints and knowns say
 * (directions, radii, rates) is taken from those functions by numerical differentiation. Nothing
 * of the solver is used.
 */
export type Motion = (t: number) => Pose;

export interface Linkage {
  readonly problem: MotionProblem;
  readonly motions: ReadonlyMap<string, Motion>;
}

/** Numbers in [−1, 1] that a test draws; used one after the other. */
export type Draw = () => number;

/** Numbers evenly spread over [−1, 1] (a linear congruential generator, Numerical Recipes). */
export const drawFrom = (seed: number): Draw => {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return state / 2 ** 31 - 1;
  };
};

type Curve = (t: number) => Vector;

const step = 1e-3;

/** First and second derivative at t = 0, of the sixth order. */
export const derivatives = (f: (t: number) => number): readonly [first: number, second: number] => {
  const at = (k: number): number => f(k * step);
  const odd = [45, -9, 1].reduce((sum, w, i) => sum + w * (at(i + 1) - at(-i - 1)), 0);
  const even = [270, -27, 2].reduce(
    (sum, w, i) => sum + w * (at(i + 1) + at(-i - 1)),
    -490 * at(0),
  );
  return [odd / (60 * step), even / (180 * step * step)];
};

export const vectorDerivatives = (f: Curve): readonly [first: Vector, second: Vector] => {
  const [x, y] = [derivatives((t) => f(t)[0]), derivatives((t) => f(t)[1])];
  return [
    [x[0], y[0]],
    [x[1], y[1]],
  ];
};

/** Direction and signed radius of a curve at t = 0; radius null where it is straight. */
const tangentOf = (curve: Curve): { direction: number; radius: number | null; speed: number } => {
  const [v, a] = vectorDerivatives(curve);
  const speed = norm(v);
  const u = scale(1 / speed, v);
  const curvature = dot(a, turnLeft(u)) / (speed * speed);
  return {
    direction: Math.atan2(v[1], v[0]),
    radius: Math.abs(curvature) < 1e-7 ? null : 1 / curvature,
    speed,
  };
};

const polynomial = (a: number, b: number, c: number) => (t: number) => a + b * t + (c * t * t) / 2;

export class LinkageBuilder {
  private readonly bodies: MotionBody[] = [];
  private readonly joints: Joint[] = [];
  private readonly knowns: Known[] = [];
  private readonly motions = new Map<string, Motion>();

  constructor(private readonly draw: Draw) {}

  build(): Linkage {
    const { bodies, joints, knowns, motions } = this;
    return { problem: { format: 'centrode.motion-problem/1', bodies, joints, knowns }, motions };
  }

  private id(kind: string): string {
    return `${kind}${this.joints.length + this.knowns.length}`;
  }

  private curve(body: string, point: Vector): Curve {
    return (t) => toScene(this.motion(body)(t), point);
  }

  private motion(body: string): Motion {
    const motion = this.motions.get(body);
    if (motion === undefined) throw new Error(`no body ${body}`);
    return motion;
  }

  private angle(): (t: number) => number {
    return polynomial(3 * this.draw(), 2 * this.draw() + 0.3, 3 * this.draw());
  }

  private add(motion: Motion): string {
    const id = `b${this.bodies.length}`;
    this.bodies.push({ id, pose: motion(0), points: {} });
    this.motions.set(id, motion);
    return id;
  }

  private point(body: string, at: Vector): { body: string; point: string } {
    const found = this.bodies.find((b) => b.id === body);
    if (found === undefined) throw new Error(`no body ${body}`);
    const point = `P${Object.keys(found.points).length}`;
    found.points[point] = [at[0], at[1]];
    return { body, point };
  }

  place(): Vector {
    return [this.draw(), this.draw()];
  }

  /** A body that moves as it likes: three scalar conditions are still to come. */
  freeBody(): string {
    const [x, y] = [this.draw, this.draw].map((d) => polynomial(2 * d(), 3 * d(), 4 * d()));
    const turn = this.angle();
    return this.add((t) => ({ x: x(t), y: y(t), heading: turn(t) }));
  }

  /** A body pinned to another, or to the ground: one condition is still to come. */
  pinnedBody(to: string | null): string {
    const own = this.place();
    const turn = this.angle();
    const there = this.place();
    const hinge: Curve = to === null ? () => there : this.curve(to, there);
    const body = this.add((t) => {
      const [x, y] = subtract(hinge(t), rotate(turn(t), own));
      return { x, y, heading: turn(t) };
    });
    const a = this.point(body, own);
    this.joints.push(
      to === null
        ? { id: this.id('pin'), kind: 'pin', a, ground: true }
        : { id: this.id('pin'), kind: 'pin', a, b: this.point(to, there) },
    );
    return body;
  }

  /** A round body that rolls on straight or circular ground: one condition is still to come. */
  rollingBody(): string {
    const radius = 0.3 + 0.2 * this.draw();
    const start = Math.PI * this.draw();
    const from = this.place();
    const travel = polynomial(0, 2 * this.draw() + 0.5, 3 * this.draw());
    const surfaceRadius = this.draw() > 0 ? null : 3 + this.draw();
    const path = surfaceRadius === null ? null : surfaceRadius - radius;
    const centre = (t: number): Vector => {
      const s = travel(t);
      if (path === null) return add(from, scale(s, unit(start)));
      const n = turnLeft(unit(start));
      const middle = add(from, scale(path, n));
      return subtract(middle, scale(path, rotate(s / path, n)));
    };
    const heading = this.draw();
    const body = this.add((t) => {
      const [x, y] = centre(t);
      return { x, y, heading: heading - travel(t) / radius };
    });
    const a = this.point(body, [0, 0]);
    this.joints.push({
      id: this.id('roll'),
      kind: 'roll',
      a,
      radius,
      surface: start,
      surfaceRadius,
    });
    return body;
  }

  /** A round body that rolls on a round part of another: one condition is still to come. */
  gearBody(on: string): string {
    const hub = this.place();
    const outside = this.draw() > 0;
    const radius = 0.4 + 0.1 * this.draw();
    const other = outside ? 0.5 : -0.9;
    const apart = Math.abs(radius + other);
    const swing = this.angle();
    const around = this.curve(on, hub);
    const body = this.add((t) => {
      const [x, y] = add(around(t), scale(apart, unit(swing(t))));
      const turned = swing(t) - (other / radius) * (this.motion(on)(t).heading - swing(t));
      return { x, y, heading: turned };
    });
    this.joints.push({
      id: this.id('gear'),
      kind: 'roll',
      a: this.point(body, [0, 0]),
      b: this.point(on, hub),
      radius,
      otherRadius: other,
    });
    return body;
  }

  /** A point of the body runs along a guide. */
  guide(body: string): void {
    const at = this.place();
    const { direction, radius } = tangentOf(this.curve(body, at));
    this.joints.push({
      id: this.id('guide'),
      kind: 'guide',
      a: this.point(body, at),
      direction,
      radius,
    });
  }

  /** A point of the body runs along a slot of another. */
  slot(body: string, of: string): void {
    const at = this.place();
    const curve = this.curve(body, at);
    const within: Curve = (t) => toBody(this.motion(of)(t), curve(t));
    const { direction, radius } = tangentOf(within);
    const b = this.point(of, within(0));
    this.joints.push({
      id: this.id('slot'),
      kind: 'slot',
      a: this.point(body, at),
      b,
      direction,
      radius,
    });
  }

  /** A link whose length changes, to another body or to the ground. */
  link(body: string, to: string | null): void {
    const [here, there] = [this.place(), this.place()];
    const curve = this.curve(body, here);
    // Two metres long, so that differences resolve the turning of its direction.
    const far = add(curve(0), scale(2, unit(3 * there[0])));
    const anchor = to === null ? far : toBody(this.motion(to)(0), far);
    const end: Curve = to === null ? () => anchor : this.curve(to, anchor);
    const [rate, rateChange] = derivatives((t) => norm(subtract(end(t), curve(t))));
    const joint = { id: this.id('link'), kind: 'link' as const, rate, rateChange };
    const a = this.point(body, here);
    this.joints.push(
      to === null
        ? { ...joint, a, groundPoint: [anchor[0], anchor[1]] }
        : { ...joint, a, b: this.point(to, anchor) },
    );
  }

  /** A wheel steered along the path of its point. */
  wheel(body: string): void {
    const at = this.place();
    const curve = this.curve(body, at);
    const steer = (t: number): number => {
      const [v] = vectorDerivatives((u) => curve(t + u));
      return Math.atan2(v[1], v[0]) - this.motion(body)(t).heading;
    };
    const [steerRate] = derivatives(steer);
    this.joints.push({
      id: this.id('wheel'),
      kind: 'wheel',
      a: this.point(body, at),
      steer: steer(0),
      steerRate,
    });
  }

  /** The rate of turning is known. */
  turning(body: string): void {
    const [omega, alpha] = derivatives((t) => this.motion(body)(t).heading);
    this.knowns.push({ id: this.id('w'), quantity: 'angular-velocity', body, value: omega });
    this.knowns.push({ id: this.id('al'), quantity: 'angular-acceleration', body, value: alpha });
  }

  /** The velocity and acceleration of a point are known: two conditions. */
  moving(body: string): void {
    const at = this.place();
    const [v, a] = vectorDerivatives(this.curve(body, at));
    const point = this.point(body, at);
    this.knowns.push({
      id: this.id('v'),
      quantity: 'velocity',
      at: point,
      components: [v[0], v[1]],
    });
    this.knowns.push({
      id: this.id('a'),
      quantity: 'acceleration',
      at: point,
      components: [a[0], a[1]],
    });
  }

  /** A point moves in a known direction along a mark of known curvature. */
  marking(body: string): void {
    const at = this.place();
    const { direction, radius } = tangentOf(this.curve(body, at));
    this.knowns.push({
      id: this.id('mark'),
      quantity: 'velocity',
      at: this.point(body, at),
      direction,
      curvature: { value: radius === null ? 0 : 1 / radius },
    });
  }

  /**
   * One condition, of a kind that is drawn. A guide, wheel or mark along the motion that a body
   * has anyway decides nothing unless the body is carried by others.
   */
  condition(body: string, others: readonly string[], carried: boolean): void {
    const drawn = (this.draw() + 1) / 2;
    const other = others[Math.floor(((this.draw() + 1) / 2) * (others.length - 1e-9))];
    const kind = carried ? Math.floor(drawn * 6.999) : Math.floor(drawn * 1.999);
    if (kind === 0) this.turning(body);
    else if (kind === 1) this.link(body, null);
    else if (kind === 2) this.guide(body);
    else if (kind === 3) this.wheel(body);
    else if (kind === 4) this.marking(body);
    else if (kind === 5) this.slot(body, other);
    else this.link(body, other);
  }
}

/** A linkage of `count` bodies that is just determined, unless its position is singular. */
export const randomLinkage = (draw: Draw, count: number): Linkage => {
  const builder = new LinkageBuilder(draw);
  const bodies: string[] = [];
  for (let k = 0; k < count; k++) {
    const kind = Math.floor(((draw() + 1) / 2) * 5.999);
    const last = bodies.length > 0 ? bodies[bodies.length - 1] : null;
    const carried = kind !== 1 && kind !== 3 && last !== null;
    let body: string;
    if (kind === 0) {
      body = builder.freeBody();
      builder.moving(body);
    } else if (kind === 1) body = builder.rollingBody();
    else if (kind === 2 && last !== null) body = builder.gearBody(last);
    else body = builder.pinnedBody(kind === 3 ? null : last);
    builder.condition(body, bodies, carried);
    bodies.push(body);
  }
  return builder.build();
};
