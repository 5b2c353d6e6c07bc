import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  resource,
  signal,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { type Findings as FindingsRecord, readFindings } from '#shared/contracts/findings';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import type { HoldsWork } from '../../core/unsaved-work';
import { showMoment } from '../../ui/dates/dates';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { FigureTable } from '../../ui/figure/figure-table';
import { Icon } from '../../ui/icon/icon';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { CurrentCase } from '../current-case';
import { FindingsForm } from './findings-form';

/** The answers to the questions, each tied to recorded computations. */
@Component({
  selector: 'app-findings',
  imports: [EmptyState, FigureTable, FindingsForm, Icon, MatButton, ProblemMessage, RouterLink],
  templateUrl: './findings.html',
  styleUrl: './findings.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Findings implements HoldsWork {
  private readonly api = inject(Api);
  protected readonly current = inject(CurrentCase);
  private readonly form = viewChild(FindingsForm);

  private readonly reading = resource({
    params: () => this.current.id(),
    loader: ({ params: caseId, abortSignal: abort }) =>
      this.api.call(readFindings, { params: { caseId }, abort }),
  });
  protected readonly findings = computed(() =>
    this.reading.hasValue() ? this.reading.value() : null,
  );
  protected readonly problem = computed(() => {
    const error = this.reading.error();
    return error === undefined ? null : ApiProblem.from(error);
  });
  protected readonly editing = signal(false);
  protected readonly unanswered = computed(
    () => this.findings()?.answers.filter((answer) => answer.text.trim() === '').length ?? 0,
  );
  protected readonly showMoment = showMoment;

  hasUnsavedWork(): boolean {
    return this.form()?.isChanged() ?? false;
  }

  protected take(saved: FindingsRecord): void {
    this.reading.set(saved);
    this.editing.set(false);
  }

  protected reload(): void {
    this.reading.reload();
  }
}
