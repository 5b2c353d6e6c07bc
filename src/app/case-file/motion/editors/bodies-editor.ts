import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { ReconstructionBody } from '#shared/engine/documents/reconstruction';
import { addBody, freeKey, numberedKey, putBody, removeBody } from '../document-edits';
import { Draft } from '../draft';
import { Place } from '../place';
import { Faults } from './faults';
import { BodyPointEditor } from './body-point-editor';
import { OutlineEditor } from './outline-editor';
import { WordsField } from './words-field';

/** The rigid bodies and their named points. */
@Component({
  selector: 'app-bodies-editor',
  imports: [BodyPointEditor, MatButton, OutlineEditor, WordsField],
  templateUrl: './bodies-editor.html',
  styleUrl: './panel.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class BodiesEditor {
  private readonly draft = inject(Draft);
  private readonly place = inject(Place);
  protected readonly faults = inject(Faults);

  protected readonly bodies = computed(() => this.draft.document()?.bodies ?? []);
  /** "body" or "body.point". */
  protected readonly chosenBody = computed(() => this.place.item()?.split('.')[0] ?? null);
  protected readonly chosenPoint = computed(() => this.place.item()?.split('.')[1] ?? null);

  protected choose(body: string | null, point?: string): void {
    this.place.go({ item: point === undefined || body === null ? body : `${body}.${point}` });
  }

  protected add(): void {
    const taken = this.bodies().map((body) => body.id);
    const number = this.bodies().length + 1;
    const id = freeKey(`body${number}`, taken, 'body');
    this.draft.edit(addBody({ id, name: `Body ${number}`, points: [], outline: [] }));
    this.choose(id);
  }

  protected put(body: ReconstructionBody, part: Partial<ReconstructionBody>): void {
    this.draft.edit(putBody({ ...body, ...part }), `body ${body.id} ${Object.keys(part).join()}`);
  }

  protected remove(id: string): void {
    this.draft.edit(removeBody(id));
    this.choose(null);
  }

  protected addPoint(body: ReconstructionBody): void {
    const id = numberedKey(
      'P',
      body.points.map((point) => point.id),
    );
    const point = { id, name: `Point ${id}`, at: [0, 0], sigma: [0.01, 0.01] } as const;
    this.put(body, {
      points: [...body.points, { ...point, at: [...point.at], sigma: [...point.sigma] }],
    });
    this.choose(body.id, id);
  }
}
