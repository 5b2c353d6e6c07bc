/** An arrow of a polygon; places are in the unit of the drawing, x and y along the scene's axes. */
export interface PolygonArrow {
  readonly kind: 'velocity' | 'relative' | 'acceleration';
  /** As it stands beside the arrow: a letter and its index ("v", "LR/G"). */
  readonly symbol: string;
  readonly index: string;
  readonly from: Place;
  readonly to: Place;
  /** The sum of the others, drawn stronger. */
  readonly result: boolean;
}

export type Place = readonly [number, number];

/** How a drawing of metres per second becomes one of pixels; y points up in the scene. */
export interface Fit {
  readonly scale: number;
  /** Of the drawing, no higher than it needs to be. */
  readonly height: number;
  readonly toPage: (p: Place) => Place;
}

/** The largest scale at which every end lies inside a frame of `width` by `most`, with room for labels. */
export function fitArrows(
  arrows: readonly Pick<PolygonArrow, 'from' | 'to'>[],
  width: number,
  most: number,
  margin: { readonly x: number; readonly y: number },
): Fit {
  const ends: Place[] = [[0, 0], ...arrows.flatMap((arrow) => [arrow.from, arrow.to])];
  const xs = ends.map((p) => p[0]);
  const ys = ends.map((p) => p[1]);
  const [left, right] = [Math.min(...xs), Math.max(...xs)];
  const [low, high] = [Math.min(...ys), Math.max(...ys)];
  const scale = Math.min(
    right > left ? (width - 2 * margin.x) / (right - left) : Infinity,
    high > low ? (most - 2 * margin.y) / (high - low) : Infinity,
  );
  const used = Number.isFinite(scale) ? scale : 1;
  const height = Math.max(56, (high - low) * used + 2 * margin.y);
  return {
    scale: used,
    height,
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
