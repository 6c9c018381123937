import { describe, expect, it } from 'vitest';
import { lineTotals } from '../figures/loom-line.js';
import { aLineInput, aLoomVersion, aShift, at, entryBuilder, LOOM_ID } from '../testing/builders.js';
import type { BookEntry } from './entry.js';
import type { LineInput } from './projection-input.js';
import { projectLine } from './projection.js';

const lineOf = (entries: readonly BookEntry[], changes: Partial<LineInput> = {}) =>
  projectLine(aLineInput({ entries, ...changes }));
const totalsOf = (entries: readonly BookEntry[], changes: Partial<LineInput> = {}) =>
  lineTotals(lineOf(entries, changes), at(480));

describe('a tap', () => {
  it('is a counted stop that costs its cause’s allowance, marked estimated', () => {
    const { book } = entryBuilder();
    const tap = book('stop', 60, { cause: 'warp-break', count: 3, arisesFrom: 'yarn', note: 'soft end' });
    expect(lineOf([tap]).stops).toEqual([
      {
        id: tap.entry.id,
        cause: 'warp-break',
        group: 'warp',
        attendedBy: 'weaver',
        arisesFrom: 'yarn',
        breakOf: 'warp',
        from: at(60),
        until: at(60),
        timed: false,
        count: 3,
        estimatedMs: 180_000,
        phases: [],
        shedWide: false,
        note: 'soft end',
      },
    ]);
  });

  it('arises from nobody knows what, unless said', () => {
    const { book } = entryBuilder();
    expect(lineOf([book('stop', 60, { cause: 'smash', count: 1 })]).stops[0]?.arisesFrom).toBe('unknown');
  });

  it('costs no time where its cause is always timed', () => {
    const { book } = entryBuilder();
    const totals = totalsOf([book('stop', 60, { cause: 'smash', count: 1 })]);
    expect(totals).toMatchObject({ stops: 1, estimatedMinutes: 0, stopMinutes: 0 });
  });

  it('inside an open timed stop adds its count, and no time', () => {
    const { book } = entryBuilder();
    const entries = [
      book('stop', 100, { cause: 'smash', count: 1, until: at(120) }),
      book('stop', 99, { cause: 'warp-break', count: 1 }),
      book('stop', 100, { cause: 'warp-break', count: 1 }),
      book('stop', 119, { cause: 'warp-break', count: 1 }),
      book('stop', 120, { cause: 'warp-break', count: 1 }),
    ];
    // A smash is a break of the warp too: one stop, however many ends.
    const totals = totalsOf(entries);
    expect(totals).toMatchObject({ warpBreaks: 5, stops: 5, measuredMinutes: 20, estimatedMinutes: 2 });
    const open = totalsOf([book('standing', 50, { cause: 'smash' }), ...entries.slice(1)]);
    expect(open).toMatchObject({ warpBreaks: 5, estimatedMinutes: 0 });
  });

  it('for a pern change costs a battery loom no time, and any other loom 15 s', () => {
    const { book } = entryBuilder();
    const perns = [book('stop', 60, { cause: 'pern-change', count: 4 })];
    expect(totalsOf(perns)).toMatchObject({ perns: 4, stops: 0, estimatedMinutes: 1 });
    const loomVersions = [aLoomVersion({ battery: true })];
    expect(totalsOf(perns, { loomVersions })).toMatchObject({ perns: 4, estimatedMinutes: 0 });
    const empty = [book('stop', 70, { cause: 'battery-empty', count: 1 })];
    expect(totalsOf(empty, { loomVersions })).toMatchObject({ stops: 1, estimatedMinutes: 1 });
  });
});

describe('the shift of a stop', () => {
  it('is the one in whose [start, end) it began', () => {
    const { book } = entryBuilder();
    const tap = (minute: number) => book('stop', minute, { cause: 'weft-break', count: 1 });
    const line = lineOf([tap(-1), tap(0), tap(479), tap(480)]);
    expect(line.stops.map((one) => one.from)).toEqual([at(0), at(479)]);
  });

  it('counts there alone; its minutes are divided at the shift’s end', () => {
    const { book } = entryBuilder();
    const long = book('stop', -30, { cause: 'smash', count: 1, until: at(10) });
    const end = book('stop', 470, { cause: 'boxes', count: 1, until: at(520) });
    const line = lineOf([long, end]);
    expect(line.stops.map((one) => [one.count, one.from, one.until])).toEqual([
      [0, at(-30), at(10)],
      [1, at(470), at(520)],
    ]);
    expect(totalsOf([long, end])).toMatchObject({ stops: 1, measuredMinutes: 20 });
    const next = aShift({ patternId: 'late', startsAt: at(480), endsAt: at(960) });
    const after = lineOf([long, end], { shift: next });
    expect(after.stops.map((one) => [one.cause, one.count])).toEqual([['boxes', 0]]);
    expect(lineTotals(after, at(960))).toMatchObject({ stops: 0, measuredMinutes: 40 });
  });

  it('is not one that it only touches', () => {
    const { book } = entryBuilder();
    const before = book('stop', -30, { cause: 'smash', count: 1, until: at(0) });
    const after = book('stop', 480, { cause: 'smash', count: 1, until: at(490) });
    expect(lineOf([before, after]).stops).toEqual([]);
    expect(lineOf([book('standing', -900, { cause: 'no-order' })]).stops).toHaveLength(1);
  });

  it('holds a stop that began and ended at once', () => {
    const { book } = entryBuilder();
    const at0 = book('stop', 0, { cause: 'smash', count: 2, until: at(0) });
    expect(lineOf([at0]).stops).toMatchObject([{ timed: true, count: 2 }]);
  });
});

describe('a timed stop', () => {
  it('lasts from its beginning to Running, by corrected moments', () => {
    const { book } = entryBuilder();
    const stop = book('standing', 60, { cause: 'weft-fork', arisesFrom: 'loom', note: 'bent' });
    const resume = { ...book('resume', 85, { targetId: stop.entry.id }), at: at(84.5) };
    expect(lineOf([stop, resume]).stops).toMatchObject([
      {
        from: at(60),
        until: at(84.5),
        timed: true,
        count: 1,
        arisesFrom: 'loom',
        note: 'bent',
        attendedBy: 'tackler',
      },
    ]);
    expect(totalsOf([stop, resume]).measuredMinutes).toBe(24.5);
  });

  it('can change its cause while it stands', () => {
    const { book } = entryBuilder();
    const stop = book('standing', 60, { cause: 'warp-break' });
    const smash = book('amend', 70, { targetId: stop.entry.id, change: { cause: 'smash' } });
    const resume = book('resume', 90, { targetId: stop.entry.id });
    expect(totalsOf([stop, smash, resume])).toMatchObject({
      warpBreaks: 1,
      minutesByCause: { smash: { measured: 30, estimated: 0 } },
    });
  });

  it('with several counts more than one', () => {
    const { book } = entryBuilder();
    expect(totalsOf([book('stop', 60, { cause: 'warp-break', count: 3, until: at(65) })])).toMatchObject({
      warpBreaks: 3,
      stops: 3,
      measuredMinutes: 5,
      estimatedMinutes: 0,
    });
  });

  it('of another loom is none of this line’s', () => {
    const { book } = entryBuilder();
    const elsewhere = { loomId: 'loom-2' };
    const entries = [
      book('standing', 60, { cause: 'smash', ...elsewhere }),
      book('stop', 70, { cause: 'smash', count: 1, ...elsewhere }),
      book('stop', 70, { cause: 'smash', count: 1, until: at(80), ...elsewhere }),
    ];
    expect(lineOf(entries).stops).toEqual([]);
  });

  it('follows an amendment to the loom that it was meant for', () => {
    const { book } = entryBuilder();
    const stop = book('stop', 70, { cause: 'smash', count: 1, loomId: 'loom-2' });
    const moved = book('amend', 75, { targetId: stop.entry.id, change: { loomId: LOOM_ID } });
    expect(lineOf([stop, moved]).stops).toHaveLength(1);
    expect(lineOf([stop, moved], { loomId: 'loom-2' }).stops).toHaveLength(0);
  });
});

describe('a shed stop', () => {
  const looms = [
    { id: LOOM_ID, shedId: 'shed-1', row: 1 },
    { id: 'loom-2', shedId: 'shed-1', row: 2 },
  ];

  it('stops the looms of its scope, and says that it is the shed’s', () => {
    const { book } = entryBuilder();
    const power = book('shed-stop', 60, { cause: 'power', scope: { of: 'row', row: 1 }, until: at(80) });
    expect(lineOf([power], { looms }).stops).toMatchObject([
      { shedWide: true, count: 1, group: 'shed', arisesFrom: 'unknown', note: null, until: at(80) },
    ]);
    expect(lineOf([power], { looms, loomId: 'loom-2' }).stops).toEqual([]);
  });

  it('ends for each loom as it is ticked off', () => {
    const { book } = entryBuilder();
    const power = book('shed-stop', 60, { cause: 'power', scope: { of: 'shed' } });
    const mine = book('resume', 75, { targetId: power.entry.id });
    const other = book('resume', 70, { targetId: power.entry.id, loomId: 'loom-2' });
    expect(lineOf([power, mine, other], { looms }).stops[0]?.until).toBe(at(75));
    expect(lineOf([power, mine, other], { looms, loomId: 'loom-2' }).stops[0]?.until).toBe(at(70));
  });
});
