import 'fake-indexeddb/auto';
import { anUnnumbered } from '../testing/entry-builders';
import { WatchedFactory } from '../testing/watched-factory';
import { LocalDatabase } from './local-database';
import { Outbox } from './outbox';
import { OutboxCopy } from './outbox-copy';

/**
 * As much of a browser's caches as the copy uses; one lists so many of its requests at most, as Chromium does. `read`:
 * the copies that were looked into.
 */
function memoryCaches(read: string[] = [], listed = 500): CacheStorage {
  const stores = new Map<string, Map<string, string>>();
  const cacheOver = (kept: Map<string, string>) => ({
    put: async (key: string, response: Response) => void kept.set(key, await response.text()),
    delete: (key: string) => Promise.resolve(kept.delete(key)),
    keys: () =>
      kept.size > listed
        ? Promise.reject(new DOMException('Operation too large.', 'AbortError'))
        : Promise.resolve([...kept.keys()].map((key) => ({ url: `http://mill.test${key}` }))),
    match: ({ url }: Request) => {
      read.push(url);
      return Promise.resolve(new Response(kept.get(new URL(url).pathname)));
    },
  });
  return {
    keys: () => Promise.resolve(['another-cache', ...stores.keys()]),
    open: (name: string) => {
      const kept = stores.get(name) ?? new Map<string, string>();
      stores.set(name, kept);
      return Promise.resolve(cacheOver(kept));
    },
  } as unknown as CacheStorage;
}

const freshDatabase = () => new LocalDatabase(new WatchedFactory().factory);

describe('the second copy of the outbox', () => {
  it('gives back what waited where the browser deleted its IndexedDB, and numbers on behind it', async () => {
    const copy = new OutboxCopy(memoryCaches());
    const before = new Outbox(freshDatabase());
    const records = await before.append([anUnnumbered(), anUnnumbered(), anUnnumbered()]);
    await copy.keep(records);
    await copy.drop([records[0]!.entry.id]);

    const database = freshDatabase();
    expect(await copy.recoverInto(database)).toBe(2);
    const after = new Outbox(database);
    expect(await after.nextBatch(10)).toEqual(records.slice(1).map(({ entry }) => entry));
    const [next] = await after.append([anUnnumbered()]);
    expect(next?.entry.deviceSeq).toBe(4);
  });

  it('neither changes nor reads anything where nothing is missing: what waits, what was acknowledged', async () => {
    const read: string[] = [];
    const copy = new OutboxCopy(memoryCaches(read));
    const database = freshDatabase();
    const outbox = new Outbox(database);
    const records = await outbox.append([anUnnumbered(), anUnnumbered()]);
    await copy.keep(records);
    const [first] = records.map(({ entry }) => entry);
    await outbox.settle([first!], [{ id: first!.id, index: 0, result: 'stored' }], 1);
    expect(await copy.recoverInto(database)).toBe(0);
    expect(await outbox.countWaiting()).toBe(1);
    expect(read).toEqual([]);
  });

  it('gives back thousands in the order in which they were made', async () => {
    const copy = new OutboxCopy(memoryCaches());
    const records = await new Outbox(freshDatabase()).append(
      Array.from({ length: 1_050 }, () => anUnnumbered()),
    );
    await copy.keep([...records].reverse());
    const database = freshDatabase();
    expect(await copy.recoverInto(database)).toBe(1_050);
    expect(await new Outbox(database).nextBatch(2_000)).toEqual(records.map(({ entry }) => entry));
  });

  it('is done without where the browser has no such store, or no room in it', async () => {
    const none = () => Promise.reject(new DOMException('Full.', 'QuotaExceededError'));
    const full = { open: none, keys: none };
    for (const caches of [undefined, full as unknown as CacheStorage]) {
      const copy = new OutboxCopy(caches);
      const records = await new Outbox(freshDatabase()).append([anUnnumbered()]);
      await copy.keep(records);
      expect(await copy.recoverInto(freshDatabase())).toBe(0);
    }
  });
});
