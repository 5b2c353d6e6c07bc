import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MAT_DIALOG_DATA, MatDialogModule, MatDialogRef } from '@angular/material/dialog';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { type LedgerEntry, answerHandOver } from '#shared/contracts/custody';
import type { CustodyState } from '#shared/contracts/exhibits';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import { fieldError, showServerErrors } from '../../core/forms/server-errors';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import type { CustodyRequest } from './hand-over-dialog';

export interface AnswerRequest extends CustodyRequest {
  readonly pending: NonNullable<CustodyState['pending']>;
  /** The giver withdraws their own offer, or the receiver accepts or refuses it. */
  readonly answer: 'accept' | 'refuse' | 'withdraw';
}

const words = {
  accept: { title: 'Accept', button: 'Accept and sign', done: 'From now on you answer for it.' },
  refuse: { title: 'Refuse', button: 'Refuse and sign', done: 'It stays with the giver.' },
  withdraw: { title: 'Withdraw the offer of', button: 'Withdraw and sign', done: 'You keep it.' },
} as const;

/** Answers a hand-over, signed with the password. */
@Component({
  selector: 'app-answer-dialog',
  imports: [
    MatButton,
    MatDialogModule,
    MatFormFieldModule,
    MatInput,
    ProblemMessage,
    ReactiveFormsModule,
  ],
  templateUrl: './answer-dialog.html',
  styleUrl: './custody-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AnswerDialog {
  private readonly api = inject(Api);
  private readonly dialog = inject<MatDialogRef<AnswerDialog, LedgerEntry>>(MatDialogRef);
  protected readonly asked = inject<AnswerRequest>(MAT_DIALOG_DATA);

  private readonly idempotencyKey = crypto.randomUUID();
  protected readonly words = words[this.asked.answer];
  protected readonly fieldError = fieldError;
  protected readonly form = inject(NonNullableFormBuilder).group({
    condition: ['', Validators.maxLength(1000)],
    sealNumber: [this.asked.exhibit.custody.sealNumber, Validators.maxLength(80)],
    location: ['', Validators.maxLength(400)],
    note: ['', Validators.maxLength(2000)],
    password: ['', Validators.required],
  });
  protected readonly busy = signal(false);
  protected readonly problem = signal<ApiProblem | null>(null);

  protected async answer(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.busy()) return;
    this.busy.set(true);
    this.problem.set(null);
    try {
      const { caseId, exhibit, pending, answer } = this.asked;
      this.dialog.close(
        await this.api.call(answerHandOver, {
          params: { caseId, exhibitId: exhibit.id },
          body: {
            ...this.form.getRawValue(),
            sequence: pending.sequence,
            answer: answer === 'accept' ? 'accepted' : 'refused',
          },
          idempotencyKey: this.idempotencyKey,
        }),
      );
    } catch (error) {
      this.problem.set(showServerErrors(this.form, ApiProblem.from(error)));
    } finally {
      this.busy.set(false);
    }
  }
}
