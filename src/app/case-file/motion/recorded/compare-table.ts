import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { quantitiesOf } from '#shared/engine/documents/motion-quantities';
import type { StationAnswer } from '#shared/engine/documents/station';
import { roundingStep, showTo } from '#shared/units/rounding';
import { showRanged } from '#shared/units/show-quantity';
import { rangedOf } from '../sheet/point-figures';

interface Row {
  readonly name: string;
  readonly before: string;
  readonly after: string;
  readonly change: string;
}

/** What was recorded beside what the live answer says: speeds of the points and turning of the bodies. */
@Component({
  selector: 'app-compare-table',
  template: `
    <table class="plain">
      <caption>
        Recorded and now
      </caption>
      <thead>
        <tr>
          <th scope="col">quantity</th>
          <th scope="col" class="number">recorded</th>
          <th scope="col" class="number">now</th>
          <th scope="col" class="number">change</th>
        </tr>
      </thead>
      <tbody>
        @for (row of rows(); track row.name) {
          <tr>
            <th scope="row">{{ row.name }}</th>
            <td class="number">{{ row.before }}</td>
            <td class="number">{{ row.after }}</td>
            <td class="number">{{ row.change }}</td>
          </tr>
        }
      </tbody>
    </table>
  `,
  styleUrl: '../sheet/sheet-table.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  // It scrolls sideways when it must, so the keyboard has to reach it.
  host: { tabindex: '0', role: 'group', 'aria-label': 'Comparison' },
})
export class CompareTable {
  readonly recorded = input.required<StationAnswer>();
  readonly now = input.required<StationAnswer>();

  protected readonly rows = computed(() => rowsOf(this.recorded(), this.now()));
}

export function rowsOf(recorded: StationAnswer, now: StationAnswer): Row[] {
  const figures = (answer: StationAnswer) =>
    new Map(
      (answer.solution?.branches ?? []).flatMap((branch, index) =>
        quantitiesOf(branch)
          .filter((one) => one.name === 'speed' || one.name === 'angular-velocity')
          .map((one) => [nameOf(one.name, one.body, one.point, index), one] as const),
      ),
    );
  const before = figures(recorded);
  const after = figures(now);
  return [...new Set([...before.keys(), ...after.keys()])].map((name): Row => {
    const a = before.get(name);
    const b = after.get(name);
    const shown = (one: typeof a) => {
      if (one === undefined) return 'not fixed';
      const unit = one.name === 'speed' ? 'm/s' : 'rad/s';
      const { value, low, high } = showRanged(rangedOf(one), unit);
      return `${value} [${low}, ${high}] ${unit}`;
    };
    return {
      name,
      before: shown(a),
      after: shown(b),
      change: a === undefined || b === undefined ? '' : changeOf(b.value - a.value, a.sigma),
    };
  });
}

function nameOf(quantity: string, body: string, point: string | null, branch: number): string {
  const motion = branch === 0 ? '' : `, motion ${branch + 1}`;
  return quantity === 'speed'
    ? `speed of ${body}.${point ?? ''}${motion}`
    : `ω of ${body}${motion}`;
}

/** A difference is shown to the place of the recorded uncertainty, one digit finer. */
function changeOf(change: number, sigma: number | null): string {
  const step = sigma === null || sigma <= 0 ? 1e-3 : roundingStep(sigma) / 10;
  const text = showTo(change, step);
  return change > 0 && Number(text) !== 0 ? `+${text}` : text;
}
