import { testServer, type TestServer } from '../../testing/test-server.js';
import { newFirstRunCode } from './first-run.service.js';

describe('the first run', () => {
  let server: TestServer;
  let code: string;
  beforeEach(async () => {
    server = await testServer({ empty: true });
    code = (await newFirstRunCode(server.deps)) ?? '';
  });
  afterEach(() => server.close());

  const setUp = (more: object = {}) =>
    server.call('post', '/first-run', {
      body: {
        code,
        millName: 'Our mill',
        timeZone: 'Europe/London',
        name: 'Maud Manager',
        email: 'maud@mill.example',
        password: 'a long password',
        browserId: '0195e000-0000-7000-8000-000000000001',
        ...more,
      },
    });

  it('makes mill, causes and manager, who is signed in', async () => {
    const before = await server.call('post', '/sessions/refresh', { body: {} });
    expect(before.body.needsFirstManager).toBe(true);
    const response = await setUp();
    expect(response.status).toBe(200);
    expect(response.body).toMatchObject({
      person: { name: 'Maud Manager', roles: ['manager'] },
      needsFirstManager: false,
      device: { kind: 'browser' },
    });
    const people = await server.call('get', '/people', {
      as: { authorization: `Bearer ${response.body.accessToken}` },
    });
    expect(people.body.people).toHaveLength(1);
    const [mill] = await server.deps.reads.query('SELECT * FROM "mill"');
    expect(mill).toEqual({
      id: 1,
      name: 'Our mill',
      timeZone: 'Europe/London',
      units: 'metric',
      figuresByPerson: 'own',
      lockAfterMinutes: 5,
    });
    const [{ causes }] = await server.deps.reads.query('SELECT count(*) AS "causes" FROM "cause_version"');
    expect(causes).toBeGreaterThan(30);
  });

  it('takes the code in any spelling, once', async () => {
    expect((await setUp({ code: ` ${code.toLowerCase().replaceAll('-', ' ')} ` })).status).toBe(200);
    const again = await setUp();
    expect([again.status, again.body.code]).toEqual([409, 'already-set-up']);
    expect(await newFirstRunCode(server.deps)).toBeNull();
  });

  it('takes no other code, and stores nothing', async () => {
    const response = await setUp({ code: 'AAAA-AAAA-AAAA' });
    expect([response.status, response.body.code]).toEqual([403, 'bad-code']);
    const left = await server.deps.reads.query('SELECT * FROM "mill"');
    expect(left).toEqual([]);
    expect((await setUp()).status).toBe(200);
  });

  it('makes a new code at each start; the one before is worth nothing', async () => {
    const next = await newFirstRunCode(server.deps);
    expect(next).not.toBe(code);
    expect((await setUp()).body.code).toBe('bad-code');
    expect((await setUp({ code: next })).status).toBe(200);
  });

  it('keeps the code’s hash alone', async () => {
    const rows = await server.deps.reads.query('SELECT * FROM "meta"');
    expect(JSON.stringify(rows)).not.toContain(code);
    expect(JSON.stringify(rows)).not.toContain(code.replaceAll('-', ''));
  });

  it('is asked by two at once and set up by one', async () => {
    const answers = await Promise.all([setUp(), setUp({ email: 'other@mill.example' })]);
    expect(answers.map(({ status }) => status).sort()).toEqual([200, 409]);
  });

  it('marks a time zone that there is none of, and tells what is wrong with a password', async () => {
    const zone = await setUp({ timeZone: 'Europe/Lancaster' });
    expect([zone.status, zone.body.fields?.[0].path]).toEqual([400, 'timeZone']);
    expect((await setUp({ password: 'too short' })).body.code).toBe('password-too-short');
    expect((await setUp({ password: 'x'.repeat(73) })).body.code).toBe('password-too-long');
    expect((await setUp()).status).toBe(200);
  });
});
