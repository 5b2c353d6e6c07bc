import { Injectable, computed, signal } from '@angular/core';
import type { Reconstruction } from '#shared/contracts/motion';
import {
  reconstructionDocument,
  type ReconstructionDocument,
} from '#shared/engine/documents/reconstruction';

/** What is edited of a reconstruction. */
export interface DraftContent {
  readonly name: string;
  readonly assumption: string;
  readonly document: ReconstructionDocument;
}

const mostSteps = 100;

/**
 * The reconstruction on the table: the saved version that it began from, and what was changed since.
 * Every change is one step that can be undone; nothing here reaches the server.
 */
@Injectable()
export class Draft {
  private readonly saved = signal<Reconstruction | null>(null);
  private readonly now = signal<DraftContent | null>(null);
  private readonly before = signal<readonly DraftContent[]>([]);
  private readonly after = signal<readonly DraftContent[]>([]);
  /** The thing that the last step changed: what is typed into one field is one step. */
  private lastThing: string | null = null;

  /** The version on the server that this draft began from. */
  readonly base = this.saved.asReadonly();
  readonly content = this.now.asReadonly();
  readonly document = computed(() => this.now()?.document ?? null);
  readonly changed = computed(() => {
    const base = this.saved();
    const content = this.now();
    return base !== null && content !== null && !same(content, base);
  });
  readonly canUndo = computed(() => this.before().length > 0);
  readonly canRedo = computed(() => this.after().length > 0);
  /** What keeps the draft from being saved, by field of the document. */
  readonly faults = computed(() => {
    const document = this.document();
    if (document === null) return new Map<string, string>();
    const checked = reconstructionDocument.safeParse(document);
    return new Map(
      checked.error?.issues.map((issue) => [issue.path.join('.'), issue.message]) ?? [],
    );
  });

  open(reconstruction: Reconstruction): void {
    this.saved.set(reconstruction);
    this.now.set(contentOf(reconstruction));
    this.before.set([]);
    this.after.set([]);
    this.lastThing = null;
  }

  close(): void {
    this.saved.set(null);
    this.now.set(null);
  }

  /** Saved: the draft now stands on this version. Steps can still be undone. */
  take(reconstruction: Reconstruction): void {
    this.saved.set(reconstruction);
  }

  /** Changes that name the same `thing` one after another are one step. */
  change(content: Partial<DraftContent>, thing: string | null = null): void {
    const now = this.now();
    if (now === null) return;
    const next = { ...now, ...content };
    if (same(next, now)) return;
    if (thing === null || thing !== this.lastThing || this.after().length > 0) {
      this.before.update((steps) => [...steps.slice(-mostSteps + 1), now]);
    }
    this.lastThing = thing;
    this.after.set([]);
    this.now.set(next);
  }

  edit(
    change: (document: ReconstructionDocument) => ReconstructionDocument,
    thing: string | null = null,
  ): void {
    const document = this.document();
    if (document !== null) this.change({ document: change(document) }, thing);
  }

  undo(): void {
    this.step(this.before, this.after);
  }

  redo(): void {
    this.step(this.after, this.before);
  }

  private step(from: typeof this.before, to: typeof this.before): void {
    const now = this.now();
    const target = from().at(-1);
    this.lastThing = null;
    if (now === null || target === undefined) return;
    from.update((steps) => steps.slice(0, -1));
    to.update((steps) => [...steps, now]);
    this.now.set(target);
  }
}

const contentOf = ({ name, assumption, document }: DraftContent): DraftContent => ({
  name,
  assumption,
  document,
});

const same = (a: DraftContent, b: DraftContent): boolean =>
  a === b || JSON.stringify(contentOf(a)) === JSON.stringify(contentOf(b));
