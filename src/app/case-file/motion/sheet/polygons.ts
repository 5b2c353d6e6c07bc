import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { Arrow, Working } from '#shared/engine/instant/working/working';
import type { PolygonArrow } from '../../../ui/vector-polygon/polygon';
import { VectorPolygon } from '../../../ui/vector-polygon/vector-polygon';

/** The vector equations of a derivation as polygons, to scale. */
@Component({
  selector: 'app-polygons',
  imports: [VectorPolygon],
  template: `
    @for (polygon of polygons(); track $index) {
      <figure>
        <ui-vector-polygon
          [arrows]="polygon.arrows"
          [unit]="polygon.unit"
          [label]="polygon.caption"
        />
        <figcaption>{{ polygon.caption }}</figcaption>
      </figure>
    }
  `,
  styles: `
    :host {
      display: flex;
      flex-wrap: wrap;
      gap: 8px 24px;
    }
    figure {
      flex: 0 1 250px;
      min-width: 200px;
      margin: 0;
      break-inside: avoid;
    }
    figcaption {
      color: var(--muted);
      font-size: 13px;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Polygons {
  readonly working = input.required<Working>();

  protected readonly polygons = computed(() =>
    this.working().steps.flatMap((step, index) =>
      step.arrows.length < 2
        ? []
        : [
            {
              arrows: step.arrows.map((arrow) => polygonArrow(arrow, step.level)),
              unit: step.level === 'velocity' ? 'm/s' : 'm/s²',
              caption: `Step ${index + 1}, ${step.level} polygon`,
            },
          ],
    ),
  );
}

function polygonArrow(arrow: Arrow, level: 'velocity' | 'acceleration'): PolygonArrow {
  const { symbol, index } = labelOf(arrow.tex);
  return {
    symbol,
    index,
    from: arrow.from,
    to: arrow.to,
    result: arrow.role === 'result',
    kind:
      arrow.role === 'relative' ? 'relative' : level === 'velocity' ? 'velocity' : 'acceleration',
  };
}

const signs: Readonly<Record<string, string>> = {
  omega: 'ω',
  alpha: 'α',
  times: '×',
  dot: '',
  cdot: '·',
};

/** TeX of one vector as plain text: "\\mathbf v_{\\text{LR}/G}" is v with the index LR/G. */
export function labelOf(tex: string): { symbol: string; index: string } {
  const plain = tex
    .replace(/\\(?:mathbf|mathrm|text|boldsymbol|vec)\b/g, '')
    .replace(/\\([a-z]+)/g, (_, name: string) => signs[name] ?? '')
    .replace(/\\[,;! ]/g, ' ');
  const parts = /^([^_]*)_\{(.*)\}$/.exec(plain.trim());
  const clean = (text: string) => text.replace(/[{}]/g, '').replace(/\s+/g, ' ').trim();
  // A product is written as it stands.
  if (parts === null || plain.includes('×')) {
    return { symbol: clean(plain.replaceAll('_', '')), index: '' };
  }
  return { symbol: clean(parts[1]), index: clean(parts[2]) };
}
