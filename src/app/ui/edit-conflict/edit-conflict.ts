import {
  afterNextRender,
  ChangeDetectionStrategy,
  Component,
  computed,
  ElementRef,
  inject,
  input,
  linkedSignal,
  output,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatRadioModule } from '@angular/material/radio';
import { Icon } from '../icon/icon';

export interface Difference<Key extends string = string> {
  readonly key: Key;
  readonly label: string;
  readonly mine: string;
  readonly theirs: string;
}

/**
 * Somebody else saved while this person was editing: each field that both changed is shown twice,
 * and the person chooses. Nothing is merged silently.
 */
@Component({
  selector: 'ui-edit-conflict',
  imports: [Icon, MatButton, MatRadioModule],
  templateUrl: './edit-conflict.html',
  styleUrl: './edit-conflict.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { role: 'alert', tabindex: '-1' },
})
export class EditConflict<Key extends string> {
  /** What was edited: "brief". */
  readonly what = input.required<string>();
  readonly differences = input.required<readonly Difference<Key>[]>();
  /** Keys of the fields where the person's own version is kept. */
  readonly settled = output<readonly Key[]>();
  readonly cancelled = output();

  /** Chosen so far, by key. */
  private readonly choices = linkedSignal<readonly Difference<Key>[], ReadonlyMap<Key, boolean>>({
    source: this.differences,
    computation: () => new Map(),
  });
  protected readonly isComplete = computed(() =>
    this.differences().every((difference) => this.choices().has(difference.key)),
  );

  constructor() {
    const host = inject<ElementRef<HTMLElement>>(ElementRef).nativeElement;
    // The form may be long: the question must not stand above what is in view.
    afterNextRender(() => host.focus());
  }

  protected choose(key: Key, mine: boolean): void {
    this.choices.update((choices) => new Map(choices).set(key, mine));
  }

  protected settle(): void {
    const kept = [...this.choices()].filter(([, mine]) => mine).map(([key]) => key);
    this.settled.emit(kept);
  }
}
