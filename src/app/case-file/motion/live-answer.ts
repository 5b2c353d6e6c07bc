import { Injectable, computed, effect, inject, signal } from '@angular/core';
import { Draft } from './draft';
import { LiveEngine } from './live-engine';
import type { Asked, LiveData, LiveFault, LiveReply } from './live-messages';
import { refOf } from './names';
import { Place } from './place';
import type { Poses } from './plan-scene';
import { WhatIf } from './what-if';
import { Workbench } from './workbench';

/** The answer to what is on the table, kept up to date while it is edited. */
@Injectable()
export class LiveAnswer {
  private readonly draft = inject(Draft);
  private readonly engine = inject(LiveEngine);
  private readonly place = inject(Place);
  private readonly whatIf = inject(WhatIf);
  private readonly workbench = inject(Workbench);

  private readonly reply = signal<LiveReply | null>(null);

  readonly data = computed<LiveData | null>(() => {
    const reply = this.reply();
    return reply?.ok === true && reply.data.stationId === this.workbench.stationId()
      ? reply.data
      : null;
  });
  /** Why there is no answer, or why it ends early. */
  readonly fault = computed<LiveFault | null>(() => {
    const reply = this.reply();
    if (reply === null) return null;
    return reply.ok ? reply.data.answer.failure : reply.fault;
  });
  readonly poses = computed<Poses>(() =>
    Object.fromEntries(
      Object.entries(this.data()?.answer.pose?.bodies ?? {}).map(([id, { pose }]) => [id, pose]),
    ),
  );

  /** The marks as the answer takes them: where they were measured, or where they were moved for trial. */
  readonly marks = computed(() => {
    const moved = this.whatIf.places();
    return this.workbench.marks().map((mark) => {
      const at = moved.get(mark.id);
      return at === undefined ? mark : { ...mark, at: [at[0], at[1]] as [number, number] };
    });
  });
  /** What is derived and shown of the answer. */
  readonly asked = computed<Asked>(() => {
    const from = this.place.from();
    const normal = Number(this.place.normal() ?? NaN);
    return {
      point: this.workbench.asked(),
      against: from === null ? null : refOf(from),
      normal: Number.isFinite(normal) ? normal : null,
    };
  });

  constructor() {
    effect(() => {
      const document = this.draft.document();
      const stationId = this.workbench.stationId();
      if (document === null || stationId === null || this.draft.faults().size > 0) {
        this.reply.set(null);
        return;
      }
      const marks = this.marks().map(({ id, label, at, covariance, trace, order }) => ({
        id,
        label,
        at,
        covariance,
        trace,
        order,
      }));
      void this.engine
        .ask({ kind: 'station', document, marks, stationId, ...this.asked() })
        .then((reply) => {
          if (reply !== null) this.reply.set(reply);
        });
    });
  }
}
