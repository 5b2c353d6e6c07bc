import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  input,
  linkedSignal,
} from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { BodyPoint, ReconstructionBody } from '#shared/engine/documents/reconstruction';
import { key } from '#shared/engine/documents/reconstruction';
import { putBody, removePoint, renamePoint } from '../document-edits';
import { Draft } from '../draft';
import { Place } from '../place';
import { Preferences } from '../preferences';
import { Faults } from './faults';
import { QuantityField } from './quantity-field';
import { WordsField } from './words-field';

/** One named point: its place on the body and how well that is known. */
@Component({
  selector: 'app-body-point-editor',
  imports: [MatButton, QuantityField, WordsField],
  template: `
    <div class="form">
      @if (fault(); as text) {
        <p class="fault" role="status">{{ text }}</p>
      }
      <app-words-field
        label="Name of the point"
        [most]="80"
        [value]="point().name"
        (valueChange)="put({ name: $event })"
      />
      <app-words-field
        label="Short name, used in the equations"
        [most]="40"
        [value]="shortName()"
        (valueChange)="rename($event)"
        [fault]="shortNameFault()"
      />
      <div class="pair">
        @for (axis of axes; track axis.name) {
          <app-quantity-field
            [label]="axis.name"
            dimension="length"
            [unit]="preferences.lengthUnit()"
            [value]="point().at[axis.index]"
            (valueChange)="putAt(axis.index, $event)"
          />
          <app-quantity-field
            [label]="'± ' + axis.short + ' (standard)'"
            dimension="length"
            [unit]="preferences.lengthUnit()"
            sign="not-negative"
            [value]="point().sigma[axis.index]"
            (valueChange)="putSigma(axis.index, $event)"
          />
        }
      </div>
      <p class="note">An uncertainty of 0 states the place as exact.</p>
      <div class="actions">
        <button matButton type="button" (click)="remove()">Remove {{ point().name }}</button>
      </div>
    </div>
  `,
  styleUrl: './panel.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class BodyPointEditor {
  private readonly draft = inject(Draft);
  private readonly place = inject(Place);
  private readonly faults = inject(Faults);
  protected readonly preferences = inject(Preferences);

  readonly body = input.required<ReconstructionBody>();
  readonly point = input.required<BodyPoint>();

  protected readonly axes = [
    { index: 0, name: 'x forward', short: 'x' },
    { index: 1, name: 'y to the left', short: 'y' },
  ] as const;
  /** As typed: it becomes the key when it can be one and no other point has it. */
  protected readonly shortName = linkedSignal(() => this.point().id);
  protected readonly shortNameFault = computed(() => {
    const text = this.shortName();
    if (text === this.point().id) return undefined;
    if (this.body().points.some((point) => point.id === text)) {
      return 'Another point of this body has this short name.';
    }
    return key.safeParse(text).error?.issues[0].message;
  });
  protected readonly fault = computed(() =>
    this.faults.at(`bodies.${this.body().id}.points.${this.point().id}`),
  );

  protected put(part: Partial<BodyPoint>): void {
    const { id } = this.point();
    const body = this.body();
    const points = body.points.map((one) => (one.id === id ? { ...one, ...part } : one));
    this.draft.edit(
      putBody({ ...body, points }),
      `point ${body.id} ${id} ${Object.keys(part).join()}`,
    );
  }

  protected putAt(index: 0 | 1, value: number | null): void {
    this.put({ at: withPart(this.point().at, index, value) });
  }

  protected putSigma(index: 0 | 1, value: number | null): void {
    this.put({ sigma: withPart(this.point().sigma, index, value) });
  }

  protected rename(text: string): void {
    this.shortName.set(text);
    if (this.shortNameFault() !== undefined || text === this.point().id) return;
    const { id } = this.body();
    this.draft.edit(renamePoint(id, this.point().id, text));
    this.place.go({ item: `${id}.${text}` });
  }

  protected remove(): void {
    this.draft.edit(removePoint(this.body().id, this.point().id));
    this.place.go({ item: this.body().id });
  }
}

function withPart(
  pair: readonly [number, number],
  index: 0 | 1,
  value: number | null,
): [number, number] {
  const part = value ?? 0;
  return index === 0 ? [part, pair[1]] : [pair[0], part];
}
