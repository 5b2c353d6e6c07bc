import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import type { Known } from '#shared/engine/documents/motion-problem';
import type { Working } from '#shared/engine/instant/working/working';
import { Equation } from '../../../ui/equation/equation';
import { stepsOf } from './working-steps';

/** The derivation as numbered steps: what is known, each vector equation with its numbers, the result. */
@Component({
  selector: 'app-working-part',
  imports: [Equation],
  templateUrl: './working-part.html',
  styleUrl: './working-part.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class WorkingPart {
  readonly working = input.required<Working>();
  readonly knowns = input.required<readonly Known[]>();
  /** Short names in the equations. */
  readonly shorten = input.required<(tex: string) => string>();
  /** What people call the known, mark or joint with this id. */
  readonly nameOf = input.required<(id: string) => string>();
  /** The known or joint that a number came from was asked for. */
  readonly traced = output<string>();

  protected readonly levels = computed(() => {
    const steps = stepsOf(this.working(), this.knowns(), this.shorten());
    return (['velocity', 'acceleration'] as const)
      .map((level) => ({
        level,
        title: level === 'velocity' ? 'Velocities' : 'Accelerations',
        steps: steps.filter((step) => step.level === level),
      }))
      .filter(({ steps }) => steps.length > 0);
  });
}
