import { ChangeDetectionStrategy, Component } from '@angular/core';
import { EmptyState } from '../../ui/empty-state/empty-state';

@Component({
  selector: 'app-exhibits',
  imports: [EmptyState],
  template: `
    <h2>Exhibits</h2>
    <ui-empty-state text="This section is not in this version yet."
      >It will hold every item of the case with its seal, its place and its files.</ui-empty-state
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
export class Exhibits {}
