import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Express } from 'express';
import request, { type Response, type Test } from 'supertest';
import type { Session } from '../../shared/contract/session.js';
import { createApp } from '../app.js';
import type { Deps } from '../deps.js';
import type { Passwords } from '../features/sessions/passwords.js';
import { createPasswords } from '../features/sessions/worker-passwords.js';
import { openDeps } from '../open-deps.js';
import type { Settings } from '../settings.js';
import {
  insertTestMill,
  TEST_NOW,
  TEST_PASSWORD,
  TEST_PEOPLE,
  TEST_PIN,
  TEST_TABLETS,
  type TestPersonKey,
  type TestShed,
} from './test-mill.js';

export * from './test-mill.js';

/** What browsers send as Origin here; the test server takes it for its own. */
export const TEST_ORIGIN = 'http://shedbeat.test';

/** A clock that stands until it is moved. */
export interface TestClock {
  now: number;
  /** Moves on by so many milliseconds. */
  pass(milliseconds: number): void;
}

/** Somebody signed in: send `authorization` as a header, `cookie` on cookie routes. */
export interface SignedInActor {
  readonly authorization: string;
  readonly cookie: string;
  readonly session: Session;
}

export interface Call {
  readonly as?: Pick<SignedInActor, 'authorization'> | null;
  readonly body?: object;
  readonly query?: Record<string, string>;
  readonly cookie?: string;
  /** null: none. */
  readonly origin?: string | null;
}

export interface TestServer {
  readonly app: Express;
  readonly deps: Deps;
  readonly clock: TestClock;
  /** A request to /api + path, with JSON and our Origin. */
  call(method: 'get' | 'post' | 'patch' | 'delete', path: string, call?: Call): Test;
  /** Weavers and tacklers on their shed's tablet with the PIN, the others at an office browser with the password. */
  signInAs(who: TestPersonKey): Promise<SignedInActor>;
  /** On a tablet, whoever it is. */
  signInOnTablet(who: TestPersonKey, shed?: TestShed): Promise<SignedInActor>;
  /** A tablet with nobody signed in. */
  tablet(shed?: TestShed): Promise<SignedInActor>;
  /** Stops and deletes everything. */
  close(): Promise<void>;
}

export interface TestServerOptions {
  /** No mill, no people: as at a first start. */
  readonly empty?: boolean;
  readonly settings?: Partial<Settings>;
  readonly deps?: Partial<Deps>;
}

/** bcrypt's least cost: the real cost has a spec of its own. */
const CHEAP = 4;

/** One worker for all servers of a spec file: starting one takes longer than all its compares. */
const passwords = createPasswords(CHEAP);
const sharedPasswords: Passwords = { ...passwords, close: async () => undefined };

let hashes: Promise<{ pinHash: string; passwordHash: string }> | null = null;

/** A real server without a port: real SQLite file in a folder of its own, the real migrations, the test mill. */
export async function testServer(options: TestServerOptions = {}): Promise<TestServer> {
  const dataDir = mkdtempSync(join(tmpdir(), 'shedbeat-test-'));
  const clock: TestClock = {
    now: TEST_NOW,
    pass: (milliseconds) => {
      clock.now += milliseconds;
    },
  };
  const settings: Settings = { ...TEST_SETTINGS, dataDir, ...options.settings };
  const opened = await openDeps(settings, {
    now: () => clock.now,
    passwords: sharedPasswords,
    ...options.deps,
  });
  const { deps } = opened;
  if (!options.empty) {
    const known = await (hashes ??= hashSecrets());
    await deps.writer.write((tx) => insertTestMill(tx, known));
  }
  const app = createApp(deps, { checkAnswers: true });
  const call: TestServer['call'] = (method, path, { as, body, query, cookie, origin = TEST_ORIGIN } = {}) => {
    let test = request(app)[method](`/api${path}`);
    if (origin !== null) test = test.set('Origin', origin);
    if (as) test = test.set('Authorization', as.authorization);
    if (cookie !== undefined) test = test.set('Cookie', cookie);
    if (query) test = test.query(query);
    return body === undefined ? test : test.send(body);
  };
  const signInOnTablet: TestServer['signInOnTablet'] = async (who, shed = 'north') =>
    actorOf(
      await call('post', '/sessions/floor', {
        body: { worksNumber: TEST_PEOPLE[who].worksNumber, pin: TEST_PIN },
        cookie: tabletCookie(shed),
      }),
      tabletCookie(shed),
    );
  return {
    app,
    deps,
    clock,
    call,
    signInOnTablet,
    signInAs: async (who) => {
      const { roles, shedIds, id } = TEST_PEOPLE[who];
      if (roles.some((role) => role === 'weaver' || role === 'tackler'))
        return signInOnTablet(who, shedIds[0] ?? 'north');
      const browserId = browserIdOf(who);
      return actorOf(
        await call('post', '/sessions/office', {
          body: { email: `${id}@mill.example`, password: TEST_PASSWORD, browserId },
        }),
      );
    },
    tablet: async (shed = 'north') =>
      actorOf(
        await call('post', '/sessions/refresh', { body: {}, cookie: tabletCookie(shed) }),
        tabletCookie(shed),
      ),
    close: async () => {
      await opened.close();
      rmSync(dataDir, { recursive: true, force: true });
    },
  };
}

export const TEST_SETTINGS: Settings = {
  port: 0,
  host: '127.0.0.1',
  dataDir: '',
  appDir: null,
  tls: null,
  publicOrigins: [TEST_ORIGIN],
  trustProxy: 0,
  logLevel: 'silent',
  backupHour: null,
  backupsKept: 3,
};

/** The header that a registered tablet's browser sends. */
export function tabletCookie(shed: TestShed = 'north'): string {
  const { id, secret } = TEST_TABLETS[shed];
  return `shedbeat-device=${id}.${secret}`;
}

/** Cookies that an answer sets, as the next request sends them back; a cleared one is left out. */
export function cookiesOf(response: Response): Record<string, string> {
  const lines = [response.headers['set-cookie'] ?? []].flat();
  const pairs = lines.map((line) => (line.split(';')[0] ?? '').split('='));
  return Object.fromEntries(
    pairs.flatMap(([name, value]) => (name !== undefined && value ? [[name, value] as const] : [])),
  );
}

/** As a Cookie header. */
export function cookieHeader(...jars: Record<string, string>[]): string {
  return Object.entries(Object.assign({}, ...jars) as Record<string, string>)
    .map(([name, value]) => `${name}=${value}`)
    .join('; ');
}

/** Each person's own office browser. */
export function browserIdOf(who: TestPersonKey): string {
  const number = Object.keys(TEST_PEOPLE).indexOf(who) + 1;
  return `0195e000-0000-7000-8000-${String(number).padStart(12, '0')}`;
}

function actorOf(response: Response, deviceCookie?: string): SignedInActor {
  if (response.status !== 200) throw new Error(`sign-in answered ${response.status}: ${response.text}`);
  const session = response.body as Session;
  const person = cookieHeader(cookiesOf(response));
  return {
    authorization: `Bearer ${session.accessToken}`,
    cookie: [deviceCookie, person].filter(Boolean).join('; '),
    session,
  };
}

async function hashSecrets() {
  const pinHash = await passwords.hash(TEST_PIN);
  const passwordHash = await passwords.hash(TEST_PASSWORD);
  return { pinHash, passwordHash };
}
