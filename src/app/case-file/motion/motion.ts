import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  signal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { ApiProblem } from '../../core/api/api-problem';
import { Messages } from '../../core/messages/messages';
import type { HoldsWork } from '../../core/unsaved-work';
import { reconstruction } from '#shared/contracts/motion';
import { EditConflict } from '../../ui/edit-conflict/edit-conflict';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { Icon } from '../../ui/icon/icon';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { CurrentCase } from '../current-case';
import { differencesOf, settle } from './conflict';
import { Draft } from './draft';
import { Faults } from './editors/faults';
import { Panel } from './editors/panel';
import { UnreadFields } from './editors/unread-fields';
import { LiveAnswer } from './live-answer';
import { LiveEngine } from './live-engine';
import { type PanelName, Place } from './place';
import { PlanTable } from './plan-table';
import { Preferences } from './preferences';
import { Records } from './recorded/records';
import { RecordedSheet } from './recorded/recorded-sheet';
import { CalculationSheet } from './sheet/calculation-sheet';
import { StationStrip } from './station-strip';
import { WhatIf } from './what-if';
import { Workbench } from './workbench';

/** The workbench: plan and stations at the left, the calculation sheet at the right. */
@Component({
  selector: 'app-motion',
  imports: [
    CalculationSheet,
    EditConflict,
    EmptyState,
    Icon,
    MatButton,
    Panel,
    PlanTable,
    ProblemMessage,
    RecordedSheet,
    StationStrip,
  ],
  templateUrl: './motion.html',
  styleUrl: './motion.scss',
  providers: [
    Draft,
    Faults,
    LiveAnswer,
    LiveEngine,
    Place,
    Preferences,
    Records,
    UnreadFields,
    WhatIf,
    Workbench,
  ],
  host: { '(window:beforeunload)': 'warn($event)', '(keydown)': 'shortcut($event)' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Motion implements HoldsWork {
  protected readonly workbench = inject(Workbench);
  protected readonly draft = inject(Draft);
  protected readonly place = inject(Place);
  protected readonly records = inject(Records);
  protected readonly whatIf = inject(WhatIf);
  private readonly current = inject(CurrentCase);
  private readonly messages = inject(Messages);
  private readonly faults = inject(Faults);
  private readonly unread = inject(UnreadFields);

  protected readonly tools: readonly { readonly panel: PanelName; readonly name: string }[] = [
    { panel: 'bodies', name: 'Bodies' },
    { panel: 'joints', name: 'Joints' },
    { panel: 'stations', name: 'Stations' },
    { panel: 'marks', name: 'Marks' },
    { panel: 'knowns', name: 'Knowns' },
  ];
  protected readonly busy = signal(false);
  /** What somebody else saved while this draft was edited. */
  private readonly theirs = signal<ApiProblem | null>(null);
  protected readonly differences = computed(() => {
    const mine = this.draft.content();
    const other = this.other();
    return mine === null || other === null ? null : differencesOf(mine, other);
  });
  private readonly other = computed(() => {
    const parsed = reconstruction.safeParse(this.theirs()?.current);
    return parsed.success ? parsed.data : null;
  });
  /** Why the draft cannot be saved as it is; empty when it can. */
  protected readonly obstacle = computed(() => {
    if (this.unread.any()) return 'A field holds what cannot be read.';
    const [first] = this.faults.unsavable();
    return first === undefined ? '' : `Not complete: ${first}.`;
  });

  constructor() {
    // A mark moved for trial belongs to the look at one alternative, not to the next one.
    effect(() => {
      this.place.alternative();
      this.whatIf.putAllBack();
    });
  }

  hasUnsavedWork(): boolean {
    return this.draft.changed();
  }

  protected warn(event: Event): void {
    if (this.draft.changed()) event.preventDefault();
  }

  protected shortcut(event: KeyboardEvent): void {
    if (!(event.ctrlKey || event.metaKey) || event.altKey) return;
    if (event.key === 's') {
      event.preventDefault();
      if (this.draft.changed() && this.obstacle() === '') void this.save();
    }
  }

  protected toggle(panel: PanelName): void {
    this.place.go({ panel: this.place.panel() === panel ? null : panel, item: null });
  }

  protected async begin(): Promise<void> {
    await this.attempt(async () => {
      await this.workbench.begin({});
      this.place.go({ panel: 'bodies' });
    });
  }

  protected async save(): Promise<void> {
    await this.attempt(async () => {
      await this.workbench.save();
      this.messages.done('The reconstruction is saved.');
    });
  }

  protected async record(): Promise<void> {
    const station = this.workbench.stationId();
    if (station === null) return;
    await this.attempt(async () => {
      if (this.draft.changed()) await this.workbench.save();
      const made = await this.records.record(station);
      this.current.reload();
      this.records.open(made.hash);
      this.messages.done(`Recorded: ${made.stationId}, ${made.status}, ${made.hash.slice(0, 16)}.`);
    });
  }

  protected settled(keep: readonly string[]): void {
    const mine = this.draft.content();
    const other = this.other();
    if (mine === null || other === null) return;
    this.workbench.keep(other);
    this.draft.take(other);
    this.draft.change(settle(mine, other, keep));
    this.theirs.set(null);
  }

  protected leaveConflict(): void {
    this.theirs.set(null);
  }

  private async attempt(work: () => Promise<void>): Promise<void> {
    if (this.busy()) return;
    this.busy.set(true);
    try {
      await work();
    } catch (error) {
      const problem = ApiProblem.from(error);
      if (problem.status === 412) this.theirs.set(problem);
      else this.messages.fault(problem);
    } finally {
      this.busy.set(false);
    }
  }
}
