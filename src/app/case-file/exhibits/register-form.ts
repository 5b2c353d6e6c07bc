import { ChangeDetectionStrategy, Component, inject, input, output, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatCheckbox } from '@angular/material/checkbox';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { MatSelectModule } from '@angular/material/select';
import { type Exhibit, exhibitKinds, registerExhibit } from '#shared/contracts/exhibits';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import { fieldError, notBlank, showServerErrors } from '../../core/forms/server-errors';
import { Messages } from '../../core/messages/messages';
import { utcFromLocal } from '../../ui/dates/dates';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { CurrentCase } from '../current-case';

/** Registers an exhibit: who registers it has received it and holds it from then on. */
@Component({
  selector: 'app-register-form',
  imports: [
    MatButton,
    MatCheckbox,
    MatFormFieldModule,
    MatInput,
    MatSelectModule,
    ProblemMessage,
    ReactiveFormsModule,
  ],
  templateUrl: './register-form.html',
  styles: `
    form {
      display: grid;
      gap: 4px;
      max-width: 560px;
    }
    h2 {
      margin-bottom: 10px;
    }
    mat-checkbox {
      margin: -4px 0 10px -10px;
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
export class RegisterForm {
  private readonly api = inject(Api);
  private readonly messages = inject(Messages);
  private readonly current = inject(CurrentCase);

  /** Exhibits that this one may be taken from. */
  readonly numbers = input.required<readonly Exhibit[]>();
  readonly registered = output<Exhibit>();
  readonly cancelled = output();

  private readonly idempotencyKey = crypto.randomUUID();
  protected readonly kinds = exhibitKinds;
  protected readonly fieldError = fieldError;
  protected readonly form = inject(NonNullableFormBuilder).group({
    kind: ['physical item' as (typeof exhibitKinds)[number], Validators.required],
    description: ['', [notBlank, Validators.maxLength(1000)]],
    source: ['', Validators.maxLength(1000)],
    collectedBy: ['', Validators.maxLength(160)],
    collectedAt: [''],
    collectedPlace: ['', Validators.maxLength(400)],
    condition: ['', Validators.maxLength(1000)],
    packaging: ['', Validators.maxLength(400)],
    sealNumber: ['', Validators.maxLength(80)],
    parentNumber: [''],
    sensitive: [false],
  });
  protected readonly busy = signal(false);
  protected readonly problem = signal<ApiProblem | null>(null);

  isChanged(): boolean {
    return this.form.dirty && this.form.controls.description.value.trim() !== '';
  }

  protected async register(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.busy()) return;
    this.busy.set(true);
    this.problem.set(null);
    const { collectedAt, parentNumber, ...rest } = this.form.getRawValue();
    try {
      const exhibit = await this.api.call(registerExhibit, {
        params: { caseId: this.current.id() },
        body: {
          ...rest,
          collectedAt: collectedAt === '' ? null : utcFromLocal(collectedAt),
          parentNumber: parentNumber === '' ? null : parentNumber,
        },
        idempotencyKey: this.idempotencyKey,
      });
      this.form.reset();
      this.messages.done(`${exhibit.number} is registered; you hold it.`);
      this.registered.emit(exhibit);
    } catch (error) {
      this.problem.set(showServerErrors(this.form, ApiProblem.from(error)));
    } finally {
      this.busy.set(false);
    }
  }
}
