import { signal } from '@angular/core';
import { NOT_SAVED, NotSaved } from '../../offline/not-saved';

/** One save at a time of a screen that passes from loom to loom: felt when it is done, told when it is not. */
export class Saving {
  private readonly busyNow = signal(false);
  private readonly failureNow = signal('');

  readonly busy = this.busyNow.asReadonly();
  /** What happened, what is safe, what to do; empty: nothing went wrong. */
  readonly failure = this.failureNow.asReadonly();

  /** Says whether it is saved. */
  async keep(save: () => Promise<unknown>): Promise<boolean> {
    this.busyNow.set(true);
    this.failureNow.set('');
    try {
      await save();
      navigator.vibrate?.(40);
      return true;
    } catch (error) {
      this.failureNow.set(error instanceof NotSaved ? error.sentence : NOT_SAVED['storage-closed']);
      return false;
    } finally {
      this.busyNow.set(false);
    }
  }

  /** Something else went wrong, or no longer does. */
  say(sentence: string): void {
    this.failureNow.set(sentence);
  }
}
