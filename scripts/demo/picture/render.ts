import sharp from 'sharp';
import { type Camera, IMAGE, type Vec3, unit } from './camera';
import { type Colour, type Solid, length3 } from './solids';

/**
 * A small ray caster: planes with a colour at every point (the ground, a wall), solids by distance
 * fields, one sun with soft shadows, and daylight from all sides. Enough to make pictures in which a
 * camera's perspective is exact and marks lie where the truth says.
 */
export interface Plane {
  /** Distance along the ray to the plane, or Infinity. */
  meet(eye: Vec3, direction: Vec3): number;
  normal: Vec3;
  colour(x: number, y: number, z: number, footprint: number): Colour;
}

export interface Stage {
  planes: readonly Plane[];
  solids: readonly Solid[];
  sky(direction: Vec3): Colour;
  sun: { towards: Vec3; strength: number; softness: number };
  daylight: number;
  /** Distance at which the air has taken about two thirds of the contrast, m. */
  haze: number;
}

const OVERSAMPLE = 1.3;

export function flatPlane(normal: Vec3, level: number, colour: Plane['colour']): Plane {
  const axis = normal.findIndex((value) => value !== 0);
  return {
    normal,
    colour,
    meet: (eye, direction) => {
      const distance = (level - eye[axis]) / direction[axis];
      return distance > 0 && direction[axis] * normal[axis] < 0 ? distance : Infinity;
    },
  };
}

/** Entry and exit of a ray through a solid's bounding sphere; null when it misses. */
function span(solid: Solid, o: Vec3, d: Vec3): readonly [number, number] | null {
  const [cx, cy, cz, r] = solid.bound;
  const x = cx - o[0];
  const y = cy - o[1];
  const z = cz - o[2];
  const along = x * d[0] + y * d[1] + z * d[2];
  const inside = r * r - (x * x + y * y + z * z - along * along);
  if (inside <= 0) return null;
  const half = Math.sqrt(inside);
  return along + half <= 0 ? null : [Math.max(0, along - half), along + half];
}

interface Hit {
  distance: number;
  solid: Solid | null;
}

function firstSolid(stage: Stage, eye: Vec3, d: Vec3, limit: number): Hit {
  const hit: Hit = { distance: limit, solid: null };
  for (const solid of stage.solids) {
    const range = span(solid, eye, d);
    if (range === null || range[0] > hit.distance) continue;
    let t = range[0];
    for (let step = 0; step < 120 && t < Math.min(range[1], hit.distance); step += 1) {
      const gap = solid.distance(eye[0] + t * d[0], eye[1] + t * d[1], eye[2] + t * d[2]);
      if (gap < 0.0004 * t) {
        hit.distance = t;
        hit.solid = solid;
        break;
      }
      t += gap * 0.92;
    }
  }
  return hit;
}

/** Whether nothing solid stands between the eye and a point. */
export function inSight(stage: Stage, eye: Vec3, point: Vec3): boolean {
  const ray: Vec3 = [point[0] - eye[0], point[1] - eye[1], point[2] - eye[2]];
  const distance = Math.hypot(...ray) - 0.03;
  return firstSolid(stage, eye, unit(ray), distance).solid === null;
}

/** Share of the sun that reaches a point, with a soft edge. */
function sunlight(stage: Stage, p: Vec3, normal: Vec3): number {
  const d = stage.sun.towards;
  const from: Vec3 = [p[0] + normal[0] * 0.004, p[1] + normal[1] * 0.004, p[2] + normal[2] * 0.004];
  let light = 1;
  for (const solid of stage.solids) {
    const range = span(solid, from, d);
    if (range === null) continue;
    let t = Math.max(range[0], 0.004);
    for (let step = 0; step < 60 && t < range[1] && light > 0.02; step += 1) {
      const gap = solid.distance(from[0] + t * d[0], from[1] + t * d[1], from[2] + t * d[2]);
      light = Math.min(light, (stage.sun.softness * gap) / t);
      t += Math.max(gap, 0.006);
    }
  }
  return Math.max(0, light);
}

/** Daylight left in corners and beneath things. */
function openness(stage: Stage, p: Vec3, normal: Vec3): number {
  let open = 1;
  for (const solid of stage.solids) {
    const [cx, cy, cz, r] = solid.bound;
    if (length3(p[0] - cx, p[1] - cy, p[2] - cz) > r + 0.7) continue;
    let closed = 0;
    for (const reach of [0.7, 0.25, 0.06]) {
      const gap = solid.distance(
        p[0] + normal[0] * reach,
        p[1] + normal[1] * reach,
        p[2] + normal[2] * reach,
      );
      if (gap >= reach) break;
      closed += (reach - gap) / reach / 3;
    }
    open *= 1 - 0.75 * Math.min(1, closed);
  }
  return open;
}

function normalOf(solid: Solid, p: Vec3): Vec3 {
  const e = 0.002;
  const [x, y, z] = p;
  const f = solid.distance;
  return unit([
    f(x + e, y, z) - f(x - e, y, z),
    f(x, y + e, z) - f(x, y - e, z),
    f(x, y, z + e) - f(x, y, z - e) + 1e-9,
  ]);
}

function lit(stage: Stage, p: Vec3, d: Vec3, normal: Vec3, colour: Colour, gloss: number): Colour {
  const { towards, strength } = stage.sun;
  const facing = normal[0] * towards[0] + normal[1] * towards[1] + normal[2] * towards[2];
  const sun = facing > 0 ? strength * facing * sunlight(stage, p, normal) : 0;
  const upward = 0.62 + 0.38 * normal[2];
  const light = sun + stage.daylight * upward * openness(stage, p, normal);
  const out: [number, number, number] = [colour[0] * light, colour[1] * light, colour[2] * light];
  if (gloss > 0) {
    const k = 2 * (d[0] * normal[0] + d[1] * normal[1] + d[2] * normal[2]);
    const mirror: Vec3 = [d[0] - k * normal[0], d[1] - k * normal[1], d[2] - k * normal[2]];
    const spark = Math.max(
      0,
      mirror[0] * towards[0] + mirror[1] * towards[1] + mirror[2] * towards[2],
    );
    const edge = gloss * (0.08 + 0.55 * (1 + k / 2) ** 5);
    const glint = facing > 0 ? gloss * strength * spark ** 40 : 0;
    const sky = stage.sky([mirror[0], mirror[1], Math.max(mirror[2], 0.02)]);
    for (const c of [0, 1, 2]) out[c] = out[c] * (1 - edge) + sky[c] * edge + glint;
  }
  return out;
}

function colourAlong(stage: Stage, eye: Vec3, d: Vec3, footprintPerMetre: number): Colour {
  let limit = 2000;
  let plane: Plane | null = null;
  for (const candidate of stage.planes) {
    const distance = candidate.meet(eye, d);
    if (distance < limit) {
      limit = distance;
      plane = candidate;
    }
  }
  const hit = firstSolid(stage, eye, d, limit);
  if (hit.solid === null && plane === null) return stage.sky(d);
  const t = hit.distance;
  const p: Vec3 = [eye[0] + t * d[0], eye[1] + t * d[1], eye[2] + t * d[2]];
  let seen: Colour = [0, 0, 0];
  if (hit.solid !== null) {
    const normal = normalOf(hit.solid, p);
    seen = lit(stage, p, d, normal, hit.solid.paint(...p), hit.solid.gloss);
  } else if (plane !== null) {
    const { normal } = plane;
    const slant = Math.abs(d[0] * normal[0] + d[1] * normal[1] + d[2] * normal[2]);
    const footprint = (footprintPerMetre * t) / Math.max(slant, 0.02) ** 0.6;
    seen = lit(stage, p, d, normal, plane.colour(...p, footprint), 0);
  }
  const air = 1 - Math.exp(-t / stage.haze);
  const far = stage.sky([d[0], d[1], 0.01]);
  const through = (c: 0 | 1 | 2): number => seen[c] * (1 - air) + far[c] * air;
  return [through(0), through(1), through(2)];
}

/** The picture as 8-bit RGB rows of the finished size. */
export async function render(stage: Stage, camera: Camera): Promise<Buffer> {
  const width = Math.round(IMAGE.width * OVERSAMPLE);
  const height = Math.round(IMAGE.height * OVERSAMPLE);
  const pixels = camera.pixels * OVERSAMPLE;
  const raw = Buffer.alloc(width * height * 3);
  const { right, down, forward, pose } = camera;
  const axis = (i: number, a: number, b: number): number => forward[i] + a * right[i] + b * down[i];
  for (let row = 0; row < height; row += 1) {
    const b = (row + 0.5 - height / 2) / pixels;
    for (let column = 0; column < width; column += 1) {
      const a = (column + 0.5 - width / 2) / pixels;
      const d = unit([axis(0, a, b), axis(1, a, b), axis(2, a, b)]);
      const colour = colourAlong(stage, pose.eye, d, 1 / pixels);
      const start = (row * width + column) * 3;
      for (let c = 0; c < 3; c += 1) raw[start + c] = Math.round(255 * developed(colour[c]));
    }
  }
  return sharp(raw, { raw: { width, height, channels: 3 } })
    .resize(IMAGE.width, IMAGE.height, { kernel: 'lanczos2' })
    .raw()
    .toBuffer();
}

/** Film curve: a soft shoulder instead of clipped highlights, then display gamma. */
function developed(light: number): number {
  const shoulder = light < 0.6 ? light : 0.6 + 0.4 * (1 - Math.exp(-(light - 0.6) / 0.4));
  return Math.min(1, Math.max(0, shoulder)) ** (1 / 2.2);
}
