import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  resource,
  signal,
  viewChild,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { type LoggedEvent, type Note, listEvents, listNotes } from '#shared/contracts/log';
import { Api } from '../../core/api/api';
import { ApiProblem } from '../../core/api/api-problem';
import { Messages } from '../../core/messages/messages';
import type { HoldsWork } from '../../core/unsaved-work';
import { showExactMoment, showMoment } from '../../ui/dates/dates';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { Icon } from '../../ui/icon/icon';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { CurrentCase } from '../current-case';
import { NoteForm } from './note-form';

const eventsAtOnce = 50;

/** Notes, which are never changed, and every recorded event of the case. */
@Component({
  selector: 'app-log',
  imports: [EmptyState, Icon, MatButton, NoteForm, ProblemMessage],
  templateUrl: './log.html',
  styleUrl: './log.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Log implements HoldsWork {
  private readonly api = inject(Api);
  private readonly messages = inject(Messages);
  protected readonly current = inject(CurrentCase);
  private readonly form = viewChild(NoteForm);

  private readonly noteReading = resource({
    params: () => this.current.id(),
    loader: ({ params: caseId, abortSignal: abort }) =>
      this.api.call(listNotes, { params: { caseId }, abort }),
  });
  private readonly eventReading = resource({
    params: () => this.current.id(),
    loader: ({ params: caseId, abortSignal: abort }) =>
      this.api.call(listEvents, { params: { caseId }, query: { limit: eventsAtOnce }, abort }),
  });
  /** Newest first: what was just written is at the top, as in the list of events. */
  protected readonly notes = computed(() => {
    if (!this.noteReading.hasValue()) return null;
    const { items } = this.noteReading.value();
    return [...items]
      .sort((a, b) => b.number - a.number)
      .map((note) => ({
        ...note,
        correctedBy: items.filter((other) => other.correctsNumber === note.number),
      }));
  });
  protected readonly events = computed(() =>
    this.eventReading.hasValue() ? this.eventReading.value() : null,
  );
  protected readonly noteProblem = computed(() => problemOf(this.noteReading.error()));
  protected readonly eventProblem = computed(() => problemOf(this.eventReading.error()));
  protected readonly loadingMore = signal(false);

  /** The note form is open; with a number, to correct that note. */
  protected readonly writing = signal<{ readonly corrects: number | null } | null>(null);
  protected readonly showMoment = showMoment;
  protected readonly showExactMoment = showExactMoment;

  hasUnsavedWork(): boolean {
    return this.form()?.isChanged() ?? false;
  }

  protected written(note: Note): void {
    this.noteReading.update((list) => ({ items: [...(list?.items ?? []), note] }));
    this.writing.set(null);
    this.eventReading.reload();
  }

  protected reload(): void {
    this.noteReading.reload();
    this.eventReading.reload();
  }

  protected async loadMore(after: string): Promise<void> {
    this.loadingMore.set(true);
    try {
      const more = await this.api.call(listEvents, {
        params: { caseId: this.current.id() },
        query: { after, limit: eventsAtOnce },
      });
      this.eventReading.update((list) => ({
        items: [...(list?.items ?? []), ...more.items],
        next: more.next,
      }));
    } catch (error) {
      this.messages.fault(error);
    } finally {
      this.loadingMore.set(false);
    }
  }

  protected subjectOf({ subject, detail }: LoggedEvent): string {
    return [subject, detail].filter(Boolean).join(' · ');
  }
}

const problemOf = (error: Error | undefined): ApiProblem | null =>
  error === undefined ? null : ApiProblem.from(error);
