import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { SurveyReading } from '#shared/survey/read-survey-csv';
import { MarkSymbol } from '../../../ui/scale-plan/mark-symbol';
import { coordinate, counted, placeInTrace, shortLength } from '../show-mark';
import { RejectedRows } from './rejected-rows';

const mostShown = 200;

/** What an import would take in and what it would reject, before anything is kept. */
@Component({
  selector: 'app-import-preview',
  imports: [MarkSymbol, RejectedRows],
  template: `
    <p role="status">
      <b>
        {{ counted(reading().rows.length, 'row') }} accepted,
        {{ reading().rejected.length }} rejected.
      </b>
      @if (unknown(); as text) {
        Unknown codes, kept as “other”: {{ text }}.
      }
    </p>
    @if (reading().rejected.length > 0) {
      <h4>Rejected rows</h4>
      <div class="scroll" tabindex="0" role="region" aria-label="Rejected rows">
        <app-rejected-rows [rows]="reading().rejected" />
      </div>
    }
    @if (reading().rows.length > 0) {
      <h4>
        Accepted rows
        @if (shown().length < reading().rows.length) {
          <small class="muted">the first {{ shown().length }}</small>
        }
      </h4>
      <div class="scroll" tabindex="0" role="region" aria-label="Accepted rows">
        <table class="plain">
          <thead>
            <tr>
              <th scope="col" class="number">Row</th>
              <th scope="col">Label</th>
              <th scope="col">Kind</th>
              <th scope="col">Trace</th>
              <th scope="col" class="number">x, m</th>
              <th scope="col" class="number">y, m</th>
              <th scope="col" class="number">±</th>
              <th scope="col" class="number">Height, m</th>
              <th scope="col">Note</th>
            </tr>
          </thead>
          <tbody>
            @for (row of shown(); track row.row) {
              <tr>
                <td class="number">{{ row.row }}</td>
                <th scope="row">{{ row.entry.label }}</th>
                <td><ui-mark-symbol [kind]="row.entry.kind" /> {{ row.entry.kind }}</td>
                <td>{{ placeInTrace(row.entry) }}</td>
                <td class="number">{{ coordinate(row.entry.at[0]) }}</td>
                <td class="number">{{ coordinate(row.entry.at[1]) }}</td>
                <td class="number">{{ shortLength(row.entry.sigma[0]) }}</td>
                <td class="number">
                  {{ row.entry.height === null ? '' : coordinate(row.entry.height) }}
                </td>
                <td>{{ row.entry.note }}</td>
              </tr>
            }
          </tbody>
        </table>
      </div>
    }
  `,
  styles: `
    :host {
      display: grid;
      gap: 6px;
      min-width: 0;
    }
    p,
    h4 {
      margin: 0;
    }
    .scroll {
      max-height: 300px;
      overflow: auto;
      border: 1px solid var(--line);
      padding: 0 10px;
    }
    table {
      font-size: 14px;
    }
    td,
    th {
      padding-block: 3px;
      white-space: nowrap;
    }
    tbody th {
      color: var(--ink);
      font-size: inherit;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ImportPreview {
  readonly reading = input.required<SurveyReading>();

  protected readonly shown = computed(() => this.reading().rows.slice(0, mostShown));
  protected readonly unknown = computed(() =>
    this.reading()
      .unknownCodes.map(({ code, count }) => `${code || 'no code'} (${count})`)
      .join(', '),
  );
  protected readonly coordinate = coordinate;
  protected readonly counted = counted;
  protected readonly placeInTrace = placeInTrace;
  protected readonly shortLength = shortLength;
}
