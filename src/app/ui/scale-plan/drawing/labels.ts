import type { PlanColours } from '../plan-colours';
import type { Sheet } from './sheet';

/** A text beside a place of the sheet. */
export interface Label {
  readonly text: string;
  /** Pixels of the place, and how far the text keeps from it. */
  readonly at: readonly [number, number];
  readonly gap: number;
  readonly colour: keyof PlanColours;
  readonly strong?: boolean;
}

const size = 12.5;
const font = (strong: boolean): string =>
  `${strong ? 700 : 400} ${size}px 'Atkinson Hyperlegible Next', Verdana, sans-serif`;

type Box = readonly [left: number, top: number, right: number, bottom: number];

/**
 * Writes labels where they do not cover each other; the earlier ones have the choice, and one that
 * finds no room is left out (the table beside the plan has them all).
 */
export function drawLabels(sheet: Sheet, labels: readonly Label[], colours: PlanColours): void {
  const { context, width, height } = sheet;
  const taken: Box[] = [];
  context.textBaseline = 'middle';
  context.lineJoin = 'round';
  context.lineWidth = 3;
  context.strokeStyle = colours.sheet;
  for (const { text, at, gap, colour, strong = false } of labels) {
    if (text === '') continue;
    context.font = font(strong);
    const wide = context.measureText(text).width;
    const place = places(at, gap, wide).find(
      (box) => inside(box, width, height) && !taken.some((other) => overlap(box, other)),
    );
    if (!place) continue;
    taken.push(place);
    context.fillStyle = colours[colour];
    const y = (place[1] + place[3]) / 2;
    context.strokeText(text, place[0], y);
    context.fillText(text, place[0], y);
  }
}

/** Right, left, above, below. */
function places([x, y]: readonly [number, number], gap: number, wide: number): Box[] {
  const half = size * 0.6;
  const box = (left: number, middle: number): Box => [
    left,
    middle - half,
    left + wide,
    middle + half,
  ];
  return [
    box(x + gap, y),
    box(x - gap - wide, y),
    box(x - wide / 2, y - gap - half),
    box(x - wide / 2, y + gap + half),
  ];
}

const inside = ([left, top, right, bottom]: Box, width: number, height: number): boolean =>
  right > 0 && bottom > 0 && left < width && top < height;

const overlap = (a: Box, b: Box): boolean =>
  a[0] < b[2] + 3 && b[0] < a[2] + 3 && a[1] < b[3] && b[1] < a[3];
