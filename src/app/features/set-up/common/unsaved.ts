import { DestroyRef, Injectable, inject } from '@angular/core';
import type { CanDeactivateFn } from '@angular/router';
import { MatDialog } from '@angular/material/dialog';
import { firstValueFrom } from 'rxjs';
import { LeaveDialog } from './leave-dialog';

/** What is typed and not saved, whatever page it stands on. */
@Injectable()
export class Unsaved {
  private readonly dialog = inject(MatDialog);
  private readonly watched = new Set<() => boolean>();

  constructor() {
    const ask = (event: BeforeUnloadEvent) => {
      if (this.any()) event.preventDefault();
    };
    globalThis.addEventListener('beforeunload', ask);
    inject(DestroyRef).onDestroy(() => globalThis.removeEventListener('beforeunload', ask));
  }

  any(): boolean {
    return [...this.watched].some((isDirty) => isDirty());
  }

  /** Watches a form until the end of whoever calls; returns the way to end it before. */
  watch(isDirty: () => boolean): () => void {
    this.watched.add(isDirty);
    return () => this.watched.delete(isDirty);
  }

  /** True at once where nothing is lost; else as the person says. */
  async mayLeave(): Promise<boolean> {
    if (!this.any()) return true;
    const answer = this.dialog.open<LeaveDialog, unknown, boolean>(LeaveDialog, { autoFocus: 'dialog' });
    return (await firstValueFrom(answer.afterClosed(), { defaultValue: false })) ?? false;
  }
}

/** Asks before something typed is left behind. Call it where injection is possible: `keepUnsaved(() => this.form.dirty)`. */
export function keepUnsaved(isDirty: () => boolean): void {
  inject(DestroyRef).onDestroy(inject(Unsaved).watch(isDirty));
}

/** On every page of set-up: "Leave without saving?". */
export const leaveGuard: CanDeactivateFn<unknown> = () => inject(Unsaved).mayLeave();
