import { ChangeDetectionStrategy, Component, inject } from '@angular/core';
import { MatIconButton } from '@angular/material/button';
import { Api } from '../core/api/api';
import { Messages } from '../core/messages/messages';
import { Session } from '../core/session/session';
import { Icon } from '../ui/icon/icon';

/** Under the top bar: whether the server is reached, and what was just done or failed. */
@Component({
  selector: 'app-message-area',
  imports: [Icon, MatIconButton],
  template: `
    @if (api.offline()) {
      <p class="strip offline" role="alert">
        <ui-icon name="warning" />
        <span>
          <b>The server cannot be reached.</b> What you typed is still here. Nothing is saved until
          the connection is back.
        </span>
      </p>
    } @else if (session.problem(); as problem) {
      <p class="strip fault" role="alert">
        <ui-icon name="fault" />
        <span
          ><b>{{ problem.title }}.</b> {{ problem.detail }}</span
        >
      </p>
    }
    <div aria-live="polite">
      @if (messages.current(); as message) {
        <p class="strip" [class.fault]="message.kind === 'fault'">
          <ui-icon [name]="message.kind === 'fault' ? 'fault' : 'check'" />
          <span
            ><b>{{ message.text }}</b> {{ message.detail }}</span
          >
          <button matIconButton type="button" aria-label="Close message" (click)="messages.clear()">
            <ui-icon name="close" />
          </button>
        </p>
      }
    </div>
  `,
  styles: `
    .strip {
      display: flex;
      align-items: center;
      gap: 10px;
      margin: 0;
      padding: 4px var(--gutter);
      min-height: 40px;
      border-bottom: 1px solid var(--line);
      background: var(--wash);
    }
    .strip.fault {
      background: var(--fault-wash);
    }
    .strip.fault ui-icon {
      color: var(--fault);
    }
    .strip.offline {
      background: var(--chalk-wash);
    }
    .strip.offline ui-icon {
      color: var(--chalk);
    }
    span {
      flex: 1;
    }
    .strip button ui-icon {
      color: inherit;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class MessageArea {
  protected readonly api = inject(Api);
  protected readonly messages = inject(Messages);
  protected readonly session = inject(Session);
}
