import { ChangeDetectionStrategy, Component } from '@angular/core';

/** A drawing sheet: traces, three positions of a body, and the curve of its instantaneous centre. */
@Component({
  selector: 'app-sign-in-drawing',
  template: `
    <svg viewBox="0 0 800 700" preserveAspectRatio="xMidYMid slice" aria-hidden="true">
      <defs>
        <pattern id="sheet-grid" width="40" height="40" patternUnits="userSpaceOnUse">
          <path class="grid" d="M40 0H0V40" />
        </pattern>
      </defs>
      <rect width="800" height="700" fill="url(#sheet-grid)" />
      <path class="ground" d="M-20 700C170 600 430 560 620 330S760 60 780-20H980V720H-20Z" />
      <path class="edge" d="M-20 700C170 600 430 560 620 330S760 60 780-20" />
      <path class="trace" d="M40 610C220 560 380 500 500 350S610 150 640 90" />
      <path class="trace" d="M70 660C250 606 430 540 548 384S664 176 690 112" />
      <path class="centrode" d="M150 330C250 330 330 290 372 226S400 110 390 60" />
      <g class="body">
        <path d="M120 560l104-38 19 52-104 38z" />
        <path d="M404 428l77-79 40 39-77 79z" />
        <path d="M576 196l58-96 48 29-58 96z" />
      </g>
      <g class="ray">
        <path d="M372 226 462 408" />
        <path d="M372 226 521 388" />
      </g>
      <g class="pole">
        <circle cx="372" cy="226" r="9" />
        <circle class="dot" cx="372" cy="226" r="2.5" />
      </g>
      <g class="arrow">
        <path d="M462 408l66-36m-11-2 12 1-7 11" />
        <path d="M521 388l62-58m-12 2 13-3-3 13" />
      </g>
      <g class="mark">
        <path d="m-6-6 12 12m0-12-12 12" transform="translate(226 551)" />
        <path d="m-6-6 12 12m0-12-12 12" transform="translate(404 452)" />
        <path d="m-6-6 12 12m0-12-12 12" transform="translate(572 240)" />
        <path d="m-6-6 12 12m0-12-12 12" transform="translate(624 252)" />
        <path d="m-6-6 12 12m0-12-12 12" transform="translate(470 474)" />
      </g>
    </svg>
  `,
  styles: `
    svg {
      position: absolute;
      inset: 0;
      width: 100%;
      height: 100%;
      fill: none;
      stroke-linecap: round;
      stroke-linejoin: round;
    }
    .grid {
      stroke: var(--line);
      stroke-width: 0.7;
      opacity: 0.7;
    }
    .ground {
      fill: var(--ground);
      opacity: 0.55;
    }
    .edge {
      stroke: var(--line);
      stroke-width: 1.5;
    }
    .trace {
      stroke: var(--chalk);
      stroke-width: 2.4;
      opacity: 0.65;
    }
    .centrode {
      stroke: var(--spruce);
      stroke-width: 1.6;
      stroke-dasharray: 2 6;
    }
    .body path {
      stroke: var(--ink);
      stroke-width: 1.6;
      fill: var(--sheet);
      fill-opacity: 0.6;
    }
    .ray {
      stroke: var(--muted);
      stroke-dasharray: 1 5;
    }
    .pole circle,
    .arrow {
      stroke: var(--spruce);
      stroke-width: 2;
    }
    .pole .dot {
      fill: var(--spruce);
      stroke: none;
    }
    .mark {
      stroke: var(--chalk);
      stroke-width: 2;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SignInDrawing {}
