/** Procedural textures, cheap enough for every pixel: value noise and its sums over octaves. */

function lattice(i: number, j: number): number {
  let hash = Math.imul(i, 374761393) ^ Math.imul(j, 668265263);
  hash = Math.imul(hash ^ (hash >>> 13), 1274126177);
  return ((hash ^ (hash >>> 16)) >>> 0) / 4294967296;
}

/** Smooth noise in [0, 1] with features of about unit size. */
export function noise(x: number, y: number): number {
  const i = Math.floor(x);
  const j = Math.floor(y);
  const fx = x - i;
  const fy = y - j;
  const sx = fx * fx * (3 - 2 * fx);
  const sy = fy * fy * (3 - 2 * fy);
  const low = lattice(i, j) * (1 - sx) + lattice(i + 1, j) * sx;
  const high = lattice(i, j + 1) * (1 - sx) + lattice(i + 1, j + 1) * sx;
  return low * (1 - sy) + high * sy;
}

/**
 * Sum of octaves in [0, 1] about a mean of one half. Octaves finer than the footprint of a pixel fade
 * out, which keeps far ground free of shimmer.
 */
export function cloud(
  x: number,
  y: number,
  size: number,
  octaves: number,
  footprint: number,
): number {
  let sum = 0;
  let weight = 0.5;
  let scale = 1 / size;
  for (let octave = 0; octave < octaves; octave += 1) {
    const kept = 1 - ramp(0.2, 0.7, footprint * scale);
    if (kept === 0) break;
    sum += kept * weight * (noise(x * scale + 17 * octave, y * scale - 31 * octave) - 0.5);
    weight *= 0.55;
    scale *= 2.1;
  }
  return 0.5 + sum;
}

/** 0 below `from`, 1 above `to`, smooth between. */
export function ramp(from: number, to: number, value: number): number {
  const share = Math.min(1, Math.max(0, (value - from) / (to - from)));
  return share * share * (3 - 2 * share);
}

/** 1 inside a stripe of the given half-width about zero, faded over the footprint of a pixel. */
export function stripe(offset: number, halfWidth: number, footprint: number): number {
  const soft = Math.max(footprint, 0.004);
  return 1 - ramp(halfWidth - soft / 2, halfWidth + soft / 2, Math.abs(offset));
}
