import { ChangeDetectionStrategy, Component, inject } from '@angular/core';
import { RouterOutlet } from '@angular/router';
import { Session } from './core/session/session';
import { MessageArea } from './shell/message-area';
import { TopBar } from './shell/top-bar';

@Component({
  selector: 'app-root',
  imports: [MessageArea, RouterOutlet, TopBar],
  template: `
    <a class="skip screen-only" href="#main" (click)="skipTo(main, $event)">Skip to the content</a>
    <app-top-bar class="screen-only" />
    <app-message-area class="screen-only" />
    <main #main id="main" tabindex="-1">
      <router-outlet />
    </main>
  `,
  styleUrl: './app.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class App {
  protected readonly session = inject(Session);

  protected skipTo(main: HTMLElement, event: Event): void {
    // A fragment would go through the router and be resolved against the base address.
    event.preventDefault();
    main.focus();
  }
}
