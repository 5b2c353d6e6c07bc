import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { MatCheckbox } from '@angular/material/checkbox';
import type { Station } from '#shared/engine/documents/reconstruction';
import {
  addStation,
  moveStation,
  newStation,
  numberedKey,
  putStation,
  removeStation,
} from '../document-edits';
import { Draft } from '../draft';
import { Place } from '../place';
import { Workbench } from '../workbench';
import { Faults } from './faults';
import { jointKinds } from './joint-kinds';
import { StatedPoseEditor } from './stated-pose-editor';
import { WordsField } from './words-field';

/** The instants of the motion that evidence fixes, in their order. */
@Component({
  selector: 'app-stations-editor',
  imports: [MatButton, MatCheckbox, StatedPoseEditor, WordsField],
  templateUrl: './stations-editor.html',
  styleUrl: './panel.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class StationsEditor {
  private readonly draft = inject(Draft);
  private readonly place = inject(Place);
  private readonly workbench = inject(Workbench);
  protected readonly faults = inject(Faults);

  protected readonly kinds = jointKinds;
  protected readonly stations = computed(() => this.draft.document()?.stations ?? []);
  protected readonly joints = computed(() => this.draft.document()?.joints ?? []);
  protected readonly bodies = computed(() => this.draft.document()?.bodies ?? []);
  protected readonly chosen = this.workbench.stationId;

  protected choose(id: string): void {
    this.place.go({ station: id });
  }

  protected add(): void {
    const id = numberedKey(
      'S',
      this.stations().map((station) => station.id),
    );
    this.draft.edit(addStation(newStation(id, `Station ${this.stations().length + 1}`)));
    this.choose(id);
  }

  protected put(station: Station, part: Partial<Station>): void {
    this.draft.edit(
      putStation({ ...station, ...part }),
      `station ${station.id} ${Object.keys(part).join()}`,
    );
  }

  protected move(id: string, by: -1 | 1): void {
    this.draft.edit(moveStation(id, by));
  }

  protected remove(id: string): void {
    this.draft.edit(removeStation(id));
    this.place.go({ station: null });
  }

  protected hold(station: Station, joint: string, holds: boolean): void {
    const off = station.joints.off.filter((one) => one !== joint);
    this.put(station, { joints: { off: holds ? off : [...off, joint] } });
  }
}
