import { ChangeDetectionStrategy, Component } from '@angular/core';
import { RouterLink } from '@angular/router';
import { EmptyState } from '../ui/empty-state/empty-state';

@Component({
  selector: 'app-not-found',
  imports: [EmptyState, RouterLink],
  template: `
    <ui-empty-state text="There is nothing at this address.">
      It may have been moved, or it is not open to you. <a routerLink="/">Go to your first page</a>.
    </ui-empty-state>
  `,
  styles: `
    :host {
      display: block;
      padding: var(--gutter);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class NotFound {}
