import { LIMITS } from '../../../shared/contract/limits.js';
import {
  cookieHeader,
  cookiesOf,
  TEST_PIN,
  tabletCookie,
  testServer,
  type SignedInActor,
  type TestServer,
} from '../../testing/test-server.js';

describe('tablet codes', () => {
  let server: TestServer;
  let manager: SignedInActor;
  beforeEach(async () => {
    server = await testServer();
    manager = await server.signInAs('manager');
  });
  afterEach(() => server.close());

  const ask = async (as = manager, shedId = 'north') =>
    server.call('post', '/devices/codes', { as, body: { name: 'By the door', shedId } });
  const register = (code: string, cookie?: string) =>
    server.call('post', '/devices/register-by-code', {
      body: { code },
      ...(cookie === undefined ? {} : { cookie }),
    });

  it('make another browser a tablet, on which PINs are taken from then on', async () => {
    const { body } = await ask();
    expect(body).toEqual({
      code: expect.stringMatching(/^[A-HJKMNP-Z2-9]{4}-[A-HJKMNP-Z2-9]{4}$/),
      expiresAt: server.clock.now + LIMITS.tabletCode,
      url: `http://shedbeat.test/tablet/code#${body.code}`,
    });
    const answer = await register(body.code);
    expect(answer.body).toMatchObject({
      person: null,
      grant: null,
      device: { kind: 'tablet', name: 'By the door', shedId: 'north' },
    });
    const signedIn = await server.call('post', '/sessions/floor', {
      body: { worksNumber: '101', pin: TEST_PIN },
      cookie: cookieHeader(cookiesOf(answer)),
    });
    expect(signedIn.body).toMatchObject({ person: { id: 'wanda' }, device: { id: answer.body.device.id } });
  });

  it('are taken as somebody types them', async () => {
    const { body } = await ask();
    expect((await register(` ${body.code.toLowerCase().replace('-', ' ')} `)).status).toBe(200);
  });

  it.each([
    ['wrong', 'tablet-code-wrong', () => 'AAAA-BBBB'],
    ['nothing of a code', 'tablet-code-wrong', () => '?!'],
    ['used', 'tablet-code-used', async (code: string) => (await register(code)) && code],
    [
      'run out',
      'tablet-code-expired',
      (code: string) => {
        server.clock.pass(LIMITS.tabletCode);
        return code;
      },
    ],
  ])('say when one is %s', async (_what, expected, prepare) => {
    const { body } = await ask();
    const answer = await register(await prepare(body.code));
    expect([answer.status, answer.body.code]).toEqual([403, expected]);
    expect(cookiesOf(answer)).toEqual({});
  });

  it('are kept as hashes alone', async () => {
    const { body } = await ask();
    const rows = await server.deps.reads.query('SELECT * FROM "tablet_code"');
    expect(rows).toHaveLength(1);
    expect(JSON.stringify(rows)).not.toContain(body.code.replace('-', ''));
  });

  it('are not to be guessed without end', async () => {
    const codes = new Set<string>();
    for (let tried = 0; tried < 101; tried++) codes.add((await register('AAAA-BBBB')).body.code);
    expect([...codes]).toEqual(['tablet-code-wrong', 'too-many-tries']);
  });

  it('make no second tablet out of one, but one again out of a withdrawn one', async () => {
    const { body } = await ask();
    expect((await register(body.code, tabletCookie())).body.code).toBe('already-tablet');
    await server.call('post', '/devices/tablet-north/revoke', { as: manager });
    expect((await register(body.code, tabletCookie())).status).toBe(200);
  });

  it('sign out who was signed in there', async () => {
    const foreman = await server.signInAs('foreman');
    const { body } = await ask();
    const answer = await register(body.code, foreman.cookie);
    expect(answer.body.person).toBeNull();
    expect((await server.call('get', '/people', { as: foreman })).body.code).toBe('session-ended');
  });

  it('are for one’s own sheds', async () => {
    const foreman = await server.signInAs('foreman');
    expect((await ask(foreman)).status).toBe(200);
    expect((await ask(foreman, 'south')).body.code).toBe('other-shed');
    expect((await ask(manager, 'west')).body.fields?.[0].path).toBe('shedId');
  });

  it('and tablets stand in the record of changes: who, when, what', async () => {
    const { body } = await ask();
    const { device } = (await register(body.code)).body;
    const rename = (name: string) =>
      server.call('patch', `/devices/${device.id}`, { as: manager, body: { name } });
    expect((await rename('Alley B')).body).toMatchObject({ id: device.id, name: 'Alley B', kind: 'tablet' });
    await rename('Alley B');
    await server.call('post', `/devices/${device.id}/revoke`, { as: manager });
    const rows = await server.deps.reads.query(
      'SELECT "byName", "what", "name", "action", "before", "after" FROM "recorded_change" ORDER BY "seq"',
    );
    const shown = rows.map((row: Record<string, string>) => Object.values(row));
    expect(shown).toEqual([
      ['Maud Test', 'tablet', 'By the door', 'added', null, '{"name":"By the door","shedId":"north"}'],
      ['Maud Test', 'tablet', 'Alley B', 'changed', '{"name":"By the door"}', '{"name":"Alley B"}'],
      ['Maud Test', 'tablet', 'Alley B', 'ended', null, null],
    ]);
  });

  it('a name is asked for and looked at', async () => {
    const rename = (id: string, name: string) =>
      server.call('patch', `/devices/${id}`, { as: manager, body: { name } });
    expect((await rename('no-such', 'Alley B')).body.code).toBe('not-found');
    for (const name of ['', '   ', 'x'.repeat(81)])
      expect((await rename('tablet-north', name)).body.fields?.[0].path).toBe('name');
  });
});
