import { result, type LocalDatabase } from './local-database';
import { isReadable, upgradeOutboxRecord, type OutboxRecord } from './records';

/** One of sixteen caches, by the id's last digit: Chromium lists no more than some 19,000 requests of one cache. */
const CACHE = 'shedbeat-outbox-copy';
const PATH = '/outbox-copy/';
/** Copies that are read at a time. */
const AT_ONCE = 100;

/**
 * A second copy of what is not in the book, in another of the browser's stores. Chromium deletes all of a site's
 * IndexedDB when it finds one checksum wrong in it, and a browser killed in mid-write can leave that behind (measured:
 * 3 of 60 kills): then this is what is left. Best effort beside IndexedDB, which stays the truth.
 */
export class OutboxCopy {
  constructor(private readonly caches: CacheStorage | undefined = globalThis.caches) {}

  /** Resolves when the copy is made, or cannot be. */
  async keep(records: readonly OutboxRecord[]): Promise<void> {
    for (const record of records) {
      const { id } = record.entry;
      await this.attempt(async (caches) => {
        const cache = await caches.open(cacheOf(id));
        await cache.put(keyOf(id), Response.json(record));
      });
    }
  }

  async drop(ids: readonly string[]): Promise<void> {
    for (const id of ids)
      await this.attempt(async (caches) => (await caches.open(cacheOf(id))).delete(keyOf(id)));
  }

  /**
   * Puts back what IndexedDB does not have any more, and goes on numbering behind it. Says how many. Of what is there
   * only the keys are looked at: after a week without network there are many.
   */
  async recoverInto(database: LocalDatabase): Promise<number> {
    const names = (await this.attempt((caches) => caches.keys())) ?? [];
    const ours = names.filter((name) => name.startsWith(`${CACHE}-`));
    if (ours.length === 0) return 0;
    const known = await database.transact(['outbox', 'sent'], 'readonly', knownIds);
    const copies: OutboxRecord[] = [];
    for (const name of ours)
      copies.push(...((await this.attempt((caches) => copiesIn(caches, name, known))) ?? []));
    if (copies.length === 0) return 0;
    copies.sort((a, b) => a.entry.deviceSeq - b.entry.deviceSeq);
    return database.transact(['outbox', 'sent', 'facts'], 'readwrite', (transaction) =>
      putBack(transaction, copies),
    );
  }

  private async attempt<T>(work: (caches: CacheStorage) => Promise<T>): Promise<T | null> {
    if (!this.caches) return null;
    try {
      return await work(this.caches);
    } catch {
      // No room, or no such store here: the entries lie in IndexedDB all the same.
      return null;
    }
  }
}

async function knownIds(transaction: IDBTransaction): Promise<ReadonlySet<unknown>> {
  const keys = ['outbox', 'sent'].map((name) => result(transaction.objectStore(name).getAllKeys()));
  return new Set((await Promise.all(keys)).flat());
}

async function putBack(transaction: IDBTransaction, copies: readonly OutboxRecord[]): Promise<number> {
  const outbox = transaction.objectStore('outbox');
  const facts = transaction.objectStore('facts');
  // Another tab may have put them back meanwhile.
  const known = await knownIds(transaction);
  const lost = copies.filter(({ entry }) => !known.has(entry.id));
  const last = new Map<string, number>();
  for (const record of lost) {
    const { id, deviceId, deviceSeq } = record.entry;
    outbox.put({ ...record, rev: record.rev + 1, state: 'waiting' }, id);
    last.set(deviceId, Math.max(deviceSeq, last.get(deviceId) ?? 0));
  }
  for (const [deviceId, deviceSeq] of last) {
    const key = `seq:${deviceId}`;
    const numbered: unknown = await result<unknown>(facts.get(key));
    if (typeof numbered !== 'number' || numbered < deviceSeq) await result(facts.put(deviceSeq, key));
  }
  return lost.length;
}

/** What a cache has that is not known. */
async function copiesIn(
  caches: CacheStorage,
  name: string,
  known: ReadonlySet<unknown>,
): Promise<OutboxRecord[]> {
  const cache = await caches.open(name);
  const keys = (await cache.keys()).filter((key) => !known.has(idOf(key)));
  const records: OutboxRecord[] = [];
  for (let from = 0; from < keys.length; from += AT_ONCE) {
    const found = await Promise.all(keys.slice(from, from + AT_ONCE).map((key) => cache.match(key)));
    for (const raw of await Promise.all(found.map((one): unknown => one?.json()))) {
      const record = isReadable(raw) ? upgradeOutboxRecord(raw) : null;
      if (record) records.push(record);
    }
  }
  return records;
}

function cacheOf(id: string): string {
  return `${CACHE}-${id.slice(-1)}`;
}

function keyOf(id: string): string {
  return `${PATH}${id}`;
}

function idOf({ url }: Request): string {
  return url.slice(url.lastIndexOf('/') + 1);
}
