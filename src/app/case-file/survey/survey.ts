import { ChangeDetectionStrategy, Component } from '@angular/core';
import { EmptyState } from '../../ui/empty-state/empty-state';

@Component({
  selector: 'app-survey',
  imports: [EmptyState],
  template: `
    <h2>Survey</h2>
    <ui-empty-state text="This section is not in this version yet."
      >It will hold the measured marks and the scale plan.</ui-empty-state
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
export class Survey {}
