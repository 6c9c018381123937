import { effect, signal, type Signal } from '@angular/core';
import type { AbstractControl } from '@angular/forms';
import type { ErrorStateMatcher } from '@angular/material/core';

/** A control's turns as a signal: it counts each change of value, status and touch. Call it where injection is possible. */
export function turnsOf(control: Signal<AbstractControl>): Signal<number> {
  const turns = signal(0);
  effect((onCleanup) => {
    const events = control().events.subscribe(() => turns.update((count) => count + 1));
    turns.update((count) => count + 1);
    onCleanup(() => events.unsubscribe());
  });
  return turns.asReadonly();
}

/** Whether a field should say what is wrong: once it was left, or while it is being typed in. */
export function speaks(control: AbstractControl): boolean {
  return control.invalid && (control.touched || control.dirty);
}

/** For an input whose own control is not the form's: its state is the form's control's. */
export function matcherOf(control: () => AbstractControl): ErrorStateMatcher {
  return { isErrorState: () => speaks(control()) };
}
