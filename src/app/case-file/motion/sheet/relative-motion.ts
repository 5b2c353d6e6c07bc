import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { showPlain } from '#shared/units/rounding';
import { PointSelect, type PointRef } from '../editors/point-select';
import { QuantityField } from '../editors/quantity-field';
import type { RelativeMotion } from '../live-messages';
import { keyOf, refOf } from '../names';
import { Place } from '../place';
import { Preferences } from '../preferences';
import { relativeRows } from './relative-figures';

/** How the asked point moves against a second one: closing and sliding part about a contact normal. */
@Component({
  selector: 'app-relative-motion',
  imports: [PointSelect, QuantityField],
  template: `
    <div class="choice screen-only">
      <app-point-select label="Against the point" [value]="other()" (valueChange)="take($event)" />
      <app-quantity-field
        label="Normal of the contact"
        dimension="angle"
        unit="°"
        optional
        [value]="normal()"
        (valueChange)="turn($event)"
        hint="Empty: from point to point"
      />
    </div>
    @if (relative(); as motion) {
      <p>
        {{ askedName() }} against {{ otherName() }}, normal at {{ normalShown() }} from +x. With the
        two points swapped the normal turns round; closing and sliding stay.
      </p>
      <table class="plain">
        <caption class="unseen">
          Relative motion
        </caption>
        <thead>
          <tr>
            <th scope="col">part</th>
            @for (unit of units(); track unit) {
              <th scope="col" class="number">{{ unit }}</th>
              <th scope="col" class="number">95 %</th>
            }
          </tr>
        </thead>
        <tbody>
          @for (row of rows(); track row.name) {
            <tr>
              <th scope="row">
                {{ row.name }} <span class="muted small">{{ row.says }}</span>
              </th>
              @for (figure of row.figures; track figure.unit) {
                <td class="number">
                  <strong>{{ figure.value }}</strong>
                  @if (figure.unit === 'm/s²') {
                    <span class="muted"> m/s²</span>
                  }
                </td>
                <td class="number muted">{{ figure.low }} – {{ figure.high }}</td>
              } @empty {
                <td class="number muted" colspan="2">not fixed</td>
              }
            </tr>
          }
        </tbody>
      </table>
    }
  `,
  styleUrl: './sheet-table.scss',
  styles: `
    .choice {
      display: grid;
      grid-template-columns: repeat(auto-fit, minmax(190px, 1fr));
      gap: 8px;
      margin: 4px 0 8px;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class RelativeMotionPart {
  private readonly place = inject(Place);
  private readonly preferences = inject(Preferences);

  readonly relative = input.required<RelativeMotion | null>();
  readonly pointName = input.required<(ref: PointRef) => string>();
  readonly asked = input.required<PointRef>();

  protected readonly other = computed(() => {
    const key = this.place.from();
    return key === null ? null : refOf(key);
  });
  protected readonly normal = computed(() => {
    const text = this.place.normal();
    const value = Number(text);
    return text === null || !Number.isFinite(value) ? null : value;
  });
  protected readonly units = computed(() => {
    const unit = this.preferences.speedUnit();
    return unit === 'm/s' ? (['m/s'] as const) : (['m/s', unit] as const);
  });
  protected readonly rows = computed(() => {
    const motion = this.relative();
    return motion === null ? [] : relativeRows(motion, this.units());
  });
  protected readonly askedName = computed(() => this.pointName()(this.asked()));
  protected readonly otherName = computed(() => {
    const other = this.other();
    return other === null ? '' : this.pointName()(other);
  });
  protected readonly normalShown = computed(
    () => `${showPlain(((this.relative()?.normal ?? 0) * 180) / Math.PI, 4)}°`,
  );

  protected take(ref: PointRef | null): void {
    this.place.go({ from: ref === null ? null : keyOf(ref) });
  }

  protected turn(normal: number | null): void {
    this.place.go({ normal: normal === null ? null : String(normal) });
  }
}
