import type { Shift } from '../../../shared/contract/reference.js';
import type { CalendarDay, PatternExamples, PatternFacts } from '../../../shared/contract/set-up.js';
import { entry, HOUR, insertTestGrants, MINUTE } from '../../testing/test-entries.js';
import { setUpDesk, type SetUpDesk } from '../../testing/set-up-desk.js';
import { TEST_NOW, testServer, testShiftKey, type TestServer } from '../../testing/test-server.js';

const EVERY_DAY = [1, 2, 3, 4, 5, 6, 7];
const facts = (startsLocal: string, endsLocal: string, more: Partial<PatternFacts> = {}): PatternFacts => ({
  name: 'Day',
  startsLocal,
  endsLocal,
  weekdays: EVERY_DAY,
  meal: null,
  ...more,
});
const EARLY = facts('06:00', '14:00', { name: 'early' });
const at = (moment: string) => Date.parse(moment);

describe('shift patterns and the calendar', () => {
  let server: TestServer;
  let desk: SetUpDesk;
  beforeEach(async () => {
    server = await testServer();
    desk = await setUpDesk(server);
  });
  afterEach(() => server.close());

  const shiftsOf = async (shedId: string, date?: string): Promise<Shift[]> => {
    const rows = await server.deps.reads.query<Shift[]>(
      `SELECT * FROM "shift" WHERE "shedId" = ? AND "date" = COALESCE(?, "date") ORDER BY "startsAt"`,
      [shedId, date ?? null],
    );
    return rows;
  };
  const hours = (shifts: readonly Shift[]) => shifts.map((one) => (one.endsAt - one.startsAt) / HOUR);
  const change = (id: string, from: string, to: PatternFacts) =>
    server.call('patch', `/set-up/patterns/${id}`, { as: desk.actor, body: { from, facts: to } });
  const log = async (shiftAt: number) => {
    await server.deps.writer.write((tx) => insertTestGrants(tx));
    const tablet = await server.tablet();
    const sent = entry('stop', { loomId: 'n1', cause: 'warp-break', count: 1, at: shiftAt });
    const answer = await server.call('post', '/sync/entries', {
      as: tablet,
      body: { sentAt: server.clock.now, entries: [sent] },
    });
    expect(answer.body.results).toMatchObject([{ result: 'stored' }]);
  };
  const pull = async (after?: string) => {
    const answer = await server.call('get', '/sync/changes', {
      as: await server.tablet(),
      query: after === undefined ? {} : { after },
    });
    return answer.body;
  };

  it('makes the shifts of a mill’s first pattern at once, the running one too', async () => {
    const [shedId = ''] = await desk.change('post', '/sheds', { name: 'New shed' });
    await desk.change('post', '/patterns', { shedId, from: '2026-03-10', facts: facts('06:00', '14:00') });
    const shifts = await shiftsOf(shedId);
    expect(shifts[0]).toMatchObject({ date: '2026-03-10', startsAt: at('2026-03-10T06:00Z'), state: 'open' });
    expect(shifts.length).toBeGreaterThanOrEqual(36);
    expect((await desk.read()).shifts.filter((one) => one.shedId === shedId)).not.toEqual([]);
    for (const { key } of shifts) expect(key.length).toBeLessThanOrEqual(64);
  });

  it('changes a pattern from a date on: shifts without entries are others, under the same keys', async () => {
    const cursor = (await pull()).cursor;
    const [id] = await desk.change('patch', '/patterns/north-early', {
      from: '2026-03-11',
      facts: { ...EARLY, startsLocal: '07:00', name: 'Early' },
    });
    expect(hours(await shiftsOf('north', '2026-03-10'))).toEqual([8, 8, 8]);
    const changed = (await shiftsOf('north', '2026-03-11'))[0];
    expect(changed).toMatchObject({
      key: testShiftKey('2026-03-11'),
      name: 'Early',
      startsAt: at('2026-03-11T07:00Z'),
    });
    const { patterns } = await desk.read();
    expect(patterns.filter((one) => /arly/.test(one.name) && one.shedId === 'north')).toMatchObject([
      { id: 'north-early', startsLocal: '06:00', from: null, until: '2026-03-11' },
      { id, startsLocal: '07:00', from: '2026-03-11', until: null },
    ]);
    const heard = await pull(cursor);
    expect(heard.shifts).toContainEqual(
      expect.objectContaining({ key: testShiftKey('2026-03-11'), name: 'Early' }),
    );
    // Changed again on the same date it is one pattern still; the older one can be changed no more.
    await desk.change('patch', `/patterns/${id}`, {
      from: '2026-03-11',
      facts: { ...EARLY, startsLocal: '08:00' },
    });
    expect(
      (await desk.read()).patterns.filter((one) => one.until === null && one.shedId === 'north'),
    ).toHaveLength(3);
    expect(
      (await desk.refused('patch', '/patterns/north-early', { from: '2026-03-12', facts: EARLY })).fields[
        'from'
      ],
    ).toMatch(/another one from 2026-03-11 on/);
    // A register that each shift has of its own is still found under the pattern's first id.
    expect((await shiftsOf('north', '2026-03-12'))[0]?.patternId).toBe('north-early');
  });

  it('leaves shifts with entries as they are, and says which', async () => {
    await log(TEST_NOW - 10 * MINUTE);
    const answer = await change('north-early', '2026-03-10', { ...EARLY, startsLocal: '07:00' });
    expect(answer.body.kept).toEqual([testShiftKey('2026-03-10')]);
    expect(hours(await shiftsOf('north', '2026-03-10'))).toEqual([8, 8, 8]);
    expect(hours(await shiftsOf('north', '2026-03-11'))).toEqual([7, 8, 8]);
  });

  it('makes no shift before the end of a closed one', async () => {
    await log(TEST_NOW - 10 * MINUTE);
    await server.deps.writer.write((tx) =>
      tx.query(`UPDATE "shift" SET "state" = 'closed' WHERE "key" = ?`, [testShiftKey('2026-03-10')]),
    );
    const answer = await change('north-late', '2026-03-08', {
      ...EARLY,
      name: 'late',
      startsLocal: '14:30',
      endsLocal: '22:00',
    });
    expect(answer.body.kept).toEqual([
      testShiftKey('2026-03-08', 'late'),
      testShiftKey('2026-03-09', 'late'),
    ]);
    expect(hours(await shiftsOf('north', '2026-03-09'))).toEqual([8, 8, 8]);
    expect(hours(await shiftsOf('north', '2026-03-10'))).toEqual([8, 7.5, 8]);
  });

  it('ends a pattern: its shifts are no more, and tablets hear of it', async () => {
    const cursor = (await pull()).cursor;
    await desk.change('post', '/patterns/north-night/end', { from: '2026-03-11' });
    expect(hours(await shiftsOf('north', '2026-03-11'))).toEqual([8, 8]);
    expect((await pull(cursor)).goneShifts).toContain(testShiftKey('2026-03-11', 'night'));
    // Its hours are free now.
    await desk.change('post', '/patterns', {
      shedId: 'north',
      from: '2026-03-11',
      facts: facts('22:30', '05:30'),
    });
    expect(hours(await shiftsOf('north', '2026-03-11'))).toEqual([8, 8, 7]);
  });

  it('works out the next shift and both nights on which the clocks change', async () => {
    const ask = async (body: object) => {
      const answer = await server.call('post', '/set-up/patterns/examples', { as: desk.actor, body });
      expect(answer.status).toBe(200);
      return answer.body as PatternExamples;
    };
    const night = facts('22:00', '06:00', {
      meal: { startsLocal: '02:00', endsLocal: '02:30', looms: 'running' },
    });
    const { examples, overlaps } = await ask({ shedId: 'north', facts: night });
    expect(examples).toEqual([
      {
        of: 'next',
        date: '2026-03-10',
        startsAt: at('2026-03-10T22:00Z'),
        endsAt: at('2026-03-11T06:00Z'),
        minutes: 480,
      },
      {
        of: 'clocks-forward',
        date: '2026-03-28',
        startsAt: at('2026-03-28T22:00Z'),
        endsAt: at('2026-03-29T05:00Z'),
        minutes: 420,
      },
      {
        of: 'clocks-back',
        date: '2026-10-24',
        startsAt: at('2026-10-24T21:00Z'),
        endsAt: at('2026-10-25T06:00Z'),
        minutes: 540,
      },
    ]);
    expect(overlaps).toEqual(['night']);
    expect((await ask({ shedId: 'north', facts: night, patternId: 'north-night' })).overlaps).toEqual([]);
    const [laterOne = ''] = await desk.change('patch', '/patterns/north-night', {
      from: '2026-03-20',
      facts: facts('22:00', '06:00', { name: 'night' }),
    });
    const earlier = { shedId: 'north', facts: night, patternId: laterOne, from: '2026-03-15' };
    expect((await ask(earlier)).overlaps).toEqual([]);
    server.clock.now = at('2026-12-01T12:00Z');
    desk = await setUpDesk(server);
    const stopped = {
      ...night,
      meal: { ...night.meal, startsLocal: '03:00', endsLocal: '03:30', looms: 'stopped' },
    };
    const later = await ask({ shedId: 'north', facts: stopped });
    expect(later.examples.map(({ of, date, minutes }) => [of, date, minutes])).toEqual([
      ['next', '2026-12-01', 450],
      ['clocks-forward', '2027-03-27', 390],
      ['clocks-back', '2027-10-30', 510],
    ]);
    expect((await ask({ shedId: 'north', facts: facts('06:00', '14:00') })).examples).toHaveLength(1);
  });

  it('lets shifts adjoin at an hour that a night does not have', async () => {
    const [shedId = ''] = await desk.change('post', '/sheds', { name: 'New shed' });
    for (const one of [facts('18:00', '01:30', { name: 'late' }), facts('01:30', '06:00', { name: 'night' })])
      await desk.change('post', '/patterns', { shedId, from: '2026-03-11', facts: one });
    const late = (await shiftsOf(shedId, '2026-03-28')).find((one) => one.name === 'late');
    const night = (await shiftsOf(shedId, '2026-03-29')).find((one) => one.name === 'night');
    expect(late?.endsAt).toBe(at('2026-03-29T01:00Z'));
    expect(night).toMatchObject({ startsAt: at('2026-03-29T01:00Z'), endsAt: at('2026-03-29T05:00Z') });
  });

  const day = (more: Partial<CalendarDay> = {}): CalendarDay => ({
    shedId: 'north',
    date: '2026-03-11',
    patternId: '*',
    kind: 'off',
    startsLocal: null,
    endsLocal: null,
    reason: 'Village fair',
    ...more,
  });

  it('takes a day off out, and puts it back', async () => {
    const cursor = (await pull()).cursor;
    await desk.change('post', '/calendar', day());
    expect(await shiftsOf('north', '2026-03-11')).toEqual([]);
    expect((await desk.read()).calendar).toEqual([day()]);
    expect((await pull(cursor)).goneShifts).toHaveLength(3);
    await desk.change('post', '/calendar/drop', { shedId: 'north', date: '2026-03-11', patternId: '*' });
    expect(hours(await shiftsOf('north', '2026-03-11'))).toEqual([8, 8, 8]);
    expect((await desk.read()).calendar).toEqual([]);
  });

  it('knows short days and overtime of one pattern, and forgets what was said before', async () => {
    await desk.change(
      'post',
      '/calendar',
      day({ patternId: 'north-early', kind: 'short', endsLocal: '12:00' }),
    );
    await desk.change(
      'post',
      '/calendar',
      day({ patternId: 'north-early', kind: 'short', endsLocal: '11:00' }),
    );
    expect(hours(await shiftsOf('north', '2026-03-11'))).toEqual([5, 8, 8]);
    expect((await desk.read()).calendar).toHaveLength(1);
    await desk.change('patch', '/patterns/north-late', {
      from: '2026-03-09',
      facts: { ...facts('14:00', '22:00', { name: 'late' }), weekdays: [1, 2] },
    });
    expect(hours(await shiftsOf('north', '2026-03-11'))).toEqual([5, 8]);
    const [late] = (await desk.read()).patterns.filter(
      (one) => one.name === 'late' && one.until === null && one.shedId === 'north',
    );
    await desk.change(
      'post',
      '/calendar',
      day({ patternId: late?.id ?? '', kind: 'overtime', endsLocal: '18:00' }),
    );
    expect(hours(await shiftsOf('north', '2026-03-11'))).toEqual([5, 4, 8]);
    expect((await desk.read()).calendar).toContainEqual(
      expect.objectContaining({ patternId: late?.id, kind: 'overtime' }),
    );
  });
});
