import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { Figure } from '#shared/contracts/findings';
import { Explained } from '../glossary/explained';
import { type SpeedUnit, figureText, rangeText, valueText } from './figure-text';

/** Figures with their ranges, each saying of which point and at which moment. */
@Component({
  selector: 'ui-figure-table',
  imports: [Explained],
  template: `
    <div class="scroll">
      <table class="plain">
        <thead>
          <tr>
            <th scope="col">Figure</th>
            <th scope="col">Which point, which moment</th>
            <th scope="col" class="number">Value</th>
            <th scope="col" class="number"><ui-explained text="95 % range" /></th>
            @if (traced()) {
              <th scope="col">From computation</th>
            }
          </tr>
        </thead>
        <tbody>
          @for (row of rows(); track $index) {
            <tr>
              <th scope="row"><ui-explained [text]="row.figure.title" /></th>
              <td><ui-explained [text]="row.figure.pointName" />, {{ row.figure.stationName }}</td>
              <td class="number">
                <b>{{ row.value }}</b>
                @if (row.second) {
                  <div class="muted small">{{ row.second.value }}</div>
                }
              </td>
              <td class="number">
                {{ row.range }}
                @if (row.second) {
                  <div class="muted small">{{ row.second.range }}</div>
                }
              </td>
              @if (traced()) {
                <td>
                  <code [title]="row.figure.computation">{{
                    row.figure.computation.slice(0, 10)
                  }}</code>
                </td>
              }
            </tr>
          }
        </tbody>
      </table>
    </div>
  `,
  styles: `
    .scroll {
      overflow-x: auto;
    }
    tbody th {
      color: var(--ink);
      font-size: 15px;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class FigureTable {
  readonly figures = input.required<readonly Figure[]>();
  readonly speedUnit = input.required<SpeedUnit>();
  /** Also shows the computation that each figure was read from. */
  readonly traced = input(false);

  protected readonly rows = computed(() =>
    this.figures().map((figure) => {
      const { first, second } = figureText(figure, this.speedUnit());
      return {
        figure,
        value: valueText(first),
        range: rangeText(first),
        second: second && { value: valueText(second), range: rangeText(second) },
      };
    }),
  );
}
