import { Injectable, computed, inject, resource } from '@angular/core';
import { type Mark, listMarkChanges, listMarks } from '#shared/contracts/survey';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import { CurrentCase } from '../current-case';

const none: never[] = [];

/** The measured marks of the open case, their imports, and what was changed. */
@Injectable()
export class SurveyMarks {
  private readonly api = inject(Api);
  private readonly current = inject(CurrentCase);

  private readonly loading = resource({
    params: () => this.current.id(),
    loader: ({ params: caseId, abortSignal: abort }) =>
      this.api.call(listMarks, { params: { caseId }, abort }),
  });
  private readonly loadingChanges = resource({
    params: () => this.current.id(),
    loader: ({ params: caseId, abortSignal: abort }) =>
      this.api.call(listMarkChanges, { params: { caseId }, abort }),
  });

  private readonly loaded = computed(() => (this.loading.hasValue() ? this.loading.value() : null));
  readonly isLoaded = computed(() => this.loaded() !== null);
  readonly marks = computed(() => this.loaded()?.items ?? none);
  readonly imports = computed(() => this.loaded()?.imports ?? none);
  readonly changes = computed(() =>
    this.loadingChanges.hasValue() ? this.loadingChanges.value().items : none,
  );
  readonly problem = computed(() => {
    const error = this.loading.error() ?? this.loadingChanges.error();
    return error === undefined ? null : ApiProblem.from(error);
  });

  /** A mark was entered or changed: it is shown as the server has it now. */
  take(mark: Mark): void {
    const loaded = this.loaded();
    if (loaded) {
      const known = loaded.items.some((one) => one.id === mark.id);
      this.loading.set({
        ...loaded,
        items: known
          ? loaded.items.map((one) => (one.id === mark.id ? mark : one))
          : [...loaded.items, mark],
      });
    }
    this.loadingChanges.reload();
    this.current.reload();
  }

  reload(): void {
    this.loading.reload();
    this.loadingChanges.reload();
    this.current.reload();
  }
}
