import { DOCUMENT } from '@angular/common';
import { Injectable, computed, inject, signal } from '@angular/core';

export const themeChoices = ['system', 'light', 'dark'] as const;
export type ThemeChoice = (typeof themeChoices)[number];

const storageKey = 'centrode.theme';

/** Light, dark, or as the system says; the choice is kept on this device. */
@Injectable({ providedIn: 'root' })
export class Theme {
  private readonly document = inject(DOCUMENT);
  private readonly systemIsDark = signal(false);

  readonly choice = signal<ThemeChoice>(this.stored());
  /** What is on screen now; drawings on a canvas follow it. */
  readonly isDark = computed(() =>
    this.choice() === 'system' ? this.systemIsDark() : this.choice() === 'dark',
  );

  constructor() {
    const query = this.document.defaultView?.matchMedia('(prefers-color-scheme: dark)');
    if (!query) return;
    this.systemIsDark.set(query.matches);
    query.addEventListener('change', (event) => this.systemIsDark.set(event.matches));
  }

  choose(choice: ThemeChoice): void {
    this.choice.set(choice);
    this.apply();
    try {
      this.document.defaultView?.localStorage.setItem(storageKey, choice);
    } catch {
      // Storage may be closed to us (private window): the choice then lasts until the page is left.
    }
  }

  apply(): void {
    const root = this.document.documentElement;
    if (this.choice() === 'system') delete root.dataset['theme'];
    else root.dataset['theme'] = this.choice();
  }

  private stored(): ThemeChoice {
    try {
      const text = this.document.defaultView?.localStorage.getItem(storageKey);
      return themeChoices.find((choice) => choice === text) ?? 'system';
    } catch {
      return 'system';
    }
  }
}
