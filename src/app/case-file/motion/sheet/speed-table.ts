import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import type { MotionBranch } from '#shared/engine/documents/motion-solution';
import type { ReconstructionDocument } from '#shared/engine/documents/reconstruction';
import { keyOf } from '../names';
import { Place } from '../place';
import { Preferences } from '../preferences';
import { pointRows, scaleOf } from './point-figures';

/** "Speed of which point?": every named point with its interval, as numbers and as a dot on a line. */
@Component({
  selector: 'app-speed-table',
  templateUrl: './speed-table.html',
  styleUrl: './speed-table.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  // It scrolls sideways when it must, so the keyboard has to reach it.
  host: { tabindex: '0', role: 'group', 'aria-label': 'Speed of every point' },
})
export class SpeedTable {
  private readonly place = inject(Place);
  private readonly preferences = inject(Preferences);

  readonly document = input.required<ReconstructionDocument>();
  readonly branch = input.required<MotionBranch>();
  readonly stationName = input.required<string>();
  /** The asked point, marked in the table. */
  readonly asked = input<{ body: string; point: string } | null>(null);

  protected readonly units = computed(() => {
    const unit = this.preferences.speedUnit();
    return unit === 'm/s' ? (['m/s'] as const) : (['m/s', unit] as const);
  });
  protected readonly rows = computed(() => pointRows(this.document(), this.branch(), this.units()));
  protected readonly severalBodies = computed(() => this.document().bodies.length > 1);
  protected readonly accelerations = computed(() =>
    this.rows().some((row) => row.acceleration !== null),
  );
  protected readonly askedKey = computed(() => {
    const asked = this.asked();
    return asked === null ? null : keyOf(asked);
  });
  /** Per cent along the line of the graphic. */
  protected readonly dots = computed(() => {
    const { low, high } = scaleOf(this.rows());
    const at = (speed: number) => (100 * (speed - low)) / (high - low);
    return new Map(
      this.rows().flatMap((row) =>
        row.speed === null
          ? []
          : [
              [
                row.key,
                { low: at(row.speed.low), value: at(row.speed.value), high: at(row.speed.high) },
              ],
            ],
      ),
    );
  });

  protected ask(key: string): void {
    this.place.go({ point: key });
  }
}
