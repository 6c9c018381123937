import 'fake-indexeddb/auto';
import { anUnnumbered, MORNING } from '../testing/entry-builders';
import { quotaExceeded, WatchedFactory } from '../testing/watched-factory';
import { LocalDatabase } from './local-database';
import { NotSaved } from './not-saved';
import { Outbox } from './outbox';

function setUp() {
  const watched = new WatchedFactory();
  const tab = () => new Outbox(new LocalDatabase(watched.factory));
  return { watched, tab, outbox: tab() };
}

async function failure(promise: Promise<unknown>): Promise<unknown> {
  return promise.then(
    () => null,
    (error: unknown) => error,
  );
}

describe('Outbox.append', () => {
  it('resolves only after the transaction is complete, with strict durability', async () => {
    const { watched, outbox } = setUp();
    await outbox.append([anUnnumbered()]);
    expect(watched.happened).toEqual(['put', 'put', 'complete']);
    expect(watched.durabilities).toEqual(['strict']);
  });

  it('numbers the entries of a device from 1 without gaps, even from several tabs at once', async () => {
    const { tab } = setUp();
    const tabs = [tab(), tab(), tab()];
    const stored = await Promise.all(
      Array.from({ length: 90 }, (_, i) => tabs[i % 3]!.append([anUnnumbered(), anUnnumbered()])),
    );
    const numbers = stored.flat().map((record) => record.entry.deviceSeq);
    expect(numbers.sort((a, b) => a - b)).toEqual(Array.from({ length: 180 }, (_, i) => i + 1));
  });

  it('counts each device for itself', async () => {
    const { outbox } = setUp();
    await outbox.append([anUnnumbered(), anUnnumbered()]);
    const [other] = await outbox.append([anUnnumbered({}, { deviceId: 'tablet-2' })]);
    expect(other?.entry.deviceSeq).toBe(1);
  });

  it('says so and stores nothing of the act when the storage is full', async () => {
    const { watched, outbox } = setUp();
    let puts = 0;
    watched.beforePut = () => {
      if (++puts > 3) throw quotaExceeded();
    };
    const error = await failure(outbox.append([anUnnumbered(), anUnnumbered(), anUnnumbered()]));
    expect(error).toBeInstanceOf(NotSaved);
    expect(error).toMatchObject({ reason: 'storage-full' });
    expect((error as NotSaved).sentence).toMatch(/^Not saved: .*storage is full/);
    watched.beforePut = () => undefined;
    expect(await outbox.all()).toEqual([]);
    const [next] = await outbox.append([anUnnumbered()]);
    expect(next?.entry.deviceSeq).toBe(1);
  });

  it('opens a connection again that was closed under it', async () => {
    const { watched, outbox } = setUp();
    await outbox.append([anUnnumbered()]);
    watched.closeConnections();
    await outbox.append([anUnnumbered()]);
    expect((await outbox.all()).map((record) => record.entry.deviceSeq).sort()).toEqual([1, 2]);
  });

  it('refuses what is no entry and stores nothing', async () => {
    const { outbox } = setUp();
    const error = await failure(outbox.append([anUnnumbered(), anUnnumbered({ count: -1 })]));
    expect(error).toMatchObject({ reason: 'malformed', detail: expect.stringContaining('count') });
    expect(await outbox.all()).toEqual([]);
  });

  it('is there after the application is started again', async () => {
    const { watched, outbox } = setUp();
    await outbox.append([anUnnumbered()]);
    watched.closeConnections();
    const again = new Outbox(new LocalDatabase(watched.factory));
    expect(await again.countWaiting()).toBe(1);
  });
});

describe('Outbox.settle', () => {
  it('keeps the server’s word on each entry', async () => {
    const { outbox } = setUp();
    const records = await outbox.append(Array.from({ length: 5 }, () => anUnnumbered()));
    const batch = await outbox.nextBatch(500);
    expect(batch.map((entry) => entry.id)).toEqual(records.map((record) => record.entry.id));
    await outbox.settle(
      batch,
      [
        { id: batch[0]!.id, index: 0, result: 'stored', at: MORNING + 5, shiftKey: 's' },
        { id: batch[1]!.id, index: 1, result: 'duplicate', at: MORNING, shiftKey: null },
        { id: batch[2]!.id, index: 2, result: 'held', hold: 'shift-closed' },
        { id: batch[3]!.id, index: 3, result: 'refused', code: 'loom-unknown' },
        { id: batch[4]!.id, index: 4, result: 'later' },
      ],
      MORNING + 60_000,
    );
    const states = new Map((await outbox.all()).map((record) => [record.entry.id, record]));
    expect(batch.map((entry) => states.get(entry.id)?.state)).toEqual([
      undefined,
      undefined,
      'held',
      'refused',
      'later',
    ]);
    expect(states.get(batch[2]!.id)?.hold).toBe('shift-closed');
    expect(states.get(batch[3]!.id)?.code).toBe('loom-unknown');
    const sent = await outbox.sentSince(0);
    expect(sent.map((record) => record.entry.id).sort()).toEqual([batch[0]!.id, batch[1]!.id].sort());
    expect(sent.find((record) => record.entry.id === batch[0]!.id)).toMatchObject({
      at: MORNING + 5,
      shiftKey: 's',
    });
    expect(await outbox.nextBatch(500)).toEqual([]);
  });

  it('takes no word on an entry that stands in another place', async () => {
    const { outbox } = setUp();
    await outbox.append([anUnnumbered(), anUnnumbered()]);
    const batch = await outbox.nextBatch(500);
    await outbox.settle(batch, [{ id: batch[1]!.id, index: 0, result: 'stored' }], MORNING);
    expect(await outbox.countWaiting()).toBe(2);
  });
});

describe('Outbox, afterwards', () => {
  async function withOneOfEach() {
    const all = setUp();
    const { outbox } = all;
    await outbox.append([anUnnumbered(), anUnnumbered(), anUnnumbered()]);
    const batch = await outbox.nextBatch(500);
    await outbox.settle(
      batch,
      [
        { id: null, index: 0, result: 'stored' },
        { id: null, index: 1, result: 'held', hold: 'no-shift' },
        { id: null, index: 2, result: 'refused', code: 'id-reused' },
      ],
      MORNING,
    );
    return { ...all, ids: batch.map((entry) => entry.id) };
  }

  it('sends again what was acknowledged or held, not what was refused', async () => {
    const { outbox, ids } = await withOneOfEach();
    await outbox.resend(MORNING - 1);
    expect((await outbox.nextBatch(500)).map((entry) => entry.id)).toEqual(ids.slice(0, 2));
    expect(await outbox.sentSince(0)).toEqual([]);
  });

  it('does not send again what was acknowledged before the window', async () => {
    const { outbox, ids } = await withOneOfEach();
    await outbox.resend(MORNING + 1);
    expect((await outbox.nextBatch(500)).map((entry) => entry.id)).toEqual([ids[1]]);
  });

  it('dismisses a refused entry only after it was exported', async () => {
    const { outbox, ids } = await withOneOfEach();
    expect(await outbox.dismiss(ids[2]!)).toBe(false);
    await outbox.markExported([ids[2]!], MORNING);
    expect(await outbox.dismiss(ids[1]!)).toBe(false);
    expect(await outbox.dismiss(ids[2]!)).toBe(true);
    expect((await outbox.all()).map((record) => record.entry.id)).toEqual([ids[1]]);
  });

  it('drops acknowledged entries when the window is over, nothing else', async () => {
    const { outbox } = await withOneOfEach();
    await outbox.prune(MORNING);
    expect(await outbox.sentSince(0)).toHaveLength(1);
    await outbox.prune(MORNING + 1);
    expect(await outbox.sentSince(0)).toEqual([]);
    expect(await outbox.all()).toHaveLength(2);
  });

  it('settles a held entry by the foreman’s decision', async () => {
    const { outbox, ids } = await withOneOfEach();
    await outbox.decided(new Set([ids[1]!]), MORNING);
    expect((await outbox.all()).map((record) => record.state)).toEqual(['refused']);
  });

  it('leaves a record of a newer version where it lies', async () => {
    const { watched, outbox } = await withOneOfEach();
    const database = new LocalDatabase(watched.factory);
    await database.transact(['outbox'], 'readwrite', (transaction) => {
      transaction.objectStore('outbox').put({ v: 99, state: 'waiting' }, 'from-the-future');
    });
    expect(await outbox.all()).toHaveLength(2);
    expect(await outbox.nextBatch(500)).toEqual([]);
    const kept = await database.transact(
      ['outbox'],
      'readonly',
      (transaction) =>
        new Promise((resolve) => {
          const request = transaction.objectStore('outbox').get('from-the-future');
          request.onsuccess = () => resolve(request.result);
        }),
    );
    expect(kept).toMatchObject({ v: 99 });
  });
});
