import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { quantitiesOf } from '#shared/engine/documents/motion-quantities';
import type { MotionBranch } from '#shared/engine/documents/motion-solution';
import { showRanged } from '#shared/units/show-quantity';
import type { PointRef } from '../editors/point-select';
import { rangedOf } from './point-figures';

/** Every motion that agrees with the knowns, side by side: none is preferred silently. */
@Component({
  selector: 'app-branch-table',
  template: `
    <p>
      The knowns do not tell these apart. Each is a solution; another known, or a reason, must say
      which one happened.
    </p>
    <table class="plain">
      <caption class="unseen">
        The motions side by side
      </caption>
      <thead>
        <tr>
          <td></td>
          @for (branch of branches(); track $index) {
            <th scope="col" class="number">motion {{ $index + 1 }}</th>
          }
        </tr>
      </thead>
      <tbody>
        @for (row of rows(); track row.name) {
          <tr>
            <th scope="row">{{ row.name }}</th>
            @for (cell of row.cells; track $index) {
              <td class="number">{{ cell }}</td>
            }
          </tr>
        }
      </tbody>
    </table>
  `,
  styleUrl: './sheet-table.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  // It scrolls sideways when it must, so the keyboard has to reach it.
  host: { tabindex: '0', role: 'group', 'aria-label': 'Branches' },
})
export class BranchTable {
  readonly branches = input.required<readonly MotionBranch[]>();
  readonly bodyName = input.required<(id: string) => string>();
  readonly asked = input.required<PointRef | null>();

  protected readonly rows = computed(() => {
    const asked = this.asked();
    const all = this.branches().map(quantitiesOf);
    const bodies = Object.keys(this.branches().at(0)?.bodies ?? {});
    const row = (
      name: string,
      unit: 'rad/s' | 'm/s' | '°',
      wanted: { body: string; point: string | null; quantity: string },
    ) => ({
      name: `${name}, ${unit}`,
      cells: all.map((quantities) => {
        const found = quantities.find(
          (one) =>
            one.body === wanted.body && one.point === wanted.point && one.name === wanted.quantity,
        );
        if (found === undefined) return 'not fixed';
        const { value, low, high } = showRanged(rangedOf(found), unit);
        return `${value} [${low}, ${high}]`;
      }),
    });
    return [
      ...(asked === null
        ? []
        : [
            row('speed of the asked point', 'm/s', { ...asked, quantity: 'speed' }),
            row('its direction', '°', { ...asked, quantity: 'velocity-direction' }),
          ]),
      ...bodies.map((body) =>
        row(`ω of ${this.bodyName()(body)}`, 'rad/s', {
          body,
          point: null,
          quantity: 'angular-velocity',
        }),
      ),
    ];
  });
}
