import { ChangeDetectionStrategy, Component, computed, input, model } from '@angular/core';
import { MatCheckbox } from '@angular/material/checkbox';
import type { Dimension, UnitSymbol } from '#shared/units/units';
import { QuantityField, type Sign } from './quantity-field';

export interface Uncertain {
  readonly value: number;
  /** Standard uncertainty, SI; 0 states the value as exact. */
  readonly sigma: number;
}

/** A value with its standard uncertainty, or stated as exact: never silently without one. */
@Component({
  selector: 'app-uncertain-field',
  imports: [MatCheckbox, QuantityField],
  template: `
    <app-quantity-field
      [label]="label()"
      [dimension]="dimension()"
      [unit]="unit()"
      [sign]="sign()"
      [value]="value().value"
      (valueChange)="put({ value: $event ?? 0 })"
      [fault]="fault()"
    />
    @if (!exact()) {
      <app-quantity-field
        label="Standard uncertainty (±)"
        [dimension]="dimension()"
        [unit]="unit()"
        sign="positive"
        [value]="value().sigma"
        (valueChange)="put({ sigma: $event ?? 0 })"
      />
    }
    <mat-checkbox [checked]="exact()" (change)="state($event.checked)"
      >Stated as exact</mat-checkbox
    >
  `,
  styles: `
    :host {
      display: grid;
      gap: 8px;
    }
    mat-checkbox {
      margin: -8px 0 -4px -8px;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class UncertainField {
  readonly label = input.required<string>();
  readonly dimension = input.required<Dimension>();
  readonly unit = input.required<UnitSymbol>();
  readonly value = model.required<Uncertain>();
  /** The uncertainty that stands when "exact" is taken back, SI. */
  readonly usual = input.required<number>();
  readonly sign = input<Sign>('any');
  readonly fault = input<string | undefined>();

  protected readonly exact = computed(() => this.value().sigma === 0);

  protected put(part: Partial<Uncertain>): void {
    this.value.set({ ...this.value(), ...part });
  }

  protected state(exact: boolean): void {
    this.put({ sigma: exact ? 0 : this.usual() });
  }
}
