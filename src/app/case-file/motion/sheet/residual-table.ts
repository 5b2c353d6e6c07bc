import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import type { Residual } from '#shared/engine/documents/motion-solution';
import { showPlain, showTo } from '#shared/units/rounding';

const critical = 3.29;

/** How far each known lies from the answer, over its own standard deviation. */
@Component({
  selector: 'app-residual-table',
  template: `
    <table class="plain">
      <caption class="unseen">
        Residuals of the knowns
      </caption>
      <thead>
        <tr>
          <th scope="col">Known</th>
          <th scope="col">part</th>
          <th scope="col" class="number">residual</th>
          <th scope="col" class="number" title="Baarda’s test, as a normal deviate">w-test</th>
          <th scope="col" class="number" title="Share of an error in it that shows">shows</th>
        </tr>
      </thead>
      <tbody>
        @for (row of rows(); track $index) {
          <tr [class.suspect]="row.suspect">
            <th scope="row">
              <button type="button" class="link" (click)="traced.emit(row.known)">
                {{ row.name }}
              </button>
            </th>
            <td>{{ row.part }}</td>
            <td class="number">{{ row.residual }}</td>
            <td class="number">
              {{ row.w }}
              @if (row.suspect) {
                <span>suspect</span>
              }
            </td>
            <td class="number">{{ row.shows }}</td>
          </tr>
        }
      </tbody>
    </table>
  `,
  styleUrl: './sheet-table.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  // It scrolls sideways when it must, so the keyboard has to reach it.
  host: { tabindex: '0', role: 'group', 'aria-label': 'Residuals' },
})
export class ResidualTable {
  readonly residuals = input.required<readonly Residual[]>();
  readonly nameOf = input.required<(id: string) => string>();
  readonly traced = output<string>();

  protected readonly rows = computed(() =>
    this.residuals().map((one) => ({
      known: one.known,
      name: this.nameOf()(one.known),
      part: `${one.part === 'value' ? '' : one.part} ${one.level === 'acceleration' ? '(acceleration)' : ''}`,
      residual: shown(one),
      w: one.normalised === null ? 'unchecked' : showTo(Math.abs(one.normalised), 0.1),
      suspect: one.normalised !== null && Math.abs(one.normalised) > critical,
      shows: `${showTo(100 * one.redundancy, 1)} %`,
    })),
  );
}

/** What is less, in SI, is rounding of the arithmetic. */
const rounding = 1e-9;

/** Directions in degrees, everything else in SI. */
function shown({ part, level, residual: found }: Residual): string {
  const residual = Math.abs(found) < rounding ? 0 : found;
  if (part === 'direction') return `${showPlain((residual * 180) / Math.PI, 2)}°`;
  if (part === 'value') return showPlain(residual, 2);
  return `${showPlain(residual, 2)} ${level === 'velocity' ? 'm/s' : 'm/s²'}`;
}
