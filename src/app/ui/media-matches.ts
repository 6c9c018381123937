import { DOCUMENT, DestroyRef, type Signal, inject, signal } from '@angular/core';

/** Whether a media query holds, kept up to date; false where nobody can say. Call it where injection is possible. */
export function mediaMatches(query: string): Signal<boolean> {
  const media = inject(DOCUMENT).defaultView?.matchMedia?.(query);
  const matches = signal(media?.matches ?? false);
  const changed = () => matches.set(media?.matches ?? false);
  media?.addEventListener('change', changed);
  inject(DestroyRef).onDestroy(() => media?.removeEventListener('change', changed));
  return matches.asReadonly();
}
