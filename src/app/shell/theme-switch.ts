import { ChangeDetectionStrategy, Component, computed, inject } from '@angular/core';
import { MatIconButton } from '@angular/material/button';
import { Theme, type ThemeChoice, themeChoices } from '../core/theme/theme';
import { Icon } from '../ui/icon/icon';
import type { IconName } from '../ui/icon/icon-paths';

const shown: Record<ThemeChoice, { icon: IconName; name: string }> = {
  system: { icon: 'system', name: 'as the system' },
  light: { icon: 'light', name: 'light' },
  dark: { icon: 'dark', name: 'dark' },
};

/** One button that goes round: as the system, light, dark. */
@Component({
  selector: 'app-theme-switch',
  imports: [Icon, MatIconButton],
  template: `
    <button
      matIconButton
      type="button"
      [attr.aria-label]="label()"
      [title]="label()"
      (click)="next()"
    >
      <ui-icon [name]="icon()" />
    </button>
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ThemeSwitch {
  private readonly theme = inject(Theme);

  protected readonly icon = computed(() => shown[this.theme.choice()].icon);
  protected readonly label = computed(
    () => `Colours: ${shown[this.theme.choice()].name}. Change to ${shown[this.following()].name}.`,
  );
  private readonly following = computed(() => {
    const at = themeChoices.indexOf(this.theme.choice());
    return themeChoices[(at + 1) % themeChoices.length] ?? 'system';
  });

  protected next(): void {
    this.theme.choose(this.following());
  }
}
