import { ChangeDetectionStrategy, Component, computed, inject, input, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink } from '@angular/router';
import { type Exhibit } from '#shared/contracts/exhibits';
import { Messages } from '../../core/messages/messages';
import { Session } from '../../core/session/session';
import { Dialogs } from '../../ui/confirm-dialog/dialogs';
import { showMoment } from '../../ui/dates/dates';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { Icon } from '../../ui/icon/icon';
import { CurrentCase } from '../current-case';
import type { AnswerRequest } from '../custody/answer-dialog';
import { isOverdue } from '../custody/event-words';
import type { CustodyRequest } from '../custody/hand-over-dialog';
import type { EditRequest } from './edit-dialog';
import { ExhibitFileCard } from './exhibit-file';
import { FileDrop } from './file-drop';

/** One exhibit: what it is, where it is and who answers for it, and its files. */
@Component({
  selector: 'app-exhibit-detail',
  imports: [EmptyState, ExhibitFileCard, FileDrop, Icon, MatButton, RouterLink],
  templateUrl: './exhibit-detail.html',
  styleUrl: './exhibit-detail.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ExhibitDetail {
  private readonly dialogs = inject(Dialogs);
  private readonly messages = inject(Messages);
  private readonly session = inject(Session);
  protected readonly current = inject(CurrentCase);

  readonly exhibit = input.required<Exhibit>();
  readonly changed = output();

  private readonly own = computed(() => this.session.account()?.id ?? '');
  protected readonly holds = computed(() => this.exhibit().custody.holderId === this.own());
  protected readonly pending = computed(() => this.exhibit().custody.pending);
  protected readonly mayAnswer = computed(() => this.pending()?.toId === this.own());
  protected readonly overdue = computed(() => {
    const pending = this.pending();
    return pending !== null && isOverdue(pending.offeredAt, Date.now());
  });
  protected readonly whereabouts = computed(() => {
    const { location, sealNumber } = this.exhibit().custody;
    const place = location === '' ? '' : `, ${location}`;
    return sealNumber === '' ? `${place}; not sealed.` : `${place}; sealed with ${sealNumber}.`;
  });
  protected readonly facts = computed(() => {
    const exhibit = this.exhibit();
    return [
      { name: 'Kind', value: exhibit.kind },
      { name: 'From', value: exhibit.source },
      { name: 'Collected', value: collected(exhibit) },
      { name: 'Condition as received', value: exhibit.condition },
      { name: 'Packaging', value: exhibit.packaging },
      { name: 'Seal as received', value: exhibit.sealNumber },
      { name: 'Taken from', value: exhibit.parentNumber ?? '' },
      { name: 'Registered', value: showMoment(exhibit.registeredAt) },
    ].filter(({ value }) => value !== '');
  });
  protected readonly showMoment = showMoment;

  protected async handOver(): Promise<void> {
    await this.act(
      async () => (await import('../custody/hand-over-dialog')).HandOverDialog,
      this.request(),
      `${this.exhibit().number} is offered; you hold it until it is accepted.`,
    );
  }

  protected async record(): Promise<void> {
    await this.act(
      async () => (await import('../custody/record-dialog')).RecordDialog,
      this.request(),
      'It is in the ledger.',
    );
  }

  protected async answer(answer: AnswerRequest['answer']): Promise<void> {
    const pending = this.pending();
    if (pending === null) return;
    const request: AnswerRequest = { ...this.request(), pending, answer };
    await this.act(
      async () => (await import('../custody/answer-dialog')).AnswerDialog,
      request,
      answer === 'accept' ? `You hold ${this.exhibit().number} now.` : 'It is in the ledger.',
    );
  }

  protected async edit(): Promise<void> {
    await this.act(
      async () => (await import('./edit-dialog')).EditDialog,
      this.request() satisfies EditRequest,
      'The change is in the ledger; the earlier words stay readable there.',
    );
  }

  private request(): CustodyRequest {
    return { caseId: this.current.id(), exhibit: this.exhibit() };
  }

  private async act(
    load: Parameters<Dialogs['open']>[0],
    request: CustodyRequest,
    done: string,
  ): Promise<void> {
    const result = await this.dialogs.open<unknown>(load, request);
    if (result === undefined || result === '') return;
    this.messages.done(done);
    this.changed.emit();
  }
}

function collected({ collectedAt, collectedBy, collectedPlace }: Exhibit): string {
  return [
    collectedAt === null ? '' : showMoment(collectedAt),
    collectedBy === '' ? '' : `by ${collectedBy}`,
    collectedPlace,
  ]
    .filter((part) => part !== '')
    .join(', ');
}
