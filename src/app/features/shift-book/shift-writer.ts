import { Injectable, computed, inject, signal } from '@angular/core';
import type { Amendment } from '@shared/entries/entry';
import { Clock } from '../../core/clock';
import type { EntryDraft } from '../../offline/entry-draft';
import { NotSaved, notSaved } from '../../offline/not-saved';
import { OfflineBook } from '../../offline/offline-book';

export interface Progress {
  readonly state: 'saved' | 'in-book' | 'held' | 'refused';
  readonly words: string;
}

/** Writes the foreman's word into the book and says how far it has come. One for a page. */
@Injectable()
export class ShiftWriter {
  private readonly book = inject(OfflineBook);
  private readonly clock = inject(Clock);
  private readonly saved = signal<readonly string[]>([]);

  readonly busy = signal(false);
  /** Why the last one is not saved; empty: it is. */
  readonly failure = signal('');
  /** How far the last act has come; null: nothing was saved on this page. */
  readonly progress = computed<Progress | null>(() => {
    const ids = this.saved();
    if (ids.length === 0) return null;
    const items = this.book.items().filter((item) => ids.includes(item.id));
    const refused = items.find((item) => item.state === 'refused');
    if (refused) return { state: 'refused', words: `Not taken by the book: ${refused.why}` };
    const held = items.find((item) => item.state === 'held');
    if (held) return { state: 'held', words: `Held: ${held.why}` };
    if (items.length > 0)
      return {
        state: 'saved',
        words: 'Saved on this device. It is sent as soon as the book can be reached.',
      };
    return { state: 'in-book', words: 'In the book.' };
  });

  /** Resolves when all of it is on this device's disk: true. False: nothing is, and `failure` says why. */
  async save(drafts: readonly EntryDraft[]): Promise<boolean> {
    if (this.busy()) return false;
    this.busy.set(true);
    try {
      const [only] = drafts;
      const entries =
        drafts.length === 1 && only ? [await this.book.log(only)] : await this.book.logAll(drafts);
      this.saved.set(entries.map((entry) => entry.id));
      this.failure.set('');
      return true;
    } catch (error) {
      this.failure.set((error instanceof NotSaved ? error : notSaved(error)).sentence);
      return false;
    } finally {
      this.busy.set(false);
    }
  }

  /** A moment of the mill's clock by this device's: what an entry carries. */
  deviceTime(moment: number): number {
    return moment - this.clock.offset();
  }

  /** An amendment's moments by this device's clock. */
  deviceChange(change: Amendment): Amendment {
    return {
      ...change,
      ...(change.at !== undefined && { at: this.deviceTime(change.at) }),
      ...(typeof change.until === 'number' && { until: this.deviceTime(change.until) }),
    };
  }

  /** What a correction is based on: a later one of this device's that still waits, else the last in the book. */
  basedOn(entryId: string, inBook: string | null): { readonly basedOn?: string } {
    const basedOn = this.waitingCorrection(entryId) ?? inBook;
    return basedOn === null ? {} : { basedOn };
  }

  /** The last correction of an entry that was made here and is not sent; null: none. */
  waitingCorrection(entryId: string): string | null {
    const last = this.book.basedOn(entryId);
    const waits = this.book.items().some((item) => item.id === last && item.state === 'waiting');
    return last !== undefined && waits ? last : null;
  }
}
