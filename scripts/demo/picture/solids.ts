/**
 * Solid things in a picture, given by their signed distance (m) and their colour. A solid lives in a
 * frame of its own; `placed` puts it into the scene.
 */
export type Colour = readonly [number, number, number];
export type Field = (x: number, y: number, z: number) => number;
export type Paint = (x: number, y: number, z: number) => Colour;

export interface Solid {
  distance: Field;
  paint: Paint;
  /** Sphere that holds the whole solid: centre and radius. */
  bound: readonly [number, number, number, number];
  /** Strength of the highlight, 0 for matt. */
  gloss: number;
}

/** Length of a vector. Math.hypot guards against overflow and is many times slower. */
export const length2 = (x: number, y: number): number => Math.sqrt(x * x + y * y);
export const length3 = (x: number, y: number, z: number): number =>
  Math.sqrt(x * x + y * y + z * z);

export function box(hx: number, hy: number, hz: number, rounding = 0): Field {
  return (x, y, z) => {
    const qx = Math.abs(x) - hx + rounding;
    const qy = Math.abs(y) - hy + rounding;
    const qz = Math.abs(z) - hz + rounding;
    const outside = length3(Math.max(qx, 0), Math.max(qy, 0), Math.max(qz, 0));
    return outside + Math.min(Math.max(qx, qy, qz), 0) - rounding;
  };
}

/** Cylinder about the y axis. */
export function drum(radius: number, halfLength: number, rounding = 0): Field {
  return (x, y, z) => {
    const dr = length2(x, z) - radius + rounding;
    const dl = Math.abs(y) - halfLength + rounding;
    return Math.min(Math.max(dr, dl), 0) + length2(Math.max(dr, 0), Math.max(dl, 0)) - rounding;
  };
}

/** Upright cone or post: radius falls from `low` at z = 0 to `high` at z = height. */
export function cone(low: number, high: number, height: number): Field {
  return (x, y, z) => {
    const share = Math.min(1, Math.max(0, z / height));
    const dr = (length2(x, y) - (low + (high - low) * share)) * 0.9;
    return Math.max(dr, -z, z - height);
  };
}

export function capsule(
  a: readonly [number, number, number],
  b: readonly [number, number, number],
  radius: number,
): Field {
  const [ax, ay, az] = a;
  const [dx, dy, dz] = [b[0] - ax, b[1] - ay, b[2] - az];
  const square = dx * dx + dy * dy + dz * dz;
  return (x, y, z) => {
    const along = ((x - ax) * dx + (y - ay) * dy + (z - az) * dz) / square;
    const t = Math.min(1, Math.max(0, along));
    return length3(x - ax - t * dx, y - ay - t * dy, z - az - t * dz) - radius;
  };
}

export function union(...fields: Field[]): Field {
  return (x, y, z) => {
    let nearest = Infinity;
    for (const field of fields) nearest = Math.min(nearest, field(x, y, z));
    return nearest;
  };
}

/** Union with a rounded seam of size k. */
export function blend(k: number, ...fields: Field[]): Field {
  return (x, y, z) => {
    let nearest = Infinity;
    for (const field of fields) {
      const d = field(x, y, z);
      const h = Math.max(k - Math.abs(nearest - d), 0) / k;
      nearest = nearest === Infinity ? d : Math.min(nearest, d) - (h * h * k) / 4;
    }
    return nearest;
  };
}

export function without(body: Field, cut: Field): Field {
  return (x, y, z) => Math.max(body(x, y, z), -cut(x, y, z));
}

export function shifted(field: Field, dx: number, dy: number, dz: number): Field {
  return (x, y, z) => field(x - dx, y - dy, z - dz);
}

export function plain(colour: Colour): Paint {
  return () => colour;
}

interface Placing {
  at: readonly [number, number, number];
  /** Turn about z, rad. */
  heading?: number;
  /** Turn in elevation (about the depth axis, x towards z), rad. */
  tilt?: number;
}

/** Puts a solid that was described about its own origin into the scene. */
export function placed(solid: Omit<Solid, 'bound'> & { reach: number }, placing: Placing): Solid {
  const [px, py, pz] = placing.at;
  const ch = Math.cos(placing.heading ?? 0);
  const sh = Math.sin(placing.heading ?? 0);
  const ct = Math.cos(placing.tilt ?? 0);
  const st = Math.sin(placing.tilt ?? 0);
  const local =
    <T>(act: (x: number, y: number, z: number) => T) =>
    (x: number, y: number, z: number): T => {
      const dx = x - px;
      const dy = y - py;
      const dz = z - pz;
      const hx = ch * dx + sh * dy;
      return act(ct * hx + st * dz, ch * dy - sh * dx, ct * dz - st * hx);
    };
  return {
    distance: local(solid.distance),
    paint: local(solid.paint),
    bound: [px, py, pz, solid.reach],
    gloss: solid.gloss,
  };
}
