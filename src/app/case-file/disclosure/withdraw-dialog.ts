import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { FormControl, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MAT_DIALOG_DATA, MatDialogModule, MatDialogRef } from '@angular/material/dialog';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { type Release, withdrawRelease } from '#shared/contracts/disclosure';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import { fieldError, notBlank } from '../../core/forms/server-errors';
import { ProblemMessage } from '../../ui/problem-message/problem-message';

export interface WithdrawRequest {
  readonly caseId: string;
  readonly release: Release;
}

@Component({
  selector: 'app-withdraw-dialog',
  imports: [
    MatButton,
    MatDialogModule,
    MatFormFieldModule,
    MatInput,
    ProblemMessage,
    ReactiveFormsModule,
  ],
  template: `
    <form (ngSubmit)="withdraw()">
      <h2 mat-dialog-title>
        Withdraw release {{ asked.release.number }} to {{ asked.release.party }}?
      </h2>
      <mat-dialog-content>
        <p>
          The party can then no longer open the summary or download the archive. What was downloaded
          before stays with them, and the release stays on record.
        </p>
        <mat-form-field appearance="outline">
          <mat-label>Reason</mat-label>
          <textarea matInput rows="3" [formControl]="reason"></textarea>
          <mat-error>{{ fieldError(reason) }}</mat-error>
        </mat-form-field>
        @if (problem(); as told) {
          <ui-problem-message [problem]="told" />
        }
      </mat-dialog-content>
      <mat-dialog-actions align="end">
        <button matButton type="button" mat-dialog-close>Cancel</button>
        <button matButton="filled" type="submit" [disabled]="busy()">Withdraw the release</button>
      </mat-dialog-actions>
    </form>
  `,
  styles: `
    mat-form-field {
      width: 100%;
    }
    p {
      margin: 0 0 14px;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class WithdrawDialog {
  private readonly api = inject(Api);
  private readonly dialog = inject<MatDialogRef<WithdrawDialog, Release>>(MatDialogRef);
  protected readonly asked = inject<WithdrawRequest>(MAT_DIALOG_DATA);

  protected readonly fieldError = fieldError;
  protected readonly reason = new FormControl('', {
    nonNullable: true,
    validators: [notBlank, Validators.maxLength(1000)],
  });
  protected readonly busy = signal(false);
  protected readonly problem = signal<ApiProblem | null>(null);

  protected async withdraw(): Promise<void> {
    this.reason.markAsTouched();
    if (this.reason.invalid || this.busy()) return;
    this.busy.set(true);
    this.problem.set(null);
    try {
      const { caseId, release } = this.asked;
      this.dialog.close(
        await this.api.call(withdrawRelease, {
          params: { caseId, releaseId: release.id },
          body: { reason: this.reason.value },
        }),
      );
    } catch (error) {
      this.problem.set(ApiProblem.from(error));
    } finally {
      this.busy.set(false);
    }
  }
}
