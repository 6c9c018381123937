import * as z from 'zod/mini';
import { exchange, type Fetch } from './exchange';

const answer = z.object({ n: z.int() });

function server(status: number, body: string, type: string, headers: Record<string, string> = {}): Fetch {
  return () => Promise.resolve(new Response(body, { status, headers: { 'content-type': type, ...headers } }));
}

function ask(fetch: Fetch) {
  return exchange(fetch, { method: 'GET', url: '/api/x', answer });
}

describe('exchange', () => {
  it('gives the body that the schema takes', async () => {
    expect(await ask(server(200, '{"n":1}', 'application/json'))).toEqual({ kind: 'ok', body: { n: 1 } });
  });

  it('takes HTML with status 200 for a network that is not ours', async () => {
    expect(await ask(server(200, '<html>Log in to the café</html>', 'text/html'))).toEqual({
      kind: 'offline',
      why: 'not-our-server',
    });
  });

  it('does not take a page for an answer that may be anything', async () => {
    const asked = { method: 'POST', url: '/api/x', answer: z.unknown() } as const;
    expect(await exchange(server(200, '<html>', 'text/html'), asked)).toMatchObject({ kind: 'offline' });
    expect(await exchange(() => Promise.resolve(new Response(null, { status: 204 })), asked)).toMatchObject({
      kind: 'ok',
    });
  });

  it('takes JSON that is not the server’s for a network that is not ours', async () => {
    expect((await ask(server(200, '{"portal":true}', 'application/json'))).kind).toBe('offline');
    expect((await ask(server(200, '{"n":', 'application/json'))).kind).toBe('offline');
    expect((await ask(server(404, 'no such page', 'text/plain'))).kind).toBe('offline');
  });

  it('takes the service worker’s 504 for no network', async () => {
    expect(await ask(server(504, '', 'text/plain'))).toEqual({ kind: 'offline', why: 'service-worker' });
  });

  it('takes a fetch that fails for no network, and one that takes too long for too slow', async () => {
    expect(await ask(() => Promise.reject(new TypeError('Failed to fetch')))).toEqual({
      kind: 'offline',
      why: 'no-network',
    });
    const never: Fetch = (_input, init) =>
      new Promise((_resolve, reject) =>
        init.signal?.addEventListener('abort', () => reject(init.signal?.reason)),
      );
    expect(await exchange(never, { method: 'GET', url: '/api/x', answer, timeout: 5 })).toEqual({
      kind: 'offline',
      why: 'too-slow',
    });
  });

  it('reads a problem with its code and Retry-After', async () => {
    const problem = { type: 'about:blank', title: 'busy', status: 503, code: 'busy' };
    const got = await ask(
      server(503, JSON.stringify(problem), 'application/problem+json', { 'retry-after': '7' }),
    );
    expect(got).toEqual({ kind: 'problem', status: 503, code: 'busy', problem, retryAfter: 7_000 });
  });

  it('knows a proxy’s 413, 429 and 503 by their status', async () => {
    for (const [status, code] of [
      [413, 'too-large'],
      [429, 'too-many-tries'],
      [503, 'busy'],
    ] as const)
      expect(await ask(server(status, '<html>', 'text/html'))).toMatchObject({
        kind: 'problem',
        status,
        code,
      });
  });
});
