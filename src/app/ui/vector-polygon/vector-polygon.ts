import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { showPlain } from '#shared/units/rounding';
import { type Place, type PolygonArrow, fitArrows, roundLength } from './polygon';

const width = 260;
const mostHeight = 190;
const margin = { x: 36, y: 22 };

/**
 * A velocity or acceleration polygon to scale: what a vector equation says, as a drawing. Absolute
 * velocities are solid, relative terms dashed, accelerations double lines. The numbers stand in the
 * equations beside it; the drawing carries a sentence for those who do not see it.
 */
@Component({
  selector: 'ui-vector-polygon',
  templateUrl: './vector-polygon.html',
  styleUrl: './vector-polygon.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class VectorPolygon {
  readonly arrows = input.required<readonly PolygonArrow[]>();
  /** "m/s" or "m/s²". */
  readonly unit = input.required<string>();
  /** What the drawing shows. */
  readonly label = input.required<string>();

  protected readonly width = width;

  private readonly fit = computed(() => fitArrows(this.arrows(), width, mostHeight, margin));

  protected readonly height = computed(() => this.fit().height);
  protected readonly pole = computed(() => this.fit().toPage([0, 0]));
  protected readonly drawn = computed(() =>
    this.arrows().map((one) => draw(one, this.fit().toPage)),
  );
  protected readonly bar = computed(() => {
    const length = roundLength(70 / this.fit().scale);
    return { pixels: length * this.fit().scale, text: `${showPlain(length)} ${this.unit()}` };
  });
  protected readonly spoken = computed(() => {
    const lengths = this.arrows().map(({ symbol, index, from, to }) => {
      const length = showPlain(Math.hypot(to[0] - from[0], to[1] - from[1]), 3);
      return `${symbol} ${index}, ${length} ${this.unit()}`;
    });
    return `${this.label()}: ${lengths.join('; ')}.`;
  });
}

interface Drawn extends Pick<PolygonArrow, 'kind' | 'symbol' | 'index' | 'result'> {
  /** The shaft, or both lines of a double one. */
  readonly shaft: string;
  readonly head: string;
  readonly labelAt: Place;
  readonly anchor: 'start' | 'middle' | 'end';
}

function draw(arrow: PolygonArrow, toPage: (p: Place) => Place): Drawn {
  const a = toPage(arrow.from);
  const b = toPage(arrow.to);
  const length = Math.hypot(b[0] - a[0], b[1] - a[1]);
  const [ux, uy] = length > 0 ? [(b[0] - a[0]) / length, (b[1] - a[1]) / length] : [1, 0];
  const head = Math.min(9, length * 0.6);
  const base = [b[0] - head * ux, b[1] - head * uy] as const;
  const wing = 0.42 * head;
  const apart = arrow.kind === 'acceleration' ? 1.5 : 0;
  const line = (side: number) =>
    `M${a[0] - side * uy} ${a[1] + side * ux}L${base[0] - side * uy} ${base[1] + side * ux}`;
  // The sum is labelled on its right and the parts on their left: they lie on both sides of it.
  const side = arrow.result ? -1 : 1;
  const off = [side * uy, -side * ux] as const;
  return {
    kind: arrow.kind,
    symbol: arrow.symbol,
    index: arrow.index,
    result: arrow.result,
    shaft: apart > 0 ? line(apart) + line(-apart) : line(0),
    head: `M${b[0]} ${b[1]}L${base[0] - wing * uy} ${base[1] + wing * ux}L${base[0] + wing * uy} ${base[1] - wing * ux}Z`,
    labelAt: [(a[0] + b[0]) / 2 + 12 * off[0], (a[1] + b[1]) / 2 + 12 * off[1] + 4],
    anchor: off[0] > 0.35 ? 'start' : off[0] < -0.35 ? 'end' : 'middle',
  };
}
