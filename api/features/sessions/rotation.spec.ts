import type { Response } from 'supertest';
import {
  browserIdOf,
  cookieHeader,
  cookiesOf,
  TEST_PASSWORD,
  testServer,
  type TestServer,
} from '../../testing/test-server.js';

/** A browser: keeps the last person cookie that it was sent. */
interface Browser {
  jar: string;
  authorization: string;
}

describe('turning of refresh tokens', () => {
  let server: TestServer;
  beforeEach(async () => {
    server = await testServer();
  });
  afterEach(() => server.close());

  const refresh = (jar: string) => server.call('post', '/sessions/refresh', { body: {}, cookie: jar });
  const browserOf = (response: Response): Browser => ({
    jar: cookieHeader(cookiesOf(response)),
    authorization: `Bearer ${response.body.accessToken}`,
  });
  const use = (browser: Browser) => server.call('get', '/people', { as: browser });

  async function signIn(): Promise<Browser> {
    const response = await server.call('post', '/sessions/office', {
      body: {
        email: 'maud@mill.example',
        password: TEST_PASSWORD,
        browserId: browserIdOf('manager'),
      },
    });
    expect(response.status).toBe(200);
    return browserOf(response);
  }

  it('goes on from cookie to cookie, each good for the next', async () => {
    let browser = await signIn();
    for (let turn = 0; turn < 5; turn++) {
      const next = browserOf(await refresh(browser.jar));
      expect(next.jar).not.toBe(browser.jar);
      browser = next;
      expect((await use(browser)).status).toBe(200);
    }
  });

  it('takes a token again whose answer was lost on its way', async () => {
    const first = await signIn();
    await refresh(first.jar);
    await refresh(first.jar);
    const third = await refresh(first.jar);
    expect(third.body.person.id).toBe('maud');
    expect((await use(browserOf(third))).status).toBe(200);
  });

  it('takes two pages that ask at the same time', async () => {
    const first = await signIn();
    const [one, other] = await Promise.all([refresh(first.jar), refresh(first.jar)]);
    for (const answer of [one, other]) {
      expect(answer.body.person.id).toBe('maud');
      expect((await use(browserOf(answer))).status).toBe(200);
    }
    // The jar keeps one of the two; it goes on.
    expect((await refresh(cookieHeader(cookiesOf(other)))).body.person.id).toBe('maud');
  });

  it('takes a token for stolen once its successor was turned, and ends the session', async () => {
    const first = await signIn();
    const second = browserOf(await refresh(first.jar));
    const third = browserOf(await refresh(second.jar));
    expect((await use(third)).status).toBe(200);

    const thief = await refresh(first.jar);
    expect(thief.status).toBe(200);
    expect(thief.body).toMatchObject({ person: null, accessToken: null, grant: null });
    expect(thief.headers['set-cookie']?.[0]).toMatch(/^shedbeat-person=;/);

    const after = await use(third);
    expect(after.status).toBe(401);
    expect(after.body.code).toBe('session-ended');
    expect((await refresh(third.jar)).body.person).toBeNull();
    const [session] = await server.deps.reads.query('SELECT "endedWhy" FROM "session"');
    expect(session.endedWhy).toBe('theft');
  });

  it('takes a token for stolen once its successor’s access token was used', async () => {
    const first = await signIn();
    const second = browserOf(await refresh(first.jar));
    expect((await refresh(first.jar)).body.person.id).toBe('maud');
    expect((await use(second)).status).toBe(200);
    expect((await refresh(first.jar)).body.person).toBeNull();
    expect((await use(second)).body.code).toBe('session-ended');
  });

  it('does not take a wrong secret for a theft', async () => {
    const first = await signIn();
    const second = browserOf(await refresh(first.jar));
    await use(second);
    const [name, value] = first.jar.split('=');
    const guessed = `${name}=${value?.split('.')[0]}.${'x'.repeat(43)}`;
    expect((await refresh(guessed)).body.person).toBeNull();
    expect((await use(second)).status).toBe(200);
  });

  it('ends the streams of a stolen session', async () => {
    const first = await signIn();
    const second = browserOf(await refresh(first.jar));
    await use(second);
    const [{ id }] = await server.deps.reads.query('SELECT "id" FROM "session"');
    let closed = 0;
    server.deps.feed.listen({
      shedIds: null,
      sessionId: id,
      deviceId: null,
      send: () => undefined,
      close: () => closed++,
    });
    await refresh(first.jar);
    expect(closed).toBe(1);
  });

  it('ends with the session’s time', async () => {
    const first = await signIn();
    server.clock.pass(31 * 86_400_000);
    expect((await refresh(first.jar)).body.person).toBeNull();
  });

  it('keeps no tokens of sessions that are over', async () => {
    const tokens = async () =>
      (await server.deps.reads.query('SELECT count(*) AS "count" FROM "refresh_token"'))[0].count as number;
    const first = await signIn();
    const second = browserOf(await refresh(first.jar));
    expect(await tokens()).toBe(2);
    await server.call('post', '/sessions/end', { cookie: second.jar });
    expect(await tokens()).toBe(0);

    await signIn();
    server.clock.pass(31 * 86_400_000);
    await signIn();
    expect(await tokens()).toBe(1);
    const sessions = await server.deps.reads.query(
      'SELECT "endedWhy" FROM "session" WHERE "endedAt" IS NOT NULL ORDER BY "startedAt", "id"',
    );
    expect(sessions).toEqual([{ endedWhy: 'signed-out' }, { endedWhy: 'expired' }]);
  });

  it('answers nobody with 200 where there is no cookie', async () => {
    const response = await server.call('post', '/sessions/refresh', { body: {} });
    expect(response.status).toBe(200);
    expect(response.body).toMatchObject({ person: null, device: null, accessToken: null, grant: null });
    expect(response.body.needsFirstManager).toBe(false);
  });
});
