import { ChangeDetectionStrategy, Component, input } from '@angular/core';
import type { MarkChange } from '#shared/contracts/survey';
import { showMoment } from '../../ui/dates/dates';
import { coordinate, placeInTrace } from './show-mark';

/** Changes and withdrawals of marks, each with what the mark was and why it was changed. */
@Component({
  selector: 'app-change-list',
  template: `
    <ol>
      @for (change of changes(); track change.markId + change.version) {
        <li>
          <p>
            <b>{{ change.before.label }}</b> {{ change.withdrawn ? 'withdrawn' : 'changed' }} by
            {{ change.by }}, {{ showMoment(change.at) }}
          </p>
          <p>{{ change.reason }}</p>
          <p class="muted">
            Before: {{ change.before.kind }} at x {{ coordinate(change.before.at[0]) }} m, y
            {{ coordinate(change.before.at[1]) }} m
            @if (change.before.trace) {
              , trace {{ placeInTrace(change.before) }}
            }
            @if (change.before.note) {
              ; {{ change.before.note }}
            }
          </p>
        </li>
      }
    </ol>
  `,
  styles: `
    ol {
      display: grid;
      gap: 10px;
      margin: 0;
      padding: 0;
      list-style: none;
    }
    p {
      margin: 0;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ChangeList {
  readonly changes = input.required<readonly MarkChange[]>();

  protected readonly showMoment = showMoment;
  protected readonly coordinate = coordinate;
  protected readonly placeInTrace = placeInTrace;
}
