import 'fake-indexeddb/auto';
import { createEnvironmentInjector, EnvironmentInjector } from '@angular/core';
import { TestBed } from '@angular/core/testing';
import type { Reference } from '@shared/contract/reference';
import type { PushRequest, PushResult } from '@shared/contract/sync';
import { aClothVersion, aLoomVersion, aShift, someCauses } from '@shared/testing/builders';
import { API } from '../core/api-paths';
import { AccessToken } from '../core/access-token';
import { ApiClient } from '../core/api-client';
import { Clock } from '../core/clock';
import { SessionStore } from '../core/session-store';
import { aPull } from '../testing/entry-builders';
import { aSession, json, StubServer } from '../testing/stub-server';
import { quotaExceeded, WatchedFactory } from '../testing/watched-factory';
import { until } from '../testing/until';
import { BookSignals } from './book-signals';
import { OfflineBook } from './offline-book';
import { OfflineParts } from './offline-parts';

const now = Date.now();
const long = now - 400 * 86_400_000;
const loom = (id: string, number: number) => ({
  id,
  shedId: 'shed-1',
  number,
  row: 1,
  position: number,
  alley: 'A',
  from: long,
  until: null,
});
const shift = aShift({ startsAt: now - 3_600_000, endsAt: now + 3_600_000 });
const reference: Reference = {
  mill: { name: 'Test', timeZone: 'UTC', units: 'metric' },
  sheds: [{ id: 'shed-1', name: 'North' }],
  looms: [loom('loom-1', 1), loom('loom-2', 2), loom('loom-3', 3)],
  loomVersions: ['loom-1', 'loom-2', 'loom-3'].map((loomId) => aLoomVersion({ loomId, effectiveAt: long })),
  cloths: [{ id: 'cloth-1', name: 'Plain' }],
  clothVersions: [aClothVersion({ effectiveAt: long })],
  warps: [],
  causeVersions: someCauses().map((cause) => ({ ...cause, effectiveAt: long })),
};
const people = [
  {
    id: 'ada',
    worksNumber: '101',
    name: 'Ada Hartley',
    shortName: 'Ada',
    roles: ['weaver' as const],
    usualSet: ['loom-3', 'loom-1'],
  },
];
const warpBreak = { kind: 'stop', loomId: 'loom-1', cause: 'warp-break', count: 1 } as const;

let server: StubServer;
let watched: WatchedFactory;

/** The word on each pushed entry by its place. */
function takes(...words: Partial<PushResult>[]): void {
  server.on(API.push, ({ body }) => {
    const { entries, sentAt } = body as PushRequest;
    const results = entries.map((entry, index) => ({
      id: entry['id'],
      index,
      result: 'stored',
      at: entry['at'],
      shiftKey: shift.key,
      ...words[index],
    }));
    return json({ serverNow: sentAt, offset: 0, results });
  });
}

async function start(): Promise<OfflineBook> {
  TestBed.resetTestingModule();
  const book = TestBed.inject(OfflineBook);
  await TestBed.inject(SessionStore).start();
  await book.whenReady();
  await until(() => expect(book.ready()).toBe(true));
  return book;
}

beforeEach(() => {
  localStorage.clear();
  watched = new WatchedFactory();
  vi.stubGlobal('indexedDB', watched.factory);
  server = new StubServer();
  vi.stubGlobal('fetch', server.fetch);
  server.on(API.refresh, () => json(aSession({ serverNow: Date.now() })));
  server.on(API.pull, () => {
    const first = server.countOf(API.pull) === 1;
    const whole = { snapshot: true, reference, people, shifts: [shift] };
    return json(aPull({ serverNow: Date.now(), ...(first && whole) }));
  });
});
afterEach(async () => {
  const parts = TestBed.inject(OfflineParts);
  await parts.loop.stop();
  TestBed.resetTestingModule();
  vi.unstubAllGlobals();
});

describe('OfflineBook', () => {
  it('goes from saved to in the book', async () => {
    const book = await start();
    await until(() => expect(book.currentShift()?.key).toBe(shift.key));
    const entry = await book.log(warpBreak);
    expect(book.syncState()).toMatchObject({ waiting: 1 });
    expect(book.syncState().kind).not.toBe('in-book');
    expect(book.notSent('loom-1')).toBe(1);
    expect(book.items()).toMatchObject([{ id: entry.id, state: 'waiting', what: 'Loom 1: warp break' }]);
    takes();
    book.retryNow();
    await until(() => expect(book.syncState()).toMatchObject({ kind: 'in-book', waiting: 0, needsLook: 0 }));
    expect(book.items()).toEqual([]);
    expect(book.notSent('loom-1')).toBe(0);
    expect(entry).toMatchObject({
      by: 'ada',
      grantId: 'grant-1',
      deviceId: 'tablet-1',
      deviceSeq: 1,
      shedId: 'shed-1',
    });
  });

  it('keeps the queue over a reload without network, and counts it in the line', async () => {
    const book = await start();
    await until(() => expect(book.currentShift()?.key).toBe(shift.key));
    await book.log(warpBreak);
    await book.log({ ...warpBreak, loomId: 'loom-2' });
    server.unplug();
    TestBed.inject(OfflineParts).loop.insist();
    await TestBed.inject(OfflineParts).loop.stop();
    const again = await start();
    await until(() =>
      expect(again.syncState()).toMatchObject({ kind: 'offline', waiting: 2, online: false }),
    );
    expect(again.syncState().lastReachedAt).not.toBeNull();
    expect(again.lines().get('loom-1')?.stops).toHaveLength(1);
    expect(again.figuresOf('loom-1')?.warp.count).toBe(1);
  });

  it('projects only the touched loom again', async () => {
    const book = await start();
    await until(() => expect(book.lines().size).toBe(3));
    const before = book.lines();
    await book.log(warpBreak);
    const after = book.lines();
    expect(after.get('loom-1')).not.toBe(before.get('loom-1'));
    expect(after.get('loom-2')).toBe(before.get('loom-2'));
    expect(after.get('loom-3')).toBe(before.get('loom-3'));
  });

  it('shows what is held and refused, does not count it, and drops a refused one only after export', async () => {
    const book = await start();
    await until(() => expect(book.currentShift()?.key).toBe(shift.key));
    takes({ result: 'held', hold: 'time-doubtful' }, { result: 'refused', code: 'cause-unknown' });
    const entries = await book.logAll([warpBreak, { ...warpBreak, loomId: 'loom-2' }]);
    await until(() =>
      expect(book.syncState()).toMatchObject({ kind: 'needs-look', needsLook: 2, waiting: 0 }),
    );
    expect(book.items().map(({ state, why }) => [state, why])).toEqual([
      ['held', expect.stringContaining('The foreman decides')],
      ['refused', expect.stringContaining('no such cause')],
    ]);
    expect(book.lines().get('loom-1')?.stops).toEqual([]);
    const refused = entries[1]!.id;
    expect(await book.dismissRefused(refused)).toBe(false);
    const file = JSON.parse(await (await book.exportWaiting()).text()) as {
      entries: { entry: { id: string } }[];
    };
    expect(file.entries.map(({ entry }) => entry.id).sort()).toEqual(entries.map(({ id }) => id).sort());
    expect(await book.dismissRefused(refused)).toBe(true);
    expect(book.items()).toHaveLength(1);
  });

  it('undoes by a void, alone or a whole act', async () => {
    const book = await start();
    await until(() => expect(book.currentShift()?.key).toBe(shift.key));
    const one = await book.log(warpBreak);
    const act = await book.logAll([warpBreak, { ...warpBreak, loomId: 'loom-2' }]);
    expect(act[0]!.batchId).toBe(act[1]!.batchId);
    const undone = await book.undo(one.id);
    expect(undone).toMatchObject({ kind: 'void', targetId: one.id });
    expect(book.basedOn(one.id)).toBe(undone.id);
    expect(
      book
        .lines()
        .get('loom-1')
        ?.stops.map(({ id }) => id),
    ).toEqual([act[0]!.id]);
    await book.undoBatch(act[0]!.batchId!);
    expect(book.lines().get('loom-1')?.stops).toEqual([]);
    expect(book.lines().get('loom-2')?.stops).toEqual([]);
    expect(book.recentOf('loom-1').map(({ voided }) => voided)).toEqual([true, true]);
  });

  it('knows the set in walking order: as its weaver chose the looms, relief last', async () => {
    const book = await start();
    await until(() => expect(book.currentShift()?.key).toBe(shift.key));
    expect(book.mySet()).toEqual([]);
    const take = (loomIds: string[]) =>
      book.log({ kind: 'assign', shiftKey: shift.key, weaverId: 'ada', loomIds });
    await take(['loom-2', 'loom-3']);
    await take(['loom-1']);
    expect(book.mySet().map(({ id }) => id)).toEqual(['loom-2', 'loom-3', 'loom-1']);
    expect(book.weaverOf('loom-2')).toBe('ada');
  });

  it('knows the last reading that holds', async () => {
    const book = await start();
    await until(() => expect(book.currentShift()?.key).toBe(shift.key));
    expect(book.lastReading('loom-1')).toBeNull();
    const reading = { kind: 'reading', loomId: 'loom-1', shiftKey: shift.key, boundary: 'start' } as const;
    await book.log({ ...reading, value: 1_000 });
    const wrong = await book.log({ ...reading, value: 9_000 });
    expect(book.lastReading('loom-1')?.value).toBe(9_000);
    await book.undo(wrong.id);
    expect(book.lastReading('loom-1')?.value).toBe(1_000);
  });

  it('says so when it cannot save, and shows nothing as saved', async () => {
    const book = await start();
    await until(() => expect(book.currentShift()?.key).toBe(shift.key));
    watched.beforePut = (store) => {
      if (store === 'outbox') throw quotaExceeded();
    };
    await expect(book.log(warpBreak)).rejects.toMatchObject({ reason: 'storage-full' });
    expect(book.syncState().waiting).toBe(0);
    expect(book.lines().get('loom-1')?.stops).toEqual([]);
  });

  it('saves nothing while nobody is signed in', async () => {
    server.on(API.refresh, () => json(aSession({ person: null })));
    const book = await start();
    await expect(book.log(warpBreak)).rejects.toMatchObject({ reason: 'nobody' });
  });

  it('carries what is known of the clock', async () => {
    server.on(API.refresh, () => json(aSession({ serverNow: Date.now() + 300_000 })));
    server.on(API.pull, () => json(aPull({ serverNow: Date.now() + 300_000 })));
    const book = await start();
    const entry = await book.log(warpBreak);
    expect(Math.abs((entry.clock?.offset ?? 0) - 300_000)).toBeLessThan(1_000);
    expect(TestBed.inject(Clock).offset()).toBe(entry.clock?.offset);
  });

  it('shows in one tab what is logged and settled in another', async () => {
    const book = await start();
    await until(() => expect(book.currentShift()?.key).toBe(shift.key));
    // Everything of a tab's own; storage, channels and the server are the browser's.
    const own = [AccessToken, ApiClient, Clock, SessionStore, OfflineParts, BookSignals, OfflineBook];
    const tab = createEnvironmentInjector(own, TestBed.inject(EnvironmentInjector));
    try {
      const other = tab.get(OfflineBook);
      await tab.get(SessionStore).start();
      await other.whenReady();
      await until(() => expect(other.currentShift()?.key).toBe(shift.key));
      const entry = await book.log(warpBreak);
      await until(() => expect(other.items().map(({ id }) => id)).toEqual([entry.id]));
      expect(
        other
          .lines()
          .get('loom-1')
          ?.stops.map(({ id }) => id),
      ).toEqual([entry.id]);
      takes();
      other.retryNow();
      await until(() => expect(book.syncState()).toMatchObject({ kind: 'in-book', waiting: 0 }));
      await until(() => expect(other.syncState()).toMatchObject({ kind: 'in-book', waiting: 0 }));
      const [a, b] = await Promise.all([book.log(warpBreak), other.log(warpBreak)]);
      expect([a.deviceSeq, b.deviceSeq].sort()).toEqual([2, 3]);
    } finally {
      await tab.get(OfflineParts).loop.stop();
      tab.destroy();
    }
  });
});
