import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import request from 'supertest';
import { ERROR_CODES, problemSchema } from '../shared/contract/errors.js';
import { LIMITS } from '../shared/contract/limits.js';
import { testServer, type SignedInActor, type TestServer } from './testing/test-server.js';

describe('the API', () => {
  let server: TestServer;
  let manager: SignedInActor;
  beforeAll(async () => {
    server = await testServer();
    manager = await server.signInAs('manager');
  });
  afterAll(() => server.close());

  const post = (path: string, body: string, type = 'application/json') =>
    request(server.app)
      .post(`/api${path}`)
      .set('Origin', 'http://shedbeat.test')
      .set('Authorization', manager.authorization)
      .set('Content-Type', type)
      .send(body);

  it('says of a body that is not JSON that it is not', async () => {
    for (const [body, type] of [
      ['{"name":', 'application/json'],
      ['"text alone"', 'application/json'],
      ['name=Nell', 'application/x-www-form-urlencoded'],
      ['hello', 'text/plain'],
    ] as const) {
      const response = await post('/people', body, type);
      expect([body, response.status, response.body.code]).toEqual([body, 400, 'bad-json']);
      expect(problemSchema.safeParse(response.body).success).toBe(true);
      expect(response.type).toBe('application/problem+json');
    }
  });

  it('says what is too large', async () => {
    const response = await post('/people', JSON.stringify({ name: 'x'.repeat(LIMITS.bodyBytes) }));
    expect([response.status, response.body.code]).toEqual([413, 'too-large']);
  });

  it('does not parse a stranger’s body', async () => {
    const response = await request(server.app)
      .post('/api/people')
      .set('Content-Type', 'application/json')
      .send('{"name":');
    expect(response.body.code).toBe('not-signed-in');
  });

  it('marks every wrong field', async () => {
    const response = await post('/people', '{"name":"","roles":[],"worksNumber":"1a"}');
    expect([response.status, response.body.code]).toEqual([400, 'bad-request']);
    expect(response.body.fields.map((each: { path: string }) => each.path)).toEqual([
      'name',
      'shortName',
      'worksNumber',
      'email',
      'roles',
      'shedIds',
    ]);
    for (const { message } of response.body.fields) expect(message).toMatch(/\w{3}/);
    expect((await post('/people', '')).body.code).toBe('bad-request');
  });

  it('has nothing at unknown addresses, and says so as a problem', async () => {
    for (const path of ['/api', '/api/nothing', '/api/people/fred/nothing', '/API/nothing', '/nothing']) {
      const response = await request(server.app).get(path);
      expect([path, response.status, response.type]).toEqual([path, 404, 'application/problem+json']);
      expect(response.body.code).toBe('not-found');
    }
    const garbled = await request(server.app).patch('/api/people/%E0%A4%A');
    expect([garbled.status, garbled.body.code]).toEqual([400, 'bad-request']);
  });

  it('sets the headers that browsers protect by, and none that a plain network cannot keep', async () => {
    const { headers } = await server.call('get', '/health');
    expect(headers['content-security-policy']).toContain("default-src 'self'");
    expect(headers['content-security-policy']).toContain("frame-ancestors 'none'");
    expect(headers['content-security-policy']).not.toContain('upgrade-insecure-requests');
    expect(headers['strict-transport-security']).toBeUndefined();
    expect(headers['x-content-type-options']).toBe('nosniff');
    expect(headers['x-powered-by']).toBeUndefined();
    expect(headers['cache-control']).toBe('no-store');
  });

  it('asks browsers to stay with HTTPS where it has it', async () => {
    const secure = await testServer({ settings: { publicOrigins: ['https://shedbeat.example'] } });
    const { headers } = await secure.call('get', '/health');
    await secure.close();
    expect(headers['strict-transport-security']).toContain('max-age=31536000');
    expect(headers['content-security-policy']).toContain('upgrade-insecure-requests');
  });

  it('tells how it is', async () => {
    const response = await server.call('get', '/health');
    expect(response.body).toEqual({
      status: 'ok',
      version: '0.1.0',
      serverNow: server.clock.now,
      epoch: server.deps.epoch,
      writerWaiting: 0,
    });
  });

  it('describes every route with its permission, request, answer and codes', async () => {
    const { body } = await server.call('get', '/openapi.json');
    expect(body.openapi).toBe('3.1.0');
    const register = body.paths['/api/devices'].post;
    expect(register['x-permission']).toBe('devices.register');
    expect(register.requestBody.content['application/json'].schema.required).toEqual(['name', 'shedId']);
    expect(register.responses['200'].content['application/json'].schema.properties).toHaveProperty('grant');
    expect(register.responses['403']['x-codes']).toEqual(
      expect.arrayContaining(['other-shed', 'bad-origin', 'not-permitted', 'device-revoked']),
    );
    expect(body.paths['/api/devices/{id}/revoke'].post.parameters).toMatchObject([
      { name: 'id', in: 'path', required: true },
    ]);
    const operations = Object.values<Record<string, Record<string, unknown>>>(body.paths).flatMap((lines) =>
      Object.values(lines),
    );
    const ids = operations.map(({ operationId }) => operationId);
    expect(new Set(ids).size).toBe(ids.length);
    for (const each of operations) expect(each).toMatchObject({ summary: expect.stringMatching(/\w/) });
    for (const code of JSON.stringify(body)
      .match(/(?<="x-codes":\[)[^\]]+/g)
      ?.join(',')
      .split(',') ?? [])
      expect(ERROR_CODES).toContain(JSON.parse(code));
    expect(body.components.schemas.Problem.properties.code.enum).toEqual(ERROR_CODES);
  });
});

describe('the application’s files', () => {
  let appDir: string;
  let server: TestServer;
  beforeAll(async () => {
    appDir = mkdtempSync(join(tmpdir(), 'shedbeat-app-'));
    writeFileSync(join(appDir, 'index.html'), '<!doctype html><title>Shedbeat</title>');
    writeFileSync(join(appDir, 'main-ABCD2345.js'), 'console.log(1);'.repeat(200));
    writeFileSync(join(appDir, 'ngsw.json'), '{}');
    writeFileSync(join(appDir, 'ngsw-worker.js'), '');
    mkdirSync(join(appDir, 'media'));
    writeFileSync(join(appDir, 'media', 'font-WXYZ6789.woff2'), '');
    server = await testServer({ settings: { appDir } });
  });
  afterAll(async () => {
    await server.close();
    rmSync(appDir, { recursive: true, force: true });
  });

  const get = (path: string) => request(server.app).get(path);

  it('are kept for good where their name has a hash, and asked for again where not', async () => {
    for (const path of ['/main-ABCD2345.js', '/media/font-WXYZ6789.woff2'])
      expect((await get(path)).headers['cache-control']).toBe('public, max-age=31536000, immutable');
    for (const path of ['/', '/index.html', '/ngsw.json', '/ngsw-worker.js', '/weeks/loom/7']) {
      const response = await get(path);
      expect([path, response.status, response.headers['cache-control']]).toEqual([path, 200, 'no-cache']);
    }
  });

  it('answer pages with the application, and nothing else with it', async () => {
    for (const path of ['/', '/weeks', '/shift-book/north:2026-03-10:early', '/first-run?x=1'])
      expect((await get(path)).text).toContain('<title>Shedbeat</title>');
    for (const path of [
      '/robots.txt',
      '/chunk-ABCD2345.js',
      '/media/none.woff2',
      '/api/nothing',
      '/.env',
      '/..%2fx.y',
    ]) {
      const response = await get(path);
      expect([path, response.status]).toEqual([path, 404]);
      expect(response.text).not.toContain('<title>');
    }
    expect((await request(server.app).post('/weeks')).status).toBe(404);
  });

  it('are compressed', async () => {
    const response = await get('/main-ABCD2345.js').set('Accept-Encoding', 'gzip');
    expect(response.headers['content-encoding']).toBe('gzip');
  });
});
