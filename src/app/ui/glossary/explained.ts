import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { MatTooltip } from '@angular/material/tooltip';
import { explain } from './terms';

/** A text whose terms of mechanics explain themselves when pointed at, touched or focused. */
@Component({
  selector: 'ui-explained',
  imports: [MatTooltip],
  // Texts are bound, not written between tags: no space may come in before the comma after a term.
  template: `
    @for (part of parts(); track $index) {
      @if (part.meaning === null) {
        <span [textContent]="part.text"></span>
      } @else {
        <button
          type="button"
          #tip="matTooltip"
          [matTooltip]="part.meaning"
          [textContent]="part.text"
          (click)="tip.show()"
        ></button>
      }
    }
  `,
  styles: `
    :host {
      white-space: pre-line;
    }
    button {
      padding: 0;
      border: 0;
      border-radius: 0;
      background: none;
      color: inherit;
      font: inherit;
      line-height: inherit;
      text-align: inherit;
      text-decoration: underline dotted 1px;
      text-underline-offset: 4px;
      cursor: help;
    }
    @media print {
      button {
        text-decoration: none;
      }
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Explained {
  readonly text = input.required<string>();

  protected readonly parts = computed(() => explain(this.text()));
}
