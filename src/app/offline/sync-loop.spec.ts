import 'fake-indexeddb/auto';
import type { Entry } from '@shared/entries/entry';
import { anUnnumbered, aPull, MORNING, pulled } from '../testing/entry-builders';
import { OFFLINE, problem, ScriptedServer } from '../testing/scripted-server';
import { VirtualTime } from '../testing/virtual-time';
import { WatchedFactory } from '../testing/watched-factory';
import { until } from '../testing/until';
import { BookStore } from './book-store';
import type { BookEvent } from './book-events';
import { LocalDatabase } from './local-database';
import { Outbox } from './outbox';
import { SyncLoop } from './sync-loop';

function setUp(leads = () => true) {
  const watched = new WatchedFactory();
  const database = new LocalDatabase(watched.factory);
  const outbox = new Outbox(database);
  const book = new BookStore(database);
  const time = new VirtualTime(MORNING);
  const server = new ScriptedServer();
  const loop = new SyncLoop({ api: server, outbox, book, clock: time, timers: time, random: () => 0, leads });
  const events: BookEvent[] = [];
  loop.events$.subscribe((event) => events.push(event));
  const log = async (count = 1): Promise<Entry[]> =>
    (await outbox.append(Array.from({ length: count }, () => anUnnumbered()))).map((record) => record.entry);
  /** Until the loop rests. */
  const settled = () => until(() => expect(time.asleep).toBe(true));
  return { watched, outbox, book, time, server, loop, events, log, settled };
}

describe('one exchange', () => {
  it('pushes what waits, pulls what is new, and keeps the cursor', async () => {
    const { outbox, book, server, loop, log } = setUp();
    const logged = await log(3);
    server.nextPulls.push({ kind: 'ok', body: aPull({ cursor: 'c.1', more: true }) });
    server.nextPulls.push({ kind: 'ok', body: aPull({ cursor: 'c.2' }) });
    expect(await loop.exchangeOnce()).toBeNull();
    expect(server.pushes.map((push) => push.entries.length)).toEqual([3]);
    expect(server.pushes[0]?.waiting).toBe(3);
    expect(server.pulls).toEqual([null, 'c.1']);
    expect(await book.cursor()).toBe('c.2');
    expect(await outbox.all()).toEqual([]);
    expect((await outbox.sentSince(0)).map((record) => record.entry.id)).toEqual(logged.map(({ id }) => id));
    expect(await book.lastReached()).toBe(MORNING);
  });

  it('keeps when the book was reached by the server’s clock, not by one that was put forward', async () => {
    const { book, server, loop } = setUp();
    server.nextPulls.push({ kind: 'ok', body: aPull({ serverNow: MORNING - 7_200_000 }) });
    await loop.exchangeOnce();
    expect(await book.lastReached()).toBe(MORNING - 7_200_000);
    expect(loop.status$.value.lastReachedAt).toBe(MORNING - 7_200_000);
  });

  it('says at the next exchange what the book said of itself, also after a crash', async () => {
    const { server, loop, log, book } = setUp();
    const [entry] = await log();
    const results = [{ id: entry!.id, index: 0, result: 'stored' as const }];
    server.nextPushes.push({ kind: 'ok', body: { serverNow: MORNING, offset: 0, results, mark: 'm.1' } });
    server.nextPulls.push(OFFLINE);
    expect(await loop.exchangeOnce()).toMatchObject({ why: 'offline' });
    expect(await book.mark()).toBe('m.1');
    await log();
    await loop.exchangeOnce();
    expect(server.pushes.map(({ seen }) => seen)).toEqual([undefined, 'm.1']);
    expect(server.seen).toEqual(['m.1', 'm.1']);
  });

  it('withdrawn, with nothing to send, learns by an empty push that it is to send again', async () => {
    const { server, outbox, loop, log } = setUp();
    const [entry] = await log();
    await loop.exchangeOnce();
    const body = { serverNow: MORNING, offset: 0, results: [], mark: 'other.1', resend: true };
    server.nextPulls.push(problem('device-revoked'), problem('device-revoked'));
    server.nextPushes.push({ kind: 'ok', body });
    expect(await loop.exchangeOnce()).toMatchObject({ why: 'refused', code: 'device-revoked' });
    expect(server.pushes.map(({ entries }) => entries.map(({ id }) => id))).toEqual([
      [entry!.id],
      [],
      [entry!.id],
      [],
    ]);
    expect(server.pushes[2]?.seen).toBe('other.1');
    expect(await outbox.countWaiting()).toBe(0);
  });

  it('sends everything again where a push finds another book, and keeps that wish before its mark', async () => {
    const { server, outbox, loop, log, watched, book } = setUp();
    const [first] = await log();
    await loop.exchangeOnce();
    const [second] = await log();
    const results = [{ id: second!.id, index: 0, result: 'stored' as const }];
    const body = { serverNow: MORNING, offset: 0, results, mark: 'm.2', resend: true };
    server.nextPushes.push({ kind: 'ok', body });
    watched.beforePut = (store) => {
      if (store === 'facts') throw new Error('This tab was killed.');
    };
    await expect(loop.exchangeOnce()).rejects.toThrow();
    expect([await book.mark(), await outbox.countWaiting()]).toEqual([null, 2]);
    watched.beforePut = () => undefined;
    expect(await loop.exchangeOnce()).toBeNull();
    expect(server.pushes.at(-1)?.entries.map(({ id }) => id)).toEqual([first!.id, second!.id]);
  });

  it('pushes at most 500 at once', async () => {
    const { server, loop, log } = setUp();
    await log(501);
    await loop.exchangeOnce();
    expect(server.pushes.map((push) => push.entries.length)).toEqual([500, 1]);
  });

  it('halves the batch until the server takes it, and sends all', async () => {
    const { outbox, server, loop, log } = setUp();
    await log(20);
    server.largest = 6;
    expect(await loop.exchangeOnce()).toBeNull();
    expect(server.pushes.map((push) => push.entries.length).slice(0, 3)).toEqual([20, 10, 5]);
    expect(await outbox.countWaiting()).toBe(0);
    expect(await outbox.sentSince(0)).toHaveLength(20);
  });

  it('refuses an entry that is too large alone, and goes on with the next', async () => {
    const { outbox, server, loop, log } = setUp();
    await log(2);
    server.largest = 0;
    await loop.exchangeOnce();
    expect((await outbox.all()).map(({ state, code }) => [state, code])).toEqual([
      ['refused', 'too-large'],
      ['refused', 'too-large'],
    ]);
  });

  it('leaves the queue as it is when the server says 401', async () => {
    const { outbox, server, loop, log } = setUp();
    await log(2);
    server.nextPushes.push(problem('not-signed-in'));
    expect(await loop.exchangeOnce()).toMatchObject({ why: 'refused', code: 'not-signed-in' });
    expect(await outbox.countWaiting()).toBe(2);
    expect(server.pushes).toHaveLength(1);
  });

  it('does not believe a server that says nothing on any entry', async () => {
    const { outbox, server, loop, log } = setUp();
    await log(1);
    server.nextPushes.push({ kind: 'ok', body: { serverNow: MORNING, offset: 0, results: [] } });
    expect(await loop.exchangeOnce()).toMatchObject({ code: 'internal' });
    expect(await outbox.countWaiting()).toBe(1);
  });

  it('sends an entry again whose answer was lost', async () => {
    const { outbox, server, loop, log } = setUp();
    const [entry] = await log(1);
    server.nextPushes.push(OFFLINE);
    expect(await loop.exchangeOnce()).toMatchObject({ why: 'offline' });
    server.word = () => ({ result: 'duplicate', at: MORNING + 1, shiftKey: 's' });
    expect(await loop.exchangeOnce()).toBeNull();
    expect(server.pushes.map((push) => push.entries[0]?.['id'])).toEqual([entry!.id, entry!.id]);
    expect(await outbox.sentSince(0)).toMatchObject([{ state: 'stored', at: MORNING + 1, shiftKey: 's' }]);
  });

  it('keeps `later` waiting and tries it again after a quarter of an hour', async () => {
    const { outbox, server, loop, log, time } = setUp();
    await log(1);
    server.word = () => ({ result: 'later' });
    await loop.exchangeOnce();
    expect((await outbox.all()).map(({ state }) => state)).toEqual(['later']);
    await loop.exchangeOnce();
    expect(server.pushes).toHaveLength(1);
    time.advance(15 * 60_000);
    server.word = () => ({ result: 'stored' });
    await loop.exchangeOnce();
    expect(server.pushes).toHaveLength(2);
    expect(await outbox.all()).toEqual([]);
  });

  it('sends again what was acknowledged in the last 14 days when the book is another one', async () => {
    const { server, loop, log, time } = setUp();
    const [old] = await log(1);
    await loop.exchangeOnce();
    time.advance(15 * 86_400_000);
    const [recent] = await log(1);
    await loop.exchangeOnce();
    time.advance(86_400_000);
    server.pushes.length = 0;
    server.nextPulls.push({ kind: 'ok', body: aPull({ snapshot: true, resend: true, cursor: 'other.1' }) });
    await loop.exchangeOnce();
    expect(server.pushes.flatMap((push) => push.entries.map((entry) => entry['id']))).toEqual([recent!.id]);
    expect(old!.id).not.toBe(recent!.id);
  });

  it('keeps the wish to send again over a crash before the new cursor is stored', async () => {
    const { watched, outbox, book, server, loop, log } = setUp();
    await log(1);
    await loop.exchangeOnce();
    watched.beforePut = (_store, value) => {
      if (typeof value === 'object' && value !== null && 'value' in value && value.value === 'other.1')
        throw new Error('crash');
    };
    server.nextPulls.push({ kind: 'ok', body: aPull({ snapshot: true, resend: true, cursor: 'other.1' }) });
    await expect(loop.exchangeOnce()).rejects.toThrow('crash');
    expect(await book.cursor()).toBe('c.1');
    expect(await outbox.countWaiting()).toBe(1);
  });

  it('settles held entries when their decision is pulled', async () => {
    const { outbox, server, loop, log } = setUp();
    const [entry] = await log(1);
    server.word = () => ({ result: 'held', hold: 'shift-closed' });
    await loop.exchangeOnce();
    expect((await outbox.all()).map(({ state }) => state)).toEqual(['held']);
    const hold = { shiftKey: 's', reason: 'shift-closed', state: 'accepted' } as const;
    server.nextPulls.push({ kind: 'ok', body: aPull({ entries: [pulled(entry!, { holds: [hold] })] }) });
    await loop.exchangeOnce();
    expect(await outbox.all()).toEqual([]);
  });

  it('tells views what became durable, after it is', async () => {
    const { events, loop, log } = setUp();
    const [entry] = await log(1);
    await loop.exchangeOnce();
    const told = events.filter((event) => event.kind !== 'status');
    expect(told.map((event) => event.kind)).toEqual(['outbox', 'pulled']);
    expect(told[0]).toMatchObject({ records: [{ entry: { id: entry!.id }, state: 'stored' }] });
  });
});

describe('the loop', () => {
  it('backs off longer with each failure, and starts anew after success', async () => {
    const { server, loop, time, settled } = setUp();
    server.nextPulls.push(OFFLINE, OFFLINE, OFFLINE);
    loop.start();
    for (const wait of [250, 500, 1_000]) {
      await settled();
      expect(time.waits.at(-1)).toBe(wait);
      expect(loop.status$.value).toMatchObject({
        phase: 'backing-off',
        reach: 'offline',
        nextTryAt: time.now() + wait,
      });
      time.advance(wait);
    }
    await settled();
    expect(loop.status$.value).toMatchObject({ phase: 'resting', reach: 'reached', nextTryAt: null });
    server.nextPulls.push(OFFLINE);
    loop.nudge();
    await until(() => expect(time.waits.at(-1)).toBe(250));
    await loop.stop();
  });

  it('waits no longer where something got through before the network failed', async () => {
    const { server, loop, time, settled } = setUp();
    for (let n = 0; n < 4; n++)
      server.nextPulls.push({ kind: 'ok', body: aPull({ cursor: `c.${n}`, more: true }) }, OFFLINE);
    loop.start();
    for (let n = 0; n < 4; n++) {
      await settled();
      expect(time.waits).toEqual(Array.from({ length: n + 1 }, () => 250));
      time.advance(250);
    }
    await loop.stop();
  });

  it('waits as long as the server asks, whoever taps meanwhile; a person may insist', async () => {
    const { server, loop, time, settled, log } = setUp();
    server.nextPushes.push(problem('busy', 90_000));
    await log(1);
    loop.start();
    await settled();
    expect(time.waits.at(-1)).toBe(90_000);
    expect(loop.status$.value).toMatchObject({ reach: 'refused', code: 'busy' });
    loop.nudge();
    loop.networkBack();
    time.advance(89_999);
    expect(time.asleep).toBe(true);
    expect(server.pushes).toHaveLength(1);
    loop.insist();
    await until(() => expect(server.pushes).toHaveLength(2));
    await loop.stop();
  });

  it('tries at once when the network is back', async () => {
    const { server, loop, settled } = setUp();
    server.nextPulls.push(OFFLINE);
    loop.start();
    await settled();
    loop.networkBack();
    await until(() => expect(loop.status$.value.reach).toBe('reached'));
    await loop.stop();
  });

  it('sends what is logged while an exchange is under way, without waiting for the next poll', async () => {
    const { server, loop, log, settled } = setUp();
    const pull = server.pull.bind(server);
    server.pull = async (after, seen) => {
      if (server.pulls.length === 0) {
        await log(1);
        loop.nudge();
      }
      return pull(after, seen);
    };
    loop.start();
    await until(() => expect(server.pushes).toHaveLength(1));
    await settled();
    await loop.stop();
  });

  it('leaves the server alone in a tab that does not lead, until it does', async () => {
    let leading = false;
    const { server, loop, time, settled } = setUp(() => leading);
    loop.start();
    await settled();
    time.advance(5_000);
    await settled();
    expect(server.pulls).toEqual([]);
    leading = true;
    time.advance(5_000);
    await until(() => expect(server.pulls).toHaveLength(1));
    await loop.stop();
  });

  it('goes on after trouble with the device’s own storage', async () => {
    const { watched, server, loop, time, settled, log } = setUp();
    await log(1);
    watched.beforePut = () => {
      throw new DOMException('gone', 'DataError');
    };
    loop.start();
    await settled();
    watched.beforePut = () => undefined;
    time.advance(60_000);
    await until(() => expect(loop.status$.value.phase).toBe('resting'));
    expect(server.pushes.length).toBeGreaterThan(1);
    await loop.stop();
  });
});
