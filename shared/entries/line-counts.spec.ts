import { describe, expect, it } from 'vitest';
import { lineTotals } from '../figures/loom-line.js';
import { aLineInput, aLoomVersion, at, entryBuilder } from '../testing/builders.js';
import type { BookEntry } from './entry.js';
import type { LineInput } from './projection-input.js';
import { projectLine } from './projection.js';

const lineOf = (entries: readonly BookEntry[], changes: Partial<LineInput> = {}) =>
  projectLine(aLineInput({ entries, ...changes }));
const totalsOf = (entries: readonly BookEntry[], changes: Partial<LineInput> = {}) =>
  lineTotals(lineOf(entries, changes), at(480));

describe('a count at hand-over', () => {
  it('is the shift’s total, taps included', () => {
    const { book } = entryBuilder();
    const entries = [
      book('stop', 60, { cause: 'pern-change', count: 3 }),
      book('stop', 70, { cause: 'weft-break', count: 2 }),
      book('count', 480, { cause: 'pern-change', total: 40 }),
    ];
    expect(lineOf(entries).handOverCounts).toEqual({ 'pern-change': 40 });
    // 40 × 15 s + 2 × 30 s
    expect(totalsOf(entries)).toMatchObject({ perns: 40, weftBreaks: 2, stops: 2, estimatedMinutes: 11 });
  });

  it('costs no time for those that were timed, or lay inside a timed stop', () => {
    const { book } = entryBuilder();
    const entries = [
      book('stop', 60, { cause: 'weft-break', count: 2, until: at(64) }),
      book('stop', 62, { cause: 'weft-break', count: 1 }), // inside
      book('stop', 90, { cause: 'weft-break', count: 1 }),
      book('count', 480, { cause: 'weft-break', total: 9 }),
    ];
    expect(totalsOf(entries)).toMatchObject({ weftBreaks: 9, measuredMinutes: 4, estimatedMinutes: 3 });
    const fewer = book('count', 481, { cause: 'weft-break', total: 2 });
    expect(totalsOf([...entries, fewer])).toMatchObject({ weftBreaks: 2, estimatedMinutes: 0 });
  });

  it('holds as last said, for its own shift', () => {
    const { book } = entryBuilder();
    const entries = [
      book('count', 481, { cause: 'pern-change', total: 41 }),
      book('count', 480, { cause: 'pern-change', total: 40 }),
      book('count', 490, { cause: 'pern-change', total: 7, shiftKey: 'another' }),
    ];
    expect(lineOf(entries).handOverCounts).toEqual({ 'pern-change': 41 });
  });

  it('costs a battery loom no time for its perns', () => {
    const { book } = entryBuilder();
    const entries = [book('count', 480, { cause: 'pern-change', total: 40 })];
    const loomVersions = [aLoomVersion({ battery: true })];
    expect(lineOf(entries, { loomVersions }).totalledCauses).toEqual({
      'pern-change': { group: 'weft', breakOf: null, allowanceMs: 0, versionId: 'pern-change.1' },
    });
    expect(totalsOf(entries, { loomVersions })).toMatchObject({ perns: 40, estimatedMinutes: 0 });
  });

  it('of a cause that the mill forgot counts, and costs no time', () => {
    const { book } = entryBuilder();
    const entries = [book('count', 480, { cause: 'constructor', total: 3 })];
    const line = lineOf(entries, { causeVersions: [] });
    expect(line.totalledCauses['constructor']).toMatchObject({ allowanceMs: 0, versionId: null });
    expect(lineTotals(line, at(480))).toMatchObject({ stops: 3, estimatedMinutes: 0 });
    // Even a line that was kept without its causes adds up.
    expect(lineTotals({ ...line, totalledCauses: {} }, at(480)).stops).toBe(3);
  });
});

describe('a paper sheet’s counts and minutes', () => {
  const sheetOf = (counts: Record<string, number>, minutes: Record<string, number>, first = 1) =>
    entryBuilder(first).book('sheet', 500, { picks: 60_000, counts, minutes });

  it('count, with allowances where the sheet gives no minutes', () => {
    const totals = totalsOf([
      sheetOf({ 'weft-break': 4, 'warp-break': 2, smash: 1 }, { 'warp-break': 11, smash: 20 }),
    ]);
    expect(totals).toMatchObject({
      warpBreaks: 3,
      weftBreaks: 4,
      stops: 7,
      measuredMinutes: 31,
      estimatedMinutes: 2,
      minutesByCause: {
        smash: { measured: 20, estimated: 0 },
        'warp-break': { measured: 11, estimated: 0 },
        'weft-break': { measured: 0, estimated: 2 },
      },
    });
  });

  it('give planned and shed stops their place', () => {
    const totals = totalsOf([sheetOf({}, { 'no-order': 60, power: 30, picking: 10 })]);
    expect(totals).toMatchObject({ plannedMinutes: 60, shedStopMinutes: 30, stopMinutes: 100 });
    expect(totals.possibleScheduled).toBe(180 * 420);
    expect(totals.possibleLessShed).toBe(180 * 390);
    // A line kept without its causes takes them as the loom's own.
    const line = { ...lineOf([sheetOf({}, { power: 30 })]), totalledCauses: {} };
    expect(lineTotals(line, at(480))).toMatchObject({ shedStopMinutes: 0, stopMinutes: 30 });
  });

  it('are totals: what was timed by taps is in them already', () => {
    const { book } = entryBuilder(100);
    const timed = book('stop', 60, { cause: 'picking', count: 1, until: at(75) });
    const tap = book('stop', 90, { cause: 'cut-off', count: 1 });
    const sheet = sheetOf({}, { picking: 40, 'cut-off': 5 });
    expect(totalsOf([timed, tap, sheet])).toMatchObject({
      stops: 2,
      measuredMinutes: 45,
      estimatedMinutes: 0,
    });
    const shorter = sheetOf({}, { picking: 10 });
    expect(totalsOf([timed, shorter]).measuredMinutes).toBe(15);
  });

  it('are overruled by a hand-over count of the same cause', () => {
    const { book } = entryBuilder(100);
    const count = book('count', 480, { cause: 'pern-change', total: 44 });
    const line = lineOf([sheetOf({ 'pern-change': 40, 'weft-break': 2 }, {}), count]);
    expect(line.handOverCounts).toEqual({ 'pern-change': 44, 'weft-break': 2 });
    expect(Object.keys(line.handOverCounts)).toEqual(['pern-change', 'weft-break']);
  });
});
