import { DOCUMENT, Injectable, inject, signal } from '@angular/core';

export const THEMES = ['device', 'light', 'dark'] as const;
export type ThemeChoice = (typeof THEMES)[number];
/** `assets/theme.js` reads it before the first paint. */
const KEY = 'shedbeat.theme';

/** Light, dark, or as the device has it. */
@Injectable({ providedIn: 'root' })
export class Theme {
  private readonly root = inject(DOCUMENT).documentElement;
  private readonly chosen = signal<ThemeChoice>(
    THEMES.find((theme) => theme === this.root.dataset['theme']) ?? 'device',
  );
  readonly choice = this.chosen.asReadonly();

  choose(theme: ThemeChoice): void {
    this.chosen.set(theme);
    if (theme === 'device') delete this.root.dataset['theme'];
    else this.root.dataset['theme'] = theme;
    try {
      if (theme === 'device') localStorage.removeItem(KEY);
      else localStorage.setItem(KEY, theme);
    } catch {
      // It holds while this page is open.
    }
  }
}
