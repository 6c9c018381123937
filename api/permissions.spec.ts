import type { Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { TEST_ORIGIN, testServer, type TestServer } from './testing/test-server.js';
import { ACTORS, EXPECTED, REFUSALS, type Actor, type Expected } from './testing/who-may.js';

const A_PATTERN = { name: 'Day', startsLocal: '08:00', endsLocal: '16:00', weekdays: [1], meal: null };

/** Set-up's changes of a shed's things answer `other-shed`; those of the whole mill are open to every manager. */
const SET_UP: Readonly<Record<string, Expected['otherShed']>> = {
  'get /api/set-up': 'shows the whole mill',
  'get /api/set-up/changes': 'shows the whole mill',
  ...Object.fromEntries(
    [
      'patch /api/set-up/mill',
      'post /api/set-up/cloths',
      'patch /api/set-up/cloths/{id}',
      'post /api/set-up/cloths/{id}/versions',
      'post /api/set-up/beams',
      'patch /api/set-up/beams/{id}',
      'delete /api/set-up/beams/{id}',
      'post /api/set-up/causes',
      'post /api/set-up/causes/{id}/versions',
      'post /api/set-up/targets',
      'post /api/set-up/parts',
      'patch /api/set-up/parts/{id}',
      'post /api/set-up/jobs',
      'patch /api/set-up/jobs/{id}',
    ].map((line) => [line, 'is of the whole mill']),
  ),
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
  'post /api/set-up/patterns': { body: { shedId: 'north', from: '2026-03-11', facts: A_PATTERN } },
  'post /api/set-up/patterns/examples': 'changes nothing',
  'patch /api/set-up/patterns/{id}': {
    path: '/api/set-up/patterns/north-early',
    body: { from: '2026-03-11', facts: A_PATTERN },
  },
  'post /api/set-up/patterns/{id}/end': {
    path: '/api/set-up/patterns/north-early/end',
    body: { from: '2026-03-11' },
  },
  'post /api/set-up/calendar': {
    body: {
      shedId: 'north',
      date: '2026-03-11',
      patternId: '*',
      kind: 'off',
      startsLocal: null,
      endsLocal: null,
      reason: 'Fair',
    },
  },
  'post /api/set-up/recalculate': { body: { shedId: 'north', from: '2026-03-01', reason: 'Wrong speed' } },
  'post /api/set-up/calendar/drop': { body: { shedId: 'north', date: '2026-03-11', patternId: '*' } },
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
