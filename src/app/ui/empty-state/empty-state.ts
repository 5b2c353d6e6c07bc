import { ChangeDetectionStrategy, Component, input } from '@angular/core';

/** Where nothing is yet: says so, and (as content) what to do next. */
@Component({
  selector: 'ui-empty-state',
  template: `
    <p class="serif">{{ text() }}</p>
    <div class="next"><ng-content /></div>
  `,
  styles: `
    :host {
      display: block;
      padding: 22px 20px;
      border: 1px dashed var(--edge);
      border-radius: var(--corner);
      background: var(--sheet);
    }
    p {
      margin: 0;
      font-weight: 700;
    }
    .next:not(:empty) {
      margin-top: 8px;
      color: var(--muted);
      max-width: 68ch;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class EmptyState {
  readonly text = input.required<string>();
}
