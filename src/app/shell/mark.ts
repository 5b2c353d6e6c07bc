import { ChangeDetectionStrategy, Component } from '@angular/core';

/** The mark of Centrode: a path, and the body whose instantaneous centre rolls along it. */
@Component({
  selector: 'app-mark',
  template: `
    <svg viewBox="0 0 24 24" aria-hidden="true" focusable="false">
      <path class="path" d="M4 21c.6-5 3-9.4 6.4-12.4S18 4 21 4" />
      <circle cx="9.6" cy="10.2" r="4.4" />
      <path d="M6.6 13.4 12.8 7" />
    </svg>
  `,
  styles: `
    :host {
      display: inline-flex;
      width: 22px;
      height: 22px;
    }
    svg {
      width: 100%;
      fill: none;
      stroke: var(--spruce);
      stroke-width: 2;
      stroke-linecap: round;
    }
    .path {
      stroke: var(--chalk);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Mark {}
