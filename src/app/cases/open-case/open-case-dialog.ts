import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import {
  FormControl,
  NonNullableFormBuilder,
  ReactiveFormsModule,
  Validators,
} from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatDialogModule, MatDialogRef } from '@angular/material/dialog';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { MatSelectModule } from '@angular/material/select';
import { type Brief, incidentKinds, openCase } from '#shared/contracts/cases';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import { fieldError, notBlank, showServerErrors } from '../../core/forms/server-errors';
import { ProblemMessage } from '../../ui/problem-message/problem-message';

@Component({
  selector: 'app-open-case-dialog',
  imports: [
    MatButton,
    MatDialogModule,
    MatFormFieldModule,
    MatInput,
    MatSelectModule,
    ProblemMessage,
    ReactiveFormsModule,
  ],
  templateUrl: './open-case-dialog.html',
  styleUrl: './open-case-dialog.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class OpenCaseDialog {
  private readonly api = inject(Api);
  private readonly dialog = inject<MatDialogRef<OpenCaseDialog, string>>(MatDialogRef);
  private readonly build = inject(NonNullableFormBuilder);

  protected readonly kinds = incidentKinds;
  protected readonly fieldError = fieldError;
  protected readonly form = this.build.group({
    title: ['', [notBlank, Validators.maxLength(160)]],
    kind: new FormControl<Brief['kind'] | null>(null, Validators.required),
    commissionedBy: ['', Validators.maxLength(400)],
    dueOn: [''],
    speedUnit: this.build.control<Brief['speedUnit']>('km/h'),
  });
  protected readonly busy = signal(false);
  protected readonly problem = signal<ApiProblem | null>(null);

  protected async open(): Promise<void> {
    this.form.markAllAsTouched();
    const { title, kind, commissionedBy, dueOn, speedUnit } = this.form.getRawValue();
    if (this.form.invalid || kind === null || this.busy()) return;
    this.busy.set(true);
    this.problem.set(null);
    try {
      const opened = await this.api.call(openCase, {
        body: { title, kind, commissionedBy, dueOn: dueOn === '' ? null : dueOn, speedUnit },
      });
      this.dialog.close(opened.id);
    } catch (error) {
      this.problem.set(showServerErrors(this.form, ApiProblem.from(error)));
    } finally {
      this.busy.set(false);
    }
  }
}
