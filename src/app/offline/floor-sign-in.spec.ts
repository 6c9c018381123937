import 'fake-indexeddb/auto';
import { TestBed } from '@angular/core/testing';
import { API } from '../core/api-paths';
import { SessionStore } from '../core/session-store';
import { aPull } from '../testing/entry-builders';
import { ADA, aSession, json, problemResponse, StubServer } from '../testing/stub-server';
import { WatchedFactory } from '../testing/watched-factory';
import { until } from '../testing/until';
import { FloorSignIn } from './floor-sign-in';
import { OfflineParts } from './offline-parts';

let server: StubServer;
let pin: string;

function plugIn(): void {
  server.on(API.refresh, () => json(aSession({ person: null })));
  server.on(API.pull, () => json(aPull({ serverNow: Date.now() })));
  server.on(API.signInFloor, ({ body }) =>
    (body as { pin: string }).pin === pin ? json(aSession()) : problemResponse('wrong-sign-in'),
  );
}

async function start() {
  TestBed.resetTestingModule();
  const session = TestBed.inject(SessionStore);
  const door = TestBed.inject(FloorSignIn);
  const parts = TestBed.inject(OfflineParts);
  await session.start();
  await parts.start();
  return { session, door, parts };
}

/** A tablet on which Ada has signed in, started again without network. */
async function offlineTablet() {
  const first = await start();
  expect(await first.door.signIn('101', '246810')).toEqual({ ok: true });
  await first.parts.loop.stop();
  server.unplug();
  return start();
}

beforeEach(() => {
  localStorage.clear();
  vi.stubGlobal('indexedDB', new WatchedFactory().factory);
  server = new StubServer();
  vi.stubGlobal('fetch', server.fetch);
  pin = '246810';
  plugIn();
});
afterEach(async () => {
  await TestBed.inject(OfflineParts).loop.stop();
  TestBed.resetTestingModule();
  vi.unstubAllGlobals();
});

describe('FloorSignIn', () => {
  it('unlocks without network whoever has signed in here, to log and pull and nothing else', async () => {
    const { session, door } = await offlineTablet();
    expect(session.state()).toBe('nobody');
    expect(await door.signIn('101', '246810')).toEqual({ ok: true });
    expect(session.state()).toBe('unlocked-offline');
    expect(session.person()).toEqual(ADA);
    expect(session.grant()?.id).toBe('grant-1');
    expect(session.may('entries.push')).toBe(true);
    expect(session.may('self')).toBe(false);
  });

  it('says in words why it does not', async () => {
    const { door } = await offlineTablet();
    expect(await door.signIn('101', '111111')).toMatchObject({ code: 'unlock-wrong' });
    expect(await door.signIn('999', '246810')).toMatchObject({
      code: 'unlock-unknown',
      sentence: expect.stringContaining('has not signed in on this tablet before'),
    });
  });

  it('has the PIN checked as soon as the server is reached', async () => {
    const { session, door, parts } = await offlineTablet();
    await door.signIn('101', '246810');
    plugIn();
    parts.loop.insist();
    await until(() => expect(session.state()).toBe('signed-in'));
    expect(door.refused()).toBeNull();
  });

  it('locks again when the server says that the PIN is no longer right, and forgets the old one', async () => {
    const { session, door, parts } = await offlineTablet();
    await door.signIn('101', '246810');
    pin = '135790';
    plugIn();
    parts.loop.insist();
    await until(() => expect(session.state()).toBe('nobody'));
    expect(door.refused()).toContain('do not go together');
    server.unplug();
    expect(await door.signIn('101', '246810')).toMatchObject({ code: 'unlock-unknown' });
  });

  it('does not go round what the server says about the tablet or the person', async () => {
    const first = await start();
    await first.door.signIn('101', '246810');
    for (const code of ['device-revoked', 'device-unknown', 'wrong-sign-in', 'too-many-tries'] as const) {
      server.on(API.signInFloor, () => problemResponse(code));
      expect(await first.door.signIn('101', '246810')).toMatchObject({ ok: false, code });
    }
  });

  it('says of a wrong PIN the same with network as without, and nothing of e-mail and password', async () => {
    const sentence = 'Number and PIN do not go together. Try again.';
    const online = await start();
    expect(await online.door.signIn('101', '111111')).toMatchObject({ code: 'wrong-sign-in', sentence });
    await online.parts.loop.stop();
    const { door } = await offlineTablet();
    expect(await door.signIn('101', '111111')).toMatchObject({ code: 'unlock-wrong', sentence });
  });

  it('unlocks while the server is there but cannot answer', async () => {
    const first = await start();
    await first.door.signIn('101', '246810');
    server.on(API.signInFloor, () => problemResponse('busy'));
    expect(await first.door.signIn('101', '246810')).toEqual({ ok: true });
    expect(first.session.state()).toBe('unlocked-offline');
  });

  it('says that plain http cannot unlock', async () => {
    await offlineTablet();
    vi.stubGlobal('crypto', { getRandomValues: crypto.getRandomValues.bind(crypto) });
    const { door } = await start();
    expect(door.unlocksOffline).toBe(false);
    expect(await door.signIn('101', '246810')).toMatchObject({
      code: 'unlock-unavailable',
      sentence: expect.stringContaining('https'),
    });
  });
});
