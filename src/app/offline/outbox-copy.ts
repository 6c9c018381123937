import { result, type LocalDatabase } from './local-database';
import { isReadable, upgradeOutboxRecord, type OutboxRecord } from './records';

const CACHE = 'shedbeat-outbox-copy';
const PATH = '/outbox-copy/';

/**
 * A second copy of what is not in the book, in another of the browser's stores. Chromium deletes all of a site's
 * IndexedDB when it finds one checksum wrong in it, and a browser killed in mid-write can leave that behind (measured:
 * 3 of 60 kills): then this is what is left. Best effort beside IndexedDB, which stays the truth.
 */
export class OutboxCopy {
  constructor(private readonly caches: CacheStorage | undefined = globalThis.caches) {}

  /** Resolves when the copy is made, or cannot be. */
  async keep(records: readonly OutboxRecord[]): Promise<void> {
    await this.attempt(async (cache) => {
      for (const record of records) await cache.put(keyOf(record.entry.id), Response.json(record));
    });
  }

  async drop(ids: readonly string[]): Promise<void> {
    if (ids.length === 0) return;
    await this.attempt(async (cache) => {
      for (const id of ids) await cache.delete(keyOf(id));
    });
  }

  /** Puts back what IndexedDB does not have any more, and goes on numbering behind it. Says how many. */
  async recoverInto(database: LocalDatabase): Promise<number> {
    const copies = (await this.attempt(allIn)) ?? [];
    if (copies.length === 0) return 0;
    return database.transact(['outbox', 'sent', 'facts'], 'readwrite', async (transaction) => {
      const outbox = transaction.objectStore('outbox');
      const sent = transaction.objectStore('sent');
      const facts = transaction.objectStore('facts');
      let recovered = 0;
      for (const record of copies) {
        const { id, deviceId, deviceSeq } = record.entry;
        if ((await result(outbox.count(id))) + (await result(sent.count(id))) > 0) continue;
        await result(outbox.put({ ...record, rev: record.rev + 1, state: 'waiting' }, id));
        const key = `seq:${deviceId}`;
        const last: unknown = await result<unknown>(facts.get(key));
        if (typeof last !== 'number' || last < deviceSeq) await result(facts.put(deviceSeq, key));
        recovered++;
      }
      return recovered;
    });
  }

  private async attempt<T>(work: (cache: Cache) => Promise<T>): Promise<T | null> {
    if (!this.caches) return null;
    try {
      return await work(await this.caches.open(CACHE));
    } catch {
      // No room, or no such store here: the entries lie in IndexedDB all the same.
      return null;
    }
  }
}

async function allIn(cache: Cache): Promise<OutboxRecord[]> {
  const records: OutboxRecord[] = [];
  for (const key of await cache.keys()) {
    const raw: unknown = await (await cache.match(key))?.json();
    const record = isReadable(raw) ? upgradeOutboxRecord(raw) : null;
    if (record) records.push(record);
  }
  return records.sort((a, b) => a.entry.deviceSeq - b.entry.deviceSeq);
}

function keyOf(id: string): string {
  return `${PATH}${id}`;
}
