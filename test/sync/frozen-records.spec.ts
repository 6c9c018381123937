import 'fake-indexeddb/auto';
import { readFileSync } from 'node:fs';
import { IDBFactory } from 'fake-indexeddb';
import { entrySchema } from '@shared/entries/entry';
import { LocalDatabase } from '../../src/app/offline/local-database';
import { Outbox } from '../../src/app/offline/outbox';
import { anUnnumbered } from '../../src/app/testing/entry-builders';

interface Frozen {
  readonly outbox: readonly { readonly entry: { readonly id: string } }[];
  readonly sent: readonly { readonly entry: { readonly id: string } }[];
  readonly facts: Readonly<Record<string, unknown>>;
}

/** Today's outbox over the stores as an older application left them. */
async function over(file: string) {
  const frozen = JSON.parse(readFileSync(new URL(`../frozen/${file}`, import.meta.url), 'utf8')) as Frozen;
  const database = new LocalDatabase(new IDBFactory() as unknown as globalThis.IDBFactory);
  await database.transact(['outbox', 'sent', 'facts'], 'readwrite', (transaction) => {
    for (const store of ['outbox', 'sent'] as const)
      for (const record of frozen[store]) transaction.objectStore(store).put(record, record.entry.id);
    for (const [key, fact] of Object.entries(frozen.facts)) transaction.objectStore('facts').put(fact, key);
  });
  return new Outbox(database);
}

describe.each(['2026-12-01-outbox-records-v1.json'])('what a tablet left behind: %s', (file) => {
  it('is read whole, and every entry is still one', async () => {
    const outbox = await over(file);
    const records = await outbox.all();
    expect(records.map(({ state }) => state)).toEqual(['waiting', 'held', 'refused']);
    for (const { entry } of [...records, ...(await outbox.sentSince(0))])
      expect(entrySchema.parse(entry)).toEqual(entry);
  });

  it('is sent on, sent again, numbered on and dismissed like today’s', async () => {
    const outbox = await over(file);
    expect((await outbox.nextBatch(500)).map(({ deviceSeq }) => deviceSeq)).toEqual([1]);
    await outbox.resend(0);
    expect((await outbox.nextBatch(500)).map(({ deviceSeq }) => deviceSeq)).toEqual([1, 2, 4]);
    const [next] = await outbox.append([anUnnumbered()]);
    expect(next?.entry.deviceSeq).toBe(5);
    expect(await outbox.dismiss('019ad8b0-1c00-7000-8000-000000000003')).toBe(true);
  });
});
