import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import { MatFormFieldModule } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { MatRadioModule } from '@angular/material/radio';
import { MatSelectModule } from '@angular/material/select';
import type { Exhibit } from '#shared/contracts/exhibits';
import { Icon } from '../../ui/icon/icon';
import { type Decision, type Withheld, isComplete, withholdReasons } from './decisions';

/** Release one exhibit, or withhold it with the reason that the list to the party will name. */
@Component({
  selector: 'app-exhibit-decision',
  imports: [Icon, MatFormFieldModule, MatInput, MatRadioModule, MatSelectModule],
  templateUrl: './exhibit-decision.html',
  styleUrl: './exhibit-decision.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ExhibitDecision {
  readonly exhibit = input.required<Exhibit>();
  readonly decision = input.required<Decision | null>();
  /** The release was tried: what is missing is pointed out. */
  readonly tried = input(false);
  readonly decided = output<Decision>();

  protected readonly reasons = withholdReasons;
  protected readonly withheld = computed(() => {
    const decision = this.decision();
    return decision !== null && !decision.released ? decision : null;
  });
  protected readonly missing = computed(() => {
    const decision = this.decision();
    if (!this.tried() || (decision !== null && isComplete(decision))) return '';
    if (decision === null) return 'Release it, or withhold it with a reason.';
    return this.withheld()?.reason === null ? 'Say why it is withheld.' : 'Explain the reason.';
  });

  protected choose(released: boolean): void {
    this.decided.emit(released ? { released } : { released, reason: null, explanation: '' });
  }

  protected giveReason(reason: Withheld['reason']): void {
    const explanation = this.withheld()?.explanation ?? '';
    this.decided.emit({ released: false, reason, explanation });
  }

  protected explain(explanation: string): void {
    const reason = this.withheld()?.reason ?? null;
    this.decided.emit({ released: false, reason, explanation });
  }
}
