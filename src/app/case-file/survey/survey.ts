import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  signal,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { type Mark, markKinds } from '#shared/contracts/survey';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { Icon } from '../../ui/icon/icon';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { tracesOf } from '../../ui/scale-plan/plan-content';
import { ScalePlan } from '../../ui/scale-plan/scale-plan';
import { CurrentCase } from '../current-case';
import type { HoldsWork } from '../../core/unsaved-work';
import { ChangeList } from './change-list';
import { ImportList } from './import/import-list';
import { ImportPanel } from './import/import-panel';
import { MarkDetails } from './mark-details';
import { MarkForm } from './mark-form';
import { MarkTable } from './mark-table';
import { Place } from './place';
import { counted } from './show-mark';
import { SurveyMarks } from './survey-marks';
import { WithdrawForm } from './withdraw-form';

/** By how much the error ellipses may be drawn too large, to be seen at all; 0: not drawn. */
const ellipseScales = [1, 10, 50, 0] as const;

/** The measured marks of a case: the scale plan and, tied to it, the table. */
@Component({
  selector: 'app-survey',
  imports: [
    ChangeList,
    EmptyState,
    Icon,
    ImportList,
    ImportPanel,
    MarkDetails,
    MarkForm,
    MarkTable,
    MatButton,
    MatFormFieldModule,
    MatInput,
    ProblemMessage,
    ScalePlan,
    WithdrawForm,
  ],
  providers: [Place, SurveyMarks],
  templateUrl: './survey.html',
  styleUrl: './survey.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Survey implements HoldsWork {
  protected readonly current = inject(CurrentCase);
  protected readonly place = inject(Place);
  protected readonly survey = inject(SurveyMarks);

  private readonly form = viewChild(MarkForm);
  protected readonly kinds = computed(() => {
    const present = new Set(this.survey.marks().map((mark) => mark.kind));
    return markKinds.filter((kind) => present.has(kind) || kind === this.place.kind());
  });
  protected readonly traces = computed(() => [
    ...new Set(this.survey.marks().flatMap((mark) => mark.trace ?? [])),
  ]);
  protected readonly shown = computed<readonly Mark[]>(() => {
    const [kind, trace] = [this.place.kind(), this.place.trace()];
    return this.survey
      .marks()
      .filter(
        (mark) => (kind === null || mark.kind === kind) && (trace === null || mark.trace === trace),
      );
  });
  protected readonly isFiltered = computed(
    () => this.place.kind() !== null || this.place.trace() !== null,
  );
  protected readonly lines = computed(() => tracesOf(this.shown()));
  protected readonly selected = computed(
    () => this.survey.marks().find((mark) => mark.id === this.place.mark()) ?? null,
  );
  protected readonly history = computed(() =>
    this.survey.changes().filter((change) => change.markId === this.place.mark()),
  );
  /** A panel for a mark needs one; work on the survey needs the right to it. */
  protected readonly panel = computed(() => {
    const panel = this.place.panel();
    if (panel === 'imports' || panel === 'changes') return panel;
    if (panel === null || !this.current.may().work) return null;
    return (panel === 'edit' || panel === 'withdraw') && this.selected() === null ? null : panel;
  });
  protected readonly counted = counted;
  protected readonly ellipseScales = ellipseScales;
  protected readonly ellipseScale = signal<number>(1);
  protected readonly planLabel = computed(
    () => `Plan of ${this.shown().length} marks of ${this.current.file().title}`,
  );

  hasUnsavedWork(): boolean {
    return this.form()?.isChanged() ?? false;
  }

  protected select(mark: string | null): void {
    void this.place.go({ mark });
  }

  protected filterKind(kind: string): void {
    void this.place.go({ kind: kind === '' ? null : kind });
  }

  protected filterTrace(trace: string): void {
    void this.place.go({ trace: trace === '' ? null : trace });
  }

  protected showAll(): void {
    void this.place.go({ kind: null, trace: null });
  }

  protected close(): void {
    void this.place.go({ panel: null });
  }

  protected saved(mark: Mark): void {
    const entering = this.panel() === 'enter';
    void this.place.go({ mark: mark.id, panel: entering ? 'enter' : null });
  }
}
