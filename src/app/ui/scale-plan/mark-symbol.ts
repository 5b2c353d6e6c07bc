import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { MarkKind } from '#shared/contracts/survey';
import { markSymbols } from './mark-symbols';

/** The symbol of a kind of mark, for tables and legends; the kind's name stands beside it. */
@Component({
  selector: 'ui-mark-symbol',
  template: `
    <svg viewBox="0 0 16 16" aria-hidden="true" focusable="false">
      <path [attr.d]="symbol().path" [class.filled]="symbol().filled" />
    </svg>
  `,
  styles: `
    :host {
      display: inline-flex;
      width: 16px;
      height: 16px;
      vertical-align: -3px;
    }
    path {
      fill: none;
      stroke: var(--chalk);
      stroke-width: 1.7;
      stroke-linecap: round;
      stroke-linejoin: round;
    }
    .filled {
      fill: var(--chalk);
      stroke-width: 1;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class MarkSymbol {
  readonly kind = input.required<MarkKind>();

  protected readonly symbol = computed(() => markSymbols[this.kind()]);
}
