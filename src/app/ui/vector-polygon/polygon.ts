/** A vector of a polygon: it begins where the one named in `after` ends, or at the pole. */
export interface PolygonVector {
  readonly id: string;
  /** Components along scene x and y, in the unit of the polygon. */
  readonly value: readonly [number, number];
  readonly kind: 'velocity' | 'relative' | 'acceleration';
  /** As it stands beside the arrow: a letter and its index ("v", "LR/G"). */
  readonly symbol: string;
  readonly index: string;
  readonly after: string | null;
}

export interface PlacedVector extends PolygonVector {
  readonly from: readonly [number, number];
  readonly to: readonly [number, number];
}

/** Puts every vector after the one that it follows; one that follows nothing begins at the pole. */
export function placeVectors(vectors: readonly PolygonVector[]): PlacedVector[] {
  const placed = new Map<string, PlacedVector>();
  for (const vector of vectors) {
    const from = (vector.after === null ? undefined : placed.get(vector.after))?.to ?? [0, 0];
    const to = [from[0] + vector.value[0], from[1] + vector.value[1]] as const;
    placed.set(vector.id, { ...vector, from, to });
  }
  return [...placed.values()];
}

/** How a drawing of metres per second becomes one of pixels; y points up in the scene. */
export interface Fit {
  readonly scale: number;
  readonly toPage: (p: readonly [number, number]) => readonly [number, number];
}

/** The largest scale at which every end lies inside the frame, with a margin for the labels. */
export function fitVectors(
  placed: readonly PlacedVector[],
  width: number,
  height: number,
  margin: { readonly x: number; readonly y: number },
): Fit {
  const ends = [[0, 0] as const, ...placed.flatMap((vector) => [vector.from, vector.to])];
  const xs = ends.map((p) => p[0]);
  const ys = ends.map((p) => p[1]);
  const [left, right] = [Math.min(...xs), Math.max(...xs)];
  const [low, high] = [Math.min(...ys), Math.max(...ys)];
  const room = { x: width - 2 * margin.x, y: height - 2 * margin.y };
  const scale = Math.min(
    right > left ? room.x / (right - left) : Infinity,
    high > low ? room.y / (high - low) : Infinity,
  );
  const used = Number.isFinite(scale) ? scale : 1;
  return {
    scale: used,
    toPage: ([x, y]) => [
      width / 2 + (x - (left + right) / 2) * used,
      height / 2 - (y - (low + high) / 2) * used,
    ],
  };
}

/** 1, 2 or 5 times a power of ten: the longest such length that is at most `most`. */
export function roundLength(most: number): number {
  const power = 10 ** Math.floor(Math.log10(most));
  return [5, 2, 1].map((k) => k * power).find((length) => length <= most * (1 + 1e-12)) ?? power;
}
