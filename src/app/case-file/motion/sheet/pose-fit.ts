import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import type { PoseSolution } from '#shared/engine/documents/pose-solution';
import { roundingStep, showPlain, showTo } from '#shared/units/rounding';
import { Place } from '../place';
import { Workbench } from '../workbench';

/** Normal deviate beyond which one mark in a thousand falls (Baarda 1968: α₀ = 0.1 %). */
const critical = 3.29;

/** How the marks fix the pose: each body's pose, and each mark's residual with its test. */
@Component({
  selector: 'app-pose-fit',
  templateUrl: './pose-fit.html',
  styleUrl: './sheet-table.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PoseFit {
  private readonly place = inject(Place);
  private readonly workbench = inject(Workbench);

  readonly solution = input.required<PoseSolution>();
  readonly bodyName = input.required<(id: string) => string>();

  protected readonly poses = computed(() =>
    Object.entries(this.solution().bodies).map(([id, { pose, covariance }]) => ({
      id,
      name: this.bodyName()(id),
      x: uncertain(pose.x, covariance[0][0], 1, 'm'),
      y: uncertain(pose.y, covariance[1][1], 1, 'm'),
      heading: uncertain(pose.heading, covariance[2][2], 180 / Math.PI, '°'),
    })),
  );
  protected readonly rows = computed(() => {
    const labels = new Map(this.workbench.marks().map((mark) => [mark.id, mark.label]));
    return this.solution().residuals.map((one) => ({
      id: one.mark,
      label: labels.get(one.mark) ?? one.mark,
      x: showTo(1000 * one.residual[0], 1),
      y: showTo(1000 * one.residual[1], 1),
      w: one.w === null ? 'unchecked' : showTo(Math.abs(one.w), 0.1),
      suspect: one.w !== null && Math.abs(one.w) > critical,
      detectable: one.detectable === null ? '–' : showPlain(1000 * one.detectable, 2),
    }));
  });
  protected readonly summary = computed(() => {
    const { redundancy, chiSquared, pValue, suspects } = this.solution();
    if (redundancy === 0) return 'Nothing checks the marks: an error in one would not show.';
    const p = pValue === null ? '' : `, p ${showPlain(pValue, 2)}`;
    const tail = suspects.length === 0 ? ' No suspect mark.' : '';
    return `Redundancy ${redundancy}; χ² ${showPlain(chiSquared, 2)}${p}.${tail}`;
  });

  protected select(markId: string): void {
    this.place.go({ mark: markId });
  }
}

function uncertain(value: number, variance: number, factor: number, unit: string): string {
  const spread = Math.sqrt(Math.max(0, variance)) * factor;
  const space = unit === '°' ? '' : ' ';
  if (!(spread > 0)) return `${showPlain(value * factor, 6)}${space}${unit}`;
  const step = roundingStep(spread);
  return `${showTo(value * factor, step)} ± ${showTo(spread, step)}${space}${unit}`;
}
