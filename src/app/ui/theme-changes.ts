import { ApplicationRef, DOCUMENT, DestroyRef, Injectable, inject, signal } from '@angular/core';

/** Counts up whenever colours may have changed: canvases read tokens again. `printing`: while a page goes to paper. */
@Injectable({ providedIn: 'root' })
export class ThemeChanges {
  private readonly changes = signal(0);
  private readonly paper = signal(false);
  readonly version = this.changes.asReadonly();
  readonly printing = this.paper.asReadonly();

  constructor() {
    const document = inject(DOCUMENT);
    const view = document.defaultView;
    const changed = () => this.changes.update((n) => n + 1);
    const observer = new MutationObserver(changed);
    observer.observe(document.documentElement, { attributeFilter: ['data-theme'] });
    const dark = view?.matchMedia?.('(prefers-color-scheme: dark)');
    dark?.addEventListener('change', changed);
    const application = inject(ApplicationRef);
    const before = () => {
      this.paper.set(true);
      // The page goes to paper as it stands when this returns: whatever draws for it has to draw now.
      application.tick();
    };
    const after = () => this.paper.set(false);
    view?.addEventListener('beforeprint', before);
    view?.addEventListener('afterprint', after);
    inject(DestroyRef).onDestroy(() => {
      observer.disconnect();
      dark?.removeEventListener('change', changed);
      view?.removeEventListener('beforeprint', before);
      view?.removeEventListener('afterprint', after);
    });
  }
}
