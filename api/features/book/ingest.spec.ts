import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { PushResult } from '../../../shared/contract/sync.js';
import { LIMITS } from '../../../shared/contract/limits.js';
import { ENTRY_SCHEMA_VERSION } from '../../../shared/entries/entry.js';
import type { IngestContext } from './ingest.js';
import { LoomRow, PersonRightsRow } from '../../database/entities/index.js';
import { testBook, type TestBook } from '../../testing/test-book.js';
import { EARLY, entry, HOUR, LATE, MINUTE, MONDAY, TUESDAY } from '../../testing/test-entries.js';
import { TEST_NOW, TEST_TABLETS } from '../../testing/test-mill.js';

const DAY = 24 * HOUR;

describe('ingest', () => {
  let book: TestBook;
  beforeEach(async () => {
    book = await testBook();
  });
  afterEach(() => book.close());

  const one = async (sent: unknown, context: Partial<IngestContext> = {}): Promise<PushResult> => {
    const [result] = await book.push([sent], context);
    if (!result) throw new Error('no result');
    return result;
  };
  const count = async (table: string) =>
    (await book.data.query<{ n: number }[]>(`SELECT COUNT(*) AS "n" FROM "${table}"`))[0]?.n;
  const reading = (boundary: 'start' | 'end', value: number, at: number, shiftKey = EARLY) =>
    entry('reading', { loomId: 'n1', shiftKey, boundary, value, at });
  const stop = (at = MONDAY + HOUR) => entry('stop', { loomId: 'n1', cause: 'warp-break', count: 1, at });

  it('stores a shift of one loom and projects its line, and a line for every other loom of the shed', async () => {
    const stands = entry('standing', { loomId: 'n1', cause: 'picking', at: MONDAY + HOUR });
    const results = await book.push([
      reading('start', 100, MONDAY),
      entry('stop', { loomId: 'n1', cause: 'warp-break', count: 2, at: MONDAY + 2 * HOUR }),
      stands,
      entry('resume', { loomId: 'n1', targetId: stands.id, at: MONDAY + HOUR + 30 * MINUTE }),
      reading('end', 960, MONDAY + 8 * HOUR),
    ]);
    expect(results.map((result) => result.result)).toEqual(Array(5).fill('stored'));
    expect(results[1]).toMatchObject({ index: 1, at: MONDAY + 2 * HOUR, shiftKey: EARLY });
    const row = await book.lineRow(EARLY, 'n1');
    expect(row).toMatchObject({ picks: 86_000, possiblePicks: 96_000, warpBreaks: 2, measuredMinutes: 30 });
    expect((await book.line(EARLY, 'n2')).flags.map((flag) => flag.code)).toContain('no-start-reading');
    await expect(book.lineRow(LATE, 'n1')).rejects.toThrow('No line');
  });

  it('lets one bad entry stand alone among good ones', async () => {
    const results = await book.push([
      stop(),
      { nonsense: true },
      'not even an object',
      { ...stop(), cause: 'no-such-cause' },
      stop(),
    ]);
    expect(results.map(({ result, code }) => code ?? result)).toEqual([
      'stored',
      'entry-malformed',
      'entry-malformed',
      'cause-unknown',
      'stored',
    ]);
    expect(results[1]).toMatchObject({ id: null, index: 1 });
    expect(await count('entry')).toBe(2);
  });

  it('says exactly what is wrong with a malformed entry', async () => {
    const letters = { ...reading('start', 1, MONDAY), value: '12a4' };
    expect(await one(letters)).toMatchObject({
      code: 'entry-malformed',
      detail: expect.stringContaining('value'),
    });
    const negative = { ...reading('start', 1, MONDAY), value: -1 };
    expect(await one(negative)).toMatchObject({
      code: 'entry-malformed',
      detail: expect.stringContaining('value'),
    });
  });

  it('keeps an entry of a newer schema for later', async () => {
    expect(await one({ ...stop(), schema: ENTRY_SCHEMA_VERSION + 1 })).toMatchObject({ result: 'later' });
    expect(await count('entry')).toBe(0);
  });

  it('answers a retry with what was fixed at first, however late it comes and whatever the clocks say', async () => {
    const late = stop(TEST_NOW + 3 * HOUR);
    const first = await one(late);
    expect(first).toMatchObject({ result: 'held', hold: 'time-doubtful' });
    const again = await one(late, { serverNow: TEST_NOW + DAY, sentAt: TEST_NOW });
    expect(again).toEqual({ ...first, result: 'duplicate' });
    const shuffled = Object.fromEntries(Object.entries(late).reverse());
    expect(await one(shuffled)).toMatchObject({ result: 'duplicate' });
    expect(await count('entry')).toBe(1);
  });

  it('refuses the same number with other content, in the book and in one request', async () => {
    const sent = stop();
    await one(sent);
    expect(await one({ ...sent, count: 2 })).toMatchObject({ result: 'refused', code: 'id-reused' });
    const twice = stop();
    const results = await book.push([twice, { ...twice, count: 3 }, twice]);
    expect(results.map(({ result, code }) => code ?? result)).toEqual(['stored', 'id-reused', 'duplicate']);
  });

  describe('refuses', () => {
    const cases: [string, string, () => unknown, Partial<IngestContext>?][] = [
      ['a grant that is nobody’s', 'grant-unknown', () => ({ ...stop(), grantId: 'stranger' })],
      ['a grant of somebody else', 'grant-unknown', () => ({ ...stop(), by: 'wilf' })],
      [
        'an entry of another tablet',
        'grant-unknown',
        () => entry('stop', { ...stop(), deviceId: TEST_TABLETS.south.id }),
      ],
      ['another shed than the tablet’s', 'entry-other-shed', () => ({ ...stop(), shedId: 'south' })],
      ['a loom of another shed', 'entry-other-shed', () => ({ ...stop(), loomId: 's1' })],
      [
        'a shed that is not the person’s',
        'entry-other-shed',
        () => entry('stop', { ...stop(), who: 'southWeaver', by: 'winnie', grantId: 'winnie.tablet-north' }),
      ],
      ['an unknown loom', 'loom-unknown', () => ({ ...stop(), loomId: 'n99' })],
      ['an unknown cause', 'cause-unknown', () => ({ ...stop(), cause: 'gremlins' })],
      [
        'an unknown shift',
        'shift-unknown',
        () => reading('start', 1, MONDAY, 'north:1999-01-01:north-early'),
      ],
      [
        'a shift of another shed',
        'entry-other-shed',
        () => reading('start', 1, MONDAY, 'south:2026-03-09:south-early'),
      ],
      [
        'an unknown person',
        'person-unknown',
        () => entry('assign', { shiftKey: EARLY, weaverId: 'nemo', loomIds: ['n1'], at: MONDAY }),
      ],
      ['an end before its beginning', 'end-before-start', () => ({ ...stop(), until: MONDAY })],
      ['more digits than the clock has', 'reading-impossible', () => reading('end', 100_000, MONDAY)],
      [
        'a role that never may',
        'entry-not-permitted',
        () => entry('close', { shiftKey: EARLY, at: MONDAY + HOUR }),
      ],
      ['a void of nothing', 'entry-malformed', () => entry('void', { at: MONDAY, reason: 'x' })],
      [
        'an unknown cloth',
        'entry-malformed',
        () =>
          entry('warp-change', {
            who: 'tackler',
            loomId: 'n1',
            how: 'gaiting',
            warpId: null,
            clothId: 'silk',
            at: MONDAY,
          }),
      ],
    ];
    it.each(cases)('%s: %s', async (_name, code, sent, context) => {
      expect(await one(sent(), context)).toMatchObject({ result: 'refused', code });
      expect(await count('entry')).toBe(0);
    });

    it('an entry from before the loom stood in the shed: loom-not-yet', async () => {
      await book.data.getRepository(LoomRow).update('n1', { from: MONDAY + 2 * HOUR });
      expect(await one(stop())).toMatchObject({ result: 'refused', code: 'loom-not-yet' });
      expect(await one(stop(MONDAY + 3 * HOUR))).toMatchObject({ result: 'stored' });
    });

    it('a resume that somebody dated before its stop: end-before-start', async () => {
      const stands = entry('standing', { loomId: 'n1', cause: 'picking', at: MONDAY + HOUR });
      const recordedAt = MONDAY + 2 * HOUR;
      const resume = entry('resume', { loomId: 'n1', targetId: stands.id, at: MONDAY, recordedAt });
      const [, result] = await book.push([stands, resume]);
      expect(result).toMatchObject({ result: 'refused', code: 'end-before-start' });
    });
  });

  describe('holds', () => {
    it('a resume that only a clock set back puts before its stop: time-doubtful', async () => {
      const stands = entry('standing', { loomId: 'n1', cause: 'picking', at: MONDAY + HOUR });
      const tapped = entry('resume', { loomId: 'n1', targetId: stands.id, at: MONDAY + 5 * MINUTE });
      const dated = entry('resume', {
        loomId: 'n1',
        targetId: stands.id,
        at: MONDAY - 5 * MINUTE,
        recordedAt: MONDAY + 5 * MINUTE,
      });
      const [, ...results] = await book.push([stands, tapped, dated]);
      for (const result of results) expect(result).toMatchObject({ result: 'held', hold: 'time-doubtful' });
      expect((await book.line(EARLY, 'n1')).stops[0]).toMatchObject({ until: null });
    });

    it('what comes from a withdrawn tablet: device-revoked', async () => {
      expect(await one(stop(), { deviceRevoked: true })).toMatchObject({
        result: 'held',
        hold: 'device-revoked',
      });
    });

    it('what was logged after a loss of rights, by the moment of the entry: rights-lost', async () => {
      const lose = (personId: string, change: Partial<PersonRightsRow>) =>
        book.data.getRepository(PersonRightsRow).insert({
          personId,
          effectiveAt: MONDAY + HOUR,
          roles: ['weaver'],
          shedIds: ['north'],
          disabled: false,
          ...change,
        });
      await lose('wanda', { disabled: true });
      await lose('tom', { roles: ['weaver'] });
      expect(await one(stop(MONDAY + HOUR - 1))).toMatchObject({ result: 'stored' });
      expect(await one(stop(MONDAY + HOUR))).toMatchObject({ result: 'held', hold: 'rights-lost' });
      const change = { loomId: 'n1', how: 'gaiting', warpId: null, clothId: 'calico' } as const;
      const gaited = entry('warp-change', { ...change, who: 'tackler', at: MONDAY + 2 * HOUR });
      expect(await one(gaited)).toMatchObject({ result: 'held', hold: 'rights-lost' });
    });

    it('a doubtful time, ahead, long ago, or tapped after it was sent: time-doubtful', async () => {
      const doubtful = { result: 'held', hold: 'time-doubtful' };
      expect(await one(stop(TEST_NOW + LIMITS.futureTolerance + 1))).toMatchObject(doubtful);
      expect(await one(stop(TEST_NOW - LIMITS.oldestMoment - 1))).toMatchObject(doubtful);
      expect(await one({ ...stop(), recordedAt: TEST_NOW + LIMITS.futureTolerance + 1 })).toMatchObject(
        doubtful,
      );
      expect(await one(stop(TEST_NOW + LIMITS.futureTolerance))).toMatchObject({ result: 'stored' });
    });

    it('a stop in no shift: no-shift, and it counts nowhere', async () => {
      const before = Date.UTC(2026, 2, 8, 1);
      expect(await one(stop(before))).toMatchObject({ result: 'held', hold: 'no-shift', shiftKey: null });
    });

    it('a correction of what has not come, until it comes: target-missing', async () => {
      const tap = stop();
      const undo = entry('void', { targetId: tap.id, reason: 'Undo', at: MONDAY + HOUR });
      expect(await one(undo)).toMatchObject({ result: 'held', hold: 'target-missing' });
      expect(await one(tap)).toMatchObject({ result: 'stored' });
      expect(await one(undo)).toEqual(expect.not.objectContaining({ hold: expect.anything() }));
      expect((await book.line(EARLY, 'n1')).stops).toEqual([]);
    });

    it('a resume that comes before its stop ends it when that comes', async () => {
      const stands = entry('standing', { loomId: 'n1', cause: 'picking', at: MONDAY + HOUR });
      const resume = entry('resume', { loomId: 'n1', targetId: stands.id, at: MONDAY + 2 * HOUR });
      expect(await one(resume)).toMatchObject({ result: 'held', hold: 'target-missing' });
      await one(stands);
      expect((await book.line(EARLY, 'n1')).stops[0]).toMatchObject({ until: MONDAY + 2 * HOUR });
    });

    it('nothing of a correction that stands before its target in the same request', async () => {
      const tap = stop();
      const undo = entry('void', { targetId: tap.id, reason: 'Undo', at: MONDAY + HOUR });
      expect((await book.push([undo, tap])).map(({ result }) => result)).toEqual(['stored', 'stored']);
    });
  });

  describe('corrects moments', () => {
    it('by the offset that the request measures', async () => {
      const result = await one(stop(MONDAY + HOUR), { sentAt: TEST_NOW - 10 * MINUTE, serverNow: TEST_NOW });
      expect(result).toMatchObject({ result: 'stored', at: MONDAY + HOUR + 10 * MINUTE });
    });

    it('by the offset known at the tap, where the clock was changed in between', async () => {
      const tap = { ...stop(), clock: { offset: 30 * MINUTE, measuredAt: MONDAY } };
      expect(await one(tap)).toMatchObject({ at: MONDAY + HOUR + 30 * MINUTE });
      const near = { ...stop(), clock: { offset: 90_000, measuredAt: MONDAY } };
      expect(await one(near)).toMatchObject({ at: MONDAY + HOUR });
    });
  });

  it('moves a stop to another shift and loom by an amendment, in both lines', async () => {
    const tap = stop();
    await book.push([tap, reading('start', 1, MONDAY + 8 * HOUR, LATE)]);
    await one(
      entry('amend', {
        targetId: tap.id,
        reason: 'Wrong loom and hour',
        change: { at: MONDAY + 9 * HOUR, loomId: 'n2' },
        at: MONDAY + 10 * HOUR,
      }),
    );
    expect((await book.line(EARLY, 'n1')).stops).toEqual([]);
    expect((await book.line(LATE, 'n2')).stops).toMatchObject([{ id: tap.id, count: 1 }]);
  });

  it('shows a stop that stands over shifts in each of them, and takes it back from all', async () => {
    const stands = entry('standing', { loomId: 'n1', cause: 'picking', at: MONDAY + 7 * HOUR });
    await book.push([
      stands,
      reading('start', 1, MONDAY + 8 * HOUR, LATE),
      reading('start', 1, MONDAY + 24 * HOUR, TUESDAY),
    ]);
    expect((await book.lineRow(EARLY, 'n1')).measuredMinutes).toBe(60);
    expect((await book.lineRow(LATE, 'n1')).measuredMinutes).toBe(480);
    await one(entry('resume', { loomId: 'n1', targetId: stands.id, at: MONDAY + 9 * HOUR }));
    expect((await book.lineRow(LATE, 'n1')).measuredMinutes).toBe(60);
    expect((await book.lineRow(TUESDAY, 'n1')).measuredMinutes).toBe(0);
    await one(entry('void', { targetId: stands.id, reason: 'It ran', at: MONDAY + 9 * HOUR }));
    expect((await book.lineRow(EARLY, 'n1')).measuredMinutes).toBe(0);
  });

  it('projects all later lines of a loom when its warp is changed, until the next change', async () => {
    await book.push([
      reading('start', 1, MONDAY),
      reading('start', 1, MONDAY + 8 * HOUR, LATE),
      reading('start', 1, MONDAY + 24 * HOUR, TUESDAY),
    ]);
    const change = (at: number) =>
      entry('warp-change', {
        who: 'tackler',
        loomId: 'n1',
        how: 'gaiting',
        warpId: null,
        clothId: 'calico',
        at,
      });
    const cloths = async (key: string) => (await book.line(key, 'n1')).stretches.map((one) => one.clothId);
    await one(change(MONDAY + 9 * HOUR));
    expect(await cloths(EARLY)).toEqual([null]);
    expect(await cloths(LATE)).toEqual([null, 'calico']);
    expect(await cloths(TUESDAY)).toEqual(['calico']);
    await one(change(MONDAY));
    expect(await cloths(EARLY)).toEqual(['calico']);
  });

  it('keeps a warp change that was moved to another loom, when that loom has one of its own', async () => {
    const change = (loomId: string, at: number) =>
      entry('warp-change', { who: 'tackler', loomId, how: 'gaiting', warpId: null, clothId: 'calico', at });
    const wrong = change('n1', MONDAY + HOUR);
    await book.push([wrong]);
    await book.push([
      entry('amend', {
        targetId: wrong.id,
        reason: 'Wrong loom',
        change: { loomId: 'n2' },
        at: MONDAY + HOUR,
      }),
    ]);
    await book.push([change('n2', MONDAY + 2 * HOUR)]);
    const fittings = await book.data.query<object[]>(`SELECT * FROM "fitting" ORDER BY "effectiveAt"`);
    expect(fittings).toMatchObject([
      { id: wrong.id, loomId: 'n2', effectiveAt: MONDAY + HOUR },
      { loomId: 'n2', effectiveAt: MONDAY + 2 * HOUR },
    ]);
    expect((await book.line(EARLY, 'n1')).stretches[0]?.clothId).toBeNull();
  });
});
