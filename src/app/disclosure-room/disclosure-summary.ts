import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  resource,
} from '@angular/core';
import { DOCUMENT } from '@angular/common';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { downloadDisclosure, readDisclosure } from '#shared/contracts/disclosure';
import { address } from '../core/api/address';
import { Api } from '../core/api/api';
import { ApiProblem } from '../core/api/api-problem';
import { showDay } from '../ui/dates/dates';
import { FigureTable } from '../ui/figure/figure-table';
import { Explained } from '../ui/glossary/explained';
import { Icon } from '../ui/icon/icon';
import { ProblemMessage } from '../ui/problem-message/problem-message';
import { sizeText } from '../ui/size/size-text';

/** One page for an attorney: answers, figures with ranges, what they rest on, what speaks against. */
@Component({
  selector: 'app-disclosure-summary',
  imports: [Explained, FigureTable, Icon, MatButton, ProblemMessage, RouterLink],
  templateUrl: './disclosure-summary.html',
  styleUrl: './disclosure-summary.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class DisclosureSummary {
  private readonly api = inject(Api);
  private readonly window = inject(DOCUMENT).defaultView;

  readonly releaseId = input.required<string>();

  private readonly reading = resource({
    params: () => this.releaseId(),
    loader: ({ params: releaseId, abortSignal: abort }) =>
      this.api.call(readDisclosure, { params: { releaseId }, abort }),
  });
  protected readonly disclosed = computed(() =>
    this.reading.hasValue() ? this.reading.value() : null,
  );
  protected readonly problem = computed(() => {
    const error = this.reading.error();
    return error === undefined ? null : ApiProblem.from(error);
  });
  protected readonly archiveAddress = computed(() =>
    address(downloadDisclosure, { releaseId: this.releaseId() }),
  );
  protected readonly size = computed(() => sizeText(this.disclosed()?.archive.size ?? null));
  protected readonly dayOf = (moment: string): string => showDay(moment.slice(0, 10));

  protected print(): void {
    this.window?.print();
  }

  protected reload(): void {
    this.reading.reload();
  }
}
