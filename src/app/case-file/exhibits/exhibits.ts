import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  resource,
  viewChild,
} from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { MatButton } from '@angular/material/button';
import { ActivatedRoute, Router, RouterLink } from '@angular/router';
import { map } from 'rxjs';
import { type Exhibit, listExhibits } from '#shared/contracts/exhibits';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import { Session } from '../../core/session/session';
import type { HoldsWork } from '../../core/unsaved-work';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { Icon } from '../../ui/icon/icon';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { CurrentCase } from '../current-case';
import { ExhibitDetail } from './exhibit-detail';
import { RegisterForm } from './register-form';
import { Uploads } from './uploads';

/**
 * The register of exhibits, with the chosen one beside it. The address holds the choice
 * (`?exhibit=2026-014/3`) and whether a new one is being registered (`?register=yes`).
 */
@Component({
  selector: 'app-exhibits',
  imports: [EmptyState, ExhibitDetail, Icon, MatButton, ProblemMessage, RegisterForm, RouterLink],
  templateUrl: './exhibits.html',
  styleUrl: './exhibits.scss',
  providers: [Uploads],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Exhibits implements HoldsWork {
  private readonly api = inject(Api);
  private readonly router = inject(Router);
  private readonly route = inject(ActivatedRoute);
  private readonly uploads = inject(Uploads);
  private readonly session = inject(Session);
  protected readonly current = inject(CurrentCase);
  private readonly form = viewChild(RegisterForm);

  private readonly query = toSignal(
    this.route.queryParamMap.pipe(
      map((query) => ({ exhibit: query.get('exhibit'), register: query.has('register') })),
    ),
    { requireSync: true },
  );
  private readonly reading = resource({
    params: () => this.current.id(),
    loader: ({ params: caseId, abortSignal: abort }) =>
      this.api.call(listExhibits, { params: { caseId }, abort }),
  });
  protected readonly exhibits = computed(() =>
    this.reading.hasValue() ? this.reading.value().items : null,
  );
  protected readonly problem = computed(() => {
    const error = this.reading.error();
    return error === undefined ? null : ApiProblem.from(error);
  });
  protected readonly registering = computed(
    () => this.query().register && this.current.may().custody,
  );
  protected readonly chosen = computed(
    () => this.exhibits()?.find(({ number }) => number === this.query().exhibit) ?? null,
  );
  /** An address that names an exhibit which is not there. */
  protected readonly unknown = computed(() =>
    this.exhibits() !== null && this.chosen() === null ? this.query().exhibit : null,
  );
  /** Offers that wait for the person who is signed in. */
  protected readonly waiting = computed(() =>
    (this.exhibits() ?? []).filter(
      ({ custody }) => custody.pending?.toId === this.session.account()?.id,
    ),
  );

  hasUnsavedWork(): boolean {
    return (this.form()?.isChanged() ?? false) || this.uploads.underWay();
  }

  protected reload(): void {
    this.reading.reload();
  }

  protected registered(exhibit: Exhibit): void {
    this.reading.update((list) => ({ items: [...(list?.items ?? []), exhibit] }));
    this.current.reload();
    this.open(exhibit.number);
  }

  protected open(number: string | null): void {
    void this.router.navigate([], { relativeTo: this.route, queryParams: { exhibit: number } });
  }

  /** The picture that stands for the exhibit in the list. */
  protected photoOf(exhibit: Exhibit): string | null {
    const file = exhibit.files.find(({ hasThumbnail }) => hasThumbnail);
    return file ? this.uploads.pictureAddress(this.current.id(), exhibit, file, true) : null;
  }
}
