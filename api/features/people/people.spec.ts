import { isEasyPin } from '../../../shared/contract/person-rules.js';
import { newPin } from './pin-slips.js';
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

  describe('forms', () => {
    const BAD: [string, object, string][] = [
      ['no name', { name: '  ' }, 'name'],
      ['a name of 81 characters', { name: 'x'.repeat(81) }, 'name'],
      ['no short name', { shortName: '' }, 'shortName'],
      ['letters in a works number', { worksNumber: '12a' }, 'worksNumber'],
      ['a works number of seven digits', { worksNumber: '1234567' }, 'worksNumber'],
      ['somebody else’s works number', { worksNumber: '101' }, 'worksNumber'],
      ['somebody else’s works number after a nought', { worksNumber: '0101' }, 'worksNumber'],
      ['somebody else’s short name', { shortName: 'Fred' }, 'shortName'],
      ['one digit six times as PIN', { pin: '111111' }, 'pin'],
      ['digits in a row as PIN', { pin: '123456' }, 'pin'],
      ['an e-mail that is none', { email: 'nell' }, 'email'],
      ['somebody else’s e-mail', { email: ' MAUD@mill.example' }, 'email'],
      ['nothing to sign in with', { worksNumber: null, email: null }, 'worksNumber'],
      ['a manager without e-mail', { roles: ['manager'], email: null }, 'email'],
      ['no role', { roles: [] }, 'roles'],
      ['a role that there is none of', { roles: ['owner'] }, 'roles.0'],
      ['a shed that there is none of', { shedIds: ['west'] }, 'shedIds'],
      ['a PIN of five digits', { pin: '12345' }, 'pin'],
      ['a loom that there is none of', { usualSet: ['n1', 'n99'] }, 'usualSet'],
      ['a loom twice', { usualSet: ['n1', 'n2', 'n1'] }, 'usualSet'],
    ];
    const marked = (body: { fields?: { path: string }[] }) => body.fields?.map(({ path }) => path);

    it.each(BAD)('refuse %s of a new person', async (_what, bad, field) => {
      const answer = await add({ ...NEW, ...bad });
      expect([answer.status, marked(answer.body)]).toEqual([400, [field]]);
    });

    it.each(BAD)('refuse %s of a known person, and change nothing', async (what, bad, field) => {
      const before = (await server.call('get', '/people', { as: manager })).body;
      const body = 'roles' in bad || 'worksNumber' in bad || 'email' in bad ? { email: null, ...bad } : bad;
      const id = what.startsWith('somebody else’s works') ? 'wilf' : 'wanda';
      const answer = await change(id, body);
      expect([answer.status, marked(answer.body)]).toEqual([400, [field]]);
      expect((await server.call('get', '/people', { as: manager })).body).toEqual(before);
    });

    it('leave alike numbers and short names alone that are there already', async () => {
      const alike = `UPDATE "person" SET "worksNumber" = '0101', "shortName" = 'wanda' WHERE "id" = 'wilf'`;
      await server.deps.writer.write((tx) => tx.query(alike));
      expect((await change('wilf', { name: 'Wilf Crake', worksNumber: '0101' })).status).toBe(200);
      expect((await change('wilf', { worksNumber: '00101' })).status).toBe(400);
    });

    it('take facts at once, and their own number and address again', async () => {
      const facts = {
        name: 'Wanda Weaver',
        shortName: 'Wanda W.',
        worksNumber: '101',
        email: 'wanda@mill.example',
        usualSet: ['n4', 'n1', 'n3'],
      };
      expect((await change('wanda', facts)).body).toMatchObject({ id: 'wanda', ...facts, roles: ['weaver'] });
      const pull = await server.call('get', '/sync/changes', { as: await server.tablet() });
      expect(JSON.stringify(pull.body)).toContain('["n4","n1","n3"]');
      expect((await change('wanda', { worksNumber: null })).body.worksNumber).toBeNull();
    });
  });

  it('records who changed what, from what to what, without secrets', async () => {
    const added = await add({ ...NEW, password: TEST_PASSWORD });
    await change(added.body.id, { roles: ['tackler'], pin: '975310' });
    await change(added.body.id, { roles: ['tackler'] });
    await change(added.body.id, { disabled: true });
    const rows: Record<string, string>[] = await server.deps.reads.query(
      'SELECT "byName", "name", "action", "before", "after" FROM "recorded_change" ORDER BY "seq"',
    );
    expect(rows.map(({ byName, name, action }) => [byName, name, action])).toEqual([
      ['Maud Test', 'Nell New', 'added'],
      ['Maud Test', 'Nell New', 'changed'],
      ['Maud Test', 'Nell New', 'ended'],
    ]);
    expect(JSON.parse(rows[1]?.['before'] ?? '')).toEqual({ roles: ['weaver'] });
    expect(JSON.parse(rows[1]?.['after'] ?? '')).toEqual({ roles: ['tackler'], pin: 'set anew' });
    expect(JSON.stringify(rows)).not.toMatch(new RegExp(`${TEST_PIN}|975310|${TEST_PASSWORD}|\\$2`));
  });

  describe('PIN slips', () => {
    const slips = (ids: string[], as = manager) =>
      server.call('post', '/people/pin-slips', { as, body: { ids } });

    it('give new PINs, once, which open a tablet; the old ones and their sign-ins end', async () => {
      const weaver = await server.signInOnTablet('weaver');
      const { body } = await slips(['wanda', 'wilf', 'wanda']);
      expect(body.slips).toMatchObject([
        { personId: 'wanda', name: 'Wanda Test', worksNumber: '101' },
        { personId: 'wilf', name: 'Wilf Test', worksNumber: '102' },
      ]);
      const signIn = (pin: string) =>
        server.call('post', '/sessions/floor', {
          body: { worksNumber: '101', pin },
          cookie: tabletCookie(),
        });
      expect((await server.call('get', '/people', { as: weaver })).body.code).toBe('session-ended');
      expect((await signIn(TEST_PIN)).body.code).toBe('wrong-sign-in');
      expect((await signIn(body.slips[0].pin)).body.person.id).toBe('wanda');
      const rows = await server.deps.reads.query('SELECT * FROM "recorded_change"');
      expect(rows).toHaveLength(2);
      expect(JSON.stringify(rows)).not.toContain(body.slips[0].pin);
    });

    it('are all or none', async () => {
      await change('wilf', { worksNumber: null });
      for (const [ids, code] of [
        [['wanda', 'wilf'], 'no-works-number'],
        [['wanda', 'no-such'], 'not-found'],
        [[], 'bad-request'],
        [Array.from({ length: 61 }, (_, index) => `p${index}`), 'bad-request'],
      ] as const)
        expect((await slips([...ids])).body.code).toBe(code);
      expect((await server.signInOnTablet('weaver')).session.person?.id).toBe('wanda');
    });

    it('are never the PINs that are guessed first', () => {
      expect(['000000', '777777', '123456', '654321', '890123'].filter((pin) => !isEasyPin(pin))).toEqual([]);
      expect(['246810', '975310', '112233', '121212'].filter(isEasyPin)).toEqual([]);
      for (let made = 0; made < 200; made++) expect(newPin()).toMatch(/^\d{6}$/);
    });
  });

  it('knows of nobody else', async () => {
    expect((await change('no-such', { disabled: true })).body.code).toBe('not-found');
  });
});
