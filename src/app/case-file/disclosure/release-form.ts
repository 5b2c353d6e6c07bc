import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  output,
  resource,
  signal,
} from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { NonNullableFormBuilder, ReactiveFormsModule, Validators } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { MatSelectModule } from '@angular/material/select';
import { RouterLink } from '@angular/router';
import { type Release, releaseCase } from '#shared/contracts/disclosure';
import { type Exhibit, listExhibits } from '#shared/contracts/exhibits';
import { readFindings } from '#shared/contracts/findings';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import { fieldError, showServerErrors } from '../../core/forms/server-errors';
import { Messages } from '../../core/messages/messages';
import { FigureTable } from '../../ui/figure/figure-table';
import { Icon } from '../../ui/icon/icon';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { CurrentCase } from '../current-case';
import { type Decision, decisions } from './decisions';
import { ExhibitDecision } from './exhibit-decision';

/** Releases the findings to a party: every exhibit is either released or withheld with a reason. */
@Component({
  selector: 'app-release-form',
  imports: [
    ExhibitDecision,
    FigureTable,
    Icon,
    MatButton,
    MatFormFieldModule,
    MatInput,
    MatSelectModule,
    ProblemMessage,
    ReactiveFormsModule,
    RouterLink,
  ],
  templateUrl: './release-form.html',
  styleUrl: './release-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ReleaseForm {
  private readonly api = inject(Api);
  private readonly build = inject(NonNullableFormBuilder);
  private readonly messages = inject(Messages);
  protected readonly current = inject(CurrentCase);

  readonly released = output<Release>();
  readonly cancelled = output();

  /** One act, one key: a second press after a lost answer does not release twice. */
  private readonly idempotencyKey = crypto.randomUUID();
  protected readonly fieldError = fieldError;
  protected readonly form = this.build.group({
    partyId: ['', Validators.required],
    password: ['', Validators.required],
  });

  private readonly reading = resource({
    params: () => this.current.id(),
    loader: async ({ params: caseId, abortSignal: abort }) => {
      const [exhibits, findings] = await Promise.all([
        this.api.call(listExhibits, { params: { caseId }, abort }),
        this.api.call(readFindings, { params: { caseId }, abort }),
      ]);
      return { exhibits: exhibits.items, findings };
    },
  });
  protected readonly known = computed(() =>
    this.reading.hasValue() ? this.reading.value() : null,
  );
  protected readonly loadProblem = computed(() => {
    const error = this.reading.error();
    return error === undefined ? null : ApiProblem.from(error);
  });
  protected readonly unanswered = computed(
    () => this.known()?.findings.answers.filter(({ text }) => text.trim() === '').length ?? 0,
  );

  /** Chosen so far, by exhibit number; an exhibit without a decision holds the release back. */
  private readonly chosen = signal<ReadonlyMap<string, Decision>>(new Map());
  protected readonly outcome = computed(() =>
    decisions(
      (this.known()?.exhibits ?? []).map((exhibit) => exhibit.number),
      this.chosen(),
    ),
  );
  protected readonly tried = signal(false);
  protected readonly busy = signal(false);
  protected readonly problem = signal<ApiProblem | null>(null);
  private readonly entered = toSignal(this.form.controls.partyId.valueChanges);
  protected readonly party = computed(() => {
    const partyId = this.entered();
    return this.current.file().parties.find((party) => party.id === partyId)?.name ?? 'the party';
  });

  protected decisionOf(exhibit: Exhibit): Decision | null {
    return this.chosen().get(exhibit.number) ?? null;
  }

  protected decide(exhibit: Exhibit, decision: Decision): void {
    this.chosen.update((chosen) => new Map(chosen).set(exhibit.number, decision));
  }

  /** Everything that is neither decided nor sensitive; sensitive items are chosen one by one. */
  protected releaseTheRest(): void {
    for (const exhibit of this.known()?.exhibits ?? []) {
      if (!exhibit.sensitive && this.decisionOf(exhibit) === null) {
        this.decide(exhibit, { released: true });
      }
    }
  }

  protected reload(): void {
    this.reading.reload();
  }

  protected async release(): Promise<void> {
    this.tried.set(true);
    this.form.markAllAsTouched();
    const outcome = this.outcome();
    if (this.form.invalid || outcome.open.length > 0 || this.busy()) return;
    this.busy.set(true);
    this.problem.set(null);
    try {
      const made = await this.api.call(releaseCase, {
        params: { caseId: this.current.id() },
        body: {
          ...this.form.getRawValue(),
          exhibits: outcome.released,
          withheld: outcome.withheld,
        },
        idempotencyKey: this.idempotencyKey,
      });
      this.messages.done(`Release ${made.number} to ${made.party} is made; its archive is built.`);
      this.released.emit(made);
    } catch (error) {
      this.problem.set(showServerErrors(this.form, ApiProblem.from(error)));
    } finally {
      this.busy.set(false);
    }
  }
}
