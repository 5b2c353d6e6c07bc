import {
  booleanAttribute,
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
} from '@angular/core';
import { Clock } from '../../core/clock';
import { daysBetween, showDay } from '../dates/dates';

/** Few days are left when work could no longer be re-assigned without haste. */
const fewDays = 3;

/** When work is due and how many days are left; little or no time left is marked and said. */
@Component({
  selector: 'ui-due-date',
  template: `
    @if (slack(); as left) {
      <span [class.pressing]="left.pressing">
        @if (left.pressing) {
          <span aria-hidden="true">▲</span>
        }
        {{ left.text }}
      </span>
    } @else {
      <span class="muted">{{ words() ? 'no due date' : '–' }}</span>
    }
  `,
  styles: `
    :host {
      color: var(--muted);
      white-space: nowrap;
    }
    .pressing {
      color: var(--chalk);
      font-weight: 700;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class DueDate {
  private readonly clock = inject(Clock);

  readonly day = input.required<string | null>();
  /** The work is finished: no days are counted. */
  readonly done = input(false);
  /** "due 18 Dec, 17 days" instead of "17 d". */
  readonly words = input(false, { transform: booleanAttribute });

  protected readonly slack = computed(() => {
    const day = this.day();
    if (day === null) return null;
    const due = `due ${showDay(day)}`;
    if (this.done()) return this.words() ? { text: due, pressing: false } : null;
    const days = daysBetween(this.clock.today(), day);
    const count = Math.abs(days) === 1 ? '1 day' : `${Math.abs(days)} days`;
    const long = days < 0 ? `${due}, ${count} overdue` : `${due}, ${count}`;
    const short = days < 0 ? `${-days} d over` : `${days} d`;
    return { text: this.words() ? long : short, pressing: days < fewDays };
  });
}
