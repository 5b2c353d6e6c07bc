import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  ElementRef,
  inject,
  input,
  linkedSignal,
  output,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { Mark } from '#shared/contracts/survey';
import { MarkSymbol } from '../../ui/scale-plan/mark-symbol';
import { coordinate, placeInTrace, shortLength, sigmaOf } from './show-mark';

/** Rows that are made at once; more are a button away, so that a large survey opens at once. */
const batch = 200;

/** The marks as a dense table; its selection is the plan's. */
@Component({
  selector: 'app-mark-table',
  imports: [MarkSymbol, MatButton],
  templateUrl: './mark-table.html',
  styleUrl: './mark-table.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class MarkTable {
  private readonly element = inject<ElementRef<HTMLElement>>(ElementRef);

  readonly marks = input.required<readonly Mark[]>();
  readonly selected = input.required<string | null>();
  readonly chosen = output<string>();

  private readonly wanted = linkedSignal({ source: this.marks, computation: () => batch });
  private readonly selectedAt = computed(() =>
    this.marks().findIndex((mark) => mark.id === this.selected()),
  );
  protected readonly rows = computed(() =>
    this.marks().slice(0, Math.max(this.wanted(), this.selectedAt() + 1)),
  );
  protected readonly coordinate = coordinate;
  protected readonly placeInTrace = placeInTrace;

  constructor() {
    effect(() => {
      const id = this.selected();
      // After the row is made, and only as far as needed: the page itself stays where it is.
      if (id !== null)
        requestAnimationFrame(() => this.button(id)?.scrollIntoView?.({ block: 'nearest' }));
    });
  }

  protected sigma(mark: Mark): string {
    const [sx, sy] = sigmaOf(mark);
    const [x, y] = [shortLength(sx), shortLength(sy)];
    return x === y ? x : `${x}, ${y}`;
  }

  protected showMore(): void {
    this.wanted.update((rows) => rows + batch);
  }

  protected useKey(event: KeyboardEvent): void {
    const by = { ArrowDown: 1, ArrowUp: -1 }[event.key];
    if (by === undefined || event.ctrlKey || event.altKey || event.metaKey) return;
    const next = this.marks()[this.selectedAt() + by];
    event.preventDefault();
    if (next === undefined) return;
    this.chosen.emit(next.id);
    requestAnimationFrame(() => this.button(next.id)?.focus());
  }

  private button(id: string): HTMLElement | null {
    return this.element.nativeElement.querySelector(`[data-mark="${CSS.escape(id)}"]`);
  }
}
