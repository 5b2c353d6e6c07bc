import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { showMoment } from '../../../ui/dates/dates';
import { ProblemMessage } from '../../../ui/problem-message/problem-message';
import { Place } from '../place';
import { Records } from './records';

/** Every recorded computation of the case, newest first; each can be opened and compared. */
@Component({
  selector: 'app-records-panel',
  imports: [ProblemMessage],
  template: `
    <p class="note">
      A recorded computation holds its complete input and its result, is addressed by the hash of
      both, and never changes.
    </p>
    @if (records.problem(); as problem) {
      <ui-problem-message [problem]="problem" />
    }
    <ul class="list">
      @for (item of items(); track item.hash) {
        <li>
          <button
            class="row"
            type="button"
            [attr.aria-expanded]="item.hash === place.computation()"
            (click)="records.open(item.hash === place.computation() ? null : item.hash)"
          >
            <span>
              {{ item.reconstructionName }}, {{ item.stationId }} {{ item.stationName }}
              <br />
              <span class="mono address">{{ item.hash.slice(0, 16) }}</span>
            </span>
            <span class="end">
              {{ item.status }}
              <br />
              {{ moment(item.recordedAt) }}, {{ item.recordedBy }}
            </span>
          </button>
        </li>
      } @empty {
        <li class="note empty">Nothing is recorded yet.</li>
      }
    </ul>
  `,
  styleUrl: '../editors/panel.scss',
  styles: `
    .address {
      font-weight: 400;
      color: var(--muted);
    }
    .empty {
      padding: 8px;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class RecordsPanel {
  protected readonly records = inject(Records);
  protected readonly place = inject(Place);

  protected readonly items = computed(() => this.records.items());
  protected readonly moment = showMoment;
}
