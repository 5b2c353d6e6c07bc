import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { addQuestion } from '#shared/contracts/cases';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import { fieldError, notBlank, showServerErrors } from '../../core/forms/server-errors';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { Icon } from '../../ui/icon/icon';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { CurrentCase } from '../current-case';

/** The questions of the case in order; each gets its answer in Findings. */
@Component({
  selector: 'app-questions',
  imports: [
    EmptyState,
    Icon,
    MatButton,
    MatFormFieldModule,
    MatInput,
    ProblemMessage,
    ReactiveFormsModule,
  ],
  template: `
    @if (current.file().questions.length > 0) {
      <ol>
        @for (question of current.file().questions; track question.id) {
          <li [value]="question.number" class="serif">{{ question.text }}</li>
        }
      </ol>
    } @else if (!adding()) {
      <ui-empty-state text="No question is asked yet.">
        The findings answer the questions listed here, one by one.
      </ui-empty-state>
    }
    @if (adding()) {
      <form [formGroup]="form" (ngSubmit)="add()">
        <mat-form-field appearance="outline">
          <mat-label>Question</mat-label>
          <textarea matInput rows="2" formControlName="text"></textarea>
          <mat-error>{{ fieldError(form.controls.text) }}</mat-error>
        </mat-form-field>
        @if (problem(); as told) {
          <ui-problem-message [problem]="told" />
        }
        <div class="actions">
          <button matButton="filled" type="submit" [disabled]="busy()">Add the question</button>
          <button matButton type="button" (click)="adding.set(false)">Cancel</button>
        </div>
      </form>
    } @else if (current.may().direct) {
      <button matButton="outlined" type="button" class="screen-only" (click)="adding.set(true)">
        <ui-icon name="add" /> Add a question
      </button>
    }
  `,
  styleUrl: './entry-list.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Questions {
  private readonly api = inject(Api);
  protected readonly current = inject(CurrentCase);

  protected readonly fieldError = fieldError;
  protected readonly form = inject(NonNullableFormBuilder).group({
    text: ['', [notBlank, Validators.maxLength(1000)]],
  });
  protected readonly adding = signal(false);
  protected readonly busy = signal(false);
  protected readonly problem = signal<ApiProblem | null>(null);

  protected async add(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.busy()) return;
    this.busy.set(true);
    this.problem.set(null);
    try {
      await this.api.call(addQuestion, {
        params: { caseId: this.current.id() },
        body: this.form.getRawValue(),
      });
      this.form.reset();
      this.adding.set(false);
      this.current.reload();
    } catch (error) {
      this.problem.set(showServerErrors(this.form, ApiProblem.from(error)));
    } finally {
      this.busy.set(false);
    }
  }
}
