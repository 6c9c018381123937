import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { PushResponse } from '../../../shared/contract/sync.js';
import { readCursor, writeCursor } from './cursor.js';
import { LIMITS } from '../../../shared/contract/limits.js';
import { entry, type Said } from '../../testing/test-entries.js';
import { testServer, testShiftKey, type SignedInActor, type TestServer } from '../../testing/test-server.js';

describe('push', () => {
  let server: TestServer;
  let weaver: SignedInActor;
  beforeEach(async () => {
    server = await testServer();
    weaver = await server.signInOnTablet('weaver');
  });
  afterEach(() => server.close());

  const stop = (as = weaver, said: Partial<Said<'stop'>> = {}) =>
    entry('stop', {
      loomId: 'n1',
      cause: 'warp-break',
      count: 1,
      at: server.clock.now,
      by: as.session.person?.id ?? '',
      grantId: as.session.grant?.id ?? '',
      deviceId: as.session.device?.id ?? '',
      ...said,
    });
  const send = (body: object, as = weaver) => server.call('post', '/sync/entries', { as, body });
  const push = async (entries: unknown[], as = weaver) => {
    const answer = await send({ sentAt: server.clock.now, entries }, as);
    expect(answer.status, answer.text).toBe(200);
    return answer.body as PushResponse;
  };
  const count = async () =>
    (await server.deps.reads.query<{ n: number }[]>(`SELECT COUNT(*) AS "n" FROM "entry"`))[0]?.n;

  it('answers each entry by itself, with the offset it measured, and notes when the tablet was seen', async () => {
    const sentAt = server.clock.now - 5_000;
    const answer = await send({ sentAt, appVersion: '1.2.3', entries: [stop(), { odd: 1 }, stop()] });
    expect(answer.body).toMatchObject({
      serverNow: server.clock.now,
      offset: 5_000,
      results: [
        { index: 0, result: 'stored', at: server.clock.now + 5_000, shiftKey: testShiftKey() },
        { index: 1, result: 'refused', code: 'entry-malformed', id: null },
        { index: 2, result: 'stored' },
      ],
    });
    const [device] = await server.deps.reads.query<object[]>(
      `SELECT * FROM "device" WHERE "id" = 'tablet-north'`,
    );
    expect(device).toMatchObject({ lastSeenAt: server.clock.now, clockOffset: 5_000, appVersion: '1.2.3' });
  });

  it('says where the book stands, and asks for all again of whoever names a book that it is not', async () => {
    const { mark } = await push([stop()]);
    const again = async (seen: string) => {
      const answer = await send({ sentAt: server.clock.now, seen, entries: [stop()] });
      return (answer.body as PushResponse).resend;
    };
    expect(await again(mark ?? '')).toBe(false);
    const known = readCursor(mark ?? '');
    if (!known) throw new Error('no mark');
    for (const other of [{ seq: known.seq + 50 }, { ref: 'another' }, { epoch: 'another' }])
      expect(await again(writeCursor({ ...known, ...other }))).toBe(true);
  });

  it('notes what waits behind a push and whether the tablet keeps its storage', async () => {
    await send({ sentAt: server.clock.now, waiting: 7, persisted: true, entries: [stop(), stop()] });
    await send({ sentAt: server.clock.now, waiting: 5, entries: [stop()] });
    const manager = await server.signInAs('manager');
    const { body } = await server.call('get', '/devices', { as: manager });
    const tablet = body.devices.find((each: { id: string }) => each.id === 'tablet-north');
    expect(tablet).toMatchObject({ waiting: 4, persisted: true });
  });

  it('takes 500 entries and refuses 501 whole, with a code by which the tablet halves them', async () => {
    const many = Array.from({ length: LIMITS.entriesPerPush + 1 }, () => stop());
    const answer = await send({ sentAt: server.clock.now, entries: many });
    expect(answer.status).toBe(413);
    expect(answer.body).toMatchObject({ code: 'too-many-entries' });
    expect(await count()).toBe(0);
    const { results } = await push(many.slice(1));
    expect(results.every((one) => one.result === 'stored')).toBe(true);
  });

  it('refuses what is not JSON, and what is not a push', async () => {
    const notJson = await server
      .call('post', '/sync/entries', { as: weaver })
      .set('Content-Type', 'application/json')
      .send('{"sentAt": 1, "entries": [');
    expect([notJson.status, (notJson.body as { code: string }).code]).toEqual([400, 'bad-json']);
    const noEntries = await send({ sentAt: server.clock.now });
    expect(noEntries.body).toMatchObject({ code: 'bad-request', fields: [{ path: 'entries' }] });
  });

  it('answers a retry after an answer that was lost with what was stored then', async () => {
    const sent = [stop(), stop()];
    const first = await push(sent);
    server.clock.pass(60_000);
    const again = await push(sent);
    expect(again.results).toEqual(first.results.map((one) => ({ ...one, result: 'duplicate' })));
    expect(await count()).toBe(2);
  });

  it('takes what a withdrawn tablet still holds, for the foreman to decide, and gives it nothing', async () => {
    const manager = await server.signInAs('manager');
    const revoked = await server.call('post', '/devices/tablet-north/revoke', { as: manager });
    expect(revoked.status).toBe(200);
    const tablet = await server.tablet();
    const held = stop();
    expect((await push([held], tablet)).results).toMatchObject([{ result: 'held', hold: 'device-revoked' }]);
    const pulled = await server.call('get', '/sync/changes', { as: tablet });
    expect(pulled.body).toMatchObject({ code: 'device-revoked' });
  });

  it('loses no acknowledged entry among 200 pushes at once, of which some fail', async () => {
    const { writer } = server.deps;
    // Neighbours that break in the middle of their transactions.
    const broken = Array.from({ length: 60 }, () =>
      writer
        .write(async (tx) => {
          await tx.query(`UPDATE "device" SET "lastSeenAt" = 1`);
          throw new Error('broken');
        })
        .catch((error: unknown) => error),
    );
    const pushes = await Promise.all(
      Array.from({ length: 200 }, async (_, n) => {
        const sent = n % 7 === 0 ? { ...stop(), cause: 'gremlins' } : stop();
        const answer = await push([sent]);
        return { id: sent.id, result: answer.results[0]?.result };
      }),
    );
    expect(await Promise.all(broken)).toHaveLength(60);
    const acknowledged = pushes.filter((one) => one.result === 'stored').map((one) => one.id);
    expect(acknowledged).toHaveLength(171);
    const kept = await server.deps.reads.query<{ id: string }[]>(`SELECT "id" FROM "entry"`);
    expect(new Set(kept.map((row) => row.id))).toEqual(new Set(acknowledged));
  });

  it('acknowledges nothing when the disk is full, and the same push is taken later', async () => {
    await server.deps.writer.exclusive(async (data) => {
      const [{ page_count: pages } = { page_count: 0 }] =
        await data.query<{ page_count: number }[]>('PRAGMA page_count');
      await data.query(`PRAGMA max_page_count = ${pages}`);
    });
    const many = Array.from({ length: 500 }, () => stop());
    const answer = await send({ sentAt: server.clock.now, entries: many });
    expect(answer.status).toBe(503);
    expect(answer.body).toMatchObject({ code: 'disk-full' });
    expect(await count()).toBe(0);
    await server.deps.writer.exclusive((data) => data.query('PRAGMA max_page_count = 1073741823'));
    expect((await push(many)).results.every((one) => one.result === 'stored')).toBe(true);
  });

  describe('the live feed', () => {
    let listening: Server;
    beforeEach(async () => {
      listening = createServer(server.app);
      await new Promise<void>((resolve) => listening.listen(0, '127.0.0.1', resolve));
    });
    afterEach(() => {
      listening.closeAllConnections();
      listening.close();
    });

    const listen = async (as: SignedInActor) => {
      const { port } = listening.address() as AddressInfo;
      const response = await fetch(`http://127.0.0.1:${port}/api/sync/feed`, {
        headers: { authorization: as.authorization, 'accept-encoding': 'gzip' },
      });
      const reader = response.body?.pipeThrough(new TextDecoderStream()).getReader();
      if (!reader) throw new Error('no stream');
      return { response, reader };
    };

    it('says that there is something new, uncompressed, and to the shed concerned only', async () => {
      const { response, reader } = await listen(weaver);
      expect(response.headers.get('content-type')).toBe('text/event-stream');
      expect(response.headers.get('content-encoding')).toBeNull();
      expect((await reader.read()).value).toBe('event: changed\ndata: {"seq":0}\n\n');
      const south = await server.signInOnTablet('southWeaver', 'south');
      await push([stop(south, { shedId: 'south', loomId: 's1' })], south);
      await push([stop()]);
      expect((await reader.read()).value).toBe('event: changed\ndata: {"seq":2}\n\n');
      await reader.cancel();
    });

    it('ends when the sign-in or the tablet is withdrawn', async () => {
      const manager = await server.signInAs('manager');
      const foreman = await server.signInAs('foreman');
      const ofTablet = await listen(weaver);
      const ofForeman = await listen(foreman);
      await ofTablet.reader.read();
      await ofForeman.reader.read();
      await server.call('post', '/devices/tablet-north/revoke', { as: manager });
      expect((await ofTablet.reader.read()).done).toBe(true);
      await server.call('patch', '/people/fred', { as: manager, body: { disabled: true } });
      const rest: (string | undefined)[] = [];
      for (let part = await ofForeman.reader.read(); !part.done; part = await ofForeman.reader.read())
        rest.push(part.value);
      expect((await ofForeman.reader.read()).done).toBe(true);
    });
  });
});
