import {
  ChangeDetectionStrategy,
  Component,
  booleanAttribute,
  effect,
  input,
  model,
  untracked,
} from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { FormControl, ReactiveFormsModule } from '@angular/forms';
import type { ErrorStateMatcher } from '@angular/material/core';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInputModule } from '@angular/material/input';

/** Words of a reconstruction: a name, an assumption, the basis of a known. Every change counts at once. */
@Component({
  selector: 'app-words-field',
  imports: [MatFormFieldModule, MatInputModule, ReactiveFormsModule],
  template: `
    <mat-form-field appearance="outline" subscriptSizing="dynamic">
      <mat-label>{{ label() }}</mat-label>
      @if (long()) {
        <textarea
          matInput
          rows="2"
          [formControl]="control"
          [errorStateMatcher]="atOnce"
          [attr.maxlength]="most()"
        ></textarea>
      } @else {
        <input
          matInput
          autocomplete="off"
          [formControl]="control"
          [errorStateMatcher]="atOnce"
          [attr.maxlength]="most()"
        />
      }
      @if (hint()) {
        <mat-hint>{{ hint() }}</mat-hint>
      }
      @if (fault(); as text) {
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
export class WordsField {
  readonly label = input.required<string>();
  readonly value = model.required<string>();
  readonly most = input(120);
  readonly long = input(false, { transform: booleanAttribute });
  readonly hint = input('');
  /** Why the words cannot stay so. */
  readonly fault = input<string | undefined>();

  protected readonly control = new FormControl('', {
    nonNullable: true,
    validators: [
      () => untracked(() => (this.fault() === undefined ? null : { fault: this.fault() })),
    ],
  });
  protected readonly atOnce: ErrorStateMatcher = {
    isErrorState: (control) => control?.invalid ?? false,
  };

  constructor() {
    effect(() => {
      const value = this.value();
      if (value !== this.control.value) this.control.reset(value, { emitEvent: false });
    });
    effect(() => {
      this.fault();
      this.control.updateValueAndValidity({ emitEvent: false });
    });
    this.control.valueChanges.pipe(takeUntilDestroyed()).subscribe((text) => this.value.set(text));
  }
}
