import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MAT_DIALOG_DATA, MatDialogModule, MatDialogRef } from '@angular/material/dialog';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { MatSelectModule } from '@angular/material/select';
import { type LedgerEntry, recordCustody } from '#shared/contracts/custody';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import { fieldError, showServerErrors } from '../../core/forms/server-errors';
import { utcFromLocal } from '../../ui/dates/dates';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import type { CustodyRequest } from './hand-over-dialog';

type Kind = 'stored' | 'examined' | 'sealed' | 'opened' | 'corrected';

const kinds: readonly { readonly kind: Kind; readonly name: string }[] = [
  { kind: 'stored', name: 'stored' },
  { kind: 'examined', name: 'examined' },
  { kind: 'sealed', name: 'sealed' },
  { kind: 'opened', name: 'seal opened' },
  { kind: 'corrected', name: 'correction of an earlier event' },
];

/** Records what the holder did with an item, or corrects an event that stands. */
@Component({
  selector: 'app-record-dialog',
  imports: [
    MatButton,
    MatDialogModule,
    MatFormFieldModule,
    MatInput,
    MatSelectModule,
    ProblemMessage,
    ReactiveFormsModule,
  ],
  templateUrl: './record-dialog.html',
  styleUrl: './custody-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class RecordDialog {
  private readonly api = inject(Api);
  private readonly dialog = inject<MatDialogRef<RecordDialog, LedgerEntry>>(MatDialogRef);
  protected readonly asked = inject<CustodyRequest>(MAT_DIALOG_DATA);

  private readonly idempotencyKey = crypto.randomUUID();
  protected readonly kinds = kinds;
  protected readonly fieldError = fieldError;
  protected readonly form = inject(NonNullableFormBuilder).group({
    kind: ['stored' as Kind, Validators.required],
    purpose: ['', Validators.maxLength(400)],
    condition: ['', Validators.maxLength(1000)],
    sealNumber: ['', Validators.maxLength(80)],
    location: ['', Validators.maxLength(400)],
    happenedAt: [''],
    note: ['', Validators.maxLength(2000)],
    refersTo: [''],
  });
  private readonly chosen = toSignal(this.form.controls.kind.valueChanges);
  protected readonly kind = computed(() => this.chosen() ?? 'stored');
  protected readonly busy = signal(false);
  protected readonly problem = signal<ApiProblem | null>(null);

  protected async record(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.busy()) return;
    this.busy.set(true);
    this.problem.set(null);
    const { happenedAt, refersTo, ...rest } = this.form.getRawValue();
    const sequence = Number.parseInt(refersTo, 10);
    try {
      const { caseId, exhibit } = this.asked;
      this.dialog.close(
        await this.api.call(recordCustody, {
          params: { caseId, exhibitId: exhibit.id },
          body: {
            ...rest,
            happenedAt: happenedAt === '' ? null : utcFromLocal(happenedAt),
            refersTo: sequence > 0 ? sequence : null,
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
