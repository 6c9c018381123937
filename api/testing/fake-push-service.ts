import { createDecipheriv, createECDH, hkdfSync, randomBytes, type ECDH } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { Agent, createServer } from 'node:https';
import type { IncomingHttpHeaders } from 'node:http';
import type { AddressInfo } from 'node:net';
import type { PushSubscriptionOnWire } from '../../shared/contract/calls.js';
import { webPushCarrier, type PushCarrier } from '../push/push-carrier.js';

export interface Pushed {
  readonly browser: FakeBrowser;
  readonly headers: IncomingHttpHeaders;
  /** As the browser decrypts it (RFC 8291). */
  readonly payload: unknown;
}

/** A browser's end of a subscription. */
export interface FakeBrowser {
  readonly subscription: PushSubscriptionOnWire;
}

/** A push service such as browsers choose, on this machine: real HTTPS, real encryption. */
export interface FakePushService {
  readonly carrier: PushCarrier;
  readonly pushed: Pushed[];
  newBrowser(): FakeBrowser;
  /** From now on this browser is answered with a status: 410, its subscription has ended. */
  answer(browser: FakeBrowser, status: number): void;
  close(): Promise<void>;
}

interface Secrets {
  readonly browser: FakeBrowser;
  readonly ecdh: ECDH;
  readonly auth: Buffer;
  status: number;
}

const tls = (name: string): Buffer => readFileSync(new URL(`./tls/${name}`, import.meta.url));

export async function fakePushService(): Promise<FakePushService> {
  const browsers = new Map<string, Secrets>();
  const pushed: Pushed[] = [];
  const cert = tls('test-cert.pem');
  const server = createServer({ cert, key: tls('test-key.pem') }, (request, response) => {
    const chunks: Buffer[] = [];
    request.on('data', (chunk: Buffer) => chunks.push(chunk));
    request.on('end', () => {
      const secrets = browsers.get(request.url ?? '');
      if (secrets?.status === 201)
        pushed.push({
          browser: secrets.browser,
          headers: request.headers,
          payload: JSON.parse(decrypt(Buffer.concat(chunks), secrets)) as unknown,
        });
      response.writeHead(secrets?.status ?? 404).end();
    });
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const host = `localhost:${(server.address() as AddressInfo).port}`;
  const agent = new Agent({ ca: cert });
  return {
    carrier: webPushCarrier({ onlyHost: host, agent }),
    pushed,
    newBrowser: () => {
      const ecdh = createECDH('prime256v1');
      const auth = randomBytes(16);
      const path = `/send/${randomBytes(12).toString('hex')}`;
      const p256dh = ecdh.generateKeys('base64url');
      const browser = {
        subscription: {
          endpoint: `https://${host}${path}`,
          keys: { p256dh, auth: auth.toString('base64url') },
        },
      };
      browsers.set(path, { browser, ecdh, auth, status: 201 });
      return browser;
    },
    answer: ({ subscription }, status) => {
      const secrets = browsers.get(new URL(subscription.endpoint).pathname);
      if (secrets) secrets.status = status;
    },
    close: async () => {
      agent.destroy();
      server.closeAllConnections();
      await new Promise((resolve) => server.close(resolve));
    },
  };
}

/** RFC 8291 over RFC 8188 (aes128gcm), one record. */
function decrypt(body: Buffer, { ecdh, auth }: Secrets): string {
  const salt = body.subarray(0, 16);
  const serverKey = body.subarray(21, 21 + body.readUInt8(20));
  const sealed = body.subarray(21 + serverKey.length);
  const info = Buffer.concat([Buffer.from('WebPush: info\0'), ecdh.getPublicKey(), serverKey]);
  const secret = Buffer.from(hkdfSync('sha256', ecdh.computeSecret(serverKey), auth, info, 32));
  const key = Buffer.from(hkdfSync('sha256', secret, salt, Buffer.from('Content-Encoding: aes128gcm\0'), 16));
  const nonce = Buffer.from(hkdfSync('sha256', secret, salt, Buffer.from('Content-Encoding: nonce\0'), 12));
  const decipher = createDecipheriv('aes-128-gcm', key, nonce);
  decipher.setAuthTag(sealed.subarray(-16));
  const padded = Buffer.concat([decipher.update(sealed.subarray(0, -16)), decipher.final()]);
  return padded.subarray(0, padded.lastIndexOf(2)).toString();
}
