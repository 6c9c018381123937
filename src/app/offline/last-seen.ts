import { Injectable, inject } from '@angular/core';
import { Clock } from '../core/clock';
import { result } from './local-database';
import { OfflineParts } from './offline-parts';
import { factOf, isReadable } from './records';

export interface Seen<T> {
  readonly value: T;
  /** When it came from the server, by the corrected clock. */
  readonly at: number;
}

/** How many reports are kept: a tackler's looms of some weeks. */
const KEPT = 120;

/**
 * Reports as they were last seen, for when there is no network. What was written by another version of the
 * application is not shown: `reads` says whether a value is one that this one understands.
 */
@Injectable({ providedIn: 'root' })
export class LastSeen {
  private readonly database = inject(OfflineParts).database;
  private readonly clock = inject(Clock);

  /** Null: never seen here, or not to be read. */
  async get<T>(key: string, reads: (value: unknown) => T | null): Promise<Seen<T> | null> {
    const raw = await this.database
      .transact(['seen'], 'readonly', (transaction) =>
        result<unknown>(transaction.objectStore('seen').get(key)),
      )
      .catch(() => null);
    if (!isReadable(raw)) return null;
    const { value, at } = (raw as unknown as { value: Seen<unknown> }).value;
    const read = reads(value);
    return read === null ? null : { value: read, at };
  }

  /** Not being able to keep it costs nothing but the look at it later: nothing is thrown. */
  async keep(key: string, value: unknown): Promise<void> {
    const fact = factOf({ value, at: this.clock.correctedNow() });
    await this.database
      .transact(['seen'], 'readwrite', async (transaction) => {
        const store = transaction.objectStore('seen');
        await result(store.put(fact, key));
        const keys = await result(store.getAllKeys());
        if (keys.length <= KEPT) return;
        const all = await result<unknown[]>(store.getAll());
        const ages = keys.map((one, i) => ({ key: one, at: momentOf(all[i]) })).sort((a, b) => a.at - b.at);
        for (const old of ages.slice(0, keys.length - KEPT)) await result(store.delete(old.key));
      })
      .catch(() => undefined);
  }
}

function momentOf(raw: unknown): number {
  return isReadable(raw) ? (raw as unknown as { value: Seen<unknown> }).value.at : 0;
}
