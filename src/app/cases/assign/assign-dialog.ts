import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  resource,
  signal,
} from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import {
  FormControl,
  NonNullableFormBuilder,
  ReactiveFormsModule,
  Validators,
} from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MAT_DIALOG_DATA, MatDialogModule, MatDialogRef } from '@angular/material/dialog';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { MatRadioModule } from '@angular/material/radio';
import { MatSelectModule } from '@angular/material/select';
import { startWith } from 'rxjs';
import { listAccounts } from '#shared/contracts/accounts';
import { type CaseRole, assign, caseRoles, readCase } from '#shared/contracts/cases';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import { fieldError, notBlank, showServerErrors } from '../../core/forms/server-errors';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { caseRoleName } from '../case-role';
import type { PersonLoad } from '../workload';

export interface AssignRequest {
  readonly caseId: string;
  /** The role that is offered first. */
  readonly role: CaseRole;
  /** Work in hand by name, shown beside each person. */
  readonly loads: readonly PersonLoad[];
}

/** Assigns a person to a case role, with what they declare about conflicts of interest. */
@Component({
  selector: 'app-assign-dialog',
  imports: [
    MatButton,
    MatDialogModule,
    MatFormFieldModule,
    MatInput,
    MatRadioModule,
    MatSelectModule,
    ProblemMessage,
    ReactiveFormsModule,
  ],
  templateUrl: './assign-dialog.html',
  styleUrl: './assign-dialog.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AssignDialog {
  private readonly api = inject(Api);
  private readonly dialog = inject<MatDialogRef<AssignDialog, boolean>>(MatDialogRef);
  private readonly build = inject(NonNullableFormBuilder);
  private readonly asked = inject<AssignRequest>(MAT_DIALOG_DATA);

  protected readonly roles = caseRoles;
  protected readonly roleName = caseRoleName;
  protected readonly fieldError = fieldError;

  protected readonly form = this.build.group({
    role: this.build.control<CaseRole>(this.asked.role),
    accountId: ['', Validators.required],
    partyId: new FormControl<string | null>(null),
    declaration: this.build.group({
      conflict: new FormControl<boolean | null>(null, Validators.required),
      statement: ['', [notBlank, Validators.maxLength(2000)]],
    }),
    overrideReason: ['', Validators.maxLength(2000)],
  });
  private readonly entered = toSignal(
    this.form.valueChanges.pipe(startWith(this.form.getRawValue())),
    { requireSync: true },
  );

  private readonly known = resource({
    loader: async ({ abortSignal: abort }) => {
      const [file, accounts] = await Promise.all([
        this.api.call(readCase, { params: { caseId: this.asked.caseId }, abort }),
        this.api.call(listAccounts, { abort }),
      ]);
      return { file, accounts: accounts.items };
    },
  });
  protected readonly file = computed(() =>
    this.known.hasValue() ? this.known.value().file : null,
  );
  protected readonly loadProblem = computed(() => {
    const error = this.known.error();
    return error === undefined ? null : ApiProblem.from(error);
  });
  protected readonly forAttorney = computed(() => this.entered().role === 'attorney');
  protected readonly hasConflict = computed(() => this.entered().declaration?.conflict === true);
  protected readonly people = computed(() => {
    const accounts = this.known.hasValue() ? this.known.value().accounts : [];
    return accounts
      .filter((one) => one.active && (one.role === 'attorney') === this.forAttorney())
      .map((one) => ({ ...one, load: this.loadOf(one.name) }));
  });
  protected readonly busy = signal(false);
  protected readonly problem = signal<ApiProblem | null>(null);

  protected retry(): void {
    this.known.reload();
  }

  /** Another role may be open to other people only. */
  protected forgetPerson(): void {
    this.form.patchValue({ accountId: '', partyId: null });
  }

  protected async assign(): Promise<void> {
    const { role, accountId, partyId, declaration, overrideReason } = this.form.getRawValue();
    const { conflict, statement } = declaration;
    if (conflict === true && overrideReason.trim() === '') {
      this.form.controls.overrideReason.setErrors({ blank: true });
    }
    if (role === 'attorney' && partyId === null) {
      this.form.controls.partyId.setErrors({ required: true });
    }
    this.form.markAllAsTouched();
    if (this.form.invalid || conflict === null || this.busy()) return;
    this.busy.set(true);
    this.problem.set(null);
    try {
      await this.api.call(assign, {
        params: { caseId: this.asked.caseId },
        body: {
          accountId,
          role,
          partyId: role === 'attorney' ? partyId : null,
          declaration: { conflict, statement },
          ...(conflict ? { overrideReason } : {}),
        },
      });
      this.dialog.close(true);
    } catch (error) {
      this.problem.set(showServerErrors(this.form, ApiProblem.from(error)));
    } finally {
      this.busy.set(false);
    }
  }

  private loadOf(name: string): number | null {
    if (this.asked.loads.length === 0) return null;
    return this.asked.loads.find((load) => load.name === name)?.count ?? 0;
  }
}
