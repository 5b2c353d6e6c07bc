import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import {
  FormControl,
  NonNullableFormBuilder,
  ReactiveFormsModule,
  Validators,
} from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { MatSelectModule } from '@angular/material/select';
import { type CaseStage, caseStages, moveStage } from '#shared/contracts/cases';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import { fieldError, showServerErrors } from '../../core/forms/server-errors';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { stageName } from '../../ui/stage/stage';
import { CurrentCase } from '../current-case';

/** Where the case stands on its way, and the move to another stage with its reason. */
@Component({
  selector: 'app-stage-move',
  imports: [
    MatButton,
    MatFormFieldModule,
    MatInput,
    MatSelectModule,
    ProblemMessage,
    ReactiveFormsModule,
  ],
  templateUrl: './stage-move.html',
  styleUrl: './stage-move.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class StageMove {
  private readonly api = inject(Api);
  protected readonly current = inject(CurrentCase);

  protected readonly stageName = stageName;
  protected readonly fieldError = fieldError;
  protected readonly steps = computed(() => {
    const at = caseStages.indexOf(this.current.file().stage);
    return caseStages.map((stage, index) => ({
      stage,
      state: index < at ? 'passed' : index === at ? 'now' : 'ahead',
    }));
  });
  protected readonly others = computed(() =>
    caseStages.filter((stage) => stage !== this.current.file().stage),
  );
  protected readonly form = inject(NonNullableFormBuilder).group({
    stage: new FormControl<CaseStage | null>(null, Validators.required),
    reason: ['', Validators.maxLength(2000)],
  });
  protected readonly moving = signal(false);
  protected readonly busy = signal(false);
  protected readonly problem = signal<ApiProblem | null>(null);

  /** Opens the form with the stage that follows. */
  protected begin(): void {
    const at = caseStages.indexOf(this.current.file().stage);
    this.form.reset({ stage: caseStages[at + 1] ?? null, reason: '' });
    this.problem.set(null);
    this.moving.set(true);
  }

  protected async move(): Promise<void> {
    const { stage, reason } = this.form.getRawValue();
    this.form.markAllAsTouched();
    if (this.form.invalid || stage === null || this.busy()) return;
    const goesBack = caseStages.indexOf(stage) < caseStages.indexOf(this.current.file().stage);
    if (goesBack && reason.trim() === '') {
      this.form.controls.reason.setErrors({ required: true });
      return;
    }
    this.busy.set(true);
    this.problem.set(null);
    try {
      const { id: caseId, version } = this.current.file();
      const moved = await this.api.call(moveStage, {
        params: { caseId },
        body: { stage, reason },
        ifMatch: version,
      });
      this.current.take(moved);
      this.moving.set(false);
    } catch (error) {
      const problem = ApiProblem.from(error);
      // Somebody changed the case: read it anew, so that the next try is about what is shown.
      if (problem.status === 412) this.current.reload();
      this.problem.set(showServerErrors(this.form, problem));
    } finally {
      this.busy.set(false);
    }
  }
}
