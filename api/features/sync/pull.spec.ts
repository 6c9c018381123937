import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { PullResponse, PushResponse } from '../../../shared/contract/sync.js';
import { entry, type Said } from '../../testing/test-entries.js';
import { testServer, testShiftKey, type SignedInActor, type TestServer } from '../../testing/test-server.js';
import { LIMITS } from '../../../shared/contract/limits.js';
import { readCursor, writeCursor } from './cursor.js';

const HOUR = 3_600_000;

describe('pull', () => {
  let server: TestServer;
  let weaver: SignedInActor;
  let foreman: SignedInActor;
  beforeEach(async () => {
    server = await testServer();
    weaver = await server.signInOnTablet('weaver');
    foreman = await server.signInAs('foreman');
  });
  afterEach(() => server.close());

  const stop = (as: SignedInActor, said: Partial<Said<'stop'>> = {}) =>
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
  const push = async (as: SignedInActor, entries: unknown[]) => {
    const answer = await server.call('post', '/sync/entries', {
      as,
      body: { sentAt: server.clock.now, entries },
    });
    expect(answer.status).toBe(200);
    return answer.body as PushResponse;
  };
  const pull = async (as: SignedInActor, after?: string) => {
    const answer = await server.call('get', '/sync/changes', { as, query: after ? { after } : {} });
    expect(answer.status).toBe(200);
    return answer.body as PullResponse;
  };
  const idsOf = (pulled: PullResponse) => pulled.entries.map(({ entry: one }) => one['id']);

  it('begins with the whole: what the mill is, shifts ahead, entries of the last shifts', async () => {
    const mine = stop(weaver);
    await push(weaver, [mine]);
    const first = await pull(weaver);
    expect(first).toMatchObject({ snapshot: true, resend: false, more: false });
    expect(idsOf(first)).toEqual([mine.id]);
    expect(first.shifts.map((shift) => shift.key)).toContain(testShiftKey('2026-03-12'));
    expect(first.shifts.every((shift) => shift.shedId === 'north')).toBe(true);
    expect(first.reference?.looms.map((loom) => loom.id)).toContain('n4');
    expect(first.reference?.causeVersions[0]?.causeId).toBe('warp-break');
    expect(first.people?.map((person) => person.id)).toContain('wanda');
    expect(first.people?.map((person) => person.id)).not.toContain('winnie');
  });

  it('goes on from its cursor with what is new, and only that', async () => {
    await push(weaver, [stop(weaver)]);
    const first = await pull(weaver);
    const later = stop(weaver);
    await push(weaver, [later]);
    const second = await pull(weaver, first.cursor);
    expect(second).toMatchObject({
      snapshot: false,
      resend: false,
      reference: null,
      people: null,
      shifts: [],
    });
    expect(idsOf(second)).toEqual([later.id]);
    expect(second.entries[0]).toMatchObject({ at: later.at, shiftKey: testShiftKey(), holds: [] });
    const third = await pull(weaver, second.cursor);
    expect(third.entries).toEqual([]);
    expect(third.cursor).toBe(second.cursor);
  });

  it('says nothing of another shed', async () => {
    const south = await server.signInOnTablet('southWeaver', 'south');
    await push(south, [stop(south, { shedId: 'south', loomId: 's1' })]);
    expect((await pull(weaver)).entries).toEqual([]);
    const refused = await server.call('get', '/sync/changes', { as: weaver, query: { shedId: 'south' } });
    expect(refused.status).toBe(403);
    expect(refused.body).toMatchObject({ code: 'other-shed' });
  });

  it('keeps other people’s names from the floor, but for those who sign in on that tablet', async () => {
    await push(weaver, [stop(weaver)]);
    await push(foreman, [entry('note', { ...stop(foreman), kind: 'note', text: 'Seen.' } as Said<'note'>)]);
    const onFloor = (await pull(weaver)).entries.map(({ entry: one }) => [one['by'], one['deviceId']]);
    expect(onFloor).toEqual([
      ['wanda', 'tablet-north'],
      ['-', '-'],
    ]);
    const inOffice = (await pull(foreman)).entries.map(({ entry: one }) => one['by']);
    expect(inOffice).toEqual(['wanda', 'fred']);
  });

  it('sends the whole again, and asks for what was acknowledged, where the book is another one', async () => {
    await push(weaver, [stop(weaver)]);
    const { cursor } = await pull(weaver);
    const known = readCursor(cursor);
    if (!known) throw new Error('no cursor');
    const restored = writeCursor({ ...known, ref: 'another-entry' });
    const beyond = writeCursor({ ...known, seq: known.seq + 50 });
    const otherBook = writeCursor({ ...known, epoch: 'another-book' });
    for (const after of [restored, beyond, otherBook, 'nonsense'])
      expect(await pull(weaver, after)).toMatchObject({ snapshot: true, resend: true });
  });

  it('asks for what was acknowledged where its cursor fits, but the last push was to another book', async () => {
    const { cursor } = await pull(weaver);
    const known = readCursor(cursor);
    if (!known) throw new Error('no cursor');
    const seen = writeCursor({ ...known, seq: known.seq + 1, ref: 'in the copy that was in its place' });
    const answer = await server.call('get', '/sync/changes', { as: weaver, query: { after: cursor, seen } });
    expect(answer.body).toMatchObject({ snapshot: true, resend: true });
    const sound = await server.call('get', '/sync/changes', {
      as: weaver,
      query: { after: cursor, seen: cursor },
    });
    expect(sound.body).toMatchObject({ snapshot: false, resend: false });
  });

  it('sends the whole again, without asking, where the view changes with who is signed in', async () => {
    await push(weaver, [stop(weaver)]);
    const { cursor } = await pull(weaver);
    expect(await pull(foreman, cursor)).toMatchObject({ snapshot: true, resend: false });
  });

  it('sends a large book in pages, and misses nothing that comes between them', async () => {
    for (let batch = 0; batch < 3; batch += 1)
      await push(
        weaver,
        Array.from({ length: 450 }, () => stop(weaver)),
      );
    const first = await pull(weaver);
    expect(first).toMatchObject({ snapshot: true, more: true });
    expect(first.entries).toHaveLength(LIMITS.changesPerPull);
    const between = stop(weaver);
    await push(weaver, [between]);
    const second = await pull(weaver, first.cursor);
    expect(second).toMatchObject({ snapshot: false, more: false, reference: null });
    const third = await pull(weaver, second.cursor);
    const all = new Set([first, second, third].flatMap(idsOf));
    expect(all.size).toBe(1_351);
    expect(all.has(between.id)).toBe(true);
  });

  it('sends what a recent entry refers to, however old: a stop that stands, a corrected entry', async () => {
    const old = server.clock.now - 47 * HOUR;
    const stands = entry('standing', { ...stop(weaver, { at: old }), kind: 'standing' } as Said<'standing'>);
    const done = stop(weaver, { at: old });
    const forgotten = stop(weaver, { at: old });
    await push(weaver, [stands, done, forgotten]);
    const amend = entry('amend', {
      ...stop(weaver),
      kind: 'amend',
      targetId: done.id,
      reason: 'Miscounted',
      change: { count: 3 },
    } as unknown as Said<'amend'>);
    await push(weaver, [amend]);
    expect(idsOf(await pull(weaver)).sort()).toEqual([stands.id, done.id, amend.id].sort());
  });

  it('says that a warp change taken back left nothing on the loom, and that a shift is no more', async () => {
    const tackler = await server.signInOnTablet('tackler');
    const gaited = entry('warp-change', {
      ...stop(tackler),
      kind: 'warp-change',
      how: 'gaiting',
      warpId: null,
      clothId: 'calico',
    } as unknown as Said<'warp-change'>);
    const { cursor } = await pull(weaver);
    await push(tackler, [gaited]);
    const fitted = await pull(weaver, cursor);
    expect(fitted).toMatchObject({ fittings: [{ loomId: 'n1', clothId: 'calico' }], fittingsOf: ['n1'] });
    expect(fitted).not.toHaveProperty('goneShifts');
    await push(tackler, [
      entry('void', {
        ...stop(tackler),
        kind: 'void',
        targetId: gaited.id,
        reason: 'Another loom',
      } as unknown as Said<'void'>),
    ]);
    const key = testShiftKey('2026-03-12');
    await server.deps.writer.write(async (tx) => {
      await tx.query(`DELETE FROM "shift" WHERE "key" = ?`, [key]);
      await tx.query(
        `INSERT INTO "change" ("shedId", "kind", "ref") VALUES ('north', 'shift', ?), ('north', 'shift', ?)`,
        [key, testShiftKey()],
      );
    });
    const bare = await pull(weaver, fitted.cursor);
    expect(bare).toMatchObject({ fittings: [], fittingsOf: ['n1'], goneShifts: [key] });
    expect(bare.shifts.map((shift) => shift.key)).toEqual([testShiftKey()]);
  });

  it('sends an entry again when its hold is decided', async () => {
    const future = stop(weaver, { at: server.clock.now + HOUR });
    expect((await push(weaver, [future])).results[0]).toMatchObject({
      result: 'held',
      hold: 'time-doubtful',
    });
    const { cursor } = await pull(weaver);
    await push(foreman, [
      entry('accept', {
        ...stop(foreman),
        kind: 'accept',
        targetId: future.id,
        reason: 'Her clock.',
      } as Said<'accept'>),
    ]);
    const next = await pull(weaver, cursor);
    expect(next.entries.find(({ entry: one }) => one['id'] === future.id)?.holds).toEqual([
      { shiftKey: '*', reason: 'time-doubtful', state: 'accepted' },
    ]);
  });
});
