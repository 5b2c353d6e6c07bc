import { booleanAttribute, ChangeDetectionStrategy, Component, input, output } from '@angular/core';
import { MatButton } from '@angular/material/button';
import type { ApiProblem } from '../../core/api/api-problem';
import { Icon } from '../icon/icon';

/** Says in place what failed; offers to try again when `retry` is listened to. */
@Component({
  selector: 'ui-problem-message',
  imports: [Icon, MatButton],
  template: `
    <ui-icon name="fault" />
    <div>
      <strong>{{ problem().title }}</strong>
      @if (problem().detail) {
        <p>{{ problem().detail }}</p>
      }
      @if (problem().errors.length > 1) {
        <ul>
          @for (error of problem().errors; track error.field) {
            <li>
              <code>{{ error.field }}</code> {{ error.message }}
            </li>
          }
        </ul>
      }
      @if (canRetry()) {
        <button matButton="outlined" type="button" (click)="retry.emit()">Try again</button>
      }
    </div>
  `,
  styles: `
    :host {
      display: flex;
      gap: 10px;
      padding: 10px 14px;
      border-left: 3px solid var(--fault);
      background: var(--fault-wash);
    }
    ui-icon {
      flex: none;
      margin-top: 2px;
      color: var(--fault);
    }
    p {
      margin: 2px 0 0;
    }
    ul {
      margin: 4px 0 0;
      padding-left: 18px;
    }
    button {
      margin-top: 8px;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: { role: 'alert' },
})
export class ProblemMessage {
  readonly problem = input.required<ApiProblem>();
  readonly canRetry = input(false, { transform: booleanAttribute });
  readonly retry = output();
}
