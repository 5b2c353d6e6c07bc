import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import type { LedgerReport } from '#shared/contracts/custody';
import { showExactMoment } from '../../ui/dates/dates';
import { Icon } from '../../ui/icon/icon';

/** What a check of the ledger found, in plain words. */
@Component({
  selector: 'app-ledger-check',
  imports: [Icon],
  template: `
    <ui-icon [name]="sound() ? 'check' : 'fault'" />
    <div>
      @if (sound()) {
        <b>Everything is as it was written.</b>
        <p>{{ extent() }}</p>
      } @else {
        <b>{{ count() }} found. Do not rely on the items concerned until this is explained.</b>
        <p>
          {{ extent() }} The laboratory lead sees this in the log; releases of changed files are
          blocked.
        </p>
        <ul>
          @for (finding of report().findings; track $index) {
            <li>{{ finding.message }}</li>
          }
        </ul>
      }
    </div>
  `,
  styles: `
    :host {
      display: flex;
      gap: 10px;
      padding: 10px 14px;
      border-left: 3px solid var(--spruce);
      background: var(--wash);
    }
    :host.faulty {
      border-left-color: var(--fault);
      background: var(--fault-wash);
    }
    ui-icon {
      flex: none;
      margin-top: 2px;
      color: var(--spruce);
    }
    :host.faulty ui-icon {
      color: var(--fault);
    }
    p,
    ul {
      margin: 2px 0 0;
    }
    ul {
      padding-left: 18px;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { '[class.faulty]': '!sound()', '[attr.role]': 'sound() ? "status" : "alert"' },
})
export class LedgerCheck {
  readonly report = input.required<LedgerReport>();

  protected readonly sound = computed(() => this.report().findings.length === 0);
  protected readonly count = computed(() => {
    const { length } = this.report().findings;
    return length === 1 ? 'One difference' : `${length} differences`;
  });
  protected readonly extent = computed(() => {
    const { events, files, checkedAt } = this.report();
    return `Checked ${showExactMoment(checkedAt)}: the chain of ${events} events, every signed head, and ${files} stored files, each hashed again.`;
  });
}
