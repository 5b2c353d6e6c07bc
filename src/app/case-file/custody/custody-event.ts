import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { RouterLink } from '@angular/router';
import type { LedgerEntry } from '#shared/contracts/custody';
import { showExactMoment } from '../../ui/dates/dates';
import { Icon } from '../../ui/icon/icon';
import { sizeText } from '../../ui/size/size-text';
import { factsOf, latenessOf, sentenceOf } from './event-words';

/** One event on the time line: its number and time at the left, what happened at the right. */
@Component({
  selector: 'app-custody-event',
  imports: [Icon, RouterLink],
  template: `
    <div class="when">
      <span class="sequence">{{ event().sequence }}</span>
      <time class="muted small" [attr.datetime]="event().recordedAt">{{
        showExactMoment(event().recordedAt)
      }}</time>
    </div>
    <div class="what">
      <p class="sentence">
        @if (named() && event().exhibit; as number) {
          <a class="mono" routerLink="." [queryParams]="{ exhibit: number }">{{ number }}</a>
        }
        <b>{{ sentence() }}</b>
        <span class="muted small">recorded by {{ event().recordedBy.name }}</span>
      </p>
      @if (lateness(); as text) {
        <p class="late small">{{ text }}</p>
      }
      @if (facts().length > 0) {
        <dl>
          @for (fact of facts(); track fact.name) {
            <div>
              <dt>{{ fact.name }}</dt>
              <dd>{{ fact.value }}</dd>
            </div>
          }
        </dl>
      }
      @for (file of event().files; track file.sha256) {
        <p class="small hash">
          {{ sizeText(file.size) }}, SHA-256 <code>{{ file.sha256 }}</code>
        </p>
      }
      @if (correctedBy(); as sequence) {
        <p class="late small">Corrected by event {{ sequence }}; both stay on record.</p>
      }
      @if (faulty()) {
        <p class="fault small"><ui-icon name="fault" /> The check names this event, see above.</p>
      }
    </div>
  `,
  styleUrl: './custody-event.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class CustodyEvent {
  readonly entry = input.required<LedgerEntry>();
  /** Several exhibits are shown together: each event says which it is about. */
  readonly named = input(false);
  readonly correctedBy = input<number | null>(null);
  readonly faulty = input(false);

  protected readonly event = computed(() => this.entry().event);
  protected readonly sentence = computed(() => sentenceOf(this.event()));
  protected readonly facts = computed(() => factsOf(this.event()));
  protected readonly lateness = computed(() => latenessOf(this.event()));
  protected readonly showExactMoment = showExactMoment;
  protected readonly sizeText = sizeText;
}
