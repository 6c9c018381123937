import type { Fitting, PersonCard, Reference, Shift } from '@shared/contract/reference';
import type { PulledEntry, PullResponse } from '@shared/contract/sync';
import { get, set } from 'idb-keyval';
import type { ClockMeasure } from '../core/clock-watch';
import { result, type LocalDatabase } from './local-database';
import {
  factOf,
  isReadable,
  MARK,
  RECORD_VERSION,
  upgradeBookRecord,
  type BookRecord,
  type Fact,
} from './records';

export interface BookContents {
  readonly entries: readonly PulledEntry[];
  readonly shifts: readonly Shift[];
  readonly fittings: readonly Fitting[];
  readonly reference: Reference | null;
  readonly people: readonly PersonCard[];
}

/**
 * What this device has of the book. A pull is stored in one transaction, its cursor with its data: after a crash
 * there is either the whole pull with its cursor or the one before. Never a cursor ahead of its data.
 */
export class BookStore {
  constructor(private readonly database: LocalDatabase) {}

  async cursor(): Promise<string | null> {
    return this.fact<string>('cursor');
  }

  /** Where the book stood when it last acknowledged something of this device. */
  async mark(): Promise<string | null> {
    return this.fact<string>(MARK);
  }

  /** Durable, whole, when it resolves. */
  async apply(pull: PullResponse): Promise<void> {
    await this.database.transact(
      ['entries', 'shifts', 'fittings', 'facts'],
      'readwrite',
      async (transaction) => {
        const entries = transaction.objectStore('entries');
        const shifts = transaction.objectStore('shifts');
        const fittings = transaction.objectStore('fittings');
        const facts = transaction.objectStore('facts');
        // Requests of one transaction run in order; a failed one aborts it whole. So nothing is waited for one by one.
        if (pull.snapshot) for (const store of [entries, shifts, fittings]) store.clear();
        for (const pulled of pull.entries) {
          const record: BookRecord = { v: RECORD_VERSION, at: pulled.at, pulled };
          entries.put(record, idOf(pulled));
        }
        for (const key of pull.goneShifts ?? []) shifts.delete(key);
        for (const shift of pull.shifts) shifts.put(factOf(shift), shift.key);
        await replaceFittings(fittings, pull);
        if (pull.reference) facts.put(factOf(pull.reference), 'reference');
        if (pull.people) facts.put(factOf(pull.people), 'people');
        // A book that does not know the mark has been told so once; from now on this one is the book.
        if (pull.resend) facts.put(factOf(pull.cursor), MARK);
        await result(facts.put(factOf(pull.cursor), 'cursor'));
      },
    );
  }

  async load(): Promise<BookContents> {
    return this.database.transact(
      ['entries', 'shifts', 'fittings', 'facts'],
      'readonly',
      async (transaction) => {
        const all = (name: 'entries' | 'shifts' | 'fittings') =>
          result<unknown[]>(transaction.objectStore(name).getAll());
        const facts = transaction.objectStore('facts');
        const records = (await all('entries')).map(upgradeBookRecord).filter((record) => record !== null);
        return {
          entries: records.map((record) => record.pulled),
          shifts: (await all('shifts')).map(valueOf<Shift>).filter((shift) => shift !== null),
          fittings: (await all('fittings')).map(valueOf<Fitting>).filter((fitting) => fitting !== null),
          reference: valueOf<Reference>(await result<unknown>(facts.get('reference'))),
          people: valueOf<PersonCard[]>(await result<unknown>(facts.get('people'))) ?? [],
        };
      },
    );
  }

  /** Drops pulled entries older than a moment: no line that the device shows needs them. */
  prune(before: number): Promise<void> {
    return this.database.transact(['entries'], 'readwrite', async (transaction) => {
      const entries = transaction.objectStore('entries');
      const old = await result(entries.index('at').getAllKeys(IDBKeyRange.upperBound(before, true)));
      for (const key of old) await result(entries.delete(key));
    });
  }

  lastReached(): Promise<number | null> {
    return this.fact<number>('reached');
  }

  clockMeasure(): Promise<ClockMeasure | null> {
    return this.fact<ClockMeasure>('clock');
  }

  /** When the book was last reached (server's clock), and how far the device's clock was off then. */
  async reached(at: number, measure: ClockMeasure | null): Promise<void> {
    await set('reached', factOf(at), this.database.store('facts'));
    if (measure) await set('clock', factOf(measure), this.database.store('facts'));
  }

  async hasAskedToPersist(): Promise<boolean> {
    return (await this.fact<boolean>('asked-to-persist')) ?? false;
  }

  rememberAskedToPersist(): Promise<void> {
    return set('asked-to-persist', factOf(true), this.database.store('facts'));
  }

  private async fact<T>(key: string): Promise<T | null> {
    return valueOf<T>(await get<unknown>(key, this.database.store('facts')));
  }
}

/** Looms whose fittings a pull carries, every one: what is known of them otherwise was taken back. */
export function loomsFittedIn({ fittings, fittingsOf }: PullResponse): ReadonlySet<string> {
  // A server before `fittingsOf` named no loom that has none any more.
  return new Set([...(fittingsOf ?? []), ...fittings.map((fitting) => fitting.loomId)]);
}

async function replaceFittings(store: IDBObjectStore, pull: PullResponse): Promise<void> {
  const looms = loomsFittedIn(pull);
  if (looms.size === 0) return;
  const keys = await result(store.getAllKeys());
  const known = await result<unknown[]>(store.getAll());
  for (const [index, key] of keys.entries()) {
    const fitting = valueOf<Fitting>(known[index]);
    if (fitting && looms.has(fitting.loomId)) store.delete(key);
  }
  for (const fitting of pull.fittings) store.put(factOf(fitting), fitting.id);
}

/** The value of a stored fact; null: missing, or written by a newer application. */
function valueOf<T>(raw: unknown): T | null {
  return isReadable(raw) ? (raw as Fact<T>).value : null;
}

export function idOf(pulled: PulledEntry): string {
  const id = pulled.entry['id'];
  return typeof id === 'string' ? id : '';
}
