import { dot, norm, scale, subtract, add, type Vector } from './vector';

interface Ordered {
  readonly at: Vector;
  /** Place along the trace, as surveyed; null for a mark on it that was measured apart. */
  readonly order: number | null;
}

/**
 * The points of a trace in the order along it. Points that the survey numbered stand by their
 * numbers; a point measured apart on the same trace (the place where the mark begins, a gap) is put
 * into the piece of the line that it lies nearest to, or before the first or after the last point.
 * Two unnumbered points of one piece stand in the order along that piece.
 *
 * Without any numbered point the points are returned as they came.
 */
export function alongTrace<T extends Ordered>(points: readonly T[]): readonly T[] {
  const numbered = points
    .filter((point) => point.order !== null)
    .sort((a, b) => Number(a.order) - Number(b.order));
  if (numbered.length < 2) return points;
  const placed = numbered.map((point, index) => ({ point, place: index }));
  for (const point of points) {
    if (point.order === null) placed.push({ point, place: placeOf(point.at, numbered) });
  }
  return placed.sort((a, b) => a.place - b.place).map(({ point }) => point);
}

/** Index along the line, between two points a fraction; below 0 and above the last at its ends. */
function placeOf(at: Vector, line: readonly Ordered[]): number {
  let best = 0;
  let least = Infinity;
  for (let i = 0; i + 1 < line.length; i++) {
    const piece = subtract(line[i + 1].at, line[i].at);
    const length = dot(piece, piece);
    if (length === 0) continue;
    const along = dot(subtract(at, line[i].at), piece) / length;
    // The first and the last piece run on beyond the line's ends.
    const low = i === 0 ? -Infinity : 0;
    const high = i + 2 === line.length ? Infinity : 1;
    const bounded = Math.min(high, Math.max(low, along));
    const away = norm(subtract(at, add(line[i].at, scale(bounded, piece))));
    if (away < least) [least, best] = [away, i + bounded];
  }
  return best;
}
