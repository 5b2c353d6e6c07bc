import { pathFrame, slideRate } from '../joints/sliding';
import { pointMotion } from '../knowns';
import type { ModelJoint, ModelKnown, ModelPath, Place } from '../model';
import { armX, armY, positionX, positionY } from '../model';
import { alongJoint } from './givens';
import type { Part, Sheet } from './sheet';
import { quantity, scalarEquation, term } from './terms';
import type { Factor, Reference, Term, WorkingEquation, WorkingSymbol } from './working';

/** How a place may move by a joint or a known: its motion as another sum of vectors. */
export interface Allowed {
  readonly place: Place;
  readonly parts: readonly Part[];
  readonly text: string;
  readonly uses: readonly Reference[];
}

const along = (tex: string, rate: readonly Factor[], ux: number, uy: number): Part => ({
  tex,
  role: 'absolute',
  x: [term(1, ...rate, quantity(ux, ''))],
  y: [term(1, ...rate, quantity(uy, ''))],
});

/** s u (velocity), or s̈ u and what curvature and a turning path add (acceleration). */
const pathParts = (sheet: Sheet, id: string, j: ModelPath): Part[] => {
  const { state: s, level } = sheet;
  const { ux, uy, curvature } = pathFrame(j, s);
  const symbol = alongJoint(sheet, id);
  const u = `\\mathbf u`;
  const rate = slideRate(j, s, s.velocity);
  const parts: Part[] = [];
  if (j.rollingAt < 0) {
    const truth = level === 'velocity' ? rate : slideAcceleration(sheet, j, ux, uy);
    parts.push(along(`${symbol.tex}\\,${u}`, [sheet.scalar(symbol, truth)], ux, uy));
  } else {
    // Rolling without slip: the centre moves by −R times the turning against the surface.
    const radius = quantity(s.g[j.rollingAt], 'm', { kind: 'joint', id });
    const turning = (body: number, sign: 1 | -1): Part => {
      const turn = sheet.turn(level, body);
      return {
        tex: `${sign < 0 ? '-' : ''}${sheet.notation.turn(level, body).tex}\\,R\\,${u}`,
        role: 'absolute',
        x: [term(sign, turn, radius, quantity(ux, ''))],
        y: [term(sign, turn, radius, quantity(uy, ''))],
      };
    };
    parts.push(turning(j.a.body, -1));
    if (j.b.body !== sheet.model.ground) parts.push(turning(j.b.body, 1));
  }
  if (level === 'velocity') return parts;
  const speed = quantity(rate, 'm/s', { kind: 'joint', id });
  const dot = sheet.notation.along('velocity', { kind: 'joint', id }, '').tex;
  if (curvature !== 0)
    parts.push({
      tex: `\\frac{${dot}^{2}}{\\rho}\\,\\mathbf n`,
      role: 'relative',
      x: [term(1, speed, speed, quantity(-uy * curvature, '1/m'))],
      y: [term(1, speed, speed, quantity(ux * curvature, '1/m'))],
    });
  if (j.b.body !== sheet.model.ground) {
    const omega = sheet.turn('velocity', j.b.body);
    const two = quantity(2, '');
    parts.push({
      tex: `2\\,${sheet.notation.turn('velocity', j.b.body).tex}\\,\\mathbf k\\times ${dot}\\,${u}`,
      role: 'relative',
      x: [term(-1, two, omega, speed, quantity(uy, ''))],
      y: [term(1, two, omega, speed, quantity(ux, ''))],
    });
  }
  return parts;
};

/** ü along the path as the solver found it: u · (a_A − a_A'). */
const slideAcceleration = (sheet: Sheet, j: ModelPath, ux: number, uy: number): number => {
  const [ax, ay] = pointMotion('acceleration', sheet.state, j.a);
  const [bx, by] = coincidentAcceleration(sheet, j);
  return ux * (ax - bx) + uy * (ay - by);
};

const coincidentAcceleration = (sheet: Sheet, j: ModelPath): [number, number] => {
  const { state: s } = sheet;
  const o = 3 * j.b.body;
  const rx = positionX(s, j.a) - s.g[o];
  const ry = positionY(s, j.a) - s.g[o + 1];
  const q = s.acceleration;
  const square = s.velocity[o + 2] ** 2;
  return [q[o] - q[o + 2] * ry - square * rx, q[o + 1] + q[o + 2] * rx - square * ry];
};

/** The point of the path's body under the sliding one, from that body's base. */
const coincidentParts = (sheet: Sheet, j: ModelPath): Part[] => {
  if (j.b.body === sheet.model.ground) return [];
  const { state: s, notation } = sheet;
  const base = sheet.baseOf(j.b.body);
  const rx = positionX(s, j.a) - positionX(s, base.place);
  const ry = positionY(s, j.a) - positionY(s, base.place);
  const r = `\\mathbf r_{${notation.pointTex(j.a)}'/${notation.pointTex(base.place)}}`;
  return [...base.parts, ...sheet.turningParts(j.b.body, rx, ry, r)];
};

/** What a joint allows the place of its first body; null when it is not put as a vector. */
export const allowedByJoint = (sheet: Sheet, j: ModelJoint): Allowed | null => {
  const uses: Reference[] = [{ kind: 'joint', id: j.id }];
  const name = sheet.notation.pointName(j.a);
  if (j.kind === 'path') {
    const how =
      j.document === 'roll'
        ? `The ${sheet.notation.bodyName(j.a.body)} rolls without slip at ${j.id}`
        : j.b.body === sheet.model.ground
          ? `${name} moves along the guide ${j.id}`
          : `${name} moves along the slot ${j.id} of the ${sheet.notation.bodyName(j.b.body)}; ${name}′ is the point of that body under it`;
    return {
      place: j.a,
      parts: [...coincidentParts(sheet, j), ...pathParts(sheet, j.id, j)],
      text: how,
      uses,
    };
  }
  if (j.kind === 'wheel') {
    const { state: s, level } = sheet;
    const angle = s.g[3 * j.a.body + 2] + s.g[j.steerAt];
    const [ux, uy] = [Math.cos(angle), Math.sin(angle)];
    const symbol = alongJoint(sheet, j.id);
    const [mx, my] = sheet.motionOf(j.a);
    const parts = [
      along(`${symbol.tex}\\,\\mathbf u`, [sheet.scalar(symbol, ux * mx + uy * my)], ux, uy),
    ];
    if (level === 'acceleration') {
      const [vx, vy] = pointMotion('velocity', s, j.a);
      const speed = quantity(ux * vx + uy * vy, 'm/s', uses[0]);
      const turning = quantity(s.velocity[3 * j.a.body + 2] + s.g[j.steerRateAt], 'rad/s', uses[0]);
      parts.push({
        tex: `(\\omega+\\dot\\delta)\\,${sheet.notation.along('velocity', uses[0], '').tex}\\,\\mathbf n`,
        role: 'relative',
        x: [term(1, turning, speed, quantity(-uy, ''))],
        y: [term(1, turning, speed, quantity(ux, ''))],
      });
    }
    return { place: j.a, parts, text: `The wheel at ${name} does not slip sideways`, uses };
  }
  return null;
};

/** What a known says of a place as a vector; null when it is not put as one. */
export const allowedByKnown = (sheet: Sheet, known: ModelKnown): Allowed | null => {
  const uses: Reference[] = [{ kind: 'known', id: known.id }];
  const { state: s, notation, level } = sheet;
  const unit = level === 'velocity' ? 'm/s' : 'm/s²';
  if (known.kind === 'components') {
    const v: [number, number] = [s.g[known.xAt], s.g[known.xAt + 1]];
    const part = sheet.numeric(notation.vectorTex(level, known.a), v, uses[0]);
    return { place: known.a, parts: [part], text: textOf(sheet, known.a, 'known'), uses };
  }
  if (known.kind === 'curvature') {
    const angle = s.g[known.directionAt];
    const [ux, uy] = [Math.cos(angle), Math.sin(angle)];
    const [vx, vy] = pointMotion('velocity', s, known.a);
    const speed = quantity(Math.hypot(vx, vy), 'm/s', notation.pointReference(known.a));
    const [ax, ay] = sheet.motionOf(known.a);
    const symbol = notation.along(level, uses[0], `of ${notation.pointName(known.a)}`);
    return {
      place: known.a,
      parts: [
        along(`${symbol.tex}\\,\\mathbf u`, [sheet.scalar(symbol, ux * ax + uy * ay)], ux, uy),
        {
          tex: `\\kappa\\,v^{2}\\,\\mathbf n`,
          role: 'relative',
          x: [term(1, speed, speed, quantity(-uy * s.g[known.curvatureAt], '1/m', uses[0]))],
          y: [term(1, speed, speed, quantity(ux * s.g[known.curvatureAt], '1/m', uses[0]))],
        },
      ],
      text: textOf(sheet, known.a, 'along the mark'),
      uses,
    };
  }
  if (known.kind !== 'polar') return null;
  const [mx, my] = sheet.motionOf(known.a);
  if (known.directionAt < 0) {
    const theta = notation.direction(level, known.a);
    const size = Math.hypot(mx, my);
    const magnitude = quantity(s.g[known.magnitudeAt], unit, uses[0]);
    const part = (f: 'cos' | 'sin', value: number): WorkingSymbol => {
      const symbol = { ...theta, tex: `\\${f}${theta.tex}`, unit: '' as const };
      sheet.scalar(symbol, value);
      return symbol;
    };
    return {
      place: known.a,
      parts: [
        {
          tex: `${notation.magnitude(level, known.a).tex}\\,\\mathbf u(${theta.tex})`,
          role: 'absolute',
          x: [term(1, magnitude, { symbol: part('cos', mx / size) })],
          y: [term(1, magnitude, { symbol: part('sin', my / size) })],
        },
      ],
      text: textOf(sheet, known.a, 'of known magnitude'),
      uses,
    };
  }
  const angle = s.g[known.directionAt];
  const [ux, uy] = [Math.cos(angle), Math.sin(angle)];
  const point = notation.pointTex(known.a);
  const symbol: WorkingSymbol = {
    tex: `${level === 'velocity' ? 'v' : 'a'}_{${point}}`,
    text: `${level} of ${notation.pointName(known.a)} along its known direction`,
    unit,
    of: notation.pointReference(known.a),
  };
  const truth = ux * mx + uy * my;
  const whole = known.magnitudeAt >= 0;
  if (whole)
    sheet.settle(
      symbol,
      known.line ? Math.sign(truth) * s.g[known.magnitudeAt] : s.g[known.magnitudeAt],
    );
  const rate = [sheet.scalar(symbol, truth)];
  const tex = whole ? notation.vectorTex(level, known.a) : `${symbol.tex}\\,\\mathbf u_{${point}}`;
  return {
    place: known.a,
    parts: [along(tex, rate, ux, uy)],
    text: textOf(sheet, known.a, 'of known direction'),
    uses,
  };
};

const textOf = (sheet: Sheet, place: Place, what: string): string =>
  `The ${sheet.level} of ${sheet.notation.pointName(place)} is ${what}`;

const dotted = (parts: readonly Part[], cx: number, cy: number, sign: 1 | -1): Term[] =>
  parts.flatMap((p) => [
    ...p.x.map((t) => scaled(t, sign * cx)),
    ...p.y.map((t) => scaled(t, sign * cy)),
  ]);

const scaled = (t: Term, by: number): Term => ({
  sign: (by < 0 ? -t.sign : t.sign) as 1 | -1,
  factors: [...t.factors, quantity(Math.abs(by), '')],
});

/** Joints that give scalar equations: a link's length, round parts, equal turning of a weld. */
export const scalarsOfJoint = (
  sheet: Sheet,
  j: ModelJoint,
): { equations: WorkingEquation[]; text: string } | null => {
  const { state: s, level, notation } = sheet;
  if (j.kind === 'weld') {
    const [a, b] = [j.a.body, j.b.body].map((body) => term(1, sheet.turn(level, body)));
    return {
      equations: [scalarEquation('scalar', [a], [b])],
      text: `The weld ${j.id} lets both bodies turn alike`,
    };
  }
  if (j.kind !== 'link' && j.kind !== 'gear') return null;
  const dx = positionX(s, j.a) - positionX(s, j.b);
  const dy = positionY(s, j.a) - positionY(s, j.b);
  const distance = Math.hypot(dx, dy);
  const [ex, ey] = [dx / distance, dy / distance];
  const a = sheet.expression(j.a);
  const b = j.b.body === sheet.model.ground ? [] : sheet.expression(j.b);
  const project = (cx: number, cy: number): Term[] => [
    ...dotted(a, cx, cy, 1),
    ...dotted(b, cx, cy, -1),
  ];
  const from: Reference = { kind: 'joint', id: j.id };
  const across = acrossRate(sheet, j, ex, ey);
  const outward =
    level === 'velocity' ? [] : [quantity(across, 'm/s', from), quantity(across, 'm/s', from)];
  if (j.kind === 'link') {
    const at = level === 'velocity' ? j.rateAt : j.rateChangeAt;
    const right: Term[] =
      at < 0 ? [] : [term(1, quantity(s.g[at], level === 'velocity' ? 'm/s' : 'm/s²', from))];
    if (outward.length > 0) right.push(term(-1, ...outward, quantity(1 / distance, '1/m', from)));
    return {
      equations: [scalarEquation('scalar', project(ex, ey), right)],
      text: `Along the link ${j.id} its ends part at the rate of its length`,
    };
  }
  const side = Math.sign(s.g[j.otherRadiusAt]);
  const normal: Term[] =
    outward.length > 0 ? [term(-1, ...outward, quantity(1 / distance, '1/m', from))] : [];
  const rolled = [
    term(1, sheet.turn(level, j.a.body), quantity(s.g[j.radiusAt], 'm', from)),
    term(1, sheet.turn(level, j.b.body), quantity(s.g[j.otherRadiusAt], 'm', from)),
  ];
  return {
    equations: [
      scalarEquation('scalar', project(ex, ey), normal),
      // t is to the left of n, and n points from a to the contact: against e outside, along it inside.
      scalarEquation('scalar', [...project(side * ey, -side * ex), ...rolled], []),
    ],
    text: `${notation.bodyName(j.a.body)} and ${notation.bodyName(j.b.body)} roll on each other at ${j.id}`,
  };
};

const acrossRate = (
  sheet: Sheet,
  j: { readonly a: Place; readonly b: Place },
  ex: number,
  ey: number,
): number => {
  const s = sheet.state;
  const v = s.velocity;
  const [a, b] = [3 * j.a.body, 3 * j.b.body];
  const wx = v[a] - v[a + 2] * armY(s, j.a) - v[b] + v[b + 2] * armY(s, j.b);
  const wy = v[a + 1] + v[a + 2] * armX(s, j.a) - v[b + 1] - v[b + 2] * armX(s, j.b);
  return -ey * wx + ex * wy;
};

/** The rate of a link's length, or of sliding between round parts, as a known gives it. */
export const slideEquation = (
  sheet: Sheet,
  j: ModelJoint,
  value: number,
  id: string,
): { equations: WorkingEquation[]; text: string } | null => {
  if (j.kind !== 'link' && j.kind !== 'gear') return null;
  const { state: s, level } = sheet;
  const dx = positionX(s, j.a) - positionX(s, j.b);
  const dy = positionY(s, j.a) - positionY(s, j.b);
  const distance = Math.hypot(dx, dy);
  const side = j.kind === 'gear' ? Math.sign(s.g[j.otherRadiusAt]) : 1;
  const [ex, ey] = [dx / distance, dy / distance];
  const [cx, cy] = j.kind === 'link' ? [ex, ey] : [side * ey, -side * ex];
  const known: Reference = { kind: 'known', id };
  const right = [term(1, quantity(value, level === 'velocity' ? 'm/s' : 'm/s²', known))];
  if (j.kind === 'link' && level === 'acceleration') {
    const across = quantity(acrossRate(sheet, j, ex, ey), 'm/s', { kind: 'joint', id: j.id });
    right.push(term(-1, across, across, quantity(1 / distance, '1/m')));
  }
  const b = j.b.body === sheet.model.ground ? [] : sheet.expression(j.b);
  const left = [...dotted(sheet.expression(j.a), cx, cy, 1), ...dotted(b, cx, cy, -1)];
  return {
    equations: [scalarEquation('scalar', left, right)],
    text: `The rate along ${j.id} is known`,
  };
};
