import { createHmac } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import jwt from 'jsonwebtoken';
import { AccessTokens } from '../features/sessions/access-tokens.js';
import { testServer, type SignedInActor, type TestServer } from '../testing/test-server.js';

describe('who is asking', () => {
  let server: TestServer;
  let manager: SignedInActor;
  beforeEach(async () => {
    server = await testServer();
    manager = await server.signInAs('manager');
  });
  afterEach(() => server.close());

  const ask = (authorization: string) => server.call('get', '/people', { as: { authorization } });
  const claims = () => jwt.decode(manager.authorization.slice('Bearer '.length)) as jwt.JwtPayload;
  const secret = () => readFileSync(join(server.deps.settings.dataDir, 'token-secret'), 'utf8');

  async function expectProblem(authorization: string, code: string): Promise<void> {
    const response = await ask(authorization);
    expect(response.status).toBe(401);
    expect(response.type).toBe('application/problem+json');
    expect(response.body.code).toBe(code);
  }

  it('takes its own token', async () => {
    expect((await ask(manager.authorization)).status).toBe(200);
    expect((await ask(`Bearer ${jwt.sign(claims(), secret())}`)).status).toBe(200);
  });

  it('takes no token without signature', async () => {
    await expectProblem(`Bearer ${jwt.sign(claims(), '', { algorithm: 'none' })}`, 'bad-token');
    const [, body, signature] = manager.authorization.slice('Bearer '.length).split('.');
    const header = Buffer.from('{"alg":"none","typ":"JWT"}').toString('base64url');
    await expectProblem(`Bearer ${header}.${body}.${signature}`, 'bad-token');
    await expectProblem(`Bearer ${header}.${body}.`, 'bad-token');
  });

  it('takes no token of another secret or another algorithm', async () => {
    await expectProblem(`Bearer ${jwt.sign(claims(), 'another secret')}`, 'bad-token');
    await expectProblem(`Bearer ${jwt.sign(claims(), secret(), { algorithm: 'HS512' })}`, 'bad-token');
  });

  it('takes no token whose claims were changed', async () => {
    const [header, , signature] = manager.authorization.slice('Bearer '.length).split('.');
    const body = Buffer.from(JSON.stringify({ ...claims(), sub: 'fred' })).toString('base64url');
    await expectProblem(`Bearer ${header}.${body}.${signature}`, 'bad-token');
  });

  it('takes no token that signs something else', async () => {
    const { exp, ...endless } = claims();
    expect(exp).toBeDefined();
    await expectProblem(`Bearer ${jwt.sign(endless, secret())}`, 'bad-token');
    await expectProblem(`Bearer ${jwt.sign({ ...claims(), did: 7 }, secret())}`, 'bad-token');
    await expectProblem(`Bearer ${jwt.sign({ ...claims(), did: 'no-such-device' }, secret())}`, 'bad-token');
    await expectProblem(`Bearer ${jwt.sign({ ...claims(), iss: 'elsewhere' }, secret())}`, 'bad-token');
    const text = createHmac('sha256', secret()).update('x').digest('base64url');
    await expectProblem(`Bearer x.${text}`, 'bad-token');
  });

  it('takes a token for 15 minutes', async () => {
    server.clock.pass(15 * 60_000 - 1000);
    expect((await ask(manager.authorization)).status).toBe(200);
    server.clock.pass(1000);
    await expectProblem(manager.authorization, 'not-signed-in');
  });

  it('takes no token of one person for another’s session', async () => {
    const foreman = await server.signInAs('foreman');
    const { sid } = jwt.decode(foreman.authorization.slice('Bearer '.length)) as { sid: string };
    await expectProblem(`Bearer ${jwt.sign({ ...claims(), sid }, secret())}`, 'session-ended');
  });

  it('takes nothing but a bearer', async () => {
    await expectProblem('Basic bWF1ZDptYXVk', 'bad-token');
    await expectProblem('Bearer ', 'bad-token');
  });

  it('lets a bad token refresh, since that is how one gets a good one', async () => {
    const response = await server.call('post', '/sessions/refresh', {
      as: { authorization: 'Bearer old' },
      body: {},
      cookie: manager.cookie,
    });
    expect(response.body.person.id).toBe('maud');
  });

  it('shuts a disabled person out at once', async () => {
    const foreman = await server.signInAs('foreman');
    expect((await server.call('get', '/people', { as: foreman })).status).toBe(200);
    await server.call('patch', '/people/fred', { as: manager, body: { disabled: true } });
    await expectProblem(foreman.authorization, 'session-ended');
    const refreshed = await server.call('post', '/sessions/refresh', { body: {}, cookie: foreman.cookie });
    expect(refreshed.body.person).toBeNull();
  });

  it('holds a changed role at once', async () => {
    const foreman = await server.signInAs('foreman');
    await server.call('patch', '/people/fred', { as: manager, body: { roles: ['weaver'] } });
    const less = await server.call('get', '/people', { as: foreman });
    expect([less.status, less.body.code]).toEqual([403, 'not-permitted']);
    await server.call('patch', '/people/fred', { as: manager, body: { roles: ['weaver', 'foreman'] } });
    expect((await server.call('get', '/people', { as: foreman })).status).toBe(200);
  });

  it('keeps its secret to the server’s user', () => {
    const tokens = new AccessTokens(secret(), () => server.clock.now);
    expect(tokens.read(manager.authorization.slice('Bearer '.length))).toHaveProperty(
      'claims.personId',
      'maud',
    );
    expect(secret().length).toBeGreaterThanOrEqual(43);
  });
});

describe('where a request comes from', () => {
  let server: TestServer;
  beforeAll(async () => {
    server = await testServer();
  });
  afterAll(() => server.close());

  const refreshFrom = (origin: string | null) =>
    server.call('post', '/sessions/refresh', { body: {}, origin }).set('Host', 'mill.local:4280');

  it('takes cookie routes from its own pages alone', async () => {
    for (const origin of [
      null,
      'null',
      'https://elsewhere.example',
      'http://mill.local',
      'https://mill.local:4280',
    ]) {
      const response = await refreshFrom(origin);
      expect([origin, response.status, response.body.code]).toEqual([origin, 403, 'bad-origin']);
    }
    expect((await refreshFrom('http://mill.local:4280')).status).toBe(200);
    expect((await refreshFrom('http://shedbeat.test')).status).toBe(200);
  });

  it('asks for it wherever a cookie is read or set', async () => {
    const document = (await server.call('get', '/openapi.json')).body;
    const ofCookies = Object.entries<Record<string, Record<string, unknown>>>(document.paths).flatMap(
      ([path, lines]) => (lines['post']?.['x-own-origin'] ? [path] : []),
    );
    expect(ofCookies.sort()).toEqual([
      '/api/devices',
      '/api/devices/register-by-code',
      '/api/first-run',
      '/api/sessions/end',
      '/api/sessions/floor',
      '/api/sessions/office',
      '/api/sessions/one-time/redeem',
      '/api/sessions/refresh',
    ]);
  });
});
