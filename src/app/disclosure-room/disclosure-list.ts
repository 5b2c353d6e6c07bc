import { ChangeDetectionStrategy, Component, computed, inject, resource } from '@angular/core';
import { RouterLink } from '@angular/router';
import { listDisclosures } from '#shared/contracts/disclosure';
import { Api } from '../core/api/api';
import { ApiProblem } from '../core/api/api-problem';
import { showDay } from '../ui/dates/dates';
import { EmptyState } from '../ui/empty-state/empty-state';
import { PageTitle } from '../ui/page-title/page-title';
import { ProblemMessage } from '../ui/problem-message/problem-message';

/** The releases that were disclosed to the attorney who is signed in. */
@Component({
  selector: 'app-disclosure-list',
  imports: [EmptyState, PageTitle, ProblemMessage, RouterLink],
  templateUrl: './disclosure-list.html',
  styleUrl: './disclosure-list.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class DisclosureList {
  private readonly api = inject(Api);

  private readonly reading = resource({
    loader: ({ abortSignal: abort }) => this.api.call(listDisclosures, { abort }),
  });
  protected readonly disclosures = computed(() =>
    this.reading.hasValue()
      ? [...this.reading.value().items].sort((a, b) => b.releasedAt.localeCompare(a.releasedAt))
      : null,
  );
  protected readonly problem = computed(() => {
    const error = this.reading.error();
    return error === undefined ? null : ApiProblem.from(error);
  });
  protected readonly dayOf = (moment: string): string => showDay(moment.slice(0, 10));

  protected reload(): void {
    this.reading.reload();
  }
}
