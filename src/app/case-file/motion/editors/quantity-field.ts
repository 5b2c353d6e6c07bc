import {
  ChangeDetectionStrategy,
  Component,
  DestroyRef,
  booleanAttribute,
  computed,
  effect,
  inject,
  input,
  model,
  signal,
  untracked,
} from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { FormControl, ReactiveFormsModule, type ValidatorFn } from '@angular/forms';
import type { ErrorStateMatcher } from '@angular/material/core';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInputModule } from '@angular/material/input';
import { parseQuantity } from '#shared/units/parse-quantity';
import { showValue } from '#shared/units/show-quantity';
import { type Dimension, type UnitSymbol, fromSi } from '#shared/units/units';
import { UnreadFields } from './unread-fields';

/** Faults are said as soon as they are there: the answer beside the form is live too. */
const atOnce: ErrorStateMatcher = { isErrorState: (control) => control?.invalid ?? false };

/** What a new text means: one at or above zero, above zero, or any. */
export type Sign = 'any' | 'not-negative' | 'positive';

/**
 * A quantity as people type it, with its unit ("45 mph", "3'-6\"", "2.4 deg"); `value` is in SI.
 * A text that cannot be read stays on screen with the reason and changes nothing.
 */
@Component({
  selector: 'app-quantity-field',
  imports: [MatFormFieldModule, MatInputModule, ReactiveFormsModule],
  template: `
    <mat-form-field appearance="outline" subscriptSizing="dynamic">
      <mat-label>{{ label() }}</mat-label>
      <input
        matInput
        autocomplete="off"
        spellcheck="false"
        [formControl]="control"
        [errorStateMatcher]="atOnce"
      />
      @if (note(); as text) {
        <mat-hint>{{ text }}</mat-hint>
      }
      @if (error(); as text) {
        <mat-error>{{ text }}</mat-error>
      }
    </mat-form-field>
  `,
  styles: `
    :host,
    mat-form-field {
      display: block;
      width: 100%;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class QuantityField {
  private readonly unread = inject(UnreadFields);

  readonly label = input.required<string>();
  readonly dimension = input.required<Dimension>();
  /** Meant when no unit is typed, and used to write a value that was not typed here. */
  readonly unit = input.required<UnitSymbol>();
  readonly value = model.required<number | null>();
  readonly sign = input<Sign>('any');
  /** May be left empty: then the value is null. */
  readonly optional = input(false, { transform: booleanAttribute });
  /** What the engine says of this field. */
  readonly fault = input<string | undefined>();
  readonly hint = input('');

  protected readonly atOnce = atOnce;
  protected readonly control = new FormControl('', { nonNullable: true });
  private readonly readable: ValidatorFn = (control) =>
    untracked(() => {
      const read = this.read(String(control.value));
      if (!read.ok) return { unread: read.message };
      return this.fault() === undefined ? null : { engine: this.fault() };
    });
  private readonly text = signal('');

  protected readonly error = computed(() => {
    this.text();
    const fault = this.fault();
    const read = this.read(this.text());
    return read.ok ? fault : read.message;
  });
  /** The value in the field's own unit when it was typed in another. */
  protected readonly note = computed(() => {
    const text = this.text();
    const parsed = parseQuantity(text, this.dimension(), { unit: this.unit() });
    if (!parsed.ok || parsed.unit.symbol === this.unit()) return this.hint();
    return `= ${showValue(parsed.value, this.unit(), 6)}`;
  });

  constructor() {
    effect(() => {
      const value = this.value();
      untracked(() => this.show(value));
    });
    effect(() => {
      this.fault();
      // Inputs may be read from here on, not while the field is made.
      if (!this.control.hasValidator(this.readable)) this.control.addValidators(this.readable);
      this.control.updateValueAndValidity({ emitEvent: false });
    });
    this.control.valueChanges.pipe(takeUntilDestroyed()).subscribe((text) => {
      this.text.set(text);
      const read = this.read(text);
      this.unread.note(this, !read.ok);
      if (read.ok && read.value !== this.value()) this.value.set(read.value);
    });
    inject(DestroyRef).onDestroy(() => this.unread.note(this, false));
  }

  /** Writes a value that came from elsewhere; a text that says the same, or is not read yet, stays. */
  private show(value: number | null): void {
    const read = this.read(this.control.value);
    if (read.ok ? sameValue(read.value, value) : this.control.dirty) return;
    const text = this.write(value);
    this.control.reset(text, { emitEvent: false });
    this.text.set(text);
    this.unread.note(this, false);
  }

  private read(text: string): { ok: true; value: number | null } | { ok: false; message: string } {
    if (text.trim() === '' && this.optional()) return { ok: true, value: null };
    const parsed = parseQuantity(text, this.dimension(), { unit: this.unit() });
    if (!parsed.ok) return parsed;
    if (this.sign() === 'positive' && !(parsed.value > 0)) {
      return { ok: false, message: 'This must be more than zero.' };
    }
    if (this.sign() === 'not-negative' && parsed.value < 0) {
      return { ok: false, message: 'This cannot be negative.' };
    }
    return { ok: true, value: parsed.value };
  }

  private write(value: number | null): string {
    if (value === null) return '';
    const shown = Number(fromSi(value, this.unit()).toPrecision(7));
    const space = this.unit().startsWith('°') || this.unit() === '' ? '' : ' ';
    return `${shown}${space}${this.unit()}`;
  }
}

/** To the digits that the field writes. */
function sameValue(a: number | null, b: number | null): boolean {
  if (a === null || b === null) return a === b;
  return Math.abs(a - b) <= 1e-6 * Math.max(Math.abs(a), Math.abs(b));
}
