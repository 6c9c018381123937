import type { Shift } from '../../../shared/contract/reference.js';
import type { CalendarDay, PatternFacts } from '../../../shared/contract/set-up.js';
import { setUpDesk, type SetUpDesk } from '../../testing/set-up-desk.js';
import { TEST_NOW, testServer, type TestServer } from '../../testing/test-server.js';

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

describe('patterns and days that cannot be', () => {
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

  const meal = (startsLocal: string, endsLocal: string) => ({
    startsLocal,
    endsLocal,
    looms: 'stopped' as const,
  });
  const fresh = (to: object, more: object = {}) => ({
    shedId: 'north',
    from: '2026-03-11',
    facts: to,
    ...more,
  });
  const wrong: [string, string, object, Record<string, RegExp>][] = [
    ['a pattern of no shed', '/patterns', fresh(EARLY, { shedId: 'west' }), { shedId: /no such shed/ }],
    ['a date that is none', '/patterns', fresh(EARLY, { from: '2026-02-31' }), { from: /no such date/ }],
    [
      'a time that is none',
      '/patterns',
      fresh({ ...EARLY, startsLocal: '24:00' }),
      { 'facts.startsLocal': /Invalid/ },
    ],
    ['no weekday', '/patterns', fresh({ ...EARLY, weekdays: [] }), { 'facts.weekdays': /Too small/ }],
    ['a weekday twice', '/patterns', fresh({ ...EARLY, weekdays: [1, 1] }), { 'facts.weekdays': /twice/ }],
    [
      'an overlap by day',
      '/patterns',
      fresh(facts('10:00', '18:00')),
      {
        'facts.startsLocal': /It would overlap early and late\. .*end that pattern first/,
      },
    ],
    [
      'an overlap across midnight',
      '/patterns',
      fresh(facts('05:00', '06:00')),
      { 'facts.startsLocal': /It would overlap night\./ },
    ],
    [
      'a meal before the shift',
      '/patterns',
      fresh({ ...EARLY, meal: meal('05:30', '06:30') }),
      {
        'facts.meal.startsLocal': /between 06:00 and 14:00/,
      },
    ],
    [
      'a meal over the end',
      '/patterns',
      fresh({ ...EARLY, meal: meal('13:45', '14:15') }),
      {
        'facts.meal.endsLocal': /between 06:00 and 14:00/,
      },
    ],
    [
      'a meal of no length',
      '/patterns',
      fresh({ ...EARLY, meal: meal('09:00', '09:00') }),
      {
        'facts.meal.endsLocal': /ends later than it begins/,
      },
    ],
    [
      'an end on a date that is none',
      '/patterns/north-early/end',
      { from: '2026-13-01' },
      { from: /no such date/ },
    ],
    ['a day off of no shed', '/calendar', day({ shedId: 'west' }), { shedId: /no such shed/ }],
    [
      'a day of another shed’s pattern',
      '/calendar',
      day({ patternId: 'south-early' }),
      { patternId: /no such pattern/ },
    ],
    ['a day off on a date that is none', '/calendar', day({ date: '2026-02-30' }), { date: /no such date/ }],
    ['a day off without a reason', '/calendar', day({ reason: ' ' }), { reason: /Too small/ }],
    [
      'a short day of all patterns',
      '/calendar',
      day({ kind: 'short', endsLocal: '12:00' }),
      { patternId: /Choose which/ },
    ],
    [
      'a short day without hours',
      '/calendar',
      day({ kind: 'short', patternId: 'north-early' }),
      { endsLocal: /Say when/ },
    ],
    [
      'a short day that is longer',
      '/calendar',
      day({ kind: 'short', patternId: 'north-early', endsLocal: '15:00' }),
      {
        endsLocal: /lies within early, 06:00 to 14:00.*choose overtime/,
      },
    ],
    [
      'overtime into the next shift',
      '/calendar',
      day({ kind: 'overtime', patternId: 'north-early', endsLocal: '15:00' }),
      {
        endsLocal: /early would overlap late of 2026-03-11/,
      },
    ],
    [
      'overtime that changes nothing',
      '/calendar',
      day({ kind: 'overtime', patternId: 'north-early' }),
      { date: /runs on that day anyhow/ },
    ],
  ];
  it.each(wrong)('refuses %s and says what would be right', async (_what, path, body, fields) => {
    const before = [await desk.read(), await shiftsOf('north')];
    const refusal = await desk.refused('post', path, body);
    expect(refusal.code).toBe('bad-request');
    expect(Object.keys(refusal.fields)).toEqual(Object.keys(fields));
    for (const [field, message] of Object.entries(fields)) expect(refusal.fields[field]).toMatch(message);
    expect([await desk.read(), await shiftsOf('north')]).toEqual(before);
  });

  it('sees that weekdays and dates keep patterns apart', async () => {
    await desk.change('post', '/patterns/north-early/end', { from: '2026-03-16' });
    const weekend = facts('06:00', '12:00', { name: 'Weekend', weekdays: [6, 7] });
    expect((await desk.refused('post', '/patterns', fresh(weekend))).fields).toHaveProperty([
      'facts.startsLocal',
    ]);
    await desk.change('post', '/patterns', fresh(weekend, { from: '2026-03-16' }));
    await desk.change(
      'post',
      '/patterns',
      fresh(facts('07:00', '13:00', { weekdays: [1, 2, 3, 4, 5] }), { from: '2026-03-16' }),
    );
    // Sunday's night shift of a pattern that ends on Monday still runs into Monday.
    await desk.change('post', '/patterns/north-night/end', { from: '2026-03-16' });
    const monday = facts('05:00', '06:00', { weekdays: [1] });
    expect(
      (await desk.refused('post', '/patterns', fresh(monday, { from: '2026-03-16' }))).fields[
        'facts.startsLocal'
      ],
    ).toMatch(/overlap night/);
    await desk.change('post', '/patterns', fresh(monday, { from: '2026-03-17' }));
  });

  it('refuses a shift too long for a loom’s pick clock, naming the loom', async () => {
    await desk.change('post', '/looms/versions', {
      loomIds: ['n3'],
      effectiveAt: TEST_NOW,
      facts: { clock: { kind: 'continuous', unit: 1, digits: 5 } },
    });
    for (const id of ['north-late', 'north-night'])
      await desk.change('post', `/patterns/${id}/end`, { from: '2026-03-11' });
    const refusal = await desk.refused('patch', '/patterns/north-early', {
      from: '2026-03-11',
      facts: facts('06:00', '18:00'),
    });
    expect(refusal.fields['facts.endsLocal']).toMatch(
      /^Loom 3: This clock begins again after 100,000 picks, but a shift of 12 h/,
    );
  });

  it('knows of no other pattern', async () => {
    expect((await desk.refused('post', '/patterns/no-such/end', { from: '2026-03-11' })).code).toBe(
      'not-found',
    );
    expect(
      (await desk.refused('patch', '/patterns/no-such', { from: '2026-03-11', facts: EARLY })).code,
    ).toBe('not-found');
    expect(
      (await desk.refused('post', '/calendar/drop', { shedId: 'north', date: '2026-03-11', patternId: '*' }))
        .code,
    ).toBe('not-found');
  });
});
