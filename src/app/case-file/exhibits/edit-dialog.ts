import { ChangeDetectionStrategy, Component, inject, signal } from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatCheckbox } from '@angular/material/checkbox';
import { MAT_DIALOG_DATA, MatDialogModule, MatDialogRef } from '@angular/material/dialog';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { type Exhibit, editExhibit, exhibit as exhibitShape } from '#shared/contracts/exhibits';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import { fieldError, notBlank, showServerErrors } from '../../core/forms/server-errors';
import { ProblemMessage } from '../../ui/problem-message/problem-message';

export interface EditRequest {
  readonly caseId: string;
  readonly exhibit: Exhibit;
}

/** Changes the words about an exhibit. If somebody else was first, their words are shown too. */
@Component({
  selector: 'app-edit-dialog',
  imports: [
    MatButton,
    MatCheckbox,
    MatDialogModule,
    MatFormFieldModule,
    MatInput,
    ProblemMessage,
    ReactiveFormsModule,
  ],
  template: `
    <form [formGroup]="form" (ngSubmit)="save()">
      <h2 mat-dialog-title>The words about {{ asked.exhibit.number }}</h2>
      <mat-dialog-content>
        <p>What it was called before stays readable in the ledger.</p>
        @if (theirs(); as other) {
          <p class="theirs" role="alert">
            Somebody else changed it meanwhile to: “{{ other.description }}”, from “{{
              other.source
            }}”, {{ other.sensitive ? 'sensitive' : 'not sensitive' }}. Saving again puts your words
            in place of theirs.
          </p>
        }
        <mat-form-field appearance="outline">
          <mat-label>What it is</mat-label>
          <textarea matInput rows="3" formControlName="description"></textarea>
          <mat-error>{{ fieldError(form.controls.description) }}</mat-error>
        </mat-form-field>
        <mat-form-field appearance="outline">
          <mat-label>Who gave it, or where it was found</mat-label>
          <input matInput formControlName="source" />
          <mat-error>{{ fieldError(form.controls.source) }}</mat-error>
        </mat-form-field>
        <mat-checkbox formControlName="sensitive">
          Sensitive: its pictures are blurred until asked for.
        </mat-checkbox>
        @if (problem(); as told) {
          <ui-problem-message [problem]="told" />
        }
      </mat-dialog-content>
      <mat-dialog-actions align="end">
        <button matButton type="button" mat-dialog-close>Cancel</button>
        <button matButton="filled" type="submit" [disabled]="busy()">
          {{ busy() ? 'Saving …' : 'Save' }}
        </button>
      </mat-dialog-actions>
    </form>
  `,
  styles: `
    mat-form-field {
      width: 100%;
    }
    p {
      margin: 0 0 12px;
    }
    .theirs {
      padding-left: 10px;
      border-left: 3px solid var(--chalk);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class EditDialog {
  private readonly api = inject(Api);
  private readonly dialog = inject<MatDialogRef<EditDialog, Exhibit>>(MatDialogRef);
  protected readonly asked = inject<EditRequest>(MAT_DIALOG_DATA);

  private version = this.asked.exhibit.version;
  protected readonly fieldError = fieldError;
  protected readonly form = inject(NonNullableFormBuilder).group({
    description: [this.asked.exhibit.description, [notBlank, Validators.maxLength(1000)]],
    source: [this.asked.exhibit.source, Validators.maxLength(1000)],
    sensitive: [this.asked.exhibit.sensitive],
  });
  /** What somebody else saved meanwhile. */
  protected readonly theirs = signal<Exhibit | null>(null);
  protected readonly busy = signal(false);
  protected readonly problem = signal<ApiProblem | null>(null);

  protected async save(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.busy()) return;
    this.busy.set(true);
    this.problem.set(null);
    try {
      const { caseId, exhibit } = this.asked;
      this.dialog.close(
        await this.api.call(editExhibit, {
          params: { caseId, exhibitId: exhibit.id },
          body: this.form.getRawValue(),
          ifMatch: this.version,
        }),
      );
    } catch (error) {
      this.refused(ApiProblem.from(error));
    } finally {
      this.busy.set(false);
    }
  }

  private refused(problem: ApiProblem): void {
    const current = exhibitShape.safeParse(problem.current);
    if (problem.status === 412 && current.success) {
      this.version = current.data.version;
      this.theirs.set(current.data);
    } else {
      this.problem.set(showServerErrors(this.form, problem));
    }
  }
}
