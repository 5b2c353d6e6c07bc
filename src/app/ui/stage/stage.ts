import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { CaseStage } from '#shared/contracts/cases';

export const stageName = (stage: CaseStage): string => stage.replaceAll('-', ' ');

/** The stage of a case, in a frame. */
@Component({
  selector: 'ui-stage',
  template: `<span class="unseen">Stage: </span>{{ name() }}`,
  styles: `
    :host {
      display: inline-block;
      padding: 0 8px;
      border: 1px solid var(--spruce);
      border-radius: 3px;
      color: var(--spruce);
      font-size: 13px;
      white-space: nowrap;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Stage {
  readonly stage = input.required<CaseStage>();

  protected readonly name = computed(() => stageName(this.stage()));
}
