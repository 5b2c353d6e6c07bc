import { Injectable, computed, inject, resource } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { ActivatedRoute } from '@angular/router';
import { map } from 'rxjs';
import { type CaseFile, readCase } from '#shared/contracts/cases';
import { Api } from '../core/api/api';
import { ApiProblem } from '../core/api/api-problem';

/**
 * The case whose file is open. Provided by the case frame, which shows a section only when the
 * case is loaded: sections may read `file()` without asking whether it is there.
 */
@Injectable()
export class CurrentCase {
  private readonly api = inject(Api);

  readonly id = toSignal(
    inject(ActivatedRoute).paramMap.pipe(map((params) => params.get('caseId') ?? '')),
    { requireSync: true },
  );
  private readonly loading = resource({
    params: () => this.id(),
    loader: ({ params: caseId, abortSignal: abort }) =>
      this.api.call(readCase, { params: { caseId }, abort }),
  });

  readonly loaded = computed(() => (this.loading.hasValue() ? this.loading.value() : null));
  readonly problem = computed(() => {
    const error = this.loading.error();
    return error === undefined ? null : ApiProblem.from(error);
  });
  readonly file = computed<CaseFile>(() => {
    const file = this.loaded();
    if (file === null) throw new Error('The case is not loaded yet');
    return file;
  });
  readonly may = computed(() => this.file().may);

  /** After a change elsewhere: counts, stage and people are read anew. */
  reload(): void {
    this.loading.reload();
  }

  /** An edit answered with the case as it is now. */
  take(file: CaseFile): void {
    this.loading.set(file);
  }
}
