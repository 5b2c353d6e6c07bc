import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import type { MotionSolution } from '#shared/engine/documents/motion-solution';
import { showPlain } from '#shared/units/rounding';
import { Icon } from '../../../ui/icon/icon';
import type { Names } from '../names';
import { lacksOf, verdictOf } from './verdict-words';

/** What the answer says of itself: how firm it is, what is free, what clashes, what would settle it. */
@Component({
  selector: 'app-verdict',
  imports: [Icon],
  template: `
    @let v = verdict();
    <div class="box" [class]="v.standing" role="status">
      @if (v.standing !== 'sound') {
        <ui-icon [name]="v.standing === 'open' ? 'warning' : 'fault'" />
      }
      <div>
        <p>
          <strong>{{ v.title }}</strong> {{ v.says.join(' ') }}
          @for (name of v.names; track name) {
            <button type="button" (click)="traced.emit(name)">{{ nameOf()(name) }}</button>{{
              $last ? '.' : ', '
            }}
          }
        </p>
        @if (velocityLack(); as lack) {
          <ul>
            @for (motion of lack.free; track $index) {
              <li>{{ motion }}</li>
            }
          </ul>
          @if (lack.helps.length > 0) {
            <p>
              <strong>One further known would settle it:</strong> {{ lack.helps.join('; or ') }}.
            </p>
          }
        }
      </div>
    </div>
    @if (accelerationLack(); as lack) {
      <details>
        <summary>The accelerations are not fixed.</summary>
        <ul>
          @for (motion of lack.free; track $index) {
            <li>{{ motion }}</li>
          }
        </ul>
        @if (lack.helps.length > 0) {
          <p>One further known would settle it: {{ lack.helps.join('; or ') }}.</p>
        }
      </details>
    }
    @for (warning of solution().warnings; track $index) {
      <p class="warning"><ui-icon name="warning" /> {{ warning }}</p>
    }
    @if (leaning(); as text) {
      <p class="muted small">{{ text }}</p>
    }
  `,
  styles: `
    :host {
      display: grid;
      gap: 6px;
    }
    .box {
      display: flex;
      gap: 8px;
      padding: 8px 12px;
      border-left: 3px solid var(--spruce);
      background: var(--wash);
    }
    .open,
    .broken {
      border-left-color: var(--chalk);
      background: var(--chalk-wash);
    }
    ui-icon {
      flex: none;
      margin-top: 2px;
      color: var(--chalk);
    }
    p,
    ul {
      margin: 0;
    }
    ul {
      padding-left: 18px;
    }
    button {
      padding: 0;
      border: 0;
      background: none;
      color: var(--spruce);
      font: inherit;
      text-decoration: underline;
      cursor: pointer;
    }
    details {
      color: var(--muted);
      font-size: 14px;
    }
    summary {
      cursor: pointer;
    }
    .warning {
      padding-left: 12px;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class VerdictBox {
  readonly solution = input.required<MotionSolution>();
  readonly names = input.required<Names>();
  /** What people call the joint or known with this id. */
  readonly nameOf = input.required<(id: string) => string>();
  /** A joint or known was asked for. */
  readonly traced = output<string>();

  protected readonly verdict = computed(() => verdictOf(this.solution()));
  private readonly lacks = computed(() => lacksOf(this.solution(), this.names()));
  protected readonly velocityLack = computed(
    () => this.lacks().find(({ level }) => level === 'velocity') ?? null,
  );
  protected readonly accelerationLack = computed(
    () => this.lacks().find(({ level }) => level === 'acceleration') ?? null,
  );
  protected readonly leaning = computed(() => {
    const { condition } = this.solution();
    return condition === null ? null : `Condition number ${showPlain(condition, 2)}.`;
  });
}
