import 'fake-indexeddb/auto';
import { anUnnumbered } from '../testing/entry-builders';
import { WatchedFactory } from '../testing/watched-factory';
import { LocalDatabase } from './local-database';
import { Outbox } from './outbox';
import { OutboxCopy } from './outbox-copy';

/** As much of a browser's caches as the copy uses. */
function memoryCaches(): CacheStorage {
  const kept = new Map<string, string>();
  const cache = {
    put: async (key: string, response: Response) => void kept.set(key, await response.text()),
    delete: (key: string) => Promise.resolve(kept.delete(key)),
    keys: () => Promise.resolve([...kept.keys()]),
    match: (key: string) => Promise.resolve(kept.has(key) ? new Response(kept.get(key)) : undefined),
  };
  return { open: () => Promise.resolve(cache) } as unknown as CacheStorage;
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

  it('changes nothing where nothing is missing: neither what waits nor what was acknowledged', async () => {
    const copy = new OutboxCopy(memoryCaches());
    const database = freshDatabase();
    const outbox = new Outbox(database);
    const records = await outbox.append([anUnnumbered(), anUnnumbered()]);
    await copy.keep(records);
    const [first] = records.map(({ entry }) => entry);
    await outbox.settle([first!], [{ id: first!.id, index: 0, result: 'stored' }], 1);
    expect(await copy.recoverInto(database)).toBe(0);
    expect(await outbox.countWaiting()).toBe(1);
  });

  it('is done without where the browser has no such store, or no room in it', async () => {
    const full = { open: () => Promise.reject(new DOMException('Full.', 'QuotaExceededError')) };
    for (const caches of [undefined, full as unknown as CacheStorage]) {
      const copy = new OutboxCopy(caches);
      const records = await new Outbox(freshDatabase()).append([anUnnumbered()]);
      await copy.keep(records);
      expect(await copy.recoverInto(freshDatabase())).toBe(0);
    }
  });
});
