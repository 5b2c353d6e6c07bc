import type { Vec2 } from '../plane-motion';
import { noise, ramp } from './texture';

/** A tyre mark as the picture shows it: a dark band along a line, stronger or weaker along the way. */
export interface Band {
  line: readonly Vec2[];
  /** Darkness 0..1 at each point of the line; 0 leaves a gap. */
  strength: readonly number[];
  halfWidth: number;
}

interface Piece {
  a: Vec2;
  b: Vec2;
  from: number;
  to: number;
  start: number;
  length: number;
  halfWidth: number;
}

const CELL = 0.8;

/** Answers how dark the tyre marks make the ground at a place. */
export function tyreBands(
  bands: readonly Band[],
): (x: number, y: number, footprint: number) => number {
  const cells = new Map<string, Piece[]>();
  const store = (piece: Piece): void => {
    const reach = piece.halfWidth + 0.1;
    const span = (axis: 0 | 1): readonly [number, number] => [
      Math.floor((Math.min(piece.a[axis], piece.b[axis]) - reach) / CELL),
      Math.floor((Math.max(piece.a[axis], piece.b[axis]) + reach) / CELL),
    ];
    const [x0, x1] = span(0);
    const [y0, y1] = span(1);
    for (let i = x0; i <= x1; i += 1) {
      for (let j = y0; j <= y1; j += 1) {
        const key = `${i},${j}`;
        cells.set(key, [...(cells.get(key) ?? []), piece]);
      }
    }
  };
  for (const { line, strength, halfWidth } of bands) {
    let start = 0;
    for (let k = 1; k < line.length; k += 1) {
      const length = Math.hypot(line[k][0] - line[k - 1][0], line[k][1] - line[k - 1][1]);
      if (length < 1e-9) continue;
      store({
        a: line[k - 1],
        b: line[k],
        from: strength[k - 1],
        to: strength[k],
        start,
        length,
        halfWidth,
      });
      start += length;
    }
  }
  return (x, y, footprint) => {
    let clear = 1;
    for (const piece of cells.get(`${Math.floor(x / CELL)},${Math.floor(y / CELL)}`) ?? []) {
      clear = Math.min(clear, 1 - darkness(piece, x, y, footprint));
    }
    return 1 - clear;
  };
}

function darkness(piece: Piece, x: number, y: number, footprint: number): number {
  const dx = (piece.b[0] - piece.a[0]) / piece.length;
  const dy = (piece.b[1] - piece.a[1]) / piece.length;
  const along = (x - piece.a[0]) * dx + (y - piece.a[1]) * dy;
  if (along < -0.02 || along > piece.length + 0.02) return 0;
  const across = (y - piece.a[1]) * dx - (x - piece.a[0]) * dy;
  const share = Math.min(1, Math.max(0, along / piece.length));
  const strength = piece.from * (1 - share) + piece.to * share;
  const soft = Math.max(footprint, 0.025);
  const inside = 1 - ramp(piece.halfWidth - soft, piece.halfWidth + soft, Math.abs(across));
  const ribs =
    footprint > 0.03 ? 0.75 : 0.5 + 0.5 * noise(across * 55, (piece.start + along) * 1.3);
  const patches = 0.7 + 0.3 * noise(x * 3.1, y * 3.1);
  return strength * inside * ribs * patches;
}
