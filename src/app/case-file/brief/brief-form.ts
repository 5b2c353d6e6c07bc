import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  output,
  signal,
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
  type Brief,
  type CaseFile,
  caseFile,
  editBrief,
  incidentKinds,
} from '#shared/contracts/cases';
import { parseQuantity } from '#shared/units/parse-quantity';
import { fromSi } from '#shared/units/units';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import { fieldError, notBlank, showServerErrors } from '../../core/forms/server-errors';
import { Messages } from '../../core/messages/messages';
import { type Difference, EditConflict } from '../../ui/edit-conflict/edit-conflict';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { CurrentCase } from '../current-case';
import { briefFields, briefOf, changesOf } from './brief-fields';

/** Edits the brief; when somebody else saved meanwhile, both versions are put side by side. */
@Component({
  selector: 'app-brief-form',
  imports: [
    EditConflict,
    MatButton,
    MatFormFieldModule,
    MatInput,
    MatSelectModule,
    ProblemMessage,
    ReactiveFormsModule,
  ],
  templateUrl: './brief-form.html',
  styleUrl: './brief-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class BriefForm {
  private readonly api = inject(Api);
  private readonly build = inject(NonNullableFormBuilder);
  private readonly current = inject(CurrentCase);
  private readonly messages = inject(Messages);

  readonly done = output();

  /** The version that this edit began from; moves on when a conflict is settled. */
  private base: CaseFile = this.current.file();
  protected readonly kinds = incidentKinds;
  protected readonly fieldError = fieldError;
  protected readonly form = this.build.group({
    title: ['', [notBlank, Validators.maxLength(160)]],
    kind: this.build.control<Brief['kind']>('other'),
    commissionedBy: ['', Validators.maxLength(400)],
    jurisdiction: ['', Validators.maxLength(200)],
    incidentOn: [''],
    place: ['', Validators.maxLength(400)],
    circumstances: ['', Validators.maxLength(20_000)],
    dueOn: [''],
    speedUnit: this.build.control<Brief['speedUnit']>('km/h'),
    xAxisBearing: ['', bearing],
  });
  private readonly edited = toSignal(this.form.valueChanges);
  protected readonly busy = signal(false);
  protected readonly problem = signal<ApiProblem | null>(null);
  /** What the record became while this edit was open. */
  protected readonly theirs = signal<CaseFile | null>(null);
  protected readonly differences = computed<Difference<keyof Brief>[]>(() => {
    this.edited();
    const theirs = this.theirs();
    if (theirs === null) return [];
    const mine = this.entered();
    const base = briefOf(this.base);
    // Only what both changed, and differently, is a question; the rest is merged.
    return briefFields
      .filter(({ key }) => mine[key] !== base[key] && theirs[key] !== base[key])
      .filter(({ key }) => mine[key] !== theirs[key])
      .map(({ key, label, show }) => ({ key, label, mine: show(mine), theirs: show(theirs) }));
  });

  constructor() {
    this.fill(briefOf(this.base));
  }

  isChanged(): boolean {
    return Object.keys(changesOf(briefOf(this.base), this.entered())).length > 0;
  }

  protected async save(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.busy()) return;
    const changes = changesOf(briefOf(this.base), this.entered());
    if (Object.keys(changes).length === 0) {
      this.done.emit();
      return;
    }
    this.busy.set(true);
    this.problem.set(null);
    try {
      const saved = await this.api.call(editBrief, {
        params: { caseId: this.base.id },
        body: changes,
        ifMatch: this.base.version,
      });
      this.current.take(saved);
      this.messages.done('The brief is saved.');
      this.base = saved;
      this.done.emit();
    } catch (error) {
      this.failed(ApiProblem.from(error));
    } finally {
      this.busy.set(false);
    }
  }

  /** Takes their version as the base, keeps what the person chose of their own, and saves. */
  protected async settle(keep: readonly (keyof Brief)[]): Promise<void> {
    const theirs = this.theirs();
    if (theirs === null) return;
    const base = briefOf(this.base);
    const mine = this.entered();
    const givenUp = this.differences().filter(({ key }) => !keep.includes(key));
    const kept = Object.entries(changesOf(base, mine)).filter(
      ([key]) => !givenUp.some((difference) => difference.key === key),
    );
    this.base = theirs;
    this.fill({ ...briefOf(theirs), ...Object.fromEntries(kept) });
    this.theirs.set(null);
    await this.save();
  }

  private failed(problem: ApiProblem): void {
    const now = problem.status === 412 ? caseFile.safeParse(problem.current) : null;
    if (now?.success) this.theirs.set(now.data);
    else this.problem.set(showServerErrors(this.form, problem));
  }

  private fill(brief: Brief): void {
    const degrees = brief.xAxisBearing === null ? '' : fromSi(brief.xAxisBearing, '°');
    this.form.setValue({
      ...brief,
      incidentOn: brief.incidentOn ?? '',
      dueOn: brief.dueOn ?? '',
      xAxisBearing: degrees === '' ? '' : `${Number(degrees.toFixed(8))}°`,
    });
  }

  private entered(): Brief {
    const value = this.form.getRawValue();
    const read = parseQuantity(value.xAxisBearing, 'angle', { unit: '°' });
    const before = this.base.xAxisBearing;
    const after = read.ok ? read.value : null;
    // The same bearing written in degrees and read back is not a change.
    const same = before !== null && after !== null && Math.abs(before - after) < 1e-9;
    return {
      ...value,
      title: value.title.trim(),
      incidentOn: value.incidentOn === '' ? null : value.incidentOn,
      dueOn: value.dueOn === '' ? null : value.dueOn,
      xAxisBearing: same ? before : after,
    };
  }
}

/** Empty, or an angle; degrees when no unit is typed. */
function bearing(control: AbstractControl): { server: string } | null {
  const text = String(control.value);
  if (text.trim() === '') return null;
  const read = parseQuantity(text, 'angle', { unit: '°' });
  return read.ok ? null : { server: read.message.replace(/\.$/, '') };
}
