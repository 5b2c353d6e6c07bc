import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { type IconName, iconPaths } from './icon-paths';

/** A drawn sign beside a text; it is never the only carrier of a meaning, so it is not read aloud. */
@Component({
  selector: 'ui-icon',
  template: `
    <svg viewBox="0 0 20 20" aria-hidden="true" focusable="false">
      <path [attr.d]="path()" />
    </svg>
  `,
  styles: `
    :host {
      display: inline-flex;
      width: 1.2em;
      height: 1.2em;
      vertical-align: -0.22em;
    }
    svg {
      width: 100%;
      height: 100%;
      fill: none;
      stroke: currentColor;
      stroke-width: 1.6;
      stroke-linecap: round;
      stroke-linejoin: round;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Icon {
  readonly name = input.required<IconName>();

  protected readonly path = computed(() => iconPaths[this.name()]);
}
