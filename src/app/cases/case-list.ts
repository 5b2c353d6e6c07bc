import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  resource,
  signal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatSortModule, type Sort } from '@angular/material/sort';
import { Router, RouterLink } from '@angular/router';
import { type CaseStage, type CaseSummary, listCases } from '#shared/contracts/cases';
import { Api } from '../core/api/api';
import { ApiProblem } from '../core/api/api-problem';
import { Clock } from '../core/clock';
import { Messages } from '../core/messages/messages';
import { Session } from '../core/session/session';
import { Dialogs } from '../ui/confirm-dialog/dialogs';
import { showDay } from '../ui/dates/dates';
import { DueDate } from '../ui/due-date/due-date';
import { EmptyState } from '../ui/empty-state/empty-state';
import { Icon } from '../ui/icon/icon';
import { PageTitle } from '../ui/page-title/page-title';
import { ProblemMessage } from '../ui/problem-message/problem-message';
import { stageName } from '../ui/stage/stage';
import type { AssignRequest } from './assign/assign-dialog';
import { WorkPanel } from './work-panel';
import {
  type CaseOrder,
  countByStage,
  inOrder,
  isInWork,
  matches,
  slackOf,
  workInHand,
} from './workload';

const pageSize = 200;

/** All cases that the account may see: the whole laboratory for its lead, else one's own. */
@Component({
  selector: 'app-case-list',
  imports: [
    DueDate,
    EmptyState,
    Icon,
    MatButton,
    MatSortModule,
    PageTitle,
    ProblemMessage,
    RouterLink,
    WorkPanel,
  ],
  templateUrl: './case-list.html',
  styleUrl: './case-list.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class CaseList {
  private readonly api = inject(Api);
  private readonly clock = inject(Clock);
  private readonly dialogs = inject(Dialogs);
  private readonly messages = inject(Messages);
  private readonly router = inject(Router);
  protected readonly session = inject(Session);

  /** Filters and order are in the address, so that a view can be kept and sent. */
  readonly stage = input<string>();
  readonly find = input<string>();
  readonly by = input<string>();

  private readonly first = resource({
    loader: ({ abortSignal: abort }) =>
      this.api.call(listCases, { query: { limit: pageSize }, abort }),
  });
  private readonly further = signal<{ items: CaseSummary[]; next: string | null } | null>(null);
  protected readonly loadingMore = signal(false);

  protected readonly loaded = computed(() => this.first.hasValue());
  protected readonly problem = computed(() => {
    const error = this.first.error();
    return error === undefined ? null : ApiProblem.from(error);
  });
  protected readonly cases = computed<CaseSummary[]>(() => [
    ...(this.first.hasValue() ? this.first.value().items : []),
    ...(this.further()?.items ?? []),
  ]);
  protected readonly next = computed(() => {
    const more = this.further();
    if (more !== null) return more.next;
    return this.first.hasValue() ? this.first.value().next : null;
  });

  protected readonly stages = computed(() => countByStage(this.cases()));
  protected readonly order = computed<{ active: CaseOrder; descending: boolean }>(() => {
    const [active, direction] = (this.by() ?? 'number-desc').split('-');
    const known: CaseOrder[] = ['number', 'title', 'lead', 'stage', 'due'];
    return {
      active: known.find((one) => one === active) ?? 'number',
      descending: direction === 'desc',
    };
  });
  protected readonly shown = computed(() => {
    const stage = this.stage();
    const { active, descending } = this.order();
    const chosen = this.cases().filter(
      (item) => (stage === undefined || item.stage === stage) && matches(item, this.find() ?? ''),
    );
    return inOrder(chosen, active, descending);
  });
  protected readonly pressing = computed(
    () =>
      this.cases().filter((item) => (slackOf(item, this.clock.today()) ?? Infinity) <= 7).length,
  );
  protected readonly unassigned = computed(
    () => this.cases().filter((item) => isInWork(item) && item.leadInvestigator === null).length,
  );

  protected readonly stageName = stageName;
  protected readonly showDay = showDay;
  protected readonly isInWork = isInWork;

  protected reload(): void {
    this.further.set(null);
    this.first.reload();
  }

  protected async loadMore(): Promise<void> {
    const after = this.next();
    if (after === null || this.loadingMore()) return;
    this.loadingMore.set(true);
    try {
      const { items, next } = await this.api.call(listCases, { query: { after, limit: pageSize } });
      this.further.update((more) => ({ items: [...(more?.items ?? []), ...items], next }));
    } catch (error) {
      this.messages.fault(error);
    } finally {
      this.loadingMore.set(false);
    }
  }

  protected showStage(stage: CaseStage): void {
    this.show({ stage: this.stage() === stage ? null : stage });
  }

  protected filter(text: string): void {
    this.show({ find: text === '' ? null : text });
  }

  protected sort({ active, direction }: Sort): void {
    this.show({ by: direction === '' ? null : `${active}-${direction}` });
  }

  protected showAll(): void {
    this.show({ stage: null, find: null });
  }

  protected async openCase(): Promise<void> {
    const caseId = await this.dialogs.open<string>(
      async () => (await import('./open-case/open-case-dialog')).OpenCaseDialog,
      null,
    );
    if (caseId !== undefined) await this.router.navigate(['/cases', caseId]);
  }

  protected async assign(item: CaseSummary): Promise<void> {
    const done = await this.dialogs.open<boolean>(
      async () => (await import('./assign/assign-dialog')).AssignDialog,
      {
        caseId: item.id,
        role: 'lead-investigator',
        loads: workInHand(this.cases()),
      } satisfies AssignRequest,
    );
    if (done) this.reload();
  }

  private show(queryParams: Record<string, string | null>): void {
    void this.router.navigate([], {
      queryParams,
      queryParamsHandling: 'merge',
      replaceUrl: true,
    });
  }
}
