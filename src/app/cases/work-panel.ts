import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { RouterLink } from '@angular/router';
import type { CaseSummary } from '#shared/contracts/cases';
import { Clock } from '../core/clock';
import { slackOf, workInHand } from './workload';

/** Beside the case list of the lead: who has how much, what waits, what presses. */
@Component({
  selector: 'app-work-panel',
  imports: [RouterLink],
  templateUrl: './work-panel.html',
  styleUrl: './work-panel.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class WorkPanel {
  private readonly clock = inject(Clock);

  readonly cases = input.required<readonly CaseSummary[]>();
  readonly unassigned = input.required<number>();
  readonly pressing = input.required<number>();

  protected readonly loads = computed(() => workInHand(this.cases()));
  protected readonly inReview = computed(() =>
    this.cases()
      .filter((item) => item.stage === 'in-technical-review')
      .map((item) => ({ ...item, slack: slackOf(item, this.clock.today()) })),
  );
}
