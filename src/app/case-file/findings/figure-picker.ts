import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  resource,
  signal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatCheckboxModule } from '@angular/material/checkbox';
import { MAT_DIALOG_DATA, MatDialogModule, MatDialogRef } from '@angular/material/dialog';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { MatSelectModule } from '@angular/material/select';
import {
  type ComputationSummary,
  listComputations,
  listReconstructions,
  readComputation,
} from '#shared/contracts/motion';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import { showMoment } from '../../ui/dates/dates';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { type SpeedUnit, figureText, rangeText, valueText } from '../../ui/figure/figure-text';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { type Candidate, candidatesOf, solutionIn } from './candidates';

export interface PickRequest {
  readonly caseId: string;
  readonly speedUnit: SpeedUnit;
  /** Keys of the figures that are chosen already. */
  readonly taken: readonly string[];
  /** How many more may be chosen. */
  readonly room: number;
}

/** Shows what a recorded computation fixes; the chosen figures go into the findings. */
@Component({
  selector: 'app-figure-picker',
  imports: [
    EmptyState,
    MatButton,
    MatCheckboxModule,
    MatDialogModule,
    MatFormFieldModule,
    MatInput,
    MatSelectModule,
    ProblemMessage,
  ],
  templateUrl: './figure-picker.html',
  styleUrl: './figure-picker.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class FigurePicker {
  private readonly api = inject(Api);
  private readonly dialog = inject<MatDialogRef<FigurePicker, readonly Candidate[]>>(MatDialogRef);
  protected readonly asked = inject<PickRequest>(MAT_DIALOG_DATA);

  private readonly listing = resource({
    loader: async ({ abortSignal: abort }) => {
      const params = { caseId: this.asked.caseId };
      const [computations, reconstructions] = await Promise.all([
        this.api.call(listComputations, { params, abort }),
        this.api.call(listReconstructions, { params, abort }),
      ]);
      return { computations: computations.items, reconstructions: reconstructions.items };
    },
  });
  protected readonly computations = computed(() =>
    this.listing.hasValue() ? this.listing.value().computations : null,
  );
  /** The newest computation is offered first. */
  private readonly opened = signal<string | null>(null);
  protected readonly hash = computed(() => this.opened() ?? this.computations()?.[0]?.hash ?? null);
  private readonly reading = resource({
    params: () => this.hash() ?? undefined,
    loader: ({ params: hash, abortSignal: abort }) =>
      this.api.call(readComputation, { params: { caseId: this.asked.caseId, hash }, abort }),
  });
  protected readonly problem = computed(() => {
    const error = this.listing.error() ?? this.reading.error();
    return error === undefined ? null : ApiProblem.from(error);
  });
  protected readonly loading = computed(() => this.listing.isLoading() || this.reading.isLoading());

  private readonly candidates = computed<Candidate[]>(() => {
    const computation = this.computations()?.find((one) => one.hash === this.hash());
    if (computation === undefined || !this.reading.hasValue()) return [];
    const solution = solutionIn(this.reading.value());
    return solution === null ? [] : candidatesOf(solution, computation, this.namesOf(computation));
  });
  protected readonly text = signal('');
  protected readonly rows = computed(() => {
    const words = this.text().toLowerCase().split(/\s+/).filter(Boolean);
    return this.candidates()
      .filter(({ title, pointName }) =>
        words.every((word) => `${title} ${pointName}`.toLowerCase().includes(word)),
      )
      .map((candidate) => {
        const { first } = figureText(candidate, this.asked.speedUnit);
        return {
          candidate,
          value: valueText(first),
          range: rangeText(first),
          taken: this.asked.taken.includes(candidate.key),
        };
      });
  });
  private readonly chosen = signal<readonly Candidate[]>([]);
  protected readonly count = computed(() => this.chosen().length);
  protected readonly isFull = computed(() => this.count() >= this.asked.room);

  protected open(hash: string): void {
    this.opened.set(hash);
  }

  protected nameOf(computation: ComputationSummary): string {
    const { reconstructionName, stationName, status, recordedAt } = computation;
    return `${reconstructionName}, ${stationName}, ${status}, ${showMoment(recordedAt)}`;
  }

  protected isChosen(candidate: Candidate): boolean {
    return this.chosen().some((one) => one.key === candidate.key);
  }

  protected choose(candidate: Candidate, on: boolean): void {
    this.chosen.update((chosen) => [
      ...chosen.filter((one) => one.key !== candidate.key),
      ...(on ? [candidate] : []),
    ]);
  }

  protected take(): void {
    this.dialog.close(this.chosen());
  }

  private namesOf(computation: ComputationSummary) {
    if (!this.listing.hasValue()) return null;
    const { reconstructions } = this.listing.value();
    return reconstructions.find((one) => one.id === computation.reconstructionId)?.document ?? null;
  }
}
