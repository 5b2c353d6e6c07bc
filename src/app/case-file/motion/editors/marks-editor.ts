import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatCheckbox } from '@angular/material/checkbox';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatSelectModule } from '@angular/material/select';
import type { MarkAssignment } from '#shared/engine/documents/reconstruction';
import { assignMark, releaseMark } from '../document-edits';
import { Draft } from '../draft';
import { namesIn } from '../names';
import { Place } from '../place';
import { Preferences } from '../preferences';
import { WhatIf } from '../what-if';
import { Workbench } from '../workbench';
import { Faults } from './faults';
import { PointSelect } from './point-select';
import { QuantityField } from './quantity-field';

/** Which point of which body made which mark at the station, and what the mark tells. */
@Component({
  selector: 'app-marks-editor',
  imports: [
    MatButton,
    MatCheckbox,
    MatFormFieldModule,
    MatSelectModule,
    PointSelect,
    QuantityField,
  ],
  templateUrl: './marks-editor.html',
  styleUrl: './panel.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class MarksEditor {
  private readonly draft = inject(Draft);
  private readonly place = inject(Place);
  private readonly faults = inject(Faults);
  protected readonly workbench = inject(Workbench);
  protected readonly whatIf = inject(WhatIf);
  protected readonly preferences = inject(Preferences);

  protected readonly marks = this.workbench.marks;
  protected readonly chosen = computed(
    () => this.marks().find((mark) => mark.id === this.place.mark()) ?? null,
  );
  protected readonly assignment = computed(
    () => this.workbench.station()?.marks.find((one) => one.markId === this.place.mark()) ?? null,
  );
  protected readonly assigned = computed(() => {
    const names = namesIn(this.draft.document());
    const labels = new Map(this.marks().map((mark) => [mark.id, mark.label]));
    return (this.workbench.station()?.marks ?? []).map((one) => ({
      id: one.markId,
      label: labels.get(one.markId) ?? 'a mark that was withdrawn',
      point: names.point(one),
      tells: [one.position ? 'position' : '', one.direction ? 'direction' : '']
        .filter((word) => word !== '')
        .join(', '),
    }));
  });
  protected readonly moved = computed(() => {
    const mark = this.chosen();
    return mark === null ? null : (this.whatIf.places().get(mark.id) ?? null);
  });
  protected readonly fault = computed(() => {
    const mark = this.chosen();
    if (mark === null) return undefined;
    return this.faults.at(`stations.${this.workbench.stationId() ?? ''}.marks.${mark.id}`);
  });

  protected choose(id: string | null): void {
    this.place.go({ mark: id });
  }

  protected madeBy(ref: { body: string; point: string } | null): void {
    if (ref !== null) this.put({ body: ref.body, point: ref.point });
  }

  protected put(part: Partial<MarkAssignment>): void {
    const station = this.workbench.stationId();
    const mark = this.chosen();
    if (station === null || mark === null) return;
    const before = this.assignment() ?? {
      markId: mark.id,
      body: '',
      point: '',
      position: true,
      direction: false,
    };
    this.draft.edit(assignMark(station, { ...before, ...part }));
  }

  protected release(): void {
    const mark = this.chosen();
    const station = this.workbench.stationId();
    if (mark !== null && station !== null) this.draft.edit(releaseMark(station, mark.id));
  }

  protected move(axis: 0 | 1, value: number | null): void {
    const mark = this.chosen();
    if (mark === null || value === null) return;
    const at = this.moved() ?? mark.at;
    if (at[axis] === value) return;
    this.whatIf.move(mark.id, axis === 0 ? [value, at[1]] : [at[0], value]);
  }
}
