import { Injectable, computed, effect, inject, resource, untracked } from '@angular/core';
import {
  addReconstruction,
  editReconstruction,
  listReconstructions,
  type Reconstruction,
} from '#shared/contracts/motion';
import { listMarks } from '#shared/contracts/survey';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import { CurrentCase } from '../current-case';
import { emptyDocument } from './document-edits';
import { Draft, type DraftContent } from './draft';
import { refOf } from './names';
import { Place } from './place';

/** What the section works with: the alternatives, the marks, and what is chosen of them. */
@Injectable()
export class Workbench {
  private readonly api = inject(Api);
  private readonly current = inject(CurrentCase);
  private readonly place = inject(Place);
  private readonly draft = inject(Draft);

  private readonly list = resource({
    params: () => ({ caseId: this.current.id() }),
    loader: async ({ params, abortSignal: abort }) =>
      (await this.api.call(listReconstructions, { params, abort })).items,
  });
  private readonly survey = resource({
    params: () => ({ caseId: this.current.id() }),
    loader: async ({ params, abortSignal: abort }) =>
      (await this.api.call(listMarks, { params, abort })).items,
  });

  readonly alternatives = computed(() => (this.list.hasValue() ? this.list.value() : []));
  readonly marks = computed(() => (this.survey.hasValue() ? this.survey.value() : []));
  readonly loaded = computed(() => this.list.hasValue() && this.survey.hasValue());
  readonly problem = computed(() => {
    const error = this.list.error() ?? this.survey.error();
    return error === undefined ? null : ApiProblem.from(error);
  });

  /** The alternative that is on the table. */
  readonly chosen = computed(() => {
    const wanted = this.place.alternative();
    const all = this.alternatives();
    return all.find((one) => one.id === wanted) ?? all.at(0) ?? null;
  });
  readonly stations = computed(() => this.draft.document()?.stations ?? []);
  readonly station = computed(() => {
    const wanted = this.place.station();
    const all = this.stations();
    return all.find((one) => one.id === wanted) ?? all.at(0) ?? null;
  });
  readonly stationId = computed(() => this.station()?.id ?? null);
  /** The point whose motion the sheet derives. */
  readonly asked = computed(() => {
    const bodies = this.draft.document()?.bodies ?? [];
    const ref = refOf(this.place.point() ?? '');
    const body = bodies.find((one) => one.id === ref.body);
    if (body?.points.some((point) => point.id === ref.point) === true) return ref;
    const first = bodies.find((one) => one.points.length > 0);
    return first === undefined ? null : { body: first.id, point: first.points[0].id };
  });
  readonly mayWork = computed(() => this.current.may().work);

  constructor() {
    effect(() => {
      const chosen = this.chosen();
      untracked(() => {
        if (chosen === null) this.draft.close();
        else if (this.draft.base()?.id !== chosen.id) this.draft.open(chosen);
      });
    });
  }

  reload(): void {
    this.list.reload();
    this.survey.reload();
  }

  /** @throws ApiProblem */
  async begin(content: Partial<DraftContent>): Promise<void> {
    const made = await this.api.call(addReconstruction, {
      params: { caseId: this.current.id() },
      body: {
        name: content.name ?? `Alternative ${letter(this.alternatives().length)}`,
        assumption: content.assumption ?? '',
        document: content.document ?? emptyDocument,
      },
    });
    this.list.update((items) => [...(items ?? []), made]);
    this.place.go({ alternative: made.id, computation: null });
  }

  /** Saves the draft over the version that it began from. @throws ApiProblem, 412 with what stands */
  async save(): Promise<void> {
    const base = this.draft.base();
    const content = this.draft.content();
    if (base === null || content === null) return;
    const saved = await this.api.call(editReconstruction, {
      params: { caseId: this.current.id(), reconstructionId: base.id },
      body: {
        name: content.name,
        assumption: content.assumption,
        document: content.document,
      },
      ifMatch: base.version,
    });
    this.draft.take(saved);
    this.keep(saved);
  }

  /** Puts a version that came from the server into the list. */
  keep(saved: Reconstruction): void {
    this.list.update((items) => items?.map((one) => (one.id === saved.id ? saved : one)) ?? []);
  }
}

const letter = (index: number): string => String.fromCharCode(65 + (index % 26));
