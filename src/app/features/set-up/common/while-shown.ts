import { effect, type Signal } from '@angular/core';
import type { Subscription } from 'rxjs';

/** Subscribes to what a signal holds, anew whenever it holds another, until the end. Call it where injection is possible. */
export function whileShown<T>(source: Signal<T>, subscribe: (value: T) => Subscription): void {
  effect((onCleanup) => {
    const subscription = subscribe(source());
    onCleanup(() => subscription.unsubscribe());
  });
}
