import { v7 as uuid } from 'uuid';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { LoomHistory, TacklerAhead } from '../../../shared/contract/calls.js';
import type { Entry } from '../../../shared/entries/entry.js';
import { JobRow, WarpRow } from '../../database/entities/index.js';
import { entry, HOUR, MINUTE, MONDAY, EARLY, LATE, NIGHT } from '../../testing/test-entries.js';
import { testServer, testShiftKey, type SignedInActor, type TestServer } from '../../testing/test-server.js';

const TUESDAY_EARLY = testShiftKey('2026-03-10', 'early');

describe('what the tackler asks of the book', () => {
  let server: TestServer;
  let tackler: SignedInActor;
  let weaver: SignedInActor;
  beforeEach(async () => {
    server = await testServer();
    tackler = await server.signInAs('tackler');
    weaver = await server.signInAs('weaver');
    await server.deps.writer.write(async (tx) => {
      await tx.insert(JobRow, { id: 'oil', name: 'Oil', everyPicks: 150_000, retired: false });
      await tx.insert(JobRow, { id: 'bands', name: 'Picking bands', everyPicks: 9_000_000, retired: false });
      await tx.insert(WarpRow, { id: 'beam-7', name: 'Beam 7', clothId: 'calico', lengthM: 200, thrumM: 2 });
    });
  });
  afterEach(() => server.close());

  const push = async (entries: readonly Entry[]) => {
    for (const actor of [weaver, tackler]) {
      const own = entries.filter(({ by }) => by === actor.session.person?.id);
      if (own.length === 0) continue;
      const grantId = actor.session.grant?.id;
      const { body } = await server.call('post', '/sync/entries', {
        as: actor,
        body: { sentAt: server.clock.now, entries: own.map((one) => ({ ...one, schema: 2, grantId })) },
      });
      expect((body.results as { result: string }[]).map(({ result }) => result)).toEqual(
        own.map(() => 'stored'),
      );
    }
  };
  const reading = (shiftKey: string, boundary: 'start' | 'end', value: number, at: number) =>
    entry('reading', { loomId: 'n1', shiftKey, boundary, value, at });
  const breaks = (count: number, at: number) =>
    entry('stop', { loomId: 'n1', cause: 'warp-break', count, at });
  const repair = (at: number, more: object = {}) =>
    entry('repair', { who: 'tackler', loomId: 'n1', cause: 'picking', at, ...more });
  /** 80,000 picks a shift for three shifts: 800 steps of the clock. */
  const woven = () => [
    reading(EARLY, 'start', 100, MONDAY),
    reading(EARLY, 'end', 900, MONDAY + 8 * HOUR),
    reading(LATE, 'end', 1_700, MONDAY + 16 * HOUR),
    reading(NIGHT, 'end', 2_500, MONDAY + 24 * HOUR),
  ];
  const history = async (as = tackler): Promise<LoomHistory> => {
    const answer = await server.call('get', '/reports/loom-history', { as, query: { loomId: 'n1' } });
    expect(answer.status).toBe(200);
    return answer.body as LoomHistory;
  };
  const ahead = async (): Promise<TacklerAhead> => {
    const answer = await server.call('get', '/reports/tackler-ahead', {
      as: tackler,
      query: { shedId: 'north' },
    });
    expect(answer.status).toBe(200);
    return answer.body as TacklerAhead;
  };

  it('repairs stand newest first, with their repeats and without names for the floor', async () => {
    const photoIds = [uuid()];
    await push([
      ...woven(),
      repair(MONDAY + HOUR, { found: 'Weak', done: 'Band taken up', part: 'Band', ran: 'watch' }),
      repair(MONDAY + 2 * HOUR, { cause: 'temple' }),
      repair(MONDAY + 17 * HOUR, { nearMiss: 'Shuttle flew to the wall', photoIds }),
    ]);
    const { repairs } = await history();
    expect(repairs).toMatchObject([
      {
        causeName: 'Picking',
        repeat: { nth: 2, shifts: 3 },
        nearMiss: 'Shuttle flew to the wall',
        photos: [{ id: photoIds[0], kept: false }],
        by: null,
      },
      { causeName: 'Temple', repeat: null },
      { found: 'Weak', done: 'Band taken up', part: 'Band', ran: 'watch', repeat: null },
    ]);
    expect((await history(await server.signInAs('foreman'))).repairs[0]?.by).toBe('Tom Test');
  });

  it('breaks before and after a repair are of whole shifts on either side', async () => {
    await push([
      ...woven(),
      breaks(8, MONDAY + HOUR),
      repair(MONDAY + 9 * HOUR),
      breaks(5, MONDAY + 10 * HOUR),
      breaks(2, MONDAY + 20 * HOUR),
    ]);
    const [one] = (await history()).repairs;
    expect(one).toMatchObject({
      before: { shifts: 1, picks: 80_000, warp: { count: 8, rate: 10 } },
      after: { shifts: 1, picks: 80_000, warp: { count: 2, rate: 2.5 } },
      otherWarp: false,
    });
    expect(one?.before.warp.low).toBeGreaterThan(0);
  });

  it('a repair that was taken back is none', async () => {
    const wrong = repair(MONDAY + HOUR);
    await push([
      wrong,
      entry('void', { who: 'tackler', targetId: wrong.id, reason: 'Loom 2', at: MONDAY + 2 * HOUR }),
    ]);
    expect((await history()).repairs).toEqual([]);
  });

  it('a job is due by the picks since it was done, the shift of the doing by its share', async () => {
    await push(woven());
    expect((await history()).jobs).toMatchObject([
      { jobId: 'oil', picks: 240_000, lastAt: null },
      { jobId: 'bands', picks: 240_000, lastAt: null },
    ]);
    expect((await ahead()).jobs).toMatchObject([{ loomNumber: 1, alley: 'A', jobId: 'oil', picks: 240_000 }]);
    const done = MONDAY + 12 * HOUR;
    await push([entry('care', { who: 'tackler', loomId: 'n1', jobId: 'oil', at: done })]);
    // Half of the late shift and the night.
    expect((await history()).jobs[0]).toMatchObject({ jobId: 'oil', picks: 120_000, lastAt: done });
    expect((await ahead()).jobs).toEqual([]);
  });

  it('a beam runs out when its picks are woven, over the shifts of the calendar', async () => {
    const ticket = { sizeSet: 'S 118', weftLot: 'L 7', lengthM: 212, thrumM: 1.5 };
    await push([
      ...woven(),
      entry('warp-change', {
        ...{ who: 'tackler', loomId: 'n1', how: 'gaiting', warpId: 'beam-7', clothId: 'calico' },
        at: MONDAY,
        ...ticket,
      }),
      reading(TUESDAY_EARLY, 'start', 2_500, MONDAY + 24 * HOUR + MINUTE),
    ]);
    expect((await history()).fitting).toMatchObject({
      warpName: 'Beam 7',
      clothName: 'Calico',
      how: 'gaiting',
      picks: 240_000,
      lengthM: 212,
      sizeSet: 'S 118',
      weftLot: 'L 7',
    });
    // 212 m, 2 m of them thrum; 240,000 picks at 25 a cm are 96 m of cloth and take 101.76 m of warp.
    const [beam] = (await ahead()).beams;
    expect(beam).toMatchObject({ warpName: 'Beam 7', picks: 240_000, known: MONDAY + 24 * HOUR });
    expect(beam?.metresLeft).toBeCloseTo(212 - 101.76 - 2, 6);
    const left = ((212 - 101.76 - 2) / 1.06) * 2_500;
    expect(beam?.picksLeft).toBe(Math.round(left));
    expect(beam?.expected).toBe(Math.round(MONDAY + 24 * HOUR + (left / 10_000) * HOUR));
  });

  it('a loom of which the book knows no warp is not on the list', async () => {
    await push(woven());
    expect(await ahead()).toMatchObject({ beams: [] });
    expect((await history()).fitting).toBeNull();
  });
});
