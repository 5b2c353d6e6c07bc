import { Injectable, computed, signal } from '@angular/core';

type Place = readonly [number, number];

/**
 * Marks moved for trial: the live answer takes them, nothing is saved and nothing is recorded with
 * them. What was measured is changed in the survey, with a reason.
 */
@Injectable()
export class WhatIf {
  private readonly moved = signal<ReadonlyMap<string, Place>>(new Map());

  readonly places = this.moved.asReadonly();
  readonly any = computed(() => this.moved().size > 0);

  move(markId: string, at: Place): void {
    this.moved.update((moved) => new Map(moved).set(markId, at));
  }

  putBack(markId: string): void {
    this.moved.update((moved) => new Map([...moved].filter(([id]) => id !== markId)));
  }

  putAllBack(): void {
    this.moved.set(new Map());
  }
}
