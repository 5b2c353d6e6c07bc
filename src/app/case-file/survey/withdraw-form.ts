import { ChangeDetectionStrategy, Component, inject, input, output, signal } from '@angular/core';
import { FormControl, FormGroup, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { type Mark, removeMark } from '#shared/contracts/survey';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import { fieldError, notBlank } from '../../core/forms/server-errors';
import { Messages } from '../../core/messages/messages';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { CurrentCase } from '../current-case';
import { SurveyMarks } from './survey-marks';

/** Takes a mark out of the survey; the reason is kept with it. */
@Component({
  selector: 'app-withdraw-form',
  imports: [MatButton, MatFormFieldModule, MatInput, ProblemMessage, ReactiveFormsModule],
  template: `
    <h3>Withdraw mark {{ mark().label }}</h3>
    <p>
      The mark leaves the plan and the table. It stays in the history with your reason, and in every
      computation that was recorded with it.
    </p>
    <form [formGroup]="form" (ngSubmit)="withdraw()">
      <mat-form-field appearance="outline" subscriptSizing="dynamic">
        <mat-label>Reason</mat-label>
        <textarea matInput rows="3" formControlName="reason"></textarea>
        <mat-error>{{ fieldError(form.controls.reason) }}</mat-error>
      </mat-form-field>
      @if (problem(); as told) {
        <ui-problem-message [problem]="told" />
      }
      <div class="actions">
        <button matButton="filled" type="submit" [disabled]="busy()">Withdraw the mark</button>
        <button matButton type="button" (click)="closed.emit()">Cancel</button>
      </div>
    </form>
  `,
  styleUrl: './mark-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class WithdrawForm {
  private readonly api = inject(Api);
  private readonly current = inject(CurrentCase);
  private readonly messages = inject(Messages);
  private readonly survey = inject(SurveyMarks);

  readonly mark = input.required<Mark>();
  readonly withdrawn = output();
  readonly closed = output();

  protected readonly fieldError = fieldError;
  protected readonly form = new FormGroup({
    reason: new FormControl('', {
      nonNullable: true,
      validators: [notBlank, Validators.maxLength(1000)],
    }),
  });
  protected readonly busy = signal(false);
  protected readonly problem = signal<ApiProblem | null>(null);

  protected async withdraw(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.busy()) return;
    this.busy.set(true);
    this.problem.set(null);
    const { id, label, version } = this.mark();
    try {
      await this.api.call(removeMark, {
        params: { caseId: this.current.id(), markId: id },
        query: { reason: this.form.controls.reason.value.trim() },
        ifMatch: version,
      });
      this.messages.done(`Mark ${label} is withdrawn.`);
      this.survey.reload();
      this.withdrawn.emit();
    } catch (error) {
      const problem = ApiProblem.from(error);
      this.problem.set(problem);
      // Changed meanwhile: the table shows what it is now, and the person decides again.
      if (problem.status === 412) this.survey.reload();
    } finally {
      this.busy.set(false);
    }
  }
}
