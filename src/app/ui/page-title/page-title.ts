import { ChangeDetectionStrategy, Component, input } from '@angular/core';

/** The heading of a page, with room for its actions at the right. */
@Component({
  selector: 'ui-page-title',
  template: `
    <div>
      <h1>{{ text() }}</h1>
      @if (note()) {
        <p class="muted">{{ note() }}</p>
      }
    </div>
    <div class="actions screen-only"><ng-content /></div>
  `,
  styles: `
    :host {
      display: flex;
      flex-wrap: wrap;
      align-items: baseline;
      justify-content: space-between;
      gap: 8px 20px;
    }
    p {
      margin: 4px 0 0;
    }
    .actions {
      display: flex;
      flex-wrap: wrap;
      gap: 8px;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PageTitle {
  readonly text = input.required<string>();
  readonly note = input('');
}
