import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { addParty } from '#shared/contracts/cases';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import { fieldError, notBlank, showServerErrors } from '../../core/forms/server-errors';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { Icon } from '../../ui/icon/icon';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { CurrentCase } from '../current-case';

/** The parties, each with its attorney if one is assigned. */
@Component({
  selector: 'app-parties',
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
    @if (parties().length > 0) {
      <ul class="rows">
        @for (party of parties(); track party.id) {
          <li>
            <span>{{ party.name }}</span>
            <span class="muted small">
              {{ party.role }}{{ party.attorneys === '' ? '' : ', attorney ' + party.attorneys }}
            </span>
          </li>
        }
      </ul>
    } @else if (!adding()) {
      <ui-empty-state text="No party is named yet.">
        Disclosures are made to a party; name them first.
      </ui-empty-state>
    }
    @if (adding()) {
      <form [formGroup]="form" (ngSubmit)="add()">
        <mat-form-field appearance="outline">
          <mat-label>Name</mat-label>
          <input matInput formControlName="name" />
          <mat-error>{{ fieldError(form.controls.name) }}</mat-error>
        </mat-form-field>
        <mat-form-field appearance="outline">
          <mat-label>Role, for example claimant</mat-label>
          <input matInput formControlName="role" />
          <mat-error>{{ fieldError(form.controls.role) }}</mat-error>
        </mat-form-field>
        @if (problem(); as told) {
          <ui-problem-message [problem]="told" />
        }
        <div class="actions">
          <button matButton="filled" type="submit" [disabled]="busy()">Add the party</button>
          <button matButton type="button" (click)="adding.set(false)">Cancel</button>
        </div>
      </form>
    } @else if (current.may().direct) {
      <button matButton="outlined" type="button" class="screen-only" (click)="adding.set(true)">
        <ui-icon name="add" /> Add a party
      </button>
    }
  `,
  styleUrl: './entry-list.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Parties {
  private readonly api = inject(Api);
  protected readonly current = inject(CurrentCase);

  protected readonly fieldError = fieldError;
  protected readonly parties = computed(() => {
    const { parties, assignments } = this.current.file();
    return parties.map((party) => ({
      ...party,
      attorneys: assignments
        .filter((one) => one.partyId === party.id)
        .map((one) => one.name)
        .join(', '),
    }));
  });
  protected readonly form = inject(NonNullableFormBuilder).group({
    name: ['', [notBlank, Validators.maxLength(160)]],
    role: ['', [notBlank, Validators.maxLength(80)]],
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
      await this.api.call(addParty, {
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
