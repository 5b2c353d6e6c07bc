import sharp from 'sharp';
import type { Vec2 } from '../plane-motion';
import { type Colour, type Solid, box, cone, length3, placed, shifted, union } from './solids';
import { noise } from './texture';

/** Lettering as a grid of coverage values, sampled like a texture: 0 paper, 1 ink. */
export type Lettering = (u: number, v: number) => number;

/** Draws SVG content on a 400 by `height` field and answers its darkness at (u, v) in 0..1. */
export async function lettering(content: string, height = 400): Promise<Lettering> {
  const svg = `<svg xmlns="http://www.w3.org/2000/svg" width="400" height="${height}">
    <rect width="400" height="${height}" fill="white"/>${content}</svg>`;
  const { data, info } = await sharp(Buffer.from(svg))
    .greyscale()
    .raw()
    .toBuffer({ resolveWithObject: true });
  return (u, v) => {
    const column = Math.min(info.width - 1, Math.max(0, Math.floor(u * info.width)));
    const row = Math.min(info.height - 1, Math.max(0, Math.floor(v * info.height)));
    return 1 - data[(row * info.width + column) * info.channels] / 255;
  };
}

export function numeral(text: string): Promise<Lettering> {
  const size = text.length > 1 ? 250 : 330;
  return lettering(
    `<text x="200" y="${200 + size * 0.36}" font-family="DejaVu Sans, sans-serif" font-weight="bold"
      font-size="${size}" text-anchor="middle">${text}</text>`,
  );
}

/** A numbered board that leans back on its foot and faces the given bearing. */
export function placard(at: Vec2, facing: number, face: Lettering): Solid {
  const half = 0.14;
  const lean = 0.3;
  const ink: Colour = [0.02, 0.02, 0.02];
  const board: Colour = [0.85, 0.6, 0.05];
  const cos = Math.cos(lean);
  const sin = Math.sin(lean);
  const upright = box(0.006, half, half);
  const leaning = (x: number, y: number, z: number): readonly [number, number, number] => {
    const dz = z - half;
    return [cos * x + sin * dz, y, cos * dz - sin * x];
  };
  return placed(
    {
      distance: (x, y, z) => upright(...leaning(x, y, z)),
      paint: (x, y, z) => {
        const [front, across, up] = leaning(x, y, z);
        if (front < 0.004) return [0.5, 0.36, 0.05];
        return face((across + half) / (2 * half), (half - up) / (2 * half)) > 0.5 ? ink : board;
      },
      gloss: 0.04,
      reach: 0.4,
    },
    { at: [at[0], at[1], 0], heading: facing },
  );
}

/** A small lettered tag on a machine; faces the side of negative depth. */
export function tag(at: readonly [number, number, number], face: Lettering, half = 0.022): Solid {
  return placed(
    {
      distance: box(half, 0.002, half),
      paint: (x, _y, z) =>
        face((x + half) / (2 * half), (half - z) / (2 * half)) > 0.5
          ? [0.02, 0.02, 0.02]
          : [0.85, 0.6, 0.05],
      gloss: 0.03,
      reach: half * 1.6,
    },
    { at },
  );
}

/** A steel rule standing or lying in elevation, divided in centimetres. */
export function rule(at: readonly [number, number, number], tilt: number, length = 0.15): Solid {
  return placed(
    {
      distance: box(length / 2, 0.001, 0.012),
      paint: (x, _y, z) => {
        const along = (x + length / 2) * 100;
        const line = Math.abs(along - Math.round(along)) < 0.06;
        return line && z > (Math.round(along) % 5 === 0 ? -0.004 : 0.003)
          ? [0.03, 0.03, 0.03]
          : [0.55, 0.55, 0.53];
      },
      gloss: 0.1,
      reach: length / 2 + 0.02,
    },
    { at, tilt },
  );
}

/** A one-metre rod in black and white tenths, lying on the ground. */
export function scaleRod(at: Vec2, heading: number, length = 1): Solid {
  return placed(
    {
      distance: box(length / 2, 0.02, 0.006),
      paint: (x) =>
        Math.floor((x / length + 0.5) * 10) % 2 === 0 ? [0.78, 0.77, 0.73] : [0.02, 0.02, 0.02],
      gloss: 0.03,
      reach: length / 2 + 0.05,
    },
    { at: [at[0], at[1], 0.006], heading },
  );
}

/** A flat black and white quartered disc on a control point, for photographs that are measured. */
export function target(at: Vec2, radius = 0.15): Solid {
  const disc = cone(radius, radius, 0.004);
  return placed(
    {
      distance: disc,
      paint: (x, y) =>
        x * y > 0 || Math.hypot(x, y) > radius * 0.92 ? [0.02, 0.02, 0.02] : [0.85, 0.85, 0.82],
      gloss: 0,
      reach: radius + 0.02,
    },
    { at: [at[0], at[1], 0] },
  );
}

export function trafficCone(at: Vec2): Solid {
  const foot = shifted(box(0.2, 0.2, 0.02, 0.01), 0, 0, 0.02);
  return placed(
    {
      distance: union(foot, cone(0.14, 0.03, 0.75)),
      paint: (_x, _y, z) => {
        if (z < 0.045) return [0.05, 0.05, 0.05];
        return z > 0.32 && z < 0.52 ? [0.8, 0.8, 0.78] : [0.8, 0.16, 0.03];
      },
      gloss: 0.08,
      reach: 0.85,
    },
    { at: [at[0], at[1], 0] },
  );
}

/** A post beside the road with a dark cap. */
export function post(at: Vec2): Solid {
  return placed(
    {
      distance: cone(0.06, 0.05, 1.05),
      paint: (_x, _y, z) => (z > 0.8 && z < 0.98 ? [0.03, 0.03, 0.03] : [0.7, 0.7, 0.66]),
      gloss: 0.05,
      reach: 1.1,
    },
    { at: [at[0], at[1], 0] },
  );
}

/** A rounded bush or tree crown on the verge. */
export function bush(at: Vec2, radius: number, height: number): Solid {
  const crown = (x: number, y: number, z: number): number => {
    const squash = length3(x, y, ((z - height) * radius) / height) - radius;
    const lumps = noise(x * 1.4 + 9, y * 1.4 + z) + noise(z * 2.1 - x, y * 2.1 + 4);
    const leaves = noise(x * 7, y * 7 + z * 9) + noise(z * 8 - x * 5, y * 6);
    return (squash + 0.28 * radius * (lumps - 1) + 0.09 * (leaves - 1)) * 0.45;
  };
  return placed(
    {
      distance: crown,
      paint: (x, y, z) => {
        const leaf = 0.4 + 0.9 * noise(x * 9 + z * 5, y * 9 - z * 4);
        return [0.06 * leaf, 0.1 * leaf, 0.03 * leaf];
      },
      gloss: 0,
      reach: Math.max(radius, height) * 2.1,
    },
    { at: [at[0], at[1], 0] },
  );
}
