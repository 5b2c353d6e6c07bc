import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { ReconstructionKnown } from '#shared/engine/documents/reconstruction';
import { bodyOfKnown, numberedKey, putKnown, removeKnown } from '../document-edits';
import { Draft } from '../draft';
import { namesIn } from '../names';
import { Place } from '../place';
import { Workbench } from '../workbench';
import { KnownForm } from './known-form';
import { extentWords, knownOf, quantities, quantityOf } from './known-kinds';

/** What is known of the motion at the station, apart from marks. */
@Component({
  selector: 'app-knowns-editor',
  imports: [KnownForm, MatButton],
  template: `
    @if (workbench.station(); as station) {
      <p class="note">
        What is known of the motion at {{ station.id }} {{ station.name }}, with how well it is
        known.
      </p>
      <ul class="list">
        @for (known of station.knowns; track known.id) {
          <li>
            <button
              class="row"
              type="button"
              [attr.aria-expanded]="place.item() === known.id"
              (click)="choose(place.item() === known.id ? null : known.id)"
            >
              {{ known.id }} {{ speaksOf(known) }}
              <span class="end">{{ extent(known) }}</span>
            </button>
            @if (place.item() === known.id) {
              <app-known-form [stationId]="station.id" [known]="known" />
              <div class="actions form">
                <button matButton type="button" (click)="remove(known.id)">
                  Remove known {{ known.id }}
                </button>
              </div>
            }
          </li>
        }
      </ul>
      @if (firstPoint(); as point) {
        <div class="actions">
          <button matButton="outlined" type="button" (click)="add(point)">Add a known</button>
        </div>
      } @else {
        <p class="note">A known speaks of a point or a body: add a body with a point first.</p>
      }
    } @else {
      <p class="note">Knowns belong to a station: add a station first.</p>
    }
  `,
  styleUrl: './panel.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class KnownsEditor {
  private readonly draft = inject(Draft);
  protected readonly place = inject(Place);
  protected readonly workbench = inject(Workbench);

  protected readonly extent = extentWords;
  private readonly names = computed(() => namesIn(this.draft.document()));
  protected readonly firstPoint = computed(() => {
    const asked = this.workbench.asked();
    if (asked !== null) return asked;
    const body = this.draft.document()?.bodies.find((one) => one.points.length > 0);
    return body === undefined ? null : { body: body.id, point: body.points[0].id };
  });

  protected speaksOf(known: ReconstructionKnown): string {
    const of = 'at' in known ? this.names().point(known.at) : this.names().body(bodyOfKnown(known));
    return `${quantities[quantityOf(known)].split(' ')[0]}, ${of}`;
  }

  protected choose(id: string | null): void {
    this.place.go({ item: id });
  }

  protected add(at: { body: string; point: string }): void {
    const station = this.workbench.station();
    if (station === null) return;
    const id = numberedKey(
      'K',
      station.knowns.map((known) => known.id),
    );
    this.draft.edit(putKnown(station.id, knownOf('velocity', 'both', id, at, '')));
    this.choose(id);
  }

  protected remove(id: string): void {
    this.draft.edit(removeKnown(this.workbench.stationId() ?? '', id));
    this.choose(null);
  }
}
