import { ChangeDetectionStrategy, Component, inject, input, output, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { type Note, addNote } from '#shared/contracts/log';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import { fieldError, notBlank, showServerErrors } from '../../core/forms/server-errors';
import { utcFromLocal } from '../../ui/dates/dates';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { CurrentCase } from '../current-case';

/** Writes a note: a new one, or one that corrects an earlier one. */
@Component({
  selector: 'app-note-form',
  imports: [MatButton, MatFormFieldModule, MatInput, ProblemMessage, ReactiveFormsModule],
  template: `
    <form [formGroup]="form" (ngSubmit)="write()">
      <mat-form-field appearance="outline">
        <mat-label>{{
          corrects() === null ? 'Note' : 'Correction of note ' + corrects()
        }}</mat-label>
        <textarea matInput rows="5" formControlName="text"></textarea>
        <mat-error>{{ fieldError(form.controls.text) }}</mat-error>
      </mat-form-field>
      <mat-form-field appearance="outline">
        <mat-label>When it happened, if it was earlier</mat-label>
        <input matInput type="datetime-local" formControlName="happenedAt" />
        <mat-hint>By the clock of this device; the note is then marked as a late entry.</mat-hint>
        <mat-error>{{ fieldError(form.controls.happenedAt) }}</mat-error>
      </mat-form-field>
      @if (problem(); as told) {
        <ui-problem-message [problem]="told" />
      }
      <div class="actions">
        <button matButton="filled" type="submit" [disabled]="busy()">
          {{ busy() ? 'Recording …' : 'Record the note' }}
        </button>
        <button matButton type="button" (click)="cancelled.emit()">Cancel</button>
        <span class="muted small">It cannot be changed afterwards.</span>
      </div>
    </form>
  `,
  styles: `
    form {
      display: grid;
      gap: 8px;
    }
    .actions {
      display: flex;
      flex-wrap: wrap;
      align-items: center;
      gap: 8px;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class NoteForm {
  private readonly api = inject(Api);
  private readonly current = inject(CurrentCase);

  readonly corrects = input.required<number | null>();
  readonly written = output<Note>();
  readonly cancelled = output();

  protected readonly fieldError = fieldError;
  protected readonly form = inject(NonNullableFormBuilder).group({
    text: ['', [notBlank, Validators.maxLength(20_000)]],
    happenedAt: [''],
  });
  protected readonly busy = signal(false);
  protected readonly problem = signal<ApiProblem | null>(null);

  isChanged(): boolean {
    return this.form.controls.text.value.trim() !== '';
  }

  protected async write(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.busy()) return;
    this.busy.set(true);
    this.problem.set(null);
    const { text, happenedAt } = this.form.getRawValue();
    try {
      const note = await this.api.call(addNote, {
        params: { caseId: this.current.id() },
        body: {
          text,
          happenedAt: happenedAt === '' ? null : utcFromLocal(happenedAt),
          correctsNumber: this.corrects(),
        },
      });
      this.form.reset();
      this.written.emit(note);
    } catch (error) {
      this.problem.set(showServerErrors(this.form, ApiProblem.from(error)));
    } finally {
      this.busy.set(false);
    }
  }
}
