import { TestBed } from '@angular/core/testing';
import * as z from 'zod/mini';
import { ADA, aSession, json, problemResponse, StubServer } from '../testing/stub-server';
import { until } from '../testing/until';
import { ApiClient } from './api-client';
import { API } from './api-paths';
import { SessionStore } from './session-store';

const desk = { id: 'browser-1', kind: 'browser', name: 'Office', shedId: null, revoked: false } as const;

let server: StubServer;

function restart(): SessionStore {
  TestBed.resetTestingModule();
  return TestBed.inject(SessionStore);
}

beforeEach(() => {
  localStorage.clear();
  server = new StubServer();
  vi.stubGlobal('fetch', server.fetch);
});
afterEach(() => vi.unstubAllGlobals());

describe('SessionStore.start', () => {
  it('knows who the cookies name', async () => {
    server.on(API.refresh, () => json(aSession()));
    const session = restart();
    expect(session.state()).toBe('unknown');
    await session.start();
    expect(session.state()).toBe('signed-in');
    expect(session.person()).toEqual(ADA);
    expect(session.isTablet()).toBe(true);
    expect(session.may('entries.push')).toBe(true);
    expect(session.may('weeks.read')).toBe(false);
  });

  it('knows nobody, and that the mill needs its first manager', async () => {
    server.on(API.refresh, () =>
      json(aSession({ person: null, device: null, accessToken: null, needsFirstManager: true })),
    );
    const session = restart();
    await session.start();
    expect(session.state()).toBe('nobody');
    expect(session.needsFirstManager()).toBe(true);
  });

  it('keeps the office’s last person without network, by what the browser remembers', async () => {
    server.on(API.refresh, () => json(aSession({ device: desk })));
    await restart().start();
    server.unplug();
    const session = restart();
    await session.start();
    expect(session.state()).toBe('signed-in');
    expect(session.person()?.id).toBe('ada');
    expect(session.grant()?.id).toBe('grant-1');
  });

  it('asks for the PIN on a tablet without network: the device is remembered, the person is not', async () => {
    server.on(API.refresh, () => json(aSession()));
    await restart().start();
    server.unplug();
    const session = restart();
    await session.start();
    expect(session.state()).toBe('nobody');
    expect(session.device()?.id).toBe('tablet-1');
  });
});

describe('SessionStore.refresh', () => {
  async function signedIn(): Promise<SessionStore> {
    server.on(API.refresh, () => json(aSession({ device: desk })));
    const session = restart();
    await session.start();
    return session;
  }

  it.each(['busy', 'internal', 'too-many-tries'] as const)('keeps the session at %s', async (code) => {
    const session = await signedIn();
    server.on(API.refresh, () => problemResponse(code));
    expect(await session.refresh()).toMatchObject({ ok: false, code });
    expect(session.state()).toBe('signed-in');
  });

  it('keeps the session without network', async () => {
    const session = await signedIn();
    server.unplug();
    expect(await session.refresh()).toMatchObject({ ok: false, code: 'offline' });
    expect(session.state()).toBe('signed-in');
  });

  it('ends the session at a 4xx, also for the next start without network', async () => {
    const session = await signedIn();
    server.on(API.refresh, () => problemResponse('session-ended'));
    await session.refresh();
    expect(session.state()).toBe('nobody');
    server.unplug();
    const next = restart();
    await next.start();
    expect(next.state()).toBe('nobody');
  });

  it('asks once when several ask at once', async () => {
    const session = await signedIn();
    const before = server.countOf(API.refresh);
    await Promise.all([session.refresh(), session.refresh(), session.refresh()]);
    expect(server.countOf(API.refresh)).toBe(before + 1);
  });

  it('keeps whoever unlocked the tablet offline until the PIN is checked, whoever the cookies name', async () => {
    server.on(API.refresh, () => json(aSession()));
    const session = restart();
    await session.start();
    const bea = { ...ADA, id: 'bea' };
    session.unlockOffline(bea, { id: 'grant-2', personId: 'bea', deviceId: 'tablet-1', issuedAt: 0 });
    await session.refresh();
    expect(session.state()).toBe('unlocked-offline');
    expect(session.person()?.id).toBe('bea');
    expect([...session.permissions()].sort()).toEqual(['changes.read', 'entries.push', 'public']);
    const tom: typeof ADA = {
      ...ADA,
      id: 'tom',
      permissions: [...ADA.permissions, 'calls.read', 'people.read'],
    };
    session.unlockOffline(tom, { id: 'grant-3', personId: 'tom', deviceId: 'tablet-1', issuedAt: 0 });
    expect([...session.permissions()].sort()).toEqual([
      'calls.read',
      'changes.read',
      'entries.push',
      'public',
    ]);
  });
});

describe('signing in and out', () => {
  it('signs in on the floor and says in words why not', async () => {
    server.on(API.refresh, () => json(aSession({ person: null })));
    server.on(API.signInFloor, ({ body }) =>
      (body as { pin: string }).pin === '246810' ? json(aSession()) : problemResponse('wrong-sign-in'),
    );
    const session = restart();
    await session.start();
    expect(await session.signInFloor('101', '111111')).toMatchObject({
      code: 'wrong-sign-in',
      sentence: expect.stringContaining('do not go together'),
    });
    expect(session.state()).toBe('nobody');
    expect(await session.signInFloor('101', '246810')).toEqual({ ok: true });
    expect(session.state()).toBe('signed-in');
  });

  it('is not undone by the answer to a question that was asked before', async () => {
    let answerLate: (response: Response) => void = () => undefined;
    server.on(API.refresh, () => new Promise<Response>((resolve) => (answerLate = resolve)));
    server.on(API.signInFloor, () => json(aSession()));
    const session = restart();
    const asking = session.refresh();
    await until(() => expect(server.countOf(API.refresh)).toBe(1));
    await session.signInFloor('101', '246810');
    answerLate(json(aSession({ person: null, accessToken: 'old' })));
    await asking;
    expect(session.state()).toBe('signed-in');
  });

  it('leaves without network, and tells the server at the next chance', async () => {
    server.on(API.refresh, () => json(aSession({ device: desk })));
    const session = restart();
    await session.start();
    server.unplug();
    await session.signOut();
    expect(session.state()).toBe('nobody');
    server.on(API.signOut, () => json(aSession({ person: null, device: null, accessToken: null })));
    server.on(API.refresh, () => {
      const toldBefore = server.countOf(API.signOut) > 1;
      return json(toldBefore ? aSession({ person: null, device: null, accessToken: null }) : aSession());
    });
    const next = restart();
    await next.start();
    expect(next.state()).toBe('nobody');
  });
});

describe('ApiClient', () => {
  const answer = z.object({ n: z.int() });

  it('renews the token once at a 401 and asks again', async () => {
    let token = 0;
    server.on(API.refresh, () => json(aSession({ accessToken: `token-${++token}` })));
    server.on('/api/x', (asked) =>
      asked.token === 'token-2' ? json({ n: 1 }) : problemResponse('not-signed-in'),
    );
    await restart().start();
    expect(await TestBed.inject(ApiClient).get('/api/x', answer)).toEqual({ kind: 'ok', body: { n: 1 } });
    expect(server.asked.filter(({ path }) => path === '/api/x').map((asked) => asked.token)).toEqual([
      'token-1',
      'token-2',
    ]);
  });

  it('asks no third time', async () => {
    server.on(API.refresh, () => json(aSession()));
    server.on('/api/x', () => problemResponse('session-ended'));
    await restart().start();
    expect(await TestBed.inject(ApiClient).get('/api/x', answer)).toMatchObject({ code: 'session-ended' });
    expect(server.countOf('/api/x')).toBe(2);
    expect(server.countOf(API.refresh)).toBe(2);
  });
});
