import { Injectable, computed, signal } from '@angular/core';

/** Fields whose text cannot be read: saving waits until each is put right. */
@Injectable()
export class UnreadFields {
  private readonly fields = signal<ReadonlySet<object>>(new Set());

  readonly any = computed(() => this.fields().size > 0);

  note(field: object, unread: boolean): void {
    if (this.fields().has(field) === unread) return;
    this.fields.update((before) => {
      const after = new Set(before);
      if (unread) after.add(field);
      else after.delete(field);
      return after;
    });
  }
}
