import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  resource,
  signal,
} from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { MatButton } from '@angular/material/button';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatSelectModule } from '@angular/material/select';
import { ActivatedRoute, Router } from '@angular/router';
import { map } from 'rxjs';
import { type LedgerReport, readLedger, verifyLedger } from '#shared/contracts/custody';
import { listExhibits } from '#shared/contracts/exhibits';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import { showExactMoment } from '../../ui/dates/dates';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { Icon } from '../../ui/icon/icon';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { CurrentCase } from '../current-case';
import { CustodyEvent } from './custody-event';
import { LedgerCheck } from './ledger-check';

/** The custody ledger of the case, or of one exhibit (`?exhibit=` in the address), newest last. */
@Component({
  selector: 'app-custody',
  imports: [
    CustodyEvent,
    EmptyState,
    Icon,
    LedgerCheck,
    MatButton,
    MatFormFieldModule,
    MatSelectModule,
    ProblemMessage,
  ],
  templateUrl: './custody.html',
  styleUrl: './custody.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Custody {
  private readonly api = inject(Api);
  private readonly router = inject(Router);
  private readonly route = inject(ActivatedRoute);
  protected readonly current = inject(CurrentCase);

  /** Number of the exhibit that is looked at; empty: the whole case. */
  protected readonly exhibit = toSignal(
    this.route.queryParamMap.pipe(map((query) => query.get('exhibit') ?? '')),
    { requireSync: true },
  );
  private readonly reading = resource({
    params: () => ({ caseId: this.current.id(), exhibit: this.exhibit() }),
    loader: ({ params: { caseId, exhibit }, abortSignal: abort }) =>
      this.api.call(readLedger, {
        params: { caseId },
        query: exhibit === '' ? {} : { exhibit },
        abort,
      }),
  });
  private readonly exhibitReading = resource({
    params: () => this.current.id(),
    loader: ({ params: caseId, abortSignal: abort }) =>
      this.api.call(listExhibits, { params: { caseId }, abort }),
  });
  protected readonly ledger = computed(() =>
    this.reading.hasValue() ? this.reading.value() : null,
  );
  protected readonly exhibits = computed(() =>
    this.exhibitReading.hasValue() ? this.exhibitReading.value().items : [],
  );
  protected readonly problem = computed(() => {
    const error = this.reading.error();
    return error === undefined ? null : ApiProblem.from(error);
  });
  /** Sequences that a later event corrects, with the correcting one. */
  protected readonly corrections = computed(
    () =>
      new Map(
        (this.ledger()?.entries ?? []).flatMap(({ event }) =>
          event.kind === 'corrected' && event.refersTo !== null
            ? [[event.refersTo, event.sequence] as const]
            : [],
        ),
      ),
  );
  protected readonly checking = signal(false);
  protected readonly report = signal<LedgerReport | null>(null);
  protected readonly checkProblem = signal<ApiProblem | null>(null);
  /** What the last check said of each event. */
  protected readonly faulty = computed(
    () => new Set((this.report()?.findings ?? []).map(({ sequence }) => sequence)),
  );
  protected readonly showExactMoment = showExactMoment;

  protected reload(): void {
    this.reading.reload();
  }

  protected show(exhibit: string): void {
    void this.router.navigate([], {
      relativeTo: this.route,
      queryParams: { exhibit: exhibit === '' ? null : exhibit },
    });
  }

  protected async verify(): Promise<void> {
    this.checking.set(true);
    this.checkProblem.set(null);
    try {
      const caseId = this.current.id();
      this.report.set(await this.api.call(verifyLedger, { params: { caseId } }));
      this.reading.reload();
    } catch (error) {
      this.report.set(null);
      this.checkProblem.set(ApiProblem.from(error));
    } finally {
      this.checking.set(false);
    }
  }
}
