import type { Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { TEST_ORIGIN, testServer, type TestServer } from './testing/test-server.js';

/** Who asks, and what is said to them where they may not. */
const REFUSALS = {
  nobody: 'not-signed-in',
  tablet: 'not-signed-in',
  weaver: 'not-permitted',
  tackler: 'not-permitted',
  foreman: 'not-permitted',
  manager: 'not-permitted',
  revokedTablet: 'device-revoked',
  disabledPerson: 'session-ended',
} as const;
type Actor = keyof typeof REFUSALS;
const ACTORS = Object.keys(REFUSALS) as Actor[];

interface Expected {
  readonly permission: string;
  readonly may: readonly Actor[];
  /** What somebody who may gets for an empty request about nothing: 200, 400 (bad-request), 404 … */
  readonly gets: number;
  /**
   * The same route asked for a thing of the north shed by somebody who may do all, but in the south shed alone; or
   * why there is no such request.
   */
  readonly otherShed: { readonly path?: string; readonly body?: object } | string;
}

const EVERYBODY = ACTORS;
const WHOEVER_WORKS = ['tablet', 'weaver', 'tackler', 'foreman', 'manager'] as const;
const OFFICE = ['foreman', 'manager'] as const;
const TACKLING = ['tackler', 'foreman', 'manager'] as const;

/** A route that is not in this table fails the test: say here who may use it before it is mounted. */
const EXPECTED: Record<string, Expected> = {
  'get /api/health': {
    permission: 'public',
    may: EVERYBODY,
    gets: 200,
    otherShed: 'names no shed',
  },
  'get /api/openapi.json': {
    permission: 'public',
    may: EVERYBODY,
    gets: 200,
    otherShed: 'names no shed',
  },
  'post /api/sessions/office': {
    permission: 'public',
    may: EVERYBODY,
    gets: 400,
    otherShed: 'names no shed',
  },
  'post /api/sessions/floor': {
    permission: 'public',
    may: EVERYBODY,
    gets: 400,
    otherShed: 'the tablet’s shed: see sessions.spec.ts',
  },
  'post /api/sessions/refresh': {
    permission: 'public',
    may: EVERYBODY,
    gets: 200,
    otherShed: 'names no shed',
  },
  'post /api/sessions/end': {
    permission: 'public',
    may: EVERYBODY,
    gets: 200,
    otherShed: 'names no shed',
  },
  'post /api/first-run': {
    permission: 'public',
    may: EVERYBODY,
    gets: 400,
    otherShed: 'names no shed',
  },
  'post /api/devices': {
    permission: 'devices.register',
    may: OFFICE,
    gets: 400,
    otherShed: { body: { name: 'By the door', shedId: 'north' } },
  },
  'get /api/devices': {
    permission: 'devices.register',
    may: OFFICE,
    gets: 200,
    otherShed: 'lists own sheds alone: see devices.spec.ts',
  },
  'post /api/devices/{id}/revoke': {
    permission: 'devices.manage',
    may: ['manager'],
    gets: 404,
    otherShed: { path: '/api/devices/tablet-north/revoke' },
  },
  'get /api/people': {
    permission: 'people.read',
    may: OFFICE,
    gets: 200,
    otherShed: 'names no shed',
  },
  'post /api/people': {
    permission: 'people.manage',
    may: ['manager'],
    gets: 400,
    otherShed: {
      body: {
        name: 'Nell New',
        shortName: 'Nell',
        worksNumber: null,
        email: null,
        roles: ['manager'],
        shedIds: ['north', 'south'],
      },
    },
  },
  'patch /api/people/{id}': {
    permission: 'people.manage',
    may: ['manager'],
    gets: 404,
    otherShed: { path: '/api/people/wanda', body: { disabled: true } },
  },
  'post /api/sync/entries': {
    permission: 'entries.push',
    may: [...WHOEVER_WORKS, 'revokedTablet'],
    gets: 400,
    otherShed: 'each entry has its own result: entry-other-shed',
  },
  'post /api/sync/bring-in': {
    permission: 'entries.bring-in',
    may: OFFICE,
    gets: 400,
    otherShed: 'each entry has its own result: see bring-in.spec.ts',
  },
  'get /api/sync/changes': {
    permission: 'changes.read',
    may: WHOEVER_WORKS,
    gets: 200,
    otherShed: { path: '/api/sync/changes?shedId=north' },
  },
  'get /api/sync/feed': {
    permission: 'changes.read',
    may: WHOEVER_WORKS,
    gets: 200,
    otherShed: { path: '/api/sync/feed?shedId=north' },
  },
  'get /api/reports/sheds': {
    permission: 'sheet.read',
    may: OFFICE,
    gets: 200,
    otherShed: 'lists own sheds alone',
  },
  'get /api/reports/shifts': {
    permission: 'sheet.read',
    may: OFFICE,
    gets: 400,
    otherShed: { path: '/api/reports/shifts?shedId=north&from=2026-03-09&to=2026-03-10' },
  },
  'get /api/reports/shifts/{key}/sheet': {
    permission: 'sheet.read',
    may: OFFICE,
    gets: 404,
    otherShed: { path: '/api/reports/shifts/north:2026-03-10:north-early/sheet' },
  },
  'get /api/reports/shifts/{key}/looms/{loomId}': {
    permission: 'sheet.read',
    may: OFFICE,
    gets: 404,
    otherShed: { path: '/api/reports/shifts/north:2026-03-10:north-early/looms/n1' },
  },
  'get /api/reports/shifts/{key}/held': {
    permission: 'sheet.read',
    may: OFFICE,
    gets: 404,
    otherShed: { path: '/api/reports/shifts/north:2026-03-10:north-early/held' },
  },
  'get /api/reports/shifts/{key}/signed': {
    permission: 'sheet.read',
    may: OFFICE,
    gets: 404,
    otherShed: { path: '/api/reports/shifts/north:2026-03-10:north-early/signed' },
  },
  'get /api/reports/weeks': {
    permission: 'weeks.read',
    may: OFFICE,
    gets: 400,
    otherShed: { path: '/api/reports/weeks?shedId=north&by=loom&from=2026-03-02&to=2026-03-09' },
  },
  'get /api/reports/loom-history': {
    permission: 'calls.read',
    may: TACKLING,
    gets: 400,
    otherShed: { path: '/api/reports/loom-history?loomId=n1' },
  },
  'get /api/reports/tackler-ahead': {
    permission: 'calls.read',
    may: TACKLING,
    gets: 400,
    otherShed: { path: '/api/reports/tackler-ahead?shedId=north' },
  },
  'post /api/photos/{id}': {
    permission: 'entries.push',
    may: [...WHOEVER_WORKS, 'revokedTablet'],
    gets: 400,
    otherShed: 'only from the device that logged its repair: see photos.spec.ts',
  },
  'get /api/photos/{id}': {
    permission: 'calls.read',
    may: TACKLING,
    gets: 404,
    otherShed: 'a photo of the north shed: see photos.spec.ts',
  },
};

/** Set-up's changes of a shed's things answer `other-shed`; those of the whole mill are open to every manager. */
const SET_UP: Readonly<Record<string, Expected['otherShed']>> = {
  'get /api/set-up': 'shows the whole mill',
  'post /api/set-up/sheds': { body: { name: 'Another shed' } },
  'patch /api/set-up/sheds/{id}': { path: '/api/set-up/sheds/north', body: { name: 'Another name' } },
  'post /api/set-up/looms': {
    body: {
      shedId: 'north',
      from: Date.UTC(2026, 2, 10),
      places: [{ number: 9, row: 9, position: 1, alley: 'A' }],
      facts: {
        ppm: 200,
        reedSpaceCm: 190,
        clock: { kind: 'continuous', unit: 100, digits: 5 },
        shuttles: 1,
        battery: false,
      },
    },
  },
  'patch /api/set-up/looms': { body: { looms: [{ id: 'n1', number: 9, row: 9, position: 1, alley: 'A' }] } },
  'patch /api/set-up/looms/{id}/until': { path: '/api/set-up/looms/n1/until', body: { until: null } },
  'post /api/set-up/looms/versions': {
    body: { loomIds: ['n1'], effectiveAt: Date.UTC(2026, 2, 10), facts: { ppm: 210 } },
  },
  'patch /api/set-up/alleys': { body: { shedId: 'north', name: 'A', tacklerIds: [] } },
};
for (const [line, otherShed] of Object.entries(SET_UP))
  EXPECTED[line] = {
    permission: 'mill.manage',
    may: ['manager'],
    gets: line.startsWith('get ') ? 200 : line.startsWith('delete ') ? 404 : 400,
    otherShed,
  };

type Document = Record<string, Record<string, { 'x-permission': string; requestBody?: object }>>;

describe('who may do what', () => {
  let server: TestServer;
  let listening: Server;
  let base: string;
  let paths: Document;
  const authorizations = new Map<Actor | 'otherShed', string | null>();

  beforeAll(async () => {
    server = await testServer();
    listening = server.app.listen(0, '127.0.0.1');
    await new Promise((resolve) => listening.once('listening', resolve));
    base = `http://127.0.0.1:${(listening.address() as AddressInfo).port}`;
    paths = (await server.call('get', '/openapi.json')).body.paths;
    await signEverybodyIn();
  });
  afterAll(async () => {
    listening.closeAllConnections();
    await new Promise((resolve) => listening.close(resolve));
    await server.close();
  });

  async function signEverybodyIn(): Promise<void> {
    const manager = await server.signInAs('manager');
    authorizations.set('nobody', null);
    authorizations.set('manager', manager.authorization);
    for (const who of ['weaver', 'tackler', 'foreman'] as const)
      authorizations.set(who, (await server.signInAs(who)).authorization);
    authorizations.set('tablet', (await server.tablet('north')).authorization);
    await server.call('post', '/devices/tablet-south/revoke', { as: manager });
    authorizations.set('revokedTablet', (await server.tablet('south')).authorization);
    const leaver = await server.call('post', '/sessions/office', {
      body: {
        email: 'wilf@mill.example',
        password: 'a long password',
        browserId: '0195e000-0000-7000-8000-00000000aaaa',
      },
    });
    authorizations.set('disabledPerson', `Bearer ${leaver.body.accessToken}`);
    await server.call('patch', '/people/wilf', { as: manager, body: { disabled: true } });
    authorizations.set('otherShed', (await server.signInAs('southForeman')).authorization);
    await server.call('patch', '/people/fay', { as: manager, body: { roles: ['foreman', 'manager'] } });
  }

  async function ask(
    who: Actor | 'otherShed',
    line: string,
    more: { path?: string; body?: object } = {},
  ): Promise<{ status: number; code: string | null }> {
    const [method = '', template = ''] = line.split(' ');
    const path = more.path ?? template.replace(/\{\w+\}/g, 'no-such');
    const authorization = authorizations.get(who);
    const response = await fetch(`${base}${path}`, {
      method: method.toUpperCase(),
      headers: {
        Origin: TEST_ORIGIN,
        'Content-Type': 'application/json',
        ...(authorization ? { Authorization: authorization } : {}),
      },
      ...(method === 'get' ? {} : { body: JSON.stringify(more.body ?? {}) }),
    });
    // An event stream never ends by itself.
    if (response.ok) await response.body?.cancel();
    const problem = response.ok ? null : ((await response.json()) as { code: string });
    return { status: response.status, code: problem?.code ?? null };
  }

  const mounted = () =>
    Object.entries(paths).flatMap(([path, lines]) => Object.keys(lines).map((method) => `${method} ${path}`));

  it('is said for every route, and for none that is not there', () => {
    expect(mounted().sort()).toEqual(Object.keys(EXPECTED).sort());
  });

  it('is what the description names as the permission', () => {
    for (const line of mounted()) {
      const [method = '', path = ''] = line.split(' ');
      expect([line, paths[path]?.[method]?.['x-permission']]).toEqual([line, EXPECTED[line]?.permission]);
    }
  });

  describe.each(Object.entries(EXPECTED))('%s', (line, { may, gets, otherShed }) => {
    it.each(ACTORS)('%s', async (who) => {
      const { status, code } = await ask(who, line);
      if (may.includes(who)) expect(status).toBe(gets);
      else expect(code).toBe(REFUSALS[who]);
    });

    if (typeof otherShed !== 'string')
      it('somebody of another shed', async () => {
        expect(await ask('otherShed', line, otherShed)).toEqual({ status: 403, code: 'other-shed' });
      });
  });

  it('leaves a tablet its own rights when the person on it is disabled', async () => {
    const weaver = await server.signInOnTablet('weaver', 'north');
    authorizations.set('weaver', weaver.authorization);
    const manager = { authorization: authorizations.get('manager') ?? '' };
    await server.call('patch', '/people/wanda', { as: manager, body: { disabled: true } });
    expect((await ask('weaver', 'get /api/sync/changes')).status).toBe(200);
    expect((await ask('weaver', 'get /api/people')).code).toBe('session-ended');
  });
});
