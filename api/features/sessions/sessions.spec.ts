import {
  browserIdOf,
  cookieHeader,
  cookiesOf,
  TEST_PASSWORD,
  TEST_PIN,
  tabletCookie,
  testServer,
  type TestServer,
} from '../../testing/test-server.js';

describe('signing in', () => {
  let server: TestServer;
  beforeEach(async () => {
    server = await testServer();
  });
  afterEach(() => server.close());

  const floor = (worksNumber: string, pin: string, cookie = tabletCookie('north')) =>
    server.call('post', '/sessions/floor', { body: { worksNumber, pin }, cookie });
  const office = (email: string, password: string, cookie?: string) =>
    server.call('post', '/sessions/office', {
      body: { email, password, browserId: browserIdOf('manager') },
      ...(cookie === undefined ? {} : { cookie }),
    });

  it('knows each role with its rights', async () => {
    for (const who of ['weaver', 'tackler', 'foreman', 'manager'] as const) {
      const { session } = await server.signInAs(who);
      expect(session.person?.roles).toEqual([who]);
      expect(session.grant).toMatchObject({ personId: session.person?.id, deviceId: session.device?.id });
    }
  });

  it('keeps the cookie from scripts and from other sites', async () => {
    const response = await office('maud@mill.example', TEST_PASSWORD);
    const [cookie] = response.headers['set-cookie'] ?? [];
    expect(cookie).toMatch(/^shedbeat-person=/);
    for (const attribute of ['HttpOnly', 'SameSite=Strict', 'Path=/']) expect(cookie).toContain(attribute);
    expect(cookie).not.toContain('Secure');
    expect(cookie).not.toContain('Domain');
  });

  it('binds the cookie to the host under HTTPS', async () => {
    const secure = await testServer({ settings: { publicOrigins: ['https://shedbeat.example'] } });
    const response = await secure.call('post', '/sessions/office', {
      origin: 'https://shedbeat.example',
      body: { email: 'maud@mill.example', password: TEST_PASSWORD, browserId: browserIdOf('manager') },
    });
    await secure.close();
    const [cookie] = response.headers['set-cookie'] ?? [];
    expect(cookie).toMatch(/^__Host-shedbeat-person=.*Secure/);
  });

  it('takes an e-mail address however it is written', async () => {
    expect((await office(' Maud@Mill.Example ', TEST_PASSWORD)).status).toBe(200);
  });

  it('says the same to a wrong password and to a stranger', async () => {
    const wrong = await office('maud@mill.example', 'another password');
    const stranger = await office('nobody@mill.example', 'another password');
    expect(wrong.status).toBe(401);
    expect(wrong.body).toEqual(stranger.body);
    expect(wrong.body.code).toBe('wrong-sign-in');
  });

  it('compares for a stranger too, so that the time taken tells nothing', async () => {
    const compared: (string | null)[] = [];
    const watched = await testServer({
      deps: {
        passwords: {
          hash: async () => '',
          compare: async (_secret, hash) => {
            compared.push(hash);
            return false;
          },
          close: async () => undefined,
        },
      },
    });
    const body = { password: 'another password', browserId: browserIdOf('manager') };
    await watched.call('post', '/sessions/office', { body: { ...body, email: 'nobody@mill.example' } });
    await watched.call('post', '/sessions/floor', {
      body: { worksNumber: '999', pin: '000000' },
      cookie: tabletCookie(),
    });
    await watched.close();
    expect(compared).toEqual([null, null]);
  });

  it('refuses a password of more than 72 bytes instead of cutting it', async () => {
    const response = await office('maud@mill.example', TEST_PASSWORD + '€'.repeat(25));
    expect(response.status).toBe(400);
    expect(response.body.code).toBe('password-too-long');
  });

  it('takes a PIN on a registered tablet alone', async () => {
    for (const cookie of ['', `shedbeat-device=tablet-north.${'x'.repeat(43)}`, 'shedbeat-device=nonsense']) {
      const response = await floor('101', TEST_PIN, cookie);
      expect(response.status).toBe(401);
      expect(response.body.code).toBe('device-unknown');
    }
    expect((await floor('101', TEST_PIN)).status).toBe(200);
  });

  it('takes nobody of another shed on a tablet, but says so only after the right PIN', async () => {
    expect((await floor('103', '000000')).body.code).toBe('wrong-sign-in');
    expect((await floor('103', TEST_PIN)).body.code).toBe('other-shed');
    expect((await floor('103', TEST_PIN, tabletCookie('south'))).status).toBe(200);
    expect((await floor('401', TEST_PIN)).status).toBe(200);
  });

  it('refuses a withdrawn tablet', async () => {
    const manager = await server.signInAs('manager');
    await server.call('post', '/devices/tablet-north/revoke', { as: manager });
    const response = await floor('101', TEST_PIN);
    expect(response.status).toBe(403);
    expect(response.body.code).toBe('device-revoked');
  });

  it('stops guessing of a PIN on a tablet, and nothing else there', async () => {
    const codes: string[] = [];
    for (let tried = 0; tried < 10; tried++) codes.push((await floor('101', '000000')).body.code);
    expect(codes.slice(0, 8)).toEqual(Array(8).fill('wrong-sign-in'));
    const refused = await floor('101', TEST_PIN);
    expect(refused.status).toBe(429);
    expect(refused.body.code).toBe('too-many-tries');
    expect(Number(refused.headers['retry-after'])).toBeGreaterThan(0);
    expect((await floor('102', TEST_PIN)).status).toBe(200);
    expect((await floor('101', TEST_PIN, tabletCookie('south'))).body.code).toBe('other-shed');
  });

  it('forgets wrong tries after a right one', async () => {
    for (let round = 0; round < 3; round++) {
      for (let tried = 0; tried < 6; tried++) await floor('101', '000000');
      expect((await floor('101', TEST_PIN)).status).toBe(200);
    }
  });

  it('stops guessing of a password', async () => {
    for (let tried = 0; tried < 10; tried++) await office('maud@mill.example', 'another password');
    expect((await office('maud@mill.example', TEST_PASSWORD)).body.code).toBe('too-many-tries');
  });

  it('signs out whoever was signed in on the tablet before', async () => {
    const first = await server.signInOnTablet('weaver');
    const response = await floor('102', TEST_PIN, first.cookie);
    expect(response.body.person.id).toBe('wilf');
    const mixed = await server.call('get', '/people', { as: first });
    expect(mixed.body.code).toBe('session-ended');
  });

  it('does not let a person cookie go on without its tablet', async () => {
    const { cookie } = await server.signInOnTablet('weaver');
    const alone = cookie.split('; ').find((each) => each.startsWith('shedbeat-person')) ?? '';
    const response = await server.call('post', '/sessions/refresh', { body: {}, cookie: alone });
    expect(response.body.person).toBeNull();
  });

  it('is one device on a registered tablet, with a password too', async () => {
    const onTablet = await office('maud@mill.example', TEST_PASSWORD, tabletCookie());
    expect(onTablet.body.device).toMatchObject({ id: 'tablet-north', kind: 'tablet' });
    const elsewhere = await office('maud@mill.example', TEST_PASSWORD);
    expect(elsewhere.body.device).toMatchObject({ id: browserIdOf('manager'), kind: 'browser' });
  });

  it('does not let a browser pass for a tablet', async () => {
    const id = '0195e000-0000-7000-8000-00000000ffff';
    await server.deps.writer.write((tx) =>
      tx.query(`UPDATE "device" SET "kind" = 'tablet' WHERE "id" = ?`, [browserIdOf('manager')]),
    );
    await server.deps.writer.write((tx) =>
      tx.query(
        `INSERT INTO "device" ("id", "kind", "name", "shedId", "registeredAt") VALUES (?, 'tablet', 'T', 'north', 1)`,
        [id],
      ),
    );
    const response = await server.call('post', '/sessions/office', {
      body: { email: 'maud@mill.example', password: TEST_PASSWORD, browserId: id },
    });
    expect(response.status).toBe(400);
    expect(response.body.fields).toEqual([{ path: 'browserId', message: expect.any(String) }]);
  });

  it('signs out: the session ends, the tablet stays', async () => {
    const weaver = await server.signInOnTablet('weaver');
    const response = await server.call('post', '/sessions/end', { cookie: weaver.cookie });
    expect(response.body).toMatchObject({ person: null, grant: null, device: { id: 'tablet-north' } });
    expect(response.body.accessToken).toEqual(expect.any(String));
    expect(cookiesOf(response)).not.toHaveProperty('shedbeat-person');
    const again = await server.call('post', '/sessions/refresh', { body: {}, cookie: weaver.cookie });
    expect(again.body.person).toBeNull();
  });

  it('renews the tablet’s cookie', async () => {
    const response = await server.call('post', '/sessions/refresh', { body: {}, cookie: tabletCookie() });
    expect(cookieHeader(cookiesOf(response))).toBe(tabletCookie());
    expect(response.body.device).toMatchObject({ id: 'tablet-north', revoked: false });
  });
});
