import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { MatCheckbox } from '@angular/material/checkbox';
import type { ReconstructionBody, Station } from '#shared/engine/documents/reconstruction';
import { putStation } from '../document-edits';
import { Draft } from '../draft';
import { Preferences } from '../preferences';
import { UncertainField } from './uncertain-field';
import { WordsField } from './words-field';

type StatedPose = Station['poses'][number];

/** A pose that is stated instead of fitted to marks: a drawing of a machine, a point of rest on a plan. */
@Component({
  selector: 'app-stated-pose-editor',
  imports: [MatCheckbox, UncertainField, WordsField],
  template: `
    <fieldset>
      <mat-checkbox [checked]="pose() !== null" (change)="state($event.checked)">
        The pose of {{ body().name }} is stated, not fitted to marks
      </mat-checkbox>
      @if (pose(); as stated) {
        <app-uncertain-field
          label="x of its origin"
          dimension="length"
          [unit]="preferences.lengthUnit()"
          [usual]="0.02"
          [value]="stated.x"
          (valueChange)="put({ x: $event })"
        />
        <app-uncertain-field
          label="y of its origin"
          dimension="length"
          [unit]="preferences.lengthUnit()"
          [usual]="0.02"
          [value]="stated.y"
          (valueChange)="put({ y: $event })"
        />
        <app-uncertain-field
          label="Heading, counter-clockwise from +x"
          dimension="angle"
          unit="°"
          [usual]="0.01"
          [value]="stated.heading"
          (valueChange)="put({ heading: $event })"
        />
        <app-words-field
          label="Why it may be taken so"
          long
          [most]="1000"
          [value]="stated.basis"
          (valueChange)="put({ basis: $event })"
        />
      }
    </fieldset>
  `,
  styleUrl: './panel.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class StatedPoseEditor {
  private readonly draft = inject(Draft);
  protected readonly preferences = inject(Preferences);

  readonly station = input.required<Station>();
  readonly body = input.required<ReconstructionBody>();

  protected readonly pose = computed(
    () => this.station().poses.find((pose) => pose.body === this.body().id) ?? null,
  );

  protected state(stated: boolean): void {
    const others = this.station().poses.filter((pose) => pose.body !== this.body().id);
    const exact = { value: 0, sigma: 0 };
    const fresh = { body: this.body().id, x: exact, y: exact, heading: exact, basis: '' };
    this.save(stated ? [...others, fresh] : others);
  }

  protected put(part: Partial<StatedPose>): void {
    this.save(
      this.station().poses.map((pose) =>
        pose.body === this.body().id ? { ...pose, ...part } : pose,
      ),
      Object.keys(part).join(),
    );
  }

  private save(poses: StatedPose[], part?: string): void {
    const station = this.station();
    this.draft.edit(
      putStation({ ...station, poses }),
      part === undefined ? null : `pose ${station.id} ${this.body().id} ${part}`,
    );
  }
}
