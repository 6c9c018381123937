import {
  TEST_PASSWORD,
  TEST_PIN,
  tabletCookie,
  testServer,
  type SignedInActor,
  type TestServer,
} from '../../testing/test-server.js';

describe('people', () => {
  let server: TestServer;
  let manager: SignedInActor;
  beforeEach(async () => {
    server = await testServer();
    manager = await server.signInAs('manager');
  });
  afterEach(() => server.close());

  const add = (body: object) => server.call('post', '/people', { as: manager, body });
  const change = (id: string, body: object) => server.call('patch', `/people/${id}`, { as: manager, body });
  const NEW = {
    name: 'Nell New',
    shortName: 'Nell',
    worksNumber: '777',
    email: null,
    roles: ['weaver'],
    shedIds: ['north'],
    pin: TEST_PIN,
  };

  it('lists everybody with rights and without secrets', async () => {
    const response = await server.call('get', '/people', { as: manager });
    expect(response.body.people).toHaveLength(7);
    expect(response.body.people).toContainEqual({
      id: 'fred',
      name: 'Fred Test',
      shortName: 'fred',
      worksNumber: '301',
      email: 'fred@mill.example',
      roles: ['foreman'],
      shedIds: ['north'],
      disabledAt: null,
      usualSet: [],
      hasPassword: true,
      hasPin: true,
      linkUntil: null,
    });
    expect(response.text).not.toMatch(/hash|\$2/i);
  });

  it('takes a new person, who may sign in at once', async () => {
    const response = await add(NEW);
    expect(response.status).toBe(200);
    expect(response.body).toMatchObject({ name: 'Nell New', roles: ['weaver'], disabledAt: null });
    const signedIn = await server.call('post', '/sessions/floor', {
      body: { worksNumber: '777', pin: TEST_PIN },
      cookie: tabletCookie(),
    });
    expect(signedIn.body.person.id).toBe(response.body.id);
  });

  it('marks what is taken or not there', async () => {
    const wrong = async (body: object) => {
      const response = await add({ ...NEW, ...body });
      return [response.status, ...(response.body.fields ?? []).map((each: { path: string }) => each.path)];
    };
    expect(await wrong({ worksNumber: '101' })).toEqual([400, 'worksNumber']);
    expect(await wrong({ email: 'MAUD@mill.example' })).toEqual([400, 'email']);
    expect(await wrong({ shedIds: ['west'] })).toEqual([400, 'shedIds']);
    expect(await wrong({ roles: ['owner'], pin: '12' })).toEqual([400, 'roles.0', 'pin']);
    expect((await server.call('get', '/people', { as: manager })).body.people).toHaveLength(7);
  });

  it('says what is wrong with a password', async () => {
    expect((await add({ ...NEW, password: 'too short' })).body.code).toBe('password-too-short');
    expect((await add({ ...NEW, password: 'ü'.repeat(37) })).body.code).toBe('password-too-long');
  });

  it('tells the tablets: numbers the change and announces it', async () => {
    const sent: number[] = [];
    server.deps.feed.listen({
      shedIds: ['south'],
      sessionId: null,
      deviceId: null,
      send: (seq) => sent.push(seq),
      close: () => undefined,
    });
    await add(NEW);
    await change('wanda', { disabled: true });
    const rows = await server.deps.reads.query('SELECT * FROM "change" ORDER BY "seq"');
    expect(rows).toMatchObject([
      { shedId: null, kind: 'people', ref: '' },
      { shedId: null, kind: 'people', ref: '' },
    ]);
    expect(sent).toEqual(rows.map((row: { seq: number }) => row.seq));
  });

  it('keeps the history of rights, for entries are judged by their moment', async () => {
    const begun = server.clock.now;
    server.clock.pass(1000);
    await change('wanda', { roles: ['weaver', 'tackler'] });
    server.clock.pass(1000);
    await change('wanda', { shedIds: ['south'] });
    await change('wanda', { shedIds: ['south'] });
    const rows = await server.deps.reads.query(
      'SELECT "effectiveAt", "roles", "shedIds" FROM "person_rights" WHERE "personId" = ? ORDER BY "effectiveAt"',
      ['wanda'],
    );
    expect(rows).toEqual([
      { effectiveAt: Date.UTC(2026, 0, 1), roles: '["weaver"]', shedIds: '["north"]' },
      { effectiveAt: begun + 1000, roles: '["weaver","tackler"]', shedIds: '["north"]' },
      { effectiveAt: begun + 2000, roles: '["weaver","tackler"]', shedIds: '["south"]' },
    ]);
  });

  it('takes two changes in the same millisecond', async () => {
    await change('wanda', { roles: ['tackler'] });
    const response = await change('wanda', { roles: ['foreman'] });
    expect(response.body.roles).toEqual(['foreman']);
  });

  it('ends sessions and streams of whoever is disabled, and leaves the tablet its own rights', async () => {
    const weaver = await server.signInOnTablet('weaver');
    const [{ id: sessionId }] = await server.deps.reads.query(
      'SELECT "id" FROM "session" WHERE "personId" = ?',
      ['wanda'],
    );
    let closed = 0;
    server.deps.feed.listen({
      shedIds: null,
      sessionId,
      deviceId: 'tablet-north',
      send: () => undefined,
      close: () => closed++,
    });
    const since = server.clock.now;
    const response = await change('wanda', { disabled: true });
    expect(response.body.disabledAt).toBe(since);
    expect(closed).toBe(1);
    expect((await server.call('get', '/people', { as: weaver })).body.code).toBe('session-ended');
    const left = await server.call('post', '/sessions/refresh', { body: {}, cookie: weaver.cookie });
    expect(left.body).toMatchObject({ person: null, device: { id: 'tablet-north' } });
    expect(left.body.accessToken).toEqual(expect.any(String));
    server.clock.pass(5000);
    expect((await change('wanda', { roles: ['tackler'] })).body.disabledAt).toBe(since);
    expect((await change('wanda', { disabled: false })).body.disabledAt).toBeNull();
    await expect(server.signInOnTablet('weaver')).resolves.toBeDefined();
  });

  it('ends other sign-ins at a new PIN or password, not the one it is set from', async () => {
    const weaver = await server.signInOnTablet('weaver');
    await change('wanda', { pin: '135790' });
    expect((await server.call('get', '/people', { as: weaver })).body.code).toBe('session-ended');
    await expect(server.signInOnTablet('weaver')).rejects.toThrow('wrong-sign-in');
    await change('maud', { password: `${TEST_PASSWORD} and longer` });
    expect((await server.call('get', '/people', { as: manager })).status).toBe(200);
  });

  it('does not let the last manager go', async () => {
    for (const body of [{ disabled: true }, { roles: ['foreman'] }]) {
      const response = await change('maud', body);
      expect([response.status, response.body.code]).toEqual([409, 'last-manager']);
    }
    expect((await server.call('get', '/people', { as: manager })).status).toBe(200);
    await change('fred', { roles: ['manager'] });
    expect((await change('maud', { roles: ['foreman'] })).status).toBe(200);
  });

  it('keeps a manager of one shed to that shed, and from all sheds', async () => {
    await change('fay', { roles: ['manager'] });
    const fay = await server.signInAs('southForeman');
    const asked = async (id: string, body: object) => {
      const response = await server.call('patch', `/people/${id}`, { as: fay, body });
      return response.body.code ?? response.status;
    };
    expect(await asked('fay', { shedIds: [] })).toBe('other-shed');
    expect(await asked('fay', { shedIds: ['north', 'south'] })).toBe('other-shed');
    expect(await asked('wanda', { disabled: true })).toBe('other-shed');
    expect(await asked('maud', { disabled: true })).toBe('other-shed');
    expect(await asked('winnie', { disabled: true })).toBe(200);
  });

  it('knows of nobody else', async () => {
    expect((await change('no-such', { disabled: true })).body.code).toBe('not-found');
  });
});
