import { ChangeDetectionStrategy, Component, inject } from '@angular/core';
import { Place } from './place';
import { Workbench } from './workbench';

/** The stations of the motion under the plan, in their order; one is on the table. */
@Component({
  selector: 'app-station-strip',
  template: `
    <ol aria-label="Stations">
      @for (station of workbench.stations(); track station.id) {
        <li>
          <button
            type="button"
            [attr.aria-current]="station.id === workbench.stationId() ? 'step' : null"
            (click)="place.go({ station: station.id })"
          >
            <strong>{{ station.id }}</strong> {{ station.name }}
            <small>
              {{ count(station.marks.length, 'mark') }}, {{ count(station.knowns.length, 'known') }}
            </small>
          </button>
        </li>
      }
    </ol>
  `,
  styles: `
    :host {
      display: block;
      overflow-x: auto;
      scrollbar-width: thin;
    }
    ol {
      display: flex;
      gap: 8px;
      margin: 0;
      padding: 8px 12px;
      list-style: none;
    }
    li {
      flex: 1 0 112px;
      max-width: 220px;
    }
    button {
      width: 100%;
      height: 100%;
      padding: 5px 4px;
      border: 0;
      border-top: 3px solid var(--line);
      background: none;
      color: var(--ink);
      font: inherit;
      font-size: 14px;
      line-height: 1.3;
      text-align: left;
      cursor: pointer;
    }
    button:hover {
      border-top-color: var(--edge);
    }
    button[aria-current] {
      border-top-color: var(--spruce);
    }
    small {
      display: block;
      color: var(--muted);
      font-size: 12.5px;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class StationStrip {
  protected readonly workbench = inject(Workbench);
  protected readonly place = inject(Place);

  protected count(number: number, word: string): string {
    return `${number} ${word}${number === 1 ? '' : 's'}`;
  }
}
