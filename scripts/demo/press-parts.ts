import { type Vec2, place } from './plane-motion';
import { PRESS, type PressMotion, atContact } from './press-motion';
import { WITNESSES, partPoint } from './press-survey';
import {
  type Colour,
  type Field,
  type Paint,
  type Solid,
  blend,
  box,
  capsule,
  drum,
  placed,
  plain,
  shifted,
  union,
  without,
} from './picture/solids';
import { cloud, noise } from './picture/texture';

/**
 * The press as solids. World x is the survey's x, world z is the survey's y plus the height of the
 * crank shaft over the floor, and depth runs away from the operator's side.
 */
export const SHAFT_HEIGHT = 1.36;

export const upright = ([x, y]: Vec2, depth: number): readonly [number, number, number] => [
  x,
  depth,
  y + SHAFT_HEIGHT,
];

const FRAME: Colour = [0.1, 0.17, 0.15];
const STEEL: Colour = [0.3, 0.3, 0.31];
const DARK: Colour = [0.06, 0.06, 0.065];

const worn =
  (colour: Colour, amount: number): Paint =>
  (x, y, z) => {
    const chip = cloud(x * 3 + y, z * 3 - y, 0.25, 4, 0);
    const grime = 1 - amount * cloud(x * 2, z * 2 + y, 0.3, 4, 0);
    return chip > 0.72
      ? [STEEL[0] * grime, STEEL[1] * grime, STEEL[2] * grime]
      : [colour[0] * grime, colour[1] * grime, colour[2] * grime];
  };

const ground = (x: number, z: number): number => 0.8 + 0.35 * noise(x * 40, z * 400);

/** A steel part with a bright bruise at each of the given places of its own frame. */
const bruised =
  (colour: Colour, places: readonly Vec2[]): Paint =>
  (x, _y, z) => {
    for (const [px, pz] of places) {
      const away = Math.hypot(x - px, z - pz) + 0.003 * (noise(x * 300, z * 300) - 0.5);
      if (away < 0.0075) return [0.75, 0.73, 0.68];
      if (away < 0.011) return [0.05, 0.045, 0.04];
    }
    const shine = ground(x, z);
    return [colour[0] * shine, colour[1] * shine, colour[2] * shine];
  };

function fixedPart(
  distance: Field,
  paint: Paint,
  reach: number,
  at: readonly [number, number, number],
): Solid {
  return placed({ distance, paint, gloss: 0.08, reach }, { at });
}

/** Frame, guides, bed and the parts of the guard that carry the witness marks. */
export function frameParts(): Solid[] {
  const base = SHAFT_HEIGHT;
  const contact = atContact();
  const witness = WITNESSES.map((mark) => place(contact[mark.body].pose, partPoint(mark)));
  const column = box(0.11, 0.2, 0.62, 0.015);
  const columns = [-0.36, 0.36].map((x) =>
    fixedPart(column, worn(FRAME, 0.5), 0.72, [x, 0.2, base - 0.3]),
  );
  const head = without(box(0.47, 0.17, 0.2, 0.03), drum(0.07, 0.5));
  const gibs = [-1, 1].map((side) => {
    const [, dent] = witness[side < 0 ? 3 : 4];
    const paint: Paint = (x, _y, z) => {
      const height = z - 0.4 - dent;
      const inner = side < 0 ? x > 0.002 : x < -0.002;
      if (inner && Math.abs(height) < 0.0035 + 0.002 * noise(x * 500, 3)) return [0.85, 0.83, 0.78];
      if (inner && Math.abs(height) < 0.008) return [0.1, 0.09, 0.08];
      const shine = ground(z, x);
      return [0.24 * shine, 0.22 * shine, 0.17 * shine];
    };
    return fixedPart(box(0.03, 0.07, 0.25, 0.004), paint, 0.28, [side * 0.2, -0.05, base - 0.4]);
  });
  const bed = union(
    shifted(box(0.52, 0.34, 0.07, 0.01), 0, 0, -0.81),
    shifted(box(0.46, 0.3, 0.24, 0.02), 0, 0.04, -1.1),
  );
  const die = union(
    shifted(box(0.2, 0.14, 0.03, 0.004), 0, 0, -0.71),
    shifted(box(0.12, 0.09, 0.02, 0.004), 0, 0, -0.67),
  );
  const bolt = union(drum(0.009, 0.06), shifted(drum(0.016, 0.012), 0, -0.055, 0));
  const bracket = shifted(box(0.018, 0.012, 0.09), -0.01, 0.07, 0.07);
  const [w1, w2, w3] = witness;
  const cover = box(0.05, 0.004, 0.03, 0.002);
  const rail = box(0.13, 0.008, 0.009, 0.002);
  return [
    ...columns,
    fixedPart(head, worn(FRAME, 0.45), 0.55, [0, 0.25, base + 0.08]),
    ...gibs,
    fixedPart(bed, worn([0.11, 0.16, 0.15], 0.5), 1.5, [0, 0.06, base]),
    fixedPart(die, bruised(DARK, []), 0.85, [0, 0.0, base]),
    fixedPart(union(bolt, bracket), bruised(STEEL, []), 0.18, [w1[0] - 0.009, -0.06, w1[1] + base]),
    fixedPart(cover, plain([0.5, 0.42, 0.05]), 0.07, [w2[0] + 0.055, -0.03, w2[1] + base + 0.02]),
    fixedPart(rail, plain([0.55, 0.45, 0.05]), 0.15, [w3[0] + 0.125, -0.16, w3[1] + base]),
  ];
}

/** Crank with its web, connecting rod and ram in the given position. */
export function movingParts(motion: PressMotion): Solid[] {
  const { crank, rod, ram } = motion;
  const points = PRESS.points;
  const weight = shifted(box(0.075, 0.024, 0.085, 0.02), -0.075, 0, 0);
  const web = union(drum(0.1, 0.024, 0.004), weight, shifted(drum(0.05, 0.024), 0.085, 0, 0.02));
  const lug = blend(0.03, web, capsule([0.06, 0, 0.02], [0.112, 0, 0.048], 0.018));
  const shaftAndPin = union(
    shifted(drum(0.06, 0.2, 0.004), 0, 0.16, 0),
    shifted(drum(0.032, 0.075, 0.004), 0.08, -0.075, 0),
  );
  const length = PRESS.rod;
  const shank = shifted(box(length / 2 - 0.03, 0.018, 0.031, 0.006), length / 2, 0, 0);
  const rodShape = without(
    blend(0.03, shank, drum(0.06, 0.026, 0.006), shifted(drum(0.046, 0.026, 0.006), length, 0, 0)),
    union(drum(0.033, 0.1), shifted(drum(0.022, 0.1), length, 0, 0)),
  );
  const ramShape = union(
    shifted(box(0.165, 0.06, 0.12, 0.006), 0, 0, 0.03),
    shifted(box(0.07, 0.05, 0.05, 0.004), 0, 0, -0.13),
    shifted(drum(0.021, 0.11), 0, -0.02, 0),
  );
  const part = (
    distance: Field,
    paint: Paint,
    reach: number,
    pose: typeof crank.pose,
    depth: number,
  ): Solid =>
    placed(
      { distance, paint, gloss: 0.16, reach },
      {
        at: upright([pose.x, pose.y], depth),
        tilt: pose.heading,
      },
    );
  return [
    part(lug, bruised(STEEL, [points.crank.P1, points.crank.P2]), 0.19, crank.pose, -0.03),
    part(shaftAndPin, bruised([0.4, 0.4, 0.41], []), 0.4, crank.pose, -0.03),
    part(rodShape, bruised([0.22, 0.22, 0.23], [[0.205, 0.024]]), 0.45, rod.pose, -0.12),
    part(ramShape, bruised([0.27, 0.27, 0.28], []), 0.26, ram.pose, -0.05),
  ];
}

/** Flywheel and motor behind the frame. */
export function driveParts(): Solid[] {
  const rim = union(
    without(drum(0.4, 0.06, 0.01), drum(0.33, 0.2)),
    drum(0.09, 0.07, 0.01),
    box(0.36, 0.02, 0.04),
    box(0.04, 0.02, 0.36),
  );
  return [
    placed(
      { distance: rim, paint: worn([0.28, 0.06, 0.04], 0.5), gloss: 0.06, reach: 0.45 },
      {
        at: upright([0, 0], 0.62),
        tilt: 0.4,
      },
    ),
    fixedPart(drum(0.15, 0.2, 0.02), worn([0.09, 0.14, 0.2], 0.4), 0.3, [
      0.62,
      0.75,
      SHAFT_HEIGHT + 0.34,
    ]),
    fixedPart(box(0.3, 0.26, 0.02), worn(FRAME, 0.5), 0.45, [0.5, 0.7, SHAFT_HEIGHT + 0.17]),
  ];
}
