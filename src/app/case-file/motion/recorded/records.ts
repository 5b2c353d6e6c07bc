import { Injectable, computed, inject, resource } from '@angular/core';
import {
  type ComputationSummary,
  listComputations,
  readComputation,
  recordComputation,
} from '#shared/contracts/motion';
import { Api } from '../../../core/api/api';
import { ApiProblem } from '../../../core/api/api-problem';
import { CurrentCase } from '../../current-case';
import { Draft } from '../draft';
import { Place } from '../place';

/** The computations that were recorded for good. */
@Injectable()
export class Records {
  private readonly api = inject(Api);
  private readonly current = inject(CurrentCase);
  private readonly draft = inject(Draft);
  private readonly place = inject(Place);

  private readonly list = resource({
    params: () => ({ caseId: this.current.id() }),
    loader: async ({ params, abortSignal: abort }) =>
      (await this.api.call(listComputations, { params, abort })).items,
  });
  private readonly opened = resource({
    params: () => {
      const hash = this.place.computation();
      return hash === null ? undefined : { caseId: this.current.id(), hash };
    },
    loader: ({ params, abortSignal: abort }) => this.api.call(readComputation, { params, abort }),
  });

  readonly items = computed(() => (this.list.hasValue() ? this.list.value() : []));
  readonly problem = computed(() => {
    const error = this.list.error() ?? this.opened.error();
    return error === undefined ? null : ApiProblem.from(error);
  });
  /** The recorded document that is open, as it came. */
  readonly document = computed<unknown>(() =>
    this.opened.hasValue() ? this.opened.value() : null,
  );
  readonly openItem = computed(
    () => this.items().find((item) => item.hash === this.place.computation()) ?? null,
  );

  /** Computes the saved version of the draft at a station on the server. @throws ApiProblem */
  async record(stationId: string): Promise<ComputationSummary> {
    const base = this.draft.base();
    if (base === null) throw new Error('Nothing is on the table');
    const made = await this.api.call(recordComputation, {
      params: { caseId: this.current.id(), reconstructionId: base.id },
      body: { stationId, version: base.version },
    });
    this.list.update((items) => [made, ...(items ?? []).filter((one) => one.hash !== made.hash)]);
    return made;
  }

  /** Opens a record, with its station on the plan and, unless work would be lost, its alternative. */
  open(hash: string | null): void {
    const item = this.items().find((one) => one.hash === hash);
    this.place.go({
      computation: hash,
      ...(item && { station: item.stationId }),
      ...(item && !this.draft.changed() && { alternative: item.reconstructionId }),
    });
  }
}
