import { chmodSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { request as httpsRequest } from 'node:https';
import { connect } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { CannotStart } from './cannot-start.js';
import { ShedRow } from './database/entities/index.js';
import type { Settings } from './settings.js';
import { startServer } from './start-server.js';
import { TEST_SETTINGS } from './testing/test-server.js';

const pem = (name: string) => fileURLToPath(new URL(`./testing/tls/${name}`, import.meta.url));

describe('starting and stopping', () => {
  let dataDir: string;
  let settings: Settings;
  beforeEach(() => {
    dataDir = mkdtempSync(join(tmpdir(), 'shedbeat-test-'));
    settings = { ...TEST_SETTINGS, dataDir };
  });
  afterEach(() => rmSync(dataDir, { recursive: true, force: true }));

  it('serves until it is closed, and can start again on the same data', async () => {
    const first = await startServer(settings);
    const health = await (await fetch(`${first.url}/api/health`)).json();
    expect(health).toMatchObject({ status: 'ok', epoch: first.deps.epoch });
    expect(first.firstRunCode).toMatch(/^[A-Z2-9]{4}-[A-Z2-9]{4}-[A-Z2-9]{4}$/);
    await first.close();
    await first.close();
    await expect(fetch(`${first.url}/api/health`)).rejects.toThrow();

    const second = await startServer(settings);
    expect(second.deps.epoch).toBe(first.deps.epoch);
    expect(second.firstRunCode).not.toBe(first.firstRunCode);
    await second.close();
  });

  it('refuses a data folder that another has', async () => {
    const first = await startServer(settings);
    await expect(startServer(settings)).rejects.toThrow(/in use by/);
    expect((await fetch(`${first.url}/api/health`)).status).toBe(200);
    await first.close();
  });

  it('says so where the port is taken, and frees the data folder', async () => {
    const first = await startServer(settings);
    const other = { ...settings, dataDir: join(dataDir, 'other'), port: Number(new URL(first.url).port) };
    await expect(startServer(other)).rejects.toThrow(CannotStart);
    await expect(startServer(other)).rejects.toThrow(/^Port \d+ is taken/);
    await first.close();
    const freed = await startServer({ ...other, port: 0 });
    await freed.close();
  });

  it('says so where the address is not ours', async () => {
    await expect(startServer({ ...settings, host: '192.0.2.1' })).rejects.toThrow(/HOST=192\.0\.2\.1/);
  });

  it('serves HTTPS with a certificate', async () => {
    const tls = { cert: pem('test-cert.pem'), key: pem('test-key.pem') };
    const server = await startServer({ ...settings, tls, publicOrigins: [] });
    expect(server.url).toMatch(/^https:/);
    const { status, headers } = await new Promise<{ status?: number; headers: object }>((resolve, reject) => {
      const asked = httpsRequest(
        `${server.url}/api/sessions/refresh`,
        { method: 'POST', rejectUnauthorized: false, headers: { Origin: server.url } },
        (response) => {
          response.resume();
          resolve({ status: response.statusCode ?? 0, headers: response.headers });
        },
      );
      asked.on('error', reject);
      asked.end();
    });
    await server.close();
    expect(status).toBe(200);
    expect(headers).toHaveProperty('strict-transport-security');
  });

  it('says what is wrong with TLS files', async () => {
    const cert = pem('test-cert.pem');
    const key = pem('test-key.pem');
    const none = join(dataDir, 'none.pem');
    const wrong = join(dataDir, 'wrong.pem');
    writeFileSync(wrong, 'not a key');
    await expect(startServer({ ...settings, tls: { cert: none, key } })).rejects.toThrow(
      /^TLS_CERT=.*cannot be read/,
    );
    await expect(startServer({ ...settings, tls: { cert, key: none } })).rejects.toThrow(
      /^TLS_KEY=.*cannot be read/,
    );
    await expect(startServer({ ...settings, tls: { cert, key: wrong } })).rejects.toThrow(
      /no certificate and key/,
    );
    const server = await startServer({ ...settings, tls: { cert, key } });
    await server.close();
  });

  it('says so where the secret was cut short', async () => {
    writeFileSync(join(dataDir, 'token-secret'), 'short');
    await expect(startServer(settings)).rejects.toThrow(/token-secret is cut short/);
  });

  it('closes the secret to others', async () => {
    writeFileSync(join(dataDir, 'token-secret'), 'x'.repeat(43));
    chmodSync(join(dataDir, 'token-secret'), 0o644);
    const server = await startServer(settings);
    await server.close();
    const { mode } = await import('node:fs').then(({ statSync }) => statSync(join(dataDir, 'token-secret')));
    expect(mode & 0o777).toBe(0o600);
  });

  it('finishes what is being written, and ends streams and idle connections', async () => {
    const server = await startServer(settings);
    let ended = 0;
    server.deps.feed.listen({
      shedIds: null,
      sessionId: null,
      deviceId: 'tablet',
      send: () => undefined,
      close: () => ended++,
    });
    const port = Number(new URL(server.url).port);
    const idle = connect(port, '127.0.0.1');
    await new Promise((resolve) => idle.once('connect', resolve));
    const dropped = new Promise((resolve) => idle.once('close', resolve));
    const writing = server.deps.writer.write(async (tx) => {
      await new Promise((resolve) => setImmediate(resolve));
      await tx.getRepository(ShedRow).insert({ id: 'north', name: 'North' });
    });
    await Promise.all([server.close(), writing, dropped]);
    expect(ended).toBe(1);
    const again = await startServer(settings);
    expect(await again.deps.reads.query('SELECT "id" FROM "shed"')).toEqual([{ id: 'north' }]);
    await again.close();
  });
});
