import { ChangeDetectionStrategy, Component, computed, input, output } from '@angular/core';
import type { MotionSolution } from '#shared/engine/documents/motion-solution';
import { showPlain } from '#shared/units/rounding';
import { Icon } from '../../../ui/icon/icon';
import { freeSentence, verdictOf } from './verdict-words';

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
            <button type="button" (click)="traced.emit(name)">{{ nameOf()(name) }}</button
            >{{ $last ? '.' : ', ' }}
          }
        </p>
        @if (solution().free.length > 0) {
          <ul>
            @for (free of solution().free; track $index) {
              <li>{{ sentence(free.motion) }}</li>
            }
          </ul>
        }
        @if (solution().helps.length > 0) {
          <p>
            <strong>One further known would settle it:</strong>
            {{ solution().helps.join('; or ') }}.
          </p>
        }
      </div>
    </div>
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
    .warning {
      padding-left: 12px;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class VerdictBox {
  readonly solution = input.required<MotionSolution>();
  /** What people call the joint or known with this id. */
  readonly nameOf = input.required<(id: string) => string>();
  /** A joint or known was asked for. */
  readonly traced = output<string>();

  protected readonly verdict = computed(() => verdictOf(this.solution()));
  protected readonly sentence = freeSentence;
  protected readonly leaning = computed(() => {
    const { condition } = this.solution();
    return condition === null ? null : `Condition number ${showPlain(condition, 2)}.`;
  });
}
