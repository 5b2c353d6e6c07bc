import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  signal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { readComputation } from '#shared/contracts/motion';
import { computation } from '#shared/engine/documents/computation';
import type { ReconstructionDocument } from '#shared/engine/documents/reconstruction';
import { stationAnswer, stationProblem } from '#shared/engine/documents/station';
import { address } from '../../../core/api/address';
import { showMoment } from '../../../ui/dates/dates';
import { ProblemMessage } from '../../../ui/problem-message/problem-message';
import { CurrentCase } from '../../current-case';
import { LiveAnswer } from '../live-answer';
import { LiveEngine } from '../live-engine';
import type { LiveData, LiveReply } from '../live-messages';
import { refOf } from '../names';
import { Place } from '../place';
import { SheetBody } from '../sheet/sheet-body';
import { Traces } from '../sheet/traces';
import { Workbench } from '../workbench';
import { CompareTable } from './compare-table';
import { Records } from './records';

/** A recorded computation, read-only, and beside it what the same station says now. */
@Component({
  selector: 'app-recorded-sheet',
  imports: [CompareTable, MatButton, ProblemMessage, SheetBody],
  // An engine of its own: the live answer goes on beside it.
  providers: [LiveEngine, Traces],
  templateUrl: './recorded-sheet.html',
  styleUrl: '../sheet/calculation-sheet.scss',
  host: { role: 'region', 'aria-label': 'Recorded computation' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class RecordedSheet {
  private readonly current = inject(CurrentCase);
  private readonly engine = inject(LiveEngine);
  private readonly live = inject(LiveAnswer);
  private readonly workbench = inject(Workbench);
  private readonly place = inject(Place);
  protected readonly records = inject(Records);

  private readonly reply = signal<LiveReply | null>(null);

  protected readonly item = this.records.openItem;
  protected readonly recordedAt = computed(() => showMoment(this.item()?.recordedAt ?? ''));
  protected readonly link = computed(() => {
    const hash = this.place.computation();
    return hash === null ? '' : address(readComputation, { caseId: this.current.id(), hash });
  });
  /** Input and result of the recorded document; null while it loads or when it is of another kind. */
  protected readonly recorded = computed(() => {
    const document = computation.safeParse(this.records.document());
    if (!document.success) return null;
    const problem = stationProblem.safeParse(document.data.input);
    const answer = stationAnswer.safeParse(document.data.result);
    return problem.success && answer.success
      ? { engine: document.data.engine, problem: problem.data, answer: answer.data }
      : null;
  });
  protected readonly document = computed<ReconstructionDocument | null>(() => {
    const problem = this.recorded()?.problem;
    return problem === undefined
      ? null
      : {
          format: 'centrode.reconstruction/1',
          bodies: problem.bodies,
          joints: problem.joints,
          stations: [problem.station],
        };
  });
  protected readonly asked = computed(() => {
    const bodies = this.document()?.bodies ?? [];
    const wanted = refOf(this.place.point() ?? '');
    const body = bodies.find((one) => one.id === wanted.body);
    if (body?.points.some((point) => point.id === wanted.point) === true) return wanted;
    const first = bodies.find((one) => one.points.length > 0);
    return first === undefined ? null : { body: first.id, point: first.points[0].id };
  });
  protected readonly data = computed<LiveData | null>(() => {
    const reply = this.reply();
    return reply?.ok === true ? reply.data : null;
  });
  protected readonly standing = computed(() => {
    const data = this.data();
    if (data === null) return '';
    if (data.now === null) {
      return 'The alternative on the table has no such station any more.';
    }
    return data.now.sameInput
      ? 'The marks and the reconstruction are as they were when this was recorded.'
      : 'Superseded: the marks or the reconstruction changed since this was recorded.';
  });

  constructor() {
    effect(() => {
      const recorded = this.recorded();
      if (recorded === null) return;
      const { problem, answer } = recorded;
      const chosen = this.workbench.chosen();
      const document = chosen?.id === this.item()?.reconstructionId ? chosen?.document : undefined;
      void this.engine
        .ask({
          kind: 'recorded',
          problem,
          answer,
          now: document === undefined ? null : { document, marks: this.workbench.marks() },
          ...this.live.asked(),
          point: this.asked(),
        })
        .then((reply) => {
          if (reply !== null) this.reply.set(reply);
        });
    });
  }

  protected close(): void {
    this.records.open(null);
  }
}
