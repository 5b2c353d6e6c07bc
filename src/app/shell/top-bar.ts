import { ChangeDetectionStrategy, Component, computed, inject, signal } from '@angular/core';
import { MatButton } from '@angular/material/button';
import { RouterLink, RouterLinkActive } from '@angular/router';
import { Messages } from '../core/messages/messages';
import { roleNames } from '../laboratory/role-names';
import { Session } from '../core/session/session';
import { Icon } from '../ui/icon/icon';
import { Mark } from './mark';
import { ThemeSwitch } from './theme-switch';

@Component({
  selector: 'app-top-bar',
  imports: [Icon, Mark, MatButton, RouterLink, RouterLinkActive, ThemeSwitch],
  templateUrl: './top-bar.html',
  styleUrl: './top-bar.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class TopBar {
  protected readonly session = inject(Session);
  private readonly messages = inject(Messages);

  protected readonly leaving = signal(false);
  protected readonly roleName = computed(() => {
    const role = this.session.role();
    return role === null ? '' : roleNames[role];
  });

  protected async signOut(): Promise<void> {
    this.leaving.set(true);
    try {
      await this.session.signOut();
    } catch (error) {
      this.messages.fault(error);
    } finally {
      this.leaving.set(false);
    }
  }
}
