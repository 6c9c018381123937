import 'fake-indexeddb/auto';
import { sentenceOf, statusOf, type ErrorCode } from '@shared/contract/errors';
import type { Answer } from '../core/answer';
import { newId } from '../core/ids';
import { quotaExceeded, WatchedFactory } from '../testing/watched-factory';
import { LocalDatabase } from './local-database';
import { PhotoStore, type PhotoRecord } from './photo-store';
import { PhotoSync } from './photo-sync';

const OK: Answer<unknown> = { kind: 'ok', body: {} };
const OFFLINE: Answer<unknown> = { kind: 'offline', why: 'no-network' };
const problem = (code: ErrorCode, retryAfter: number | null = null): Answer<unknown> => {
  const status = statusOf(code);
  return {
    kind: 'problem',
    status,
    code,
    problem: { type: code, title: sentenceOf(code), status, code },
    retryAfter,
  };
};

function setUp() {
  const watched = new WatchedFactory();
  const store = new PhotoStore(new LocalDatabase(watched.factory));
  const answers: Answer<unknown>[] = [];
  const sent: string[] = [];
  const inBook = new Set<string>(['repair-1']);
  const waits: number[] = [];
  let leads = true;
  const sync = new PhotoSync({
    store,
    upload: (photo) => {
      sent.push(photo.id);
      return Promise.resolve(answers.shift() ?? OK);
    },
    leads: () => leads,
    isInBook: (id) => inBook.has(id),
    // The third wait has no end.
    timers: {
      wait: (ms) => (waits.push(ms) < 3 ? Promise.resolve() : new Promise(() => undefined)),
    },
    random: () => 0.5,
    changed: () => undefined,
  });
  const take = async (repairId = 'repair-1', logged = true): Promise<string> => {
    const id = newId();
    const bytes = new Uint8Array([1, 2, 3]).buffer;
    await store.add({ id, repairId, bytes, type: 'image/jpeg', takenAt: 1_000 });
    if (logged) await store.markLogged([id], true);
    return id;
  };
  const left = async (): Promise<readonly (readonly [string, PhotoRecord['code']])[]> =>
    (await store.all()).map(({ id, code }) => [id, code]);
  return { watched, store, answers, sent, inBook, sync, take, left, waits, lose: () => (leads = false) };
}

describe('photos on their way', () => {
  it('are on disk when they are said to be kept, and survive another start', async () => {
    const { watched, store, take } = setUp();
    const id = await take('repair-1', false);
    expect(watched.durabilities).toEqual(['strict']);
    const again = new PhotoStore(new LocalDatabase(watched.factory));
    const [photo] = await again.ofRepair('repair-1');
    expect(photo).toMatchObject({ id, type: 'image/jpeg', logged: false });
    expect([...new Uint8Array(photo!.bytes)]).toEqual([1, 2, 3]);
    expect(await store.ofRepair('another')).toEqual([]);
  });

  it('leave the device only when the server keeps them, oldest first', async () => {
    const { sync, take, sent, left, answers } = setUp();
    const ids = [await take(), await take(), await take()];
    answers.push(OK, OFFLINE);
    expect(await sync.pass()).toEqual({ why: 'offline', retryAfter: null });
    expect(sent).toEqual(ids.slice(0, 2));
    expect((await left()).map(([id]) => id)).toEqual(ids.slice(1));
    expect(await sync.pass()).toBeNull();
    expect(await left()).toEqual([]);
  });

  it('wait for their repair to be logged, and to be in the book', async () => {
    const { sync, take, sent, inBook } = setUp();
    await take('repair-1', false);
    const later = await take('repair-2');
    await sync.pass();
    expect(sent).toEqual([]);
    inBook.add('repair-2');
    await sync.pass();
    expect(sent).toEqual([later]);
  });

  it('that are no pictures stay, with the reason, and do not hold up the others', async () => {
    const { sync, take, left, answers, sent } = setUp();
    const [bad, good] = [await take(), await take()];
    answers.push(problem('photo-not-an-image'));
    expect(await sync.pass()).toBeNull();
    expect(await left()).toEqual([[bad, 'photo-not-an-image']]);
    await sync.pass();
    expect(sent).toEqual([bad, good]);
  });

  it.each([
    ['photo-no-repair', 'refused'],
    ['not-signed-in', 'refused'],
    ['busy', 'busy'],
    ['disk-full', 'busy'],
  ] as const)('are tried again after %s', async (code, why) => {
    const { sync, take, left, answers } = setUp();
    const id = await take();
    answers.push(problem(code, 7_000));
    expect(await sync.pass()).toEqual({ why, retryAfter: 7_000 });
    expect(await left()).toEqual([[id, null]]);
  });

  it('are tried ever more seldom', async () => {
    const { sync, take, waits, answers } = setUp();
    await take();
    answers.push(OFFLINE, OFFLINE, OFFLINE);
    sync.start();
    await vi.waitFor(() => expect(waits).toEqual([375, 750, 1_500]));
    sync.stop();
  });

  it('are sent by one tab', async () => {
    const { sync, take, sent, lose } = setUp();
    await take();
    lose();
    await sync.pass();
    expect(sent).toEqual([]);
  });

  it('of what was never logged are dropped after a while; a refused one is not', async () => {
    const { store, take, left } = setUp();
    await take('repair-9', false);
    const logged = await take();
    await store.refuse(logged, 'photo-too-large');
    await store.prune(2_000);
    expect(await left()).toEqual([[logged, 'photo-too-large']]);
  });

  it('that do not fit are said not to be kept', async () => {
    const { watched, store, left } = setUp();
    watched.beforePut = () => {
      throw quotaExceeded();
    };
    const photo = { id: newId(), repairId: 'r', bytes: new ArrayBuffer(3), type: 'image/jpeg', takenAt: 1 };
    await expect(store.add(photo)).rejects.toMatchObject({ name: 'QuotaExceededError' });
    expect(await left()).toEqual([]);
  });
});
