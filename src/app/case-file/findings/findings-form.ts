import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  type OnInit,
  output,
  signal,
} from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButton, MatIconButton } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import {
  type Figure,
  type Findings,
  editFindings,
  findings as findingsShape,
} from '#shared/contracts/findings';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import { Messages } from '../../core/messages/messages';
import { Dialogs } from '../../ui/confirm-dialog/dialogs';
import { type Difference, EditConflict } from '../../ui/edit-conflict/edit-conflict';
import { figureText, rangeText, valueText } from '../../ui/figure/figure-text';
import { Icon } from '../../ui/icon/icon';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { CurrentCase } from '../current-case';
import { choiceOf, keyOf } from './candidates';
import {
  type Draft,
  type DraftField,
  changedFields,
  draftOf,
  fieldsOf,
  mergeDrafts,
  showField,
} from './draft';
import type { PickRequest } from './figure-picker';

const mostFigures = 12;

/** Edits the findings; a save that meets somebody else's puts both side by side. */
@Component({
  selector: 'app-findings-form',
  imports: [
    EditConflict,
    Icon,
    MatButton,
    MatFormFieldModule,
    MatIconButton,
    MatInput,
    ProblemMessage,
    ReactiveFormsModule,
  ],
  templateUrl: './findings-form.html',
  styleUrl: './findings-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class FindingsForm implements OnInit {
  private readonly api = inject(Api);
  private readonly build = inject(NonNullableFormBuilder);
  private readonly current = inject(CurrentCase);
  private readonly dialogs = inject(Dialogs);
  private readonly messages = inject(Messages);

  readonly findings = input.required<Findings>();
  readonly saved = output<Findings>();
  readonly cancelled = output();

  /** The version that this edit began from; moves on when a conflict is settled. */
  private readonly base = signal<Findings | null>(null);
  protected readonly figures = signal<readonly Figure[]>([]);
  protected readonly form = this.build.group({
    answers: this.build.array<string>([]),
    dependsOn: ['', Validators.maxLength(4000)],
    against: ['', Validators.maxLength(4000)],
  });
  protected readonly questions = computed(() => this.base()?.answers ?? []);
  protected readonly rows = computed(() =>
    this.figures().map((figure) => {
      const { first } = figureText(figure, this.current.file().speedUnit);
      return { figure, key: keyOf(figure), text: `${valueText(first)} (${rangeText(first)})` };
    }),
  );
  protected readonly mostFigures = mostFigures;
  protected readonly busy = signal(false);
  protected readonly problem = signal<ApiProblem | null>(null);
  protected readonly theirs = signal<Findings | null>(null);
  protected readonly differences = signal<readonly Difference<DraftField>[]>([]);

  ngOnInit(): void {
    this.begin(this.findings(), draftOf(this.findings()));
  }

  isChanged(): boolean {
    const base = this.base();
    return base !== null && changedFields(draftOf(base), this.entered()).length > 0;
  }

  protected async pick(): Promise<void> {
    const picked = await this.dialogs.open<readonly Figure[]>(
      async () => (await import('./figure-picker')).FigurePicker,
      {
        caseId: this.current.id(),
        speedUnit: this.current.file().speedUnit,
        taken: this.figures().map(keyOf),
        room: mostFigures - this.figures().length,
      } satisfies PickRequest,
      '760px',
    );
    if (picked) this.figures.update((figures) => [...figures, ...picked]);
  }

  protected drop(key: string): void {
    this.figures.update((figures) => figures.filter((figure) => keyOf(figure) !== key));
  }

  protected raise(index: number): void {
    this.figures.update((figures) => {
      const moved = [...figures];
      const [figure] = moved.splice(index, 1);
      if (figure) moved.splice(index - 1, 0, figure);
      return moved;
    });
  }

  protected async save(): Promise<void> {
    const base = this.base();
    if (base === null || this.form.invalid || this.busy()) return;
    this.busy.set(true);
    this.problem.set(null);
    const { answers, figures, dependsOn, against } = this.entered();
    try {
      const saved = await this.api.call(editFindings, {
        params: { caseId: this.current.id() },
        body: {
          answers: answers.map(({ questionNumber, text }) => ({ questionNumber, text })),
          figures: figures.map(choiceOf),
          dependsOn,
          against,
        },
        ifMatch: base.version,
      });
      this.messages.done('The findings are saved.');
      this.begin(saved, draftOf(saved));
      this.saved.emit(saved);
    } catch (error) {
      this.failed(ApiProblem.from(error));
    } finally {
      this.busy.set(false);
    }
  }

  protected async settle(keep: readonly DraftField[]): Promise<void> {
    const base = this.base();
    const theirs = this.theirs();
    if (base === null || theirs === null) return;
    const merged = mergeDrafts(draftOf(base), this.entered(), draftOf(theirs), keep);
    this.theirs.set(null);
    this.begin(theirs, merged);
    await this.save();
  }

  private failed(problem: ApiProblem): void {
    const base = this.base();
    const now = problem.status === 412 ? findingsShape.safeParse(problem.current).data : undefined;
    if (now === undefined || base === null) {
      this.problem.set(problem);
      return;
    }
    const [was, mine, other] = [draftOf(base), this.entered(), draftOf(now)];
    const changedByBoth = changedFields(was, mine).filter((field) =>
      changedFields(was, other).includes(field),
    );
    this.differences.set(
      fieldsOf(other)
        .filter(({ key }) => changedByBoth.includes(key))
        .filter(({ key }) => changedFields(mine, other).includes(key))
        .map(({ key, label }) => ({
          key,
          label,
          mine: showField(mine, key, this.current.file().speedUnit),
          theirs: showField(other, key, this.current.file().speedUnit),
        })),
    );
    this.theirs.set(now);
  }

  private begin(base: Findings, draft: Draft): void {
    this.base.set(base);
    this.figures.set(draft.figures);
    const { answers } = this.form.controls;
    answers.clear();
    for (const { text } of draft.answers) {
      answers.push(this.build.control(text, Validators.maxLength(4000)));
    }
    this.form.patchValue({ dependsOn: draft.dependsOn, against: draft.against });
  }

  private entered(): Draft {
    const { answers, dependsOn, against } = this.form.getRawValue();
    return {
      answers: this.questions().map(({ questionNumber, question }, index) => ({
        questionNumber,
        question,
        text: answers[index] ?? '',
      })),
      figures: this.figures(),
      dependsOn,
      against,
    };
  }
}
