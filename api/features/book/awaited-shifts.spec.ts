import type { PushResponse } from '../../../shared/contract/sync.js';
import type { Entry } from '../../../shared/entries/entry.js';
import { entry, HOUR, insertTestGrants, MINUTE } from '../../testing/test-entries.js';
import { setUpDesk, type SetUpDesk } from '../../testing/set-up-desk.js';
import { testServer, testShiftKey, type TestServer } from '../../testing/test-server.js';
import { rebuildBook } from './rebuild.js';

const DATE = '2026-03-09';
const SHIFT = testShiftKey(DATE, 'early');
const BEGINS = Date.parse(`${DATE}T06:00Z`);
const OFF = { shedId: 'north', date: DATE, patternId: 'north-early' };

describe('entries whose shift is not there', () => {
  let server: TestServer;
  let desk: SetUpDesk;
  beforeEach(async () => {
    server = await testServer();
    desk = await setUpDesk(server);
    await server.deps.writer.write((tx) => insertTestGrants(tx));
  });
  afterEach(() => server.close());

  const takeOut = () =>
    desk.change('post', '/calendar', {
      ...OFF,
      kind: 'off',
      startsLocal: null,
      endsLocal: null,
      reason: 'Fair',
    });
  const putBack = () => desk.change('post', '/calendar/drop', OFF);
  const push = async (entries: readonly Entry[]) => {
    const answer = await server.call('post', '/sync/entries', {
      as: await server.tablet(),
      body: { sentAt: server.clock.now, entries },
    });
    if (answer.status !== 200) throw new Error(answer.text);
    return (answer.body as PushResponse).results;
  };
  const said = async (entries: readonly Entry[]) =>
    (await push(entries)).map(({ result, hold, code, shiftKey }) => [
      result,
      hold ?? code ?? null,
      shiftKey ?? null,
    ]);
  const line = async (loomId = 'n1') => {
    const rows = await server.deps.reads.query<
      { picks: number; warpBreaks: number; measuredMinutes: number }[]
    >(
      `SELECT "picks", "warpBreaks", "measuredMinutes" FROM "loom_line" WHERE "shiftKey" = ? AND "loomId" = ?`,
      [SHIFT, loomId],
    );
    return rows[0] ?? null;
  };
  const rebuilt = () => server.deps.writer.write(rebuildBook);
  const reading = (boundary: 'start' | 'end', value: number, at: number, shiftKey = SHIFT) =>
    entry('reading', { loomId: 'n1', shiftKey, boundary, value, at });
  const tap = (at: number) => entry('stop', { loomId: 'n1', cause: 'warp-break', count: 1, at });

  it('wait where the shift was taken out of the plan meanwhile, and count when it is put back', async () => {
    await takeOut();
    const stands = entry('standing', { loomId: 'n1', cause: 'picking', at: BEGINS + 2 * HOUR });
    const again = entry('resume', { loomId: 'n1', targetId: stands.id, at: BEGINS + 2 * HOUR + 30 * MINUTE });
    const all = [
      reading('start', 100, BEGINS),
      tap(BEGINS + HOUR),
      stands,
      again,
      reading('end', 960, BEGINS + 8 * HOUR),
    ];
    expect(await said(all)).toEqual([
      ['held', 'no-shift', null],
      ['held', 'no-shift', null],
      ['held', 'no-shift', null],
      ['stored', null, null],
      ['held', 'no-shift', null],
    ]);
    expect(await line()).toBeNull();
    expect(await rebuilt()).toMatchObject({ different: [] });

    await putBack();
    expect(await said(all)).toEqual(all.map(() => ['duplicate', null, SHIFT]));
    expect(await line()).toEqual({ picks: 86_000, warpBreaks: 1, measuredMinutes: 30 });
    expect(await line('n2')).not.toBeNull();
    expect(await rebuilt()).toMatchObject({ different: [], unlikeSigned: [] });
    // What has entries stays, whatever the calendar says.
    const off = { ...OFF, kind: 'off', startsLocal: null, endsLocal: null, reason: 'Fair' };
    const answer = await server.call('post', '/set-up/calendar', { as: desk.actor, body: off });
    expect(answer.body).toMatchObject({ kept: [SHIFT] });
  });

  it('reach the tablets with their shift and freed, once it is there', async () => {
    await takeOut();
    const sent = [tap(BEGINS + HOUR), reading('start', 100, BEGINS)];
    await push(sent);
    const pull = async (after?: string) => {
      const query: Record<string, string> = after === undefined ? {} : { after };
      return (await server.call('get', '/sync/changes', { as: await server.tablet(), query })).body;
    };
    const { cursor } = await pull();
    await putBack();
    const { entries } = await pull(cursor);
    const holds = [{ shiftKey: '*', reason: 'no-shift', state: 'accepted' }];
    expect(entries).toHaveLength(2);
    for (const one of entries) expect(one).toMatchObject({ shiftKey: SHIFT, holds });
  });

  it('count when the foreman accepted them before the shift came, and not when he refused them', async () => {
    await takeOut();
    const [yes, no] = [tap(BEGINS + HOUR), tap(BEGINS + 2 * HOUR)];
    await push([yes, no]);
    const word = { who: 'foreman', reason: 'Asked around', at: server.clock.now } as const;
    await push([
      entry('accept', { ...word, targetId: yes.id }),
      entry('refuse', { ...word, targetId: no.id }),
    ]);
    await putBack();
    expect(await line()).toMatchObject({ warpBreaks: 1 });
    expect(await rebuilt()).toMatchObject({ different: [] });
  });

  it('keep waiting for what else they wait for', async () => {
    await takeOut();
    const late = { ...reading('start', 100, BEGINS), recordedAt: server.clock.now + 24 * HOUR };
    expect(await said([late])).toEqual([['held', 'time-doubtful', null]]);
    await putBack();
    expect(await said([late])).toEqual([['duplicate', 'time-doubtful', SHIFT]]);
    await push([
      entry('accept', { who: 'foreman', targetId: late.id, reason: 'It is so', at: server.clock.now }),
    ]);
    expect(await said([late])).toEqual([['duplicate', null, SHIFT]]);
    expect(await rebuilt()).toMatchObject({ different: [] });
  });

  it('close the shift that comes back, with all that it closes, where a foreman had closed it', async () => {
    await takeOut();
    const close = entry('close', { who: 'foreman', shiftKey: SHIFT, at: BEGINS + 8 * HOUR });
    expect(await said([close, tap(BEGINS + HOUR)])).toEqual([
      ['held', 'no-shift', null],
      ['held', 'no-shift', null],
    ]);
    await putBack();
    expect(await line()).toMatchObject({ warpBreaks: 1 });
    expect(await rebuilt()).toMatchObject({ different: [], unlikeSigned: [], signedShifts: 1 });
  });

  it('are found in the shift to which a correction moved them, made since', async () => {
    await takeOut();
    const late = tap(BEGINS + 9 * HOUR);
    const move = entry('amend', {
      targetId: late.id,
      reason: 'An hour wrong',
      change: { at: BEGINS + 3 * HOUR, loomId: 'n2' },
      at: BEGINS + 10 * HOUR,
    });
    expect(await said([late, move])).toEqual([
      ['stored', null, testShiftKey(DATE, 'late')],
      ['stored', null, null],
    ]);
    await putBack();
    expect(await line('n2')).toMatchObject({ warpBreaks: 1 });
    expect(await rebuilt()).toMatchObject({ different: [] });
  });

  it('are booked into a shift whose hours are longer now', async () => {
    await takeOut();
    const between = tap(BEGINS + 7 * HOUR);
    expect(await said([between])).toEqual([['held', 'no-shift', null]]);
    await desk.change('post', '/calendar', {
      ...OFF,
      patternId: 'north-late',
      kind: 'overtime',
      startsLocal: '12:00',
      endsLocal: '22:00',
      reason: 'For the early shift',
    });
    expect(await said([between])).toEqual([['duplicate', null, testShiftKey(DATE, 'late')]]);
    expect(await rebuilt()).toMatchObject({ different: [] });
  });

  it('are refused still where no shift of that key ever was, or it was another shed’s', async () => {
    await takeOut();
    await desk.change('post', '/calendar', {
      shedId: 'south',
      date: DATE,
      patternId: '*',
      kind: 'off',
      startsLocal: null,
      endsLocal: null,
      reason: 'Fair',
    });
    expect(
      await said([
        reading('start', 1, BEGINS, 'north:1999-01-01:north-early'),
        reading('start', 1, BEGINS, testShiftKey(DATE, 'early', 'south')),
      ]),
    ).toEqual([
      ['refused', 'shift-unknown', null],
      ['refused', 'entry-other-shed', null],
    ]);
  });
});
