import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { showPlain } from '#shared/units/rounding';
import { type PolygonVector, fitVectors, placeVectors, roundLength } from './polygon';

const width = 260;
const height = 200;
const margin = { x: 34, y: 26 };

/**
 * A velocity or acceleration polygon to scale: what the vector equations say, as a drawing. Absolute
 * velocities are solid, relative terms dashed, accelerations double lines. The table of its numbers
 * stands beside it on the sheet; the drawing carries a sentence for those who do not see it.
 */
@Component({
  selector: 'ui-vector-polygon',
  templateUrl: './vector-polygon.html',
  styleUrl: './vector-polygon.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class VectorPolygon {
  readonly vectors = input.required<readonly PolygonVector[]>();
  /** "m/s" or "m/s²". */
  readonly unit = input.required<string>();
  /** What the drawing shows. */
  readonly label = input.required<string>();

  protected readonly width = width;
  protected readonly height = height;

  private readonly placed = computed(() => placeVectors(this.vectors()));
  private readonly fit = computed(() => fitVectors(this.placed(), width, height, margin));

  protected readonly pole = computed(() => this.fit().toPage([0, 0]));
  protected readonly arrows = computed(() =>
    this.placed().map((vector) => arrow(vector, this.fit().toPage)),
  );
  protected readonly bar = computed(() => {
    const length = roundLength(70 / this.fit().scale);
    return { pixels: length * this.fit().scale, text: `${showPlain(length)} ${this.unit()}` };
  });
  protected readonly spoken = computed(() => {
    const lengths = this.vectors().map(
      ({ symbol, index, value }) =>
        `${symbol} of ${index}: ${showPlain(Math.hypot(...value), 3)} ${this.unit()}`,
    );
    return `${this.label()}. ${lengths.join('; ')}.`;
  });
}

interface Arrow {
  readonly id: string;
  readonly kind: PolygonVector['kind'];
  readonly symbol: string;
  readonly index: string;
  /** The shaft, or both lines of a double one. */
  readonly shaft: string;
  readonly head: string;
  readonly labelAt: readonly [number, number];
  readonly anchor: 'start' | 'middle' | 'end';
}

function arrow(
  vector: ReturnType<typeof placeVectors>[number],
  toPage: (p: readonly [number, number]) => readonly [number, number],
): Arrow {
  const a = toPage(vector.from);
  const b = toPage(vector.to);
  const length = Math.hypot(b[0] - a[0], b[1] - a[1]);
  const [ux, uy] = length > 0 ? [(b[0] - a[0]) / length, (b[1] - a[1]) / length] : [1, 0];
  const head = Math.min(9, length * 0.6);
  const base = [b[0] - head * ux, b[1] - head * uy] as const;
  const off = vector.kind === 'acceleration' ? 1.4 : 0;
  const line = (side: number) =>
    `M${a[0] - side * uy} ${a[1] + side * ux}L${base[0] - side * uy} ${base[1] + side * ux}`;
  // The label stands beside the middle, on the left of the arrow as one looks along it.
  const left = [uy, -ux] as const;
  return {
    id: vector.id,
    kind: vector.kind,
    symbol: vector.symbol,
    index: vector.index,
    shaft: off > 0 ? line(off) + line(-off) : line(0),
    head: `M${b[0]} ${b[1]}L${base[0] - 0.42 * head * uy} ${base[1] + 0.42 * head * ux}L${base[0] + 0.42 * head * uy} ${base[1] - 0.42 * head * ux}Z`,
    labelAt: [(a[0] + b[0]) / 2 + 9 * left[0], (a[1] + b[1]) / 2 + 9 * left[1] + 4],
    anchor: left[0] > 0.35 ? 'start' : left[0] < -0.35 ? 'end' : 'middle',
  };
}
