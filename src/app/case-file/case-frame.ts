import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { RouterLink, RouterLinkActive, RouterOutlet } from '@angular/router';
import { ProblemMessage } from '../ui/problem-message/problem-message';
import { CurrentCase } from './current-case';
import { DueDate } from '../ui/due-date/due-date';
import { Stage } from '../ui/stage/stage';

interface Section {
  readonly path: string;
  readonly name: string;
  readonly count: number | null;
}

/** The case file: its heading, its sections, and the caution at its foot. */
@Component({
  selector: 'app-case-frame',
  imports: [DueDate, ProblemMessage, RouterLink, RouterLinkActive, RouterOutlet, Stage],
  templateUrl: './case-frame.html',
  styleUrl: './case-frame.scss',
  providers: [CurrentCase],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class CaseFrame {
  protected readonly current = inject(CurrentCase);

  protected readonly sections = computed<Section[]>(() => {
    const counts = this.current.loaded()?.counts;
    return [
      { path: 'brief', name: 'Brief', count: null },
      { path: 'exhibits', name: 'Exhibits', count: counts?.exhibits ?? null },
      { path: 'custody', name: 'Custody', count: null },
      { path: 'survey', name: 'Survey', count: counts?.marks ?? null },
      { path: 'motion', name: 'Motion', count: counts?.computations ?? null },
      { path: 'findings', name: 'Findings', count: null },
      { path: 'disclosure', name: 'Disclosure', count: counts?.releases ?? null },
      { path: 'log', name: 'Log', count: null },
    ];
  });
}
