import { ChangeDetectionStrategy, Component } from '@angular/core';
import { EmptyState } from '../../ui/empty-state/empty-state';

@Component({
  selector: 'app-log',
  imports: [EmptyState],
  template: `
    <h2>Log</h2>
    <ui-empty-state text="This section is not in this version yet."
      >It will hold the notes and every recorded event.</ui-empty-state
    >
  `,
  styles: `
    :host {
      display: grid;
      gap: 12px;
      padding: var(--gutter);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Log {}
