import {
  cookieHeader,
  cookiesOf,
  TEST_PIN,
  tabletCookie,
  testServer,
  type TestServer,
} from '../../testing/test-server.js';

describe('tablets', () => {
  let server: TestServer;
  beforeEach(async () => {
    server = await testServer();
  });
  afterEach(() => server.close());

  const register = async (who: 'manager' | 'foreman', body: object) => {
    const actor = await server.signInAs(who);
    return server.call('post', '/devices', { as: actor, body, cookie: actor.cookie });
  };

  it('makes a browser a tablet, on which PINs are taken from then on', async () => {
    const response = await register('manager', { name: 'By the door', shedId: 'north' });
    expect(response.status).toBe(200);
    expect(response.body.device).toMatchObject({ kind: 'tablet', name: 'By the door', shedId: 'north' });
    expect(response.body.grant).toMatchObject({ personId: 'maud', deviceId: response.body.device.id });

    const jar = cookieHeader(cookiesOf(response));
    const refreshed = await server.call('post', '/sessions/refresh', { body: {}, cookie: jar });
    expect(refreshed.body).toMatchObject({ person: { id: 'maud' }, device: { id: response.body.device.id } });
    const signedIn = await server.call('post', '/sessions/floor', {
      body: { worksNumber: '101', pin: TEST_PIN },
      cookie: jar,
    });
    expect(signedIn.body).toMatchObject({ person: { id: 'wanda' }, device: { id: response.body.device.id } });
  });

  it('keeps of the cookie’s secret its hash alone', async () => {
    const response = await register('manager', { name: 'By the door', shedId: 'north' });
    const secret = cookiesOf(response)['shedbeat-device']?.split('.')[1] ?? '';
    expect(secret).toHaveLength(43);
    const rows = await server.deps.reads.query('SELECT * FROM "device"');
    expect(JSON.stringify(rows)).not.toContain(secret);
  });

  it('lets a foreman register for his own shed alone', async () => {
    const own = await register('foreman', { name: 'Alley B', shedId: 'north' });
    expect(own.status).toBe(200);
    const other = await register('foreman', { name: 'Alley B', shedId: 'south' });
    expect([other.status, other.body.code]).toEqual([403, 'other-shed']);
    expect(cookiesOf(other)).toEqual({});
  });

  it('knows which shed there is none of', async () => {
    const response = await register('manager', { name: 'Alley B', shedId: 'west' });
    expect([response.status, response.body.fields?.[0].path]).toEqual([400, 'shedId']);
  });

  it('shows a foreman his shed’s tablets and the browsers, a manager all', async () => {
    const idsFor = async (who: 'manager' | 'foreman') => {
      const response = await server.call('get', '/devices', { as: await server.signInAs(who) });
      return response.body.devices.map((each: { id: string }) => each.id) as string[];
    };
    expect(await idsFor('foreman')).not.toContain('tablet-south');
    expect(await idsFor('foreman')).toContain('tablet-north');
    expect(await idsFor('manager')).toEqual(expect.arrayContaining(['tablet-north', 'tablet-south']));
  });

  it('withdraws a tablet at once: sessions, streams, rights', async () => {
    const weaver = await server.signInOnTablet('weaver');
    const tablet = await server.tablet();
    const closed: string[] = [];
    for (const [name, sessionId, deviceId] of [
      ['weaver', 'some session', 'tablet-north'],
      ['alone', null, 'tablet-north'],
      ['other', null, 'tablet-south'],
    ] as const)
      server.deps.feed.listen({
        shedIds: ['north'],
        sessionId,
        deviceId,
        send: () => undefined,
        close: () => closed.push(name),
      });
    const manager = await server.signInAs('manager');
    const answer = await server.call('post', '/devices/tablet-north/revoke', { as: manager });
    expect(answer.body).toMatchObject({ id: 'tablet-north', revoked: true, revokedAt: server.clock.now });
    expect(closed).toEqual(['weaver', 'alone']);
    for (const actor of [weaver, tablet]) {
      const response = await server.call('get', '/people', { as: actor });
      expect([response.status, response.body.code]).toEqual([403, 'device-revoked']);
    }
    const [session] = await server.deps.reads.query('SELECT * FROM "session" WHERE "personId" = ?', [
      'wanda',
    ]);
    expect(session.endedWhy).toBe('device-revoked');
  });

  it('lets a withdrawn tablet come back to hand in what it holds', async () => {
    const manager = await server.signInAs('manager');
    await server.call('post', '/devices/tablet-north/revoke', { as: manager });
    const { session } = await server.tablet();
    expect(session).toMatchObject({ person: null, device: { id: 'tablet-north', revoked: true } });
    expect(session.accessToken).toEqual(expect.any(String));
  });

  it('withdraws once: a second time changes nothing', async () => {
    const manager = await server.signInAs('manager');
    const first = await server.call('post', '/devices/tablet-north/revoke', { as: manager });
    server.clock.pass(60_000);
    const second = await server.call('post', '/devices/tablet-north/revoke', { as: manager });
    expect(second.body.revokedAt).toBe(first.body.revokedAt);
    const none = await server.call('post', '/devices/no-such/revoke', { as: manager });
    expect([none.status, none.body.code]).toEqual([404, 'not-found']);
  });

  it('withdraws an office browser too', async () => {
    const foreman = await server.signInAs('foreman');
    const manager = await server.signInAs('manager');
    const id = foreman.session.device?.id ?? '';
    await server.call('post', `/devices/${id}/revoke`, { as: manager });
    const response = await server.call('get', '/people', { as: foreman });
    expect([response.status, response.body.code]).toEqual([403, 'device-revoked']);
    const again = await server.call('post', '/sessions/refresh', { body: {}, cookie: foreman.cookie });
    expect(again.body).toMatchObject({ person: null, accessToken: null });
  });

  it('does not take a tablet’s cookie for another tablet', async () => {
    const [, value] = tabletCookie('north').split('=');
    const crossed = `shedbeat-device=tablet-south.${value?.split('.')[1]}`;
    const response = await server.call('post', '/sessions/refresh', { body: {}, cookie: crossed });
    expect(response.body.device).toBeNull();
  });
});
