import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  resource,
  signal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { listReleases, type Release } from '#shared/contracts/disclosure';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import type { HoldsWork } from '../../core/unsaved-work';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { CurrentCase } from '../current-case';
import { ReleaseCard } from './release-card';
import { ReleaseForm } from './release-form';

/** How often the list is read again while an archive is being built. */
const lookAgainAfter = 2000;

/** What was released to whom, in which archive, and who opened it. */
@Component({
  selector: 'app-disclosure',
  imports: [EmptyState, MatButton, ProblemMessage, ReleaseCard, ReleaseForm],
  templateUrl: './disclosure.html',
  styleUrl: './disclosure.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Disclosure implements HoldsWork {
  private readonly api = inject(Api);
  protected readonly current = inject(CurrentCase);

  private readonly reading = resource({
    params: () => this.current.id(),
    loader: ({ params: caseId, abortSignal: abort }) =>
      this.api.call(listReleases, { params: { caseId }, abort }),
  });
  protected readonly releases = computed(() =>
    this.reading.hasValue()
      ? [...this.reading.value().items].sort((a, b) => b.number - a.number)
      : null,
  );
  protected readonly problem = computed(() => {
    const error = this.reading.error();
    return error === undefined ? null : ApiProblem.from(error);
  });
  protected readonly releasing = signal(false);
  protected readonly hasParties = computed(() => this.current.file().parties.length > 0);

  constructor() {
    effect((onCleanup) => {
      if (!this.releases()?.some((release) => release.archive.state === 'building')) return;
      const timer = setTimeout(() => this.reading.reload(), lookAgainAfter);
      onCleanup(() => clearTimeout(timer));
    });
  }

  hasUnsavedWork(): boolean {
    return this.releasing();
  }

  protected released(release: Release): void {
    this.releasing.set(false);
    this.replace(release);
    this.current.reload();
  }

  protected replace(release: Release): void {
    this.reading.update((list) => ({
      items: [...(list?.items ?? []).filter((one) => one.id !== release.id), release],
    }));
  }

  protected reload(): void {
    this.reading.reload();
  }
}
