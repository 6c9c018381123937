import { DestroyRef, ElementRef, type Signal, afterNextRender, inject, signal } from '@angular/core';

/**
 * The width of the component's own box, px, kept up to date: what decides between a table and cards is the room there
 * is, not the screen. Call it where injection is possible; until measured it is `assumed`.
 */
export function hostWidth(assumed: number): Signal<number> {
  const width = signal(assumed);
  const host = inject<ElementRef<HTMLElement>>(ElementRef).nativeElement;
  const destroyed = inject(DestroyRef);
  afterNextRender(() => {
    if (typeof ResizeObserver === 'undefined') return;
    width.set(host.clientWidth);
    const observer = new ResizeObserver(() => width.set(host.clientWidth));
    observer.observe(host);
    destroyed.onDestroy(() => observer.disconnect());
  });
  return width.asReadonly();
}
