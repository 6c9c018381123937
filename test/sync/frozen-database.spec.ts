import 'fake-indexeddb/auto';
import { readFileSync } from 'node:fs';
import { IDBFactory } from 'fake-indexeddb';
import { entrySchema } from '@shared/entries/entry';
import { LocalDatabase, result } from '../../src/app/offline/local-database';
import { Outbox } from '../../src/app/offline/outbox';
import { PhotoStore } from '../../src/app/offline/photo-store';
import { anUnnumbered } from '../../src/app/testing/entry-builders';

type Kept = Readonly<Record<string, unknown>>;
interface Frozen {
  readonly version: number;
  readonly stores: Readonly<
    Record<
      string,
      { readonly index: string | null; readonly records: Readonly<Record<string, Kept | number>> }
    >
  >;
}

/** The database as the application of then made and left it, opened by today's. */
async function over({ version, stores }: Frozen): Promise<LocalDatabase> {
  const factory = new IDBFactory() as unknown as globalThis.IDBFactory;
  const opening = factory.open('shedbeat', version);
  opening.onupgradeneeded = () => {
    for (const [name, { index }] of Object.entries(stores)) {
      const store = opening.result.createObjectStore(name);
      if (index !== null) store.createIndex(index, index);
    }
  };
  const database = await result(opening);
  const transaction = database.transaction(Object.keys(stores), 'readwrite');
  for (const [name, { records }] of Object.entries(stores))
    for (const [key, record] of Object.entries(records))
      await result(transaction.objectStore(name).put(name === 'photos' ? withBytes(record) : record, key));
  database.close();
  return new LocalDatabase(factory);
}

function withBytes(record: Kept | number): Kept {
  if (typeof record === 'number') throw new Error('No photo.');
  return { ...record, bytes: Uint8Array.from(Buffer.from(String(record['bytes']), 'base64')).buffer };
}

describe.each(['2026-12-01-device-database-v2.json'])(
  'the database that a tablet left behind: %s',
  (file) => {
    const frozen = JSON.parse(readFileSync(new URL(`../frozen/${file}`, import.meta.url), 'utf8')) as Frozen;

    it('gives every entry, whole and in its state', async () => {
      const outbox = new Outbox(await over(frozen));
      const records = await outbox.all();
      expect(records.map(({ state }) => state).sort()).toEqual(['held', 'later', 'refused', 'waiting']);
      const sent = await outbox.sentSince(0);
      expect(sent.map(({ entry }) => entry.kind).sort()).toEqual(['repair', 'warp-change']);
      for (const { entry } of [...records, ...sent]) expect(entrySchema.parse(entry)).toEqual(entry);
    });

    it('sends what waits, again too what was acknowledged, and numbers on', async () => {
      const outbox = new Outbox(await over(frozen));
      const kinds = async () => (await outbox.nextBatch(500)).map(({ kind }) => kind).sort();
      expect(await kinds()).toEqual(['pay-word']);
      await outbox.requeueLater();
      expect(await kinds()).toEqual(['care', 'pay-word']);
      await outbox.resend(0);
      expect(await kinds()).toEqual(['care', 'pay-word', 'repair', 'stop', 'warp-change']);
      const [next] = await outbox.append([{ ...anUnnumbered(), deviceId: 'tablet-north' }]);
      expect(next?.entry.deviceSeq).toBe(38);
    });

    it('still has the photos that wait, with their bytes', async () => {
      const photos = await new PhotoStore(await over(frozen)).all();
      expect(photos.map(({ code, logged }) => [code, logged])).toEqual([
        [null, true],
        ['photo-other', true],
      ]);
      for (const { bytes } of photos) expect([...new Uint8Array(bytes)]).toEqual([255, 216, 255, 217]);
    });
  },
);
