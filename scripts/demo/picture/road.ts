import type { Vec3 } from './camera';
import { type Plane, flatPlane } from './render';
import { type Colour, length2 } from './solids';
import { cloud, noise, ramp, stripe } from './texture';

/** Where a place lies in relation to the road: along it, and to the left of its centre line, m. */
export type RoadLine = (x: number, y: number) => readonly [number, number];

export interface RoadLook {
  line: RoadLine;
  halfWidth: number;
  shoulder: number;
  /** 0 dry and pale, 1 wet and dark. */
  wet: number;
  /** Colour of the ground beside the road. */
  verge: Colour;
  marks: (x: number, y: number, footprint: number) => number;
}

/** Bend to the left with its centre of curvature on the left. */
export function bend(centre: readonly [number, number], radius: number): RoadLine {
  return (x, y) => {
    const dx = x - centre[0];
    const dy = y - centre[1];
    return [radius * Math.atan2(dx, -dy), radius - length2(dx, dy)];
  };
}

export function straight(offset: number, heading: number): RoadLine {
  const cos = Math.cos(heading);
  const sin = Math.sin(heading);
  return (x, y) => [cos * x + sin * (y - offset), cos * (y - offset) - sin * x];
}

const mix = (a: Colour, b: Colour, share: number): Colour => [
  a[0] + (b[0] - a[0]) * share,
  a[1] + (b[1] - a[1]) * share,
  a[2] + (b[2] - a[2]) * share,
];
const scale = (a: Colour, k: number): Colour => [a[0] * k, a[1] * k, a[2] * k];

export function roadGround(look: RoadLook): Plane {
  const { line, halfWidth, shoulder, wet, verge, marks } = look;
  return flatPlane([0, 0, 1], 0, (x, y, _z, footprint) => {
    const [along, offset] = line(x, y);
    const ragged = 0.1 * (cloud(along, offset, 0.9, 3, footprint) - 0.5);
    const beyond = Math.abs(offset) + ragged - halfWidth;
    if (beyond > shoulder + 0.4) return vergeColour(verge, x, y, footprint);
    const gravel = scale([0.3, 0.27, 0.23], 0.3 + 1.2 * cloud(x, y, 0.07, 4, footprint));
    if (beyond > 0.05) {
      const blend = ramp(
        shoulder - 0.4,
        shoulder + 0.4,
        beyond + 0.6 * (noise(x * 2, y * 2) - 0.5),
      );
      return mix(gravel, vergeColour(verge, x, y, footprint), blend);
    }
    const patch = cloud(along * 0.25, offset, 1.1, 4, footprint);
    const grit = cloud(x, y, 0.03, 5, footprint);
    const lane = 0.025 * Math.cos((offset / halfWidth) * 4 * Math.PI);
    const tone = (0.145 - 0.075 * wet) * (0.72 + 0.4 * patch + 1.1 * (grit - 0.5) + lane);
    let road: Colour = [tone, tone * 0.99, tone * (0.96 + 0.1 * wet)];
    const paint = roadPaint(along, offset, halfWidth, footprint);
    const worn = 0.55 + 0.45 * ramp(0.3, 0.55, cloud(x, y, 0.12, 3, footprint));
    road = mix(road, [0.62, 0.62, 0.58], paint * worn * (1 - 0.3 * wet));
    const dark = marks(x, y, footprint);
    const seam = 0.35 * stripe(offset - 0.06, 0.012, footprint) * noise(along * 0.7, 3);
    return scale(mix(road, [0.018, 0.018, 0.02], Math.min(0.93, dark)), 1 - seam);
  });
}

function roadPaint(along: number, offset: number, halfWidth: number, footprint: number): number {
  const edges = stripe(Math.abs(offset) - halfWidth + 0.25, 0.06, footprint);
  const dash = along - 6 * Math.floor(along / 6);
  const centre = dash < 3 ? stripe(offset, 0.06, footprint) : 0;
  return Math.max(edges, centre);
}

function vergeColour(verge: Colour, x: number, y: number, footprint: number): Colour {
  const broad = cloud(x, y, 5, 3, footprint);
  const blades = cloud(x * 1.7, y, 0.14, 5, footprint);
  const light = 0.45 + 0.5 * broad + 1.2 * (blades - 0.5);
  const dry = ramp(0.45, 0.75, cloud(x + 40, y, 3, 3, footprint));
  return scale(mix(verge, [0.25, 0.21, 0.1], 0.55 * dry), Math.max(0.15, light));
}

export interface SkyLook {
  zenith: Colour;
  horizon: Colour;
  /** Height of the tree line or slope beside the road, as a tangent of elevation, by azimuth
   * (the same at -pi and +pi). */
  skyline: (azimuth: number) => number;
  trees: Colour;
}

export function sky(look: SkyLook): (direction: Vec3) => Colour {
  return ([x, y, z]) => {
    const level = length2(x, y);
    const height = z / Math.max(level, 1e-6);
    const azimuth = Math.atan2(y, x);
    const crown = look.skyline(azimuth);
    const round = azimuth > 0 ? azimuth : -azimuth;
    const fuzz = 0.012 * cloud(round * 60, height * 60, 1.5, 4, 0);
    if (height + fuzz < crown) {
      const leaf = 0.45 + 0.9 * cloud(round * 70, height * 90, 0.9, 4, 0);
      return mix(scale(look.trees, leaf), look.horizon, 0.28);
    }
    const rise = Math.min(1, Math.max(0, height) ** 0.6);
    const blue = mix(look.horizon, look.zenith, rise);
    const ceiling = 1 / (Math.max(z, 0) + 0.12);
    const veil = cloud(x * ceiling * 0.8 + 5, y * ceiling * 0.8, 0.9, 5, 0);
    return mix(blue, [0.93, 0.93, 0.94], 0.75 * ramp(0.42, 0.72, veil) * (1 - 0.4 * rise));
  };
}
