import { describe, expect, it } from 'vitest';
import { aLineInput, at, entryBuilder, LOOM_ID } from '../testing/builders.js';
import type { BookEntry } from './entry.js';
import { lineNeedsLook } from './needs-look.js';
import { sortedFlags } from './line-flags.js';
import type { LineFlagCode } from './loom-line.js';
import type { LineInput } from './projection-input.js';
import { projectLine } from './projection.js';

function flagsOf(code: LineFlagCode, entries: readonly BookEntry[], changes: Partial<LineInput> = {}) {
  return projectLine(aLineInput({ entries, ...changes })).flags.filter((flag) => flag.code === code);
}
const clock = (offset: number, stepped?: boolean) => ({
  clock: { offset, measuredAt: at(0), ...(stepped === undefined ? {} : { stepped }) },
});

describe('stop-still-open', () => {
  it('is flagged while nobody has said Running, in every shift that it reaches', () => {
    const { book } = entryBuilder();
    const stop = book('standing', -100, { cause: 'smash' });
    const flag = { code: 'stop-still-open', entryId: stop.entry.id };
    expect(flagsOf('stop-still-open', [stop])).toEqual([flag]);
    expect(flagsOf('stop-still-open', [stop, book('resume', 900, { targetId: stop.entry.id })])).toEqual([]);
  });
});

describe('stop-inside-stop', () => {
  it('flags a new stop logged while one stands; both stay on record', () => {
    const { book } = entryBuilder();
    const outer = book('standing', 10, { cause: 'smash' });
    const inner = book('standing', 20, { cause: 'boxes' });
    const line = projectLine(aLineInput({ entries: [outer, inner] }));
    expect(line.stops.map((one) => one.until)).toEqual([null, null]);
    expect(flagsOf('stop-inside-stop', [outer, inner])).toEqual([
      { code: 'stop-inside-stop', entryId: inner.entry.id },
    ]);
  });

  it('flags the later logged of two of one moment', () => {
    const { book } = entryBuilder();
    const [first, second] = [
      book('standing', 10, { cause: 'smash' }),
      book('standing', 10, { cause: 'boxes' }),
    ];
    expect(flagsOf('stop-inside-stop', [second, first])).toMatchObject([{ entryId: second.entry.id }]);
  });

  it('does not flag stops that follow one another, taps, or shed stops', () => {
    const { book } = entryBuilder();
    const entries = [
      book('stop', 10, { cause: 'smash', count: 1, until: at(20) }),
      book('stop', 20, { cause: 'boxes', count: 1, until: at(30) }),
      book('stop', 15, { cause: 'weft-break', count: 1 }),
      book('shed-stop', 12, { cause: 'power', scope: { of: 'shed' }, until: at(40) }),
    ];
    expect(flagsOf('stop-inside-stop', entries)).toEqual([]);
  });
});

describe('time-uncertain', () => {
  function standing(start: object, end: object) {
    const { book } = entryBuilder();
    const stop = book('standing', 10, { cause: 'smash', ...start });
    const resume = book('resume', 30, { targetId: stop.entry.id, ...end });
    return flagsOf('time-uncertain', [stop, resume]).length;
  }

  it.each([
    ['an offset unchanged: the tablet slept', clock(1000), clock(1000), 0],
    ['an offset measured a little apart', clock(1000), clock(6000), 0],
    ['an offset changed across the stop', clock(1000), clock(6001), 1],
    ['the clock stepped before the start', clock(0, true), clock(0), 1],
    ['the clock stepped before the end', clock(0), clock(0, true), 1],
    ['two tablets, each with its own offset', clock(0), { ...clock(60_000), deviceId: 'tablet-2' }, 0],
    ['an end without a measure', clock(0), {}, 0],
    ['a start without a measure', {}, clock(0), 0],
  ])('with %s', (_, start, end, flags) => {
    expect(standing(start, end)).toBe(flags);
  });

  it('where Running lies before the stop: it is taken to have ended at once', () => {
    const { book } = entryBuilder();
    const stop = book('standing', 10, { cause: 'smash' });
    const resume = book('resume', 8, { targetId: stop.entry.id });
    expect(flagsOf('time-uncertain', [stop, resume])).toEqual([
      { code: 'time-uncertain', entryId: stop.entry.id },
    ]);
  });

  it('for a tap whose clock was stepped, once a stop, and not for other shifts’', () => {
    const { book } = entryBuilder();
    const tap = book('stop', 10, { cause: 'weft-break', count: 1, ...clock(0, true) });
    const far = book('stop', 900, { cause: 'weft-break', count: 1, ...clock(0, true) });
    const timed = book('stop', 10, { cause: 'smash', count: 1, until: at(20), ...clock(0, true) });
    const old = book('stop', -90, { cause: 'smash', count: 1, until: at(-80), ...clock(0, true) });
    expect(flagsOf('time-uncertain', [tap, far, timed, old]).map((flag) => flag.entryId)).toEqual([
      tap.entry.id,
      timed.entry.id,
    ]);
  });
});

describe('clock-offset', () => {
  it('names the entry whose device clock was furthest off, if by more than 2 min', () => {
    const { book } = entryBuilder();
    const tap = (offset: number) => book('stop', 10, { cause: 'smash', count: 1, ...clock(offset) });
    expect(flagsOf('clock-offset', [tap(120_000), tap(-120_000)])).toEqual([]);
    const [fast, slow] = [tap(130_000), tap(-150_000)];
    expect(flagsOf('clock-offset', [fast, slow, tap(0)])).toEqual([
      { code: 'clock-offset', value: -150_000, entryId: slow.entry.id },
    ]);
    const equal = tap(150_000);
    expect(flagsOf('clock-offset', [equal, slow])).toMatchObject([{ entryId: slow.entry.id }]);
  });

  it('looks at the entries of this loom and shift alone, voided ones left out', () => {
    const { book } = entryBuilder();
    const off = clock(200_000);
    const voided = book('stop', 10, { cause: 'smash', count: 1, ...off });
    const power = book('shed-stop', 60, { cause: 'power', scope: { of: 'shed' } });
    const entries = [
      voided,
      book('void', 11, { targetId: voided.entry.id }),
      power,
      book('resume', 70, { targetId: power.entry.id, loomId: 'loom-2', ...off }),
      book('reading', 0, { boundary: 'end', value: 1, shiftKey: 'another', ...off }),
      book('stop', 900, { cause: 'smash', count: 1, ...off }),
    ];
    expect(flagsOf('clock-offset', entries)).toEqual([]);
    const mine = book('resume', 75, { targetId: power.entry.id, ...off });
    expect(flagsOf('clock-offset', [...entries, mine])).toMatchObject([{ entryId: mine.entry.id }]);
    const reading = book('reading', 900, { boundary: 'end', value: 1, ...clock(900_000) });
    expect(flagsOf('clock-offset', [...entries, reading])).toMatchObject([{ value: 900_000 }]);
  });
});

describe('corrected-twice', () => {
  it('names the entry that two people corrected without sight of each other', () => {
    const { book } = entryBuilder();
    const stop = book('stop', 10, { cause: 'smash', count: 1 });
    const [a, b] = [1, 2].map((count) => book('amend', 20, { targetId: stop.entry.id, change: { count } }));
    expect(flagsOf('corrected-twice', [stop, a!, b!])).toEqual([
      { code: 'corrected-twice', entryId: stop.entry.id },
    ]);
    const gone = book('void', 30, { targetId: stop.entry.id });
    expect(flagsOf('corrected-twice', [stop, a!, gone])).toHaveLength(1);
    expect(flagsOf('corrected-twice', [stop, a!])).toEqual([]);
  });

  it('not that of another shift', () => {
    const { book } = entryBuilder();
    const stop = book('stop', 900, { cause: 'smash', count: 1 });
    const [a, b] = [1, 2].map((count) => book('amend', 20, { targetId: stop.entry.id, change: { count } }));
    expect(flagsOf('corrected-twice', [stop, a!, b!])).toEqual([]);
  });
});

describe('over-logged and much-unaccounted', () => {
  function withStop(picks: number, stopMinutes: number) {
    const { book } = entryBuilder();
    return [
      book('reading', 0, { boundary: 'start', value: 0 }),
      book('reading', 480, { boundary: 'end', value: picks }),
      book('stop', 0, { cause: 'smash', count: 1, until: at(stopMinutes) }),
    ];
  }

  // 180 ppm, 480 min: 86,400 picks possible; 60 min of stops are 10,800 of them.
  it.each([
    [75_601, []],
    [75_602, [2]],
    [80_000, [4_400]],
  ])(
    'is over-logged where the log takes more than a unit above the picks lost: %d picks',
    (picks, values) => {
      expect(flagsOf('over-logged', withStop(picks, 60)).map((flag) => flag.value)).toEqual(values);
    },
  );

  it.each([
    [66_960, []], // 108 min lost, 60 logged: 48 unaccounted, 10% of T
    [66_900, [48 + 1 / 3]],
  ])('is much where more than 10%% of T is unaccounted for: %d picks', (picks, values) => {
    const found = flagsOf('much-unaccounted', withStop(picks, 60)).map((flag) => flag.value);
    expect(found).toEqual(values.map((value) => expect.closeTo(value, 9) as number));
  });

  it('neither without picks or speed', () => {
    const { book } = entryBuilder();
    const open = [book('reading', 0, { boundary: 'start', value: 0 })];
    expect(flagsOf('much-unaccounted', open)).toEqual([]);
    const sheet = [book('sheet', 500, { picks: 5, counts: {}, minutes: {} })];
    expect(flagsOf('much-unaccounted', sheet, { loomVersions: [] })).toEqual([]);
    expect(flagsOf('much-unaccounted', sheet)).toHaveLength(1);
  });
});

describe('flags', () => {
  it('come in one order, each once, with their fields in one order', () => {
    const flags = sortedFlags([
      { entryId: 'b', code: 'stop-still-open' },
      { code: 'no-end-reading' },
      { entryId: 'a', value: 3, code: 'stop-still-open' },
      { code: 'readings-disagree', value: 9 },
      { code: 'readings-disagree', value: 2 },
      { code: 'no-end-reading' },
    ]);
    expect(JSON.stringify(flags)).toBe(
      '[{"code":"no-end-reading"},{"code":"readings-disagree","value":2},{"code":"readings-disagree","value":9},' +
        '{"code":"stop-still-open","value":3,"entryId":"a"},{"code":"stop-still-open","entryId":"b"}]',
    );
  });

  it('ask for a look, or only say how a line came about', () => {
    expect(lineNeedsLook({ flags: [{ code: 'agreed-picks' }, { code: 'estimated-split' }] })).toBe(false);
    expect(lineNeedsLook({ flags: [{ code: 'agreed-picks' }, { code: 'no-end-reading' }] })).toBe(true);
  });

  it('of a plain line there are none', () => {
    const { book } = entryBuilder();
    const entries = [
      book('assign', 0, { weaverId: 'ada', loomIds: [LOOM_ID] }),
      book('reading', 0, { boundary: 'start', value: 0 }),
      book('reading', 480, { boundary: 'end', value: 80_000 }),
      // none of these touches a line
      book('note', 5, { text: 'Fresh beam tomorrow', loomId: LOOM_ID }),
      book('close', 481, {}),
      book('reopen', 482, {}),
      book('accept', 483, { targetId: '019e8000-0000-7000-8000-000000000001' }),
      book('refuse', 484, { targetId: '019e8000-0000-7000-8000-000000000002' }),
    ];
    expect(projectLine(aLineInput({ entries })).flags).toEqual([]);
  });
});
