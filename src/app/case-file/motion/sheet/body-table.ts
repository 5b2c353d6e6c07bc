import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { coverage95 } from '#shared/engine/documents/motion-quantities';
import type { MotionBranch } from '#shared/engine/documents/motion-solution';
import { showTo } from '#shared/units/rounding';
import { type ShownFigure, showRanged } from '#shared/units/show-quantity';

/** How each body turns, and about which centre. */
@Component({
  selector: 'app-body-table',
  template: `
    <table class="plain">
      <caption class="unseen">
        Turning of the bodies
      </caption>
      <thead>
        <tr>
          <th scope="col">Body</th>
          <th scope="col" class="number">ω rad/s</th>
          <th scope="col" class="number">α rad/s²</th>
          <th scope="col" class="number">instantaneous centre m</th>
        </tr>
      </thead>
      <tbody>
        @for (row of rows(); track row.id) {
          <tr>
            <th scope="row">{{ row.name }}</th>
            <td class="number">
              @if (row.omega; as figure) {
                <strong>{{ figure.value }}</strong>
                <span class="muted"> {{ figure.low }} – {{ figure.high }}</span>
              } @else {
                <span class="muted">not fixed</span>
              }
            </td>
            <td class="number">
              @if (row.alpha; as figure) {
                <strong>{{ figure.value }}</strong>
                <span class="muted"> {{ figure.low }} – {{ figure.high }}</span>
              } @else {
                <span class="muted">not fixed</span>
              }
            </td>
            <td class="number">{{ row.centre }}</td>
          </tr>
        }
      </tbody>
    </table>
  `,
  styleUrl: './sheet-table.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  // It scrolls sideways when it must, so the keyboard has to reach it.
  host: { tabindex: '0', role: 'group', 'aria-label': 'Turning of the bodies' },
})
export class BodyTable {
  readonly branch = input.required<MotionBranch>();
  readonly bodyName = input.required<(id: string) => string>();

  protected readonly rows = computed(() =>
    Object.entries(this.branch().bodies).map(([id, motion]) => ({
      id,
      name: this.bodyName()(id),
      omega: signed(motion.omega, motion.sigma.omega, 'rad/s'),
      alpha: signed(motion.alpha, motion.sigma.alpha, 'rad/s²'),
      centre:
        motion.pole !== null
          ? motion.pole.map((part) => showTo(part, 0.01)).join(', ')
          : motion.omega === null
            ? 'not fixed'
            : 'none: it does not turn',
    })),
  );
}

function signed(
  value: number | null,
  sigma: number | null,
  unit: 'rad/s' | 'rad/s²',
): ShownFigure | null {
  if (value === null) return null;
  const half = coverage95 * (sigma ?? 0);
  return showRanged({ value, low: value - half, high: value + half }, unit);
}
