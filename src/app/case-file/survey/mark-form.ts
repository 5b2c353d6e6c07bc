import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  input,
  output,
  signal,
  untracked,
} from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import {
  type AbstractControl,
  NonNullableFormBuilder,
  ReactiveFormsModule,
  Validators,
} from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { MatSelectModule } from '@angular/material/select';
import {
  type Mark,
  type MarkKind,
  addMark,
  editMark,
  mark,
  markKinds,
} from '#shared/contracts/survey';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import { fieldError, notBlank, showServerErrors } from '../../core/forms/server-errors';
import { Messages } from '../../core/messages/messages';
import { type Difference, EditConflict } from '../../ui/edit-conflict/edit-conflict';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { quantity } from '../../ui/quantity-field/quantity';
import { QuantityField } from '../../ui/quantity-field/quantity-field';
import { MarkSymbol } from '../../ui/scale-plan/mark-symbol';
import { CurrentCase } from '../current-case';
import {
  changedFields,
  emptyTexts,
  entryOf,
  heightRule,
  lengthRule,
  markFields,
  type MarkTexts,
  otherSigmaRule,
  sameField,
  sigmaRule,
  textsOf,
} from './mark-texts';
import { SurveyMarks } from './survey-marks';

/** What the server calls a field, where the form has another name for it. */
const formNames: Record<string, keyof MarkTexts> = {
  'at.0': 'x',
  'at.1': 'y',
  'sigma.0': 'sigmaX',
  'sigma.1': 'sigmaY',
};

/** Enters a mark by its coordinates, or changes one with the reason. */
@Component({
  selector: 'app-mark-form',
  imports: [
    EditConflict,
    MarkSymbol,
    MatButton,
    MatFormFieldModule,
    MatInput,
    MatSelectModule,
    ProblemMessage,
    QuantityField,
    ReactiveFormsModule,
  ],
  templateUrl: './mark-form.html',
  styleUrl: './mark-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class MarkForm {
  private readonly api = inject(Api);
  private readonly build = inject(NonNullableFormBuilder);
  private readonly current = inject(CurrentCase);
  private readonly messages = inject(Messages);
  private readonly survey = inject(SurveyMarks);

  /** The mark that is changed; null: a new one is entered. */
  readonly mark = input.required<Mark | null>();
  readonly saved = output<Mark>();
  readonly cancelled = output();

  /** The version that this edit began from; moves on when a conflict is settled. */
  private base: Mark | null = null;
  protected readonly kinds = markKinds;
  protected readonly rules = {
    length: lengthRule,
    height: heightRule,
    sigma: sigmaRule,
    otherSigma: otherSigmaRule,
  };
  protected readonly fieldError = fieldError;
  protected readonly form = this.build.group({
    label: ['', [notBlank, Validators.maxLength(40)]],
    kind: this.build.control<MarkKind>('tyre mark'),
    x: ['', quantity(lengthRule)],
    y: ['', quantity(lengthRule)],
    sigmaX: ['', quantity(sigmaRule)],
    sigmaY: ['', quantity(otherSigmaRule)],
    correlation: ['', correlation],
    height: ['', quantity(heightRule)],
    trace: ['', Validators.maxLength(40)],
    order: ['', order],
    note: ['', Validators.maxLength(1000)],
    reason: ['', [notBlank, Validators.maxLength(1000)]],
  });
  private readonly edited = toSignal(this.form.valueChanges);
  protected readonly busy = signal(false);
  protected readonly problem = signal<ApiProblem | null>(null);
  /** What the mark became while this edit was open. */
  protected readonly theirs = signal<Mark | null>(null);
  protected readonly differences = computed<Difference<keyof MarkTexts>[]>(() => {
    this.edited();
    const now = this.theirs();
    if (now === null || this.base === null) return [];
    const [base, mine, theirs] = [textsOf(this.base), this.entered(), textsOf(now)];
    // Only what both changed, and differently, is a question; the rest is merged.
    return markFields
      .filter(
        ({ key }) =>
          !sameField(key, mine, base) &&
          !sameField(key, theirs, base) &&
          !sameField(key, mine, theirs),
      )
      .map(({ key, label }) => ({
        key,
        label,
        mine: mine[key] || '–',
        theirs: theirs[key] || '–',
      }));
  });

  constructor() {
    effect(() => {
      const id = this.mark()?.id;
      // Another mark, not another version of this one: what was typed stays.
      untracked(() => {
        if (id !== undefined && id === this.base?.id) return;
        this.begin(this.mark());
      });
    });
  }

  isChanged(): boolean {
    return changedFields(this.base ? textsOf(this.base) : emptyTexts, this.entered()).length > 0;
  }

  protected async save(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.busy()) return;
    this.busy.set(true);
    this.problem.set(null);
    try {
      const saved = await this.send();
      this.survey.take(saved);
      this.messages.done(
        this.base ? `Mark ${saved.label} is changed.` : `Mark ${saved.label} is entered.`,
      );
      this.begin(this.base ? saved : null);
      this.saved.emit(saved);
    } catch (error) {
      this.failed(ApiProblem.from(error));
    } finally {
      this.busy.set(false);
    }
  }

  /** Takes their version as the base, keeps what the person chose of their own, and saves. */
  protected async settle(keep: readonly (keyof MarkTexts)[]): Promise<void> {
    const theirs = this.theirs();
    if (theirs === null || this.base === null) return;
    const mine = this.entered();
    const asked = this.differences().map(({ key }) => key);
    const kept = changedFields(textsOf(this.base), mine).filter(
      (key) => !asked.includes(key) || keep.includes(key),
    );
    this.base = theirs;
    const own = Object.fromEntries(kept.map((key) => [key, mine[key]]));
    this.form.patchValue({ ...textsOf(theirs), ...own });
    this.theirs.set(null);
    await this.save();
  }

  private send(): Promise<Mark> {
    const { caseId, base } = { caseId: this.current.id(), base: this.base };
    const body = entryOf(this.entered());
    if (base === null) return this.api.call(addMark, { params: { caseId }, body });
    return this.api.call(editMark, {
      params: { caseId, markId: base.id },
      body: { ...body, reason: this.form.controls.reason.value.trim() },
      ifMatch: base.version,
    });
  }

  private failed(problem: ApiProblem): void {
    const now = problem.status === 412 ? mark.safeParse(problem.current) : null;
    if (now?.success) {
      this.theirs.set(now.data);
      return;
    }
    const named = problem.errors.map(({ field, message }) => ({
      field: formNames[field] ?? field,
      message,
    }));
    const { status, title, detail } = problem;
    this.problem.set(showServerErrors(this.form, new ApiProblem(status, title, detail, named)));
  }

  private begin(base: Mark | null): void {
    this.base = base;
    this.theirs.set(null);
    this.problem.set(null);
    // The next mark of a survey is mostly of the same kind and measured the same way.
    const { kind, sigmaX, sigmaY } = this.entered();
    this.form.reset({
      ...(base ? textsOf(base) : { ...emptyTexts, kind, sigmaX, sigmaY }),
      reason: base ? '' : '-',
    });
  }

  private entered(): MarkTexts {
    const { reason: _, ...texts } = this.form.getRawValue();
    return texts;
  }
}

function correlation(control: AbstractControl): { server: string } | null {
  const text = String(control.value).trim();
  const value = Number(text);
  return text === '' || (value > -1 && value < 1)
    ? null
    : { server: 'a correlation lies between −1 and 1' };
}

function order(control: AbstractControl): { server: string } | null {
  return /^\s*\d{0,9}\s*$/.test(String(control.value))
    ? null
    : { server: 'a place is a whole number: 0, 1, 2 …' };
}
