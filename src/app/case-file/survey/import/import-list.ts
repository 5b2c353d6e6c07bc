import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import type { SurveyImport } from '#shared/contracts/survey';
import { showMoment } from '../../../ui/dates/dates';
import { EmptyState } from '../../../ui/empty-state/empty-state';
import { counted } from '../show-mark';
import { RejectedRows } from './rejected-rows';

/** Every import of the case with the rows that it did not take. */
@Component({
  selector: 'app-import-list',
  imports: [EmptyState, RejectedRows],
  template: `
    @for (one of imports(); track one.id) {
      <article>
        <p>
          <b>{{ one.exhibitNumber }}, {{ one.fileName }}</b> by {{ one.by }},
          {{ showMoment(one.importedAt) }}
        </p>
        <p class="muted">
          {{ counted(one.accepted, 'mark') }} taken,
          {{ counted(one.rejected.length, 'row') }} rejected
        </p>
        @if (one.rejected.length > 0) {
          <details>
            <summary>Rejected rows</summary>
            <app-rejected-rows [rows]="one.rejected" />
          </details>
        }
      </article>
    } @empty {
      <ui-empty-state text="Nothing was imported yet.">
        Import a survey file that is an exhibit of this case.
      </ui-empty-state>
    }
  `,
  styles: `
    :host {
      display: grid;
      gap: 12px;
    }
    p {
      margin: 0;
    }
    summary {
      cursor: pointer;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ImportList {
  readonly imports = input.required<readonly SurveyImport[]>();

  protected readonly counted = counted;
  protected readonly showMoment = showMoment;
}
