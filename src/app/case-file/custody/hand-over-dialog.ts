import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  resource,
  signal,
} from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MAT_DIALOG_DATA, MatDialogModule, MatDialogRef } from '@angular/material/dialog';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { MatSelectModule } from '@angular/material/select';
import { type LedgerEntry, handOver, listReceivers } from '#shared/contracts/custody';
import type { Exhibit } from '#shared/contracts/exhibits';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import { fieldError, notBlank, showServerErrors } from '../../core/forms/server-errors';
import { utcFromLocal } from '../../ui/dates/dates';
import { ProblemMessage } from '../../ui/problem-message/problem-message';

export interface CustodyRequest {
  readonly caseId: string;
  readonly exhibit: Exhibit;
}

/** Offers an item to a colleague; it stays with the giver until they accept. */
@Component({
  selector: 'app-hand-over-dialog',
  imports: [
    MatButton,
    MatDialogModule,
    MatFormFieldModule,
    MatInput,
    MatSelectModule,
    ProblemMessage,
    ReactiveFormsModule,
  ],
  templateUrl: './hand-over-dialog.html',
  styleUrl: './custody-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class HandOverDialog {
  private readonly api = inject(Api);
  private readonly dialog = inject<MatDialogRef<HandOverDialog, LedgerEntry>>(MatDialogRef);
  protected readonly asked = inject<CustodyRequest>(MAT_DIALOG_DATA);

  /** One act, one key: a second press after a lost answer does not offer twice. */
  private readonly idempotencyKey = crypto.randomUUID();
  protected readonly fieldError = fieldError;
  protected readonly form = inject(NonNullableFormBuilder).group({
    toId: ['', Validators.required],
    purpose: ['', [notBlank, Validators.maxLength(400)]],
    condition: ['', Validators.maxLength(1000)],
    sealNumber: [this.asked.exhibit.custody.sealNumber, Validators.maxLength(80)],
    location: ['', Validators.maxLength(400)],
    method: ['hand' as 'hand' | 'courier' | 'post', Validators.required],
    tracking: ['', Validators.maxLength(120)],
    happenedAt: [''],
    note: ['', Validators.maxLength(2000)],
  });
  private readonly method = toSignal(this.form.controls.method.valueChanges);
  protected readonly sent = computed(() => (this.method() ?? 'hand') !== 'hand');
  protected readonly receivers = resource({
    loader: ({ abortSignal: abort }) =>
      this.api.call(listReceivers, { params: { caseId: this.asked.caseId }, abort }),
  });
  protected readonly busy = signal(false);
  protected readonly problem = signal<ApiProblem | null>(null);

  protected async offer(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.busy()) return;
    this.busy.set(true);
    this.problem.set(null);
    const { happenedAt, ...rest } = this.form.getRawValue();
    try {
      const { caseId, exhibit } = this.asked;
      this.dialog.close(
        await this.api.call(handOver, {
          params: { caseId, exhibitId: exhibit.id },
          body: { ...rest, happenedAt: happenedAt === '' ? null : utcFromLocal(happenedAt) },
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
