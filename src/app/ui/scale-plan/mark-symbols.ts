import type { MarkKind } from '#shared/contracts/survey';

export interface MarkSymbol {
  /** Path on a 16 × 16 grid whose middle (8, 8) lies on the mark. */
  readonly path: string;
  /** Drawn as a surface; else as a line. */
  readonly filled: boolean;
}

const line = (path: string): MarkSymbol => ({ path, filled: false });
const surface = (path: string): MarkSymbol => ({ path, filled: true });

/** Our own symbols: the shape alone tells the kind, the colour is the same for all. */
export const markSymbols: Record<MarkKind, MarkSymbol> = {
  'tyre mark': line('M8 3a5 5 0 1 1 0 10A5 5 0 0 1 8 3ZM5 5l6 6M11 5l-6 6'),
  'skid mark': line('M5.5 2.5v11M10.5 2.5v11M5.5 8h5'),
  'yaw mark': line('M2.5 12.5C3.5 7 7 3.5 13.5 3M6.5 13.5C7.3 10 9.5 7.6 13.5 7'),
  scrub: line('M2.5 11l4-6M6 11l4-6M9.5 11l4-6'),
  gouge: surface('M2.5 3.5h11L8 13.5Z'),
  scrape: line('M2 10.5 5 5l3 5.5L11 5l3 5.5'),
  'witness mark': line('M8 2.5 13.5 8 8 13.5 2.5 8ZM8 7v2M7 8h2'),
  debris: surface('M4 3l4 1.5L6.5 8 3 7ZM9.5 8l4 .5-1 4.5-4-1.5ZM11 3l2 1-1 2-2-1Z'),
  fluid: surface('M8 2c2.6 3.6 4.3 5.5 4.3 7.6a4.3 4.3 0 0 1-8.6 0C3.7 7.5 5.4 5.6 8 2Z'),
  'point of rest': line('M3 3h10v10H3ZM3 8h10M8 3v10'),
  'road edge': line('M2 9h12M5 9v4M8 9v4M11 9v4'),
  'line marking': line('M1.5 6.5h5v3h-5ZM9.5 6.5h5v3h-5Z'),
  'control point': line('M8 2.2 14 13H2ZM8 8.5v2M7 9.5h2'),
  other: line('M8 5.2a2.8 2.8 0 1 1 0 5.6 2.8 2.8 0 0 1 0-5.6Z'),
};
