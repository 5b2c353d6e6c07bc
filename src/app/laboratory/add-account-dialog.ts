import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatDialogModule, MatDialogRef } from '@angular/material/dialog';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { MatSelectModule } from '@angular/material/select';
import {
  type Account,
  type AccountRole,
  accountRoles,
  addAccount,
} from '#shared/contracts/accounts';
import { Api } from '../core/api/api';
import { ApiProblem } from '../core/api/api-problem';
import { fieldError, notBlank, showServerErrors } from '../core/forms/server-errors';
import { ProblemMessage } from '../ui/problem-message/problem-message';
import { roleNames } from './role-names';

@Component({
  selector: 'app-add-account-dialog',
  imports: [
    MatButton,
    MatDialogModule,
    MatFormFieldModule,
    MatInput,
    MatSelectModule,
    ProblemMessage,
    ReactiveFormsModule,
  ],
  template: `
    <form [formGroup]="form" (ngSubmit)="add()">
      <h2 mat-dialog-title>Add an account</h2>
      <mat-dialog-content>
        <mat-form-field appearance="outline">
          <mat-label>Name</mat-label>
          <input matInput formControlName="name" autocomplete="off" />
          <mat-error>{{ fieldError(form.controls.name) }}</mat-error>
        </mat-form-field>
        <mat-form-field appearance="outline">
          <mat-label>E-mail address</mat-label>
          <input matInput type="email" formControlName="email" autocomplete="off" />
          <mat-error>{{ fieldError(form.controls.email) }}</mat-error>
        </mat-form-field>
        <mat-form-field appearance="outline">
          <mat-label>Role</mat-label>
          <mat-select formControlName="role">
            @for (role of roles; track role) {
              <mat-option [value]="role">{{ roleNames[role] }}</mat-option>
            }
          </mat-select>
        </mat-form-field>
        <mat-form-field appearance="outline">
          <mat-label>First password</mat-label>
          <input matInput type="password" formControlName="password" autocomplete="new-password" />
          <mat-hint>At least 12 characters. Tell it to the person yourself.</mat-hint>
          <mat-error>{{ fieldError(form.controls.password) }}</mat-error>
        </mat-form-field>
        @if (problem(); as told) {
          <ui-problem-message [problem]="told" />
        }
      </mat-dialog-content>
      <mat-dialog-actions align="end">
        <button matButton type="button" mat-dialog-close>Cancel</button>
        <button matButton="filled" type="submit" [disabled]="busy()">Add the account</button>
      </mat-dialog-actions>
    </form>
  `,
  styles: `
    mat-dialog-content {
      display: grid;
      gap: 8px;
    }
    mat-form-field:first-child {
      margin-top: 6px;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AddAccountDialog {
  private readonly api = inject(Api);
  private readonly build = inject(NonNullableFormBuilder);
  private readonly dialog = inject<MatDialogRef<AddAccountDialog, Account>>(MatDialogRef);

  protected readonly roles = accountRoles;
  protected readonly roleNames = roleNames;
  protected readonly fieldError = fieldError;
  protected readonly form = this.build.group({
    name: ['', [notBlank, Validators.maxLength(120)]],
    email: ['', [Validators.required, Validators.email, Validators.maxLength(320)]],
    role: this.build.control<AccountRole>('investigator'),
    password: ['', [Validators.required, Validators.minLength(12), Validators.maxLength(200)]],
  });
  protected readonly busy = signal(false);
  protected readonly problem = signal<ApiProblem | null>(null);

  protected async add(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.busy()) return;
    this.busy.set(true);
    this.problem.set(null);
    try {
      this.dialog.close(await this.api.call(addAccount, { body: this.form.getRawValue() }));
    } catch (error) {
      this.problem.set(showServerErrors(this.form, ApiProblem.from(error)));
    } finally {
      this.busy.set(false);
    }
  }
}
