import { ChangeDetectionStrategy, Component, computed, inject, input } from '@angular/core';
import { MatCheckbox } from '@angular/material/checkbox';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatSelectModule } from '@angular/material/select';
import type { ReconstructionKnown } from '#shared/engine/documents/reconstruction';
import { bodyOfKnown, putKnown } from '../document-edits';
import { Draft } from '../draft';
import { Preferences } from '../preferences';
import { Faults } from './faults';
import {
  type Extent,
  type Quantity,
  extentNames,
  extentOf,
  extents,
  knownOf,
  quantities,
  quantityNames,
  quantityOf,
} from './known-kinds';
import { PointSelect } from './point-select';
import { UncertainField } from './uncertain-field';
import { WordsField } from './words-field';

/** One known of a station: what it speaks of, how much of it is known, how well, and on what basis. */
@Component({
  selector: 'app-known-form',
  imports: [
    MatCheckbox,
    MatFormFieldModule,
    MatSelectModule,
    PointSelect,
    UncertainField,
    WordsField,
  ],
  templateUrl: './known-form.html',
  styleUrl: './panel.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class KnownForm {
  private readonly draft = inject(Draft);
  private readonly faults = inject(Faults);
  protected readonly preferences = inject(Preferences);

  readonly stationId = input.required<string>();
  readonly known = input.required<ReconstructionKnown>();

  protected readonly quantities = quantities;
  protected readonly quantityNames = quantityNames;
  protected readonly extents = extents;
  protected readonly extentNames = extentNames;
  protected readonly quantity = computed(() => quantityOf(this.known()));
  protected readonly extent = computed(() => extentOf(this.known()));
  /** The known by its form: one number of a body, or a vector of a point in one of two ways. */
  protected readonly scalar = computed(() => {
    const known = this.known();
    return 'value' in known ? known : null;
  });
  protected readonly ofPoint = computed(() => {
    const known = this.known();
    return 'at' in known ? known : null;
  });
  protected readonly cartesian = computed(() => {
    const known = this.known();
    return 'x' in known ? known : null;
  });
  protected readonly polar = computed(() => {
    const known = this.known();
    return 'magnitude' in known ? known : null;
  });
  protected readonly bodies = computed(() => this.draft.document()?.bodies ?? []);
  protected readonly ofVelocity = computed(() => this.quantity() === 'velocity');
  protected readonly ofTurning = computed(() => this.quantity() === 'angular-velocity');

  /** What the engine or the schema says of this known, or of one part of it. */
  protected fault(part?: string): string | undefined {
    const path = `stations.${this.stationId()}.knowns.${this.known().id}`;
    return this.faults.at(part === undefined ? path : `${path}.${part}`);
  }

  protected speakOf(quantity: Quantity): void {
    this.remake(quantity, this.extent() ?? 'both');
  }

  protected extend(extent: Extent): void {
    this.remake(this.quantity(), extent);
  }

  private remake(quantity: Quantity, extent: Extent): void {
    const known = this.known();
    const body = bodyOfKnown(known);
    const first = this.bodies().find((one) => one.id === body)?.points[0];
    const at = 'at' in known ? known.at : { body, point: first?.id ?? '' };
    this.draft.edit(
      putKnown(this.stationId(), knownOf(quantity, extent, known.id, at, known.basis)),
    );
  }

  /** The parts are those of the known's own kind: the template offers no other. */
  protected put(part: Partial<ReconstructionKnown>): void {
    const known = { ...this.known(), ...part } as ReconstructionKnown;
    this.draft.edit(
      putKnown(this.stationId(), known),
      `known ${this.stationId()} ${known.id} ${Object.keys(part).join()}`,
    );
  }
}
