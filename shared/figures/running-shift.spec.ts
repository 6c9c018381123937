import { describe, expect, it } from 'vitest';
import type { BookEntry } from '../entries/entry.js';
import type { LineInput } from '../entries/projection-input.js';
import { projectLine } from '../entries/projection.js';
import { aLineInput, aLoomVersion, at, entryBuilder } from '../testing/builders.js';
import { noInterval } from './breaks.js';
import { lineFigures, lineTotals, whyNoPicks } from './loom-line.js';
import { noFigure } from './no-figure.js';

const lineOf = (entries: readonly BookEntry[], changes: Partial<LineInput> = {}) =>
  projectLine(aLineInput({ entries, ...changes }));

describe('a shift that still runs', () => {
  const { book } = entryBuilder();
  const entries = [
    book('reading', 0, { boundary: 'start', value: 0 }),
    book('stop', 60, { cause: 'warp-break', count: 2 }),
    book('standing', 100, { cause: 'smash' }),
    book('stop', 300, { cause: 'weft-break', count: 4 }),
  ];
  const line = lineOf(entries);

  it('is clipped to what has gone by', () => {
    expect(lineTotals(line, at(120))).toMatchObject({
      minutes: 120,
      measuredMinutes: 20,
      estimatedMinutes: 2,
      possiblePicks: 120 * 180,
      picks: null,
      warpBreaks: 3,
      weftBreaks: 0,
      weavingMinutes: null,
      pickEnds: null,
    });
    expect(lineTotals(line, at(50))).toMatchObject({ minutes: 50, stops: 0, stopMinutes: 0 });
    expect(lineTotals(line, at(60) - 1).stops).toBe(0);
    expect(lineTotals(line, at(60))).toMatchObject({ stops: 2, estimatedMinutes: 2 });
  });

  it('has not begun before it starts', () => {
    expect(lineTotals(line, at(-60))).toMatchObject({ minutes: 0, stops: 0, possiblePicks: 0 });
    expect(lineFigures(line, at(-60), noInterval).atMost).toMatchObject({
      efficiency: noFigure('no-time'),
      picks: 0,
    });
  });

  it('does not reckon with a stretch that is still to come', () => {
    const loomVersions = [aLoomVersion(), aLoomVersion({ id: 'faster', effectiveAt: at(300), ppm: 200 })];
    const planned = projectLine(aLineInput({ loomVersions, entries: [] }));
    expect(planned.stretches).toHaveLength(2);
    expect(lineTotals(planned, at(100))).toMatchObject({ minutes: 100, possiblePicks: 18_000 });
    expect(lineTotals(planned, at(310))).toMatchObject({ minutes: 310, possiblePicks: 56_000 });
  });

  it('is ppm × (elapsed − logged stops), at most', () => {
    const figures = lineFigures(line, at(120), noInterval);
    expect(figures.atMost).toEqual({ efficiency: 98 / 120, picks: 98 * 180, asOf: at(120) });
    expect(figures.efficiency).toEqual(noFigure('shift-not-over'));
    expect(figures.unaccountedMinutes).toEqual(noFigure('shift-not-over'));
  });

  it('is at most nothing where more is logged than has gone by', () => {
    const many = lineOf([book('stop', 1, { cause: 'warp-break', count: 9 })]);
    expect(lineFigures(many, at(5), noInterval).atMost).toMatchObject({ efficiency: 0, picks: 0 });
  });

  it('stays at most once it is over, as of its end, until it is read', () => {
    const figures = lineFigures(line, at(900), noInterval);
    expect(figures.atMost?.asOf).toBe(at(480));
    expect(figures.efficiency).toEqual(noFigure('no-end-reading'));
    const read = lineOf([...entries, book('reading', 478, { boundary: 'end', value: 15_000 })]);
    expect(lineFigures(read, at(900), noInterval).atMost).toBeNull();
  });

  it('has its whole T as soon as it is read, a little before its end', () => {
    const read = lineOf([...entries, book('reading', 476, { boundary: 'end', value: 15_000 })]);
    expect(lineTotals(read, at(476))).toMatchObject({ minutes: 480, measuredMinutes: 376 });
  });
});

describe('whyNoPicks', () => {
  const { book } = entryBuilder();
  const start = book('reading', 0, { boundary: 'start', value: 0 });
  const end = book('reading', 480, { boundary: 'end', value: 70_000 });
  const rival = book('reading', 480, { boundary: 'end', value: 71_000 });

  it.each([
    ['no-start-reading', [end], 900, {}],
    ['no-start-reading', [], 100, {}],
    ['no-end-reading', [start], 480, {}],
    ['shift-not-over', [start], 479, {}],
    ['readings-disagree', [start, end, rival], 900, {}],
    ['no-speed', [start, end], 900, { loomVersions: [] }],
    [
      'not-comparable',
      [start, end],
      900,
      { loomVersions: [aLoomVersion({ clock: { kind: 'continuous', unit: 1, digits: 2 } })] },
    ],
  ] as const)('is %s', (why, entries, minute, changes) => {
    expect(whyNoPicks(lineOf(entries, changes), at(minute))).toBe(why);
  });
});
