import type { Pose } from '../plane-motion';
import {
  type Colour,
  type Field,
  type Paint,
  type Solid,
  box,
  drum,
  placed,
  shifted,
  union,
} from './solids';

const GLASS: Colour = [0.02, 0.025, 0.03];
const METAL: Colour = [0.45, 0.46, 0.47];
const TYRE: Colour = [0.02, 0.02, 0.022];

/** Narrows a field towards its top, as a cabin or a bonnet does. */
function tapered(
  field: Field,
  low: number,
  high: number,
  lengthwise: number,
  across: number,
): Field {
  return (x, y, z) => {
    const share = Math.min(1, Math.max(0, (z - low) / (high - low)));
    return field(x / (1 - lengthwise * share), y / (1 - across * share), z) * 0.72;
  };
}

const wheel = (radius: number, halfWidth: number): Field => drum(radius, halfWidth, 0.03);
const wheelPaint =
  (radius: number): Paint =>
  (x, _y, z) =>
    Math.hypot(x, z) < radius * 0.62 ? METAL : TYRE;

function standing(
  pose: Pose,
  solid: { distance: Field; paint: Paint; gloss: number; reach: number },
  at: readonly [number, number, number],
  turned = 0,
): Solid {
  const cos = Math.cos(pose.heading);
  const sin = Math.sin(pose.heading);
  return placed(solid, {
    at: [pose.x + cos * at[0] - sin * at[1], pose.y + sin * at[0] + cos * at[1], at[2]],
    heading: pose.heading + turned,
  });
}

/** A small saloon without any maker's features; origin at G, x forward. */
export function car(pose: Pose, colour: Colour): Solid[] {
  const lower = tapered(shifted(box(2.12, 0.87, 0.3, 0.16), -0.14, 0, 0.58), 0.62, 0.95, 0.04, 0.1);
  const cabin = tapered(
    shifted(box(1.28, 0.78, 0.34, 0.16), -0.36, 0, 1.08),
    0.82,
    1.42,
    0.36,
    0.22,
  );
  const arches = union(...[1.18, -1.46].map((x) => shifted(drum(0.37, 1.2), x, 0, 0.31)));
  const paint: Paint = (x, y, z) => {
    if (z > 0.93 && z < 1.31) {
      const pillar = Math.abs(x + 0.42) < 0.05 || Math.abs(x + 1.18) < 0.05;
      const side = Math.abs(y) > 0.5;
      return side && pillar ? colour : GLASS;
    }
    if (x > 1.8 && z > 0.62 && z < 0.74 && Math.abs(y) > 0.52) return [0.4, 0.41, 0.42];
    if (x < -2.12 && z > 0.6 && z < 0.78 && Math.abs(y) > 0.5) return [0.35, 0.02, 0.02];
    if (z < 0.42) return [0.03, 0.03, 0.035];
    if (Math.abs(y) > 0.7 && z < 0.9 && (Math.abs(x - 0.42) < 0.012 || Math.abs(x + 0.6) < 0.012))
      return [0.03, 0.03, 0.03];
    return colour;
  };
  const body: Field = (x, y, z) =>
    Math.max(Math.min(lower(x, y, z), cabin(x, y, z)), -arches(x, y, z));
  const round = { distance: wheel(0.31, 0.1), paint: wheelPaint(0.31), gloss: 0.05, reach: 0.36 };
  return [
    standing(pose, { distance: body, paint, gloss: 0.35, reach: 2.9 }, [0, 0, 0]),
    ...[
      [1.18, 0.755],
      [1.18, -0.755],
      [-1.46, 0.745],
      [-1.46, -0.745],
    ].map(([x, y]) => standing(pose, round, [x, y, 0.31])),
  ];
}

const heavyWheel = { distance: wheel(0.5, 0.15), paint: wheelPaint(0.5), gloss: 0.04, reach: 0.58 };

/** Two-axle tractor with the cab over the steered axle; origin at G. */
export function tractor(pose: Pose, colour: Colour): Solid[] {
  const cab = shifted(box(0.98, 1.22, 1.15, 0.14), 1.62, 0, 1.95);
  const shield = shifted(box(0.5, 1.1, 0.35, 0.2), 1.3, 0, 3.2);
  const frame = shifted(box(2.9, 0.45, 0.16, 0.03), -0.4, 0, 0.82);
  const coupling = shifted(box(0.5, 0.5, 0.06, 0.05), -1.95, 0, 1.08);
  const paint: Paint = (x, y, z) => {
    if (z < 1.0 || (x < 0.55 && z < 1.2)) return [0.04, 0.04, 0.045];
    if (x > 2.35 && z > 1.85 && z < 2.75 && Math.abs(y) < 1.08) return GLASS;
    if (x > 1.3 && x < 2.2 && Math.abs(y) > 1.1 && z > 1.95 && z < 2.7) return GLASS;
    if (x > 2.4 && z > 1.05 && z < 1.22 && Math.abs(y) > 0.7) return [0.75, 0.75, 0.7];
    return colour;
  };
  const body = union(cab, shield, frame, coupling);
  return [
    standing(pose, { distance: body, paint, gloss: 0.25, reach: 5 }, [0, 0, 0]),
    ...[
      [1.52, 1.02],
      [1.52, -1.02],
      [-2.18, 0.93],
      [-2.18, -0.93],
    ].map(([x, y]) => standing(pose, heavyWheel, [x, y, 0.5])),
  ];
}

/** Box semi-trailer on an axle group; origin at G, x forward. */
export function semiTrailer(pose: Pose, colour: Colour): Solid[] {
  const hull = shifted(box(5.6, 1.25, 1.32, 0.04), 0.05, 0, 2.58);
  const frame = shifted(box(5.2, 0.5, 0.13, 0.02), 0, 0, 1.13);
  const guard = shifted(box(1.9, 1.2, 0.14, 0.02), 0.6, 0, 0.8);
  const legs = shifted(box(0.07, 0.8, 0.4, 0.02), 2.4, 0, 0.8);
  const paint: Paint = (x, y, z) => {
    if (z < 1.26) return [0.05, 0.05, 0.055];
    if (z < 1.36) return [0.3, 0.3, 0.3];
    const ribs = Math.abs(y) > 1.2 && Math.abs(x - 0.6 * Math.round(x / 0.6)) < 0.012 ? 0.82 : 1;
    const band = Math.abs(y) > 1.2 && z > 2.2 && z < 2.5 ? 0.55 : 1;
    return [colour[0] * ribs * band, colour[1] * ribs, colour[2] * ribs];
  };
  const axles = [-1.94, -3.25, -4.56];
  return [
    standing(
      pose,
      { distance: union(hull, frame, guard, legs), paint, gloss: 0.12, reach: 7.2 },
      [0, 0, 0],
    ),
    ...axles.flatMap((x) => [1.01, -1.01].map((y) => standing(pose, heavyWheel, [x, y, 0.5]))),
  ];
}
