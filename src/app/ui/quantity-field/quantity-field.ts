import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import { type FormControl, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { startWith, switchMap } from 'rxjs';
import { parseQuantity } from '#shared/units/parse-quantity';
import { showValue } from '#shared/units/show-quantity';
import { meaningsOfComma, type QuantityRule } from './quantity';

/**
 * A quantity as people type it, with its unit: `12.5 m`, `3'-6"`, `450 mm`. The control holds the
 * text itself, so that it is kept word for word; its validator is `quantity(rule)`.
 */
@Component({
  selector: 'ui-quantity-field',
  imports: [MatButton, MatFormFieldModule, MatInput, ReactiveFormsModule],
  template: `
    <mat-form-field appearance="outline" subscriptSizing="dynamic">
      <mat-label>{{ label() }}</mat-label>
      <input
        matInput
        autocomplete="off"
        spellcheck="false"
        [formControl]="control()"
        [placeholder]="placeholder()"
      />
      <mat-hint>{{ note() }}</mat-hint>
      <mat-error>{{ error() }}</mat-error>
    </mat-form-field>
    @if (meanings().length > 0) {
      <div class="ask" role="group" [attr.aria-label]="'What the comma in ' + label() + ' means'">
        <span>Does it mean</span>
        @for (meaning of meanings(); track meaning) {
          <button matButton="outlined" type="button" (click)="take(meaning)">{{ meaning }}</button>
        }
      </div>
    }
  `,
  styles: `
    :host,
    mat-form-field {
      display: block;
      width: 100%;
    }
    .ask {
      display: flex;
      flex-wrap: wrap;
      align-items: center;
      gap: 8px;
      margin-top: 4px;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class QuantityField {
  readonly label = input.required<string>();
  readonly control = input.required<FormControl<string>>();
  readonly rule = input.required<QuantityRule>();
  readonly hint = input('');
  readonly placeholder = input('');

  private readonly text = toSignal(
    toObservable(this.control).pipe(
      switchMap((control) => control.valueChanges.pipe(startWith(control.value))),
    ),
    { initialValue: '' },
  );
  /** The value in SI, when it was typed in another unit. */
  protected readonly note = computed(() => {
    const { dimension, unit } = this.rule();
    const parsed = parseQuantity(this.text(), dimension, { unit });
    if (!parsed.ok || parsed.unit.factor === 1 || dimension !== 'length') return this.hint();
    return `= ${showValue(parsed.value, 'm', 6)}`;
  });
  protected readonly meanings = computed(() => meaningsOfComma(this.text()));

  protected error(): string {
    const { errors } = this.control();
    const told: unknown = errors?.['server'] ?? errors?.['quantity'];
    return typeof told === 'string' ? told : '';
  }

  protected take(meaning: string): void {
    this.control().setValue(meaning);
    this.control().markAsDirty();
  }
}
