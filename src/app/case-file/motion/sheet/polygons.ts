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
  readonly shorten = input.required<(tex: string) => string>();

  /** The last equation of each level: the one that gives the asked point. */
  protected readonly polygons = computed(() =>
    (['velocity', 'acceleration'] as const).flatMap((level) => {
      const { steps } = this.working();
      const index = steps.findLastIndex((step) => step.level === level && step.arrows.length > 1);
      if (index < 0) return [];
      return [
        {
          arrows: steps[index].arrows.map((arrow) => polygonArrow(arrow, level, this.shorten())),
          unit: level === 'velocity' ? 'm/s' : 'm/s²',
          caption: `Step ${index + 1}, ${level} polygon`,
        },
      ];
    }),
  );
}

function polygonArrow(
  arrow: Arrow,
  level: 'velocity' | 'acceleration',
  shorten: (tex: string) => string,
): PolygonArrow {
  const { symbol, index } = labelOf(shorten(arrow.tex));
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

const signs: Readonly<Record<string, string>> = { omega: 'ω', alpha: 'α', times: '×', cdot: '·' };

/**
 * TeX of one vector as a short text: "\\mathbf v_{\\text{LR}/G}" is v with the index LR/G. A term of a
 * rotation is called by what it is: v, aᵗ (along) or aⁿ (toward the centre) of one point to another.
 */
export function labelOf(tex: string): { symbol: string; index: string } {
  const apart = /\\mathbf r_\{(.*)\}/.exec(tex);
  if (apart !== null) {
    const symbol = /\\alpha/.test(tex) ? 'aᵗ' : /\^\{?2|times.*times/.test(tex) ? 'aⁿ' : 'v';
    return { symbol, index: plain(apart[1]) };
  }
  const slide = /\\d?dot s_\{(.*?)\}\\?[, ]*\\mathbf u/.exec(tex);
  if (slide !== null) return { symbol: tex.includes('\\ddot') ? 'a' : 'v', index: plain(slide[1]) };
  const parts = /^\\mathbf ([a-z])_\{(.*)\}$/.exec(tex.trim());
  return parts === null
    ? { symbol: plain(tex), index: '' }
    : { symbol: parts[1], index: plain(parts[2]) };
}

const plain = (tex: string): string =>
  tex
    .replace(/\\(?:mathbf|mathrm|text|boldsymbol|vec)\b/g, '')
    .replace(/\\([a-z]+)/g, (_, name: string) => signs[name] ?? '')
    .replace(/\\[,;! ]/g, ' ')
    .replace(/[{}_]/g, '')
    .replace(/\s+/g, ' ')
    .trim();
