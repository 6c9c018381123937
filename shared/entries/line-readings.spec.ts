import { describe, expect, it } from 'vitest';
import { aShift, at } from '../testing/builders.js';
import { clock, lineOf, NEXT, PREVIOUS, readings } from '../testing/read-lines.js';

describe('picks of a continuous clock', () => {
  it('are end less start', () => {
    const { read } = readings();
    const [start, end] = [read(0, 'start', 100_000), read(480, 'end', 174_250)];
    const { line } = lineOf([start, end]);
    expect(line).toMatchObject({ picks: 74_250, picksBy: 'readings', readingMinutes: null });
    expect([line.startReadingId, line.endReadingId]).toEqual([start.entry.id, end.entry.id]);
    expect(line.readings).toEqual([
      {
        id: start.entry.id,
        boundary: 'start',
        at: at(0),
        value: 100_000,
        newValue: null,
        kept: false,
        from: 'own',
      },
      {
        id: end.entry.id,
        boundary: 'end',
        at: at(480),
        value: 174_250,
        newValue: null,
        kept: false,
        from: 'own',
      },
    ]);
  });

  it('roll over, and count in units', () => {
    const { read } = readings();
    const entries = [read(0, 'start', 9_950), read(480, 'end', 692)];
    expect(lineOf(entries, { loomVersions: clock({ digits: 4, unit: 100 }) }).line.picks).toBe(74_200);
  });

  it('are unknown without a reading, and the line says which', () => {
    const { read } = readings();
    const start = lineOf([read(0, 'start', 5)]);
    expect(start.line).toMatchObject({ picks: null, picksBy: 'none' });
    expect(start.flags('no-start-reading', 'no-end-reading')).toEqual([{ code: 'no-end-reading' }]);
    const end = lineOf([read(480, 'end', 5)]);
    expect(end.flags('no-start-reading', 'no-end-reading')).toEqual([{ code: 'no-start-reading' }]);
  });

  it('are unknown where the clock is not known, or cannot show the reading', () => {
    const { read } = readings();
    const entries = [read(0, 'start', 5), read(480, 'end', 70_005)];
    expect(lineOf(entries, { loomVersions: [] }).line.picks).toBeNull();
    expect(lineOf(entries, { loomVersions: clock({ digits: 4 }) }).line.picks).toBeNull();
  });

  it('name the shift they serve, whenever they were typed', () => {
    const { read } = readings();
    const typedLate = { ...read(480, 'end', 70_000) };
    const entry = { ...typedLate.entry, recordedAt: at(900), source: 'paper' as const };
    expect(lineOf([read(0, 'start', 0), { ...typedLate, entry }]).line.picks).toBe(70_000);
  });
});

describe('a clock zeroed each shift', () => {
  const loomVersions = clock({ kind: 'zeroed-each-shift' });

  it('needs no start reading, and takes no neighbour’s', () => {
    const { read } = readings();
    const before = readings(PREVIOUS, 100).read(0, 'end', 88_000);
    const { line, flags } = lineOf([before, read(480, 'end', 70_000)], { loomVersions, previous: PREVIOUS });
    expect(line).toMatchObject({ picks: 70_000, startReadingId: null });
    expect(flags('no-start-reading', 'readings-disagree', 'woven-between-shifts')).toEqual([]);
  });

  it('starts where somebody read it, if it was not zeroed', () => {
    const { read } = readings();
    const entries = [read(0, 'start', 3_000), read(480, 'end', 70_000)];
    expect(lineOf(entries, { loomVersions }).line.picks).toBe(67_000);
  });

  it('adds a reset', () => {
    const { read } = readings();
    const entries = [read(100, 'reset', 20_000, 0), read(480, 'end', 50_000)];
    expect(lineOf(entries, { loomVersions }).line.picks).toBe(70_000);
  });

  it('still needs an end', () => {
    expect(lineOf([], { loomVersions }).flags('no-start-reading', 'no-end-reading')).toEqual([
      { code: 'no-end-reading' },
    ]);
  });
});

describe('a clock with one register a shift', () => {
  const loomVersions = clock({ kind: 'register-a-shift' });
  const yesterday = aShift({ date: '2026-05-31', startsAt: at(-1440), endsAt: at(-960) });

  it('stands where its last shift left it, whatever other shifts read', () => {
    const { read } = readings();
    const left = readings(yesterday, 100).read(-960, 'end', 12_000);
    const night = readings(PREVIOUS, 200).read(0, 'end', 99_000);
    const { line, flags } = lineOf([left, night, read(480, 'end', 80_000)], {
      loomVersions,
      previous: PREVIOUS,
    });
    expect(line).toMatchObject({ picks: 68_000, startReadingId: left.entry.id });
    expect(flags('reading-off-boundary', 'readings-disagree')).toEqual([]);
    expect(line.readings[0]).toMatchObject({ from: 'neighbour', value: 12_000 });
  });

  it('starts where it was read, if it was', () => {
    const { read } = readings();
    const left = readings(yesterday, 100).read(-960, 'end', 12_000);
    const entries = [left, read(0, 'start', 13_000), read(480, 'end', 80_000)];
    const { line, flags } = lineOf(entries, { loomVersions });
    expect(line.picks).toBe(67_000);
    expect(flags('readings-disagree')).toEqual([]);
  });

  it('needs a start from somewhere', () => {
    const { read } = readings();
    const night = readings(PREVIOUS, 200).read(0, 'end', 99_000);
    const { flags } = lineOf([night, read(480, 'end', 80_000)], {
      loomVersions,
      previous: PREVIOUS,
      next: NEXT,
    });
    expect(flags('no-start-reading')).toHaveLength(1);
  });
});

describe('more than this loom can weave', () => {
  const possible = 180 * 480 * 1.05 + 1;

  it.each([
    [Math.floor(possible), false],
    [Math.floor(possible) + 1, true],
  ])('is flagged above speed × T × 1.05 + one unit: %d picks', (picks, flagged) => {
    const { read } = readings();
    const { line, flags } = lineOf([read(0, 'start', 0), read(480, 'end', picks)]);
    expect(line.picks).toBe(picks);
    expect(flags('more-than-possible')).toEqual(
      flagged ? [{ code: 'more-than-possible', value: picks }] : [],
    );
  });

  it('is kept when somebody said so, flagged all the same', () => {
    const { book, read } = readings();
    const end = book('reading', 480, { boundary: 'end', value: 99_999, kept: true });
    const { line, flags } = lineOf([read(0, 'start', 0), end]);
    expect(line.readings.at(-1)?.kept).toBe(true);
    expect(flags('more-than-possible')).toHaveLength(1);
  });
});

describe('a clock out of order', () => {
  it('is met by agreed picks: marked, and held against the shift’s length', () => {
    const { read, book } = readings();
    const entries = [
      read(0, 'start', 0),
      read(300, 'end', 10),
      book('decide', 500, { about: { agreedPicks: 61_000 } }),
      book('decide', 490, { about: { agreedPicks: 60_000 } }),
    ];
    const { line, flags } = lineOf(entries);
    expect(line).toMatchObject({ picks: 61_000, picksBy: 'agreed', readingMinutes: null });
    expect(line.stretches).toMatchObject([{ picks: 61_000, picksBy: 'agreed' }]);
    expect(flags('agreed-picks', 'no-start-reading', 'no-end-reading')).toEqual([{ code: 'agreed-picks' }]);
  });
});

describe('a paper sheet', () => {
  it('brings readings, taken as read on the boundary', () => {
    const { book } = readings();
    const sheet = book('sheet', 700, { start: 999_000, end: 69_000, counts: {}, minutes: {} });
    const { line, flags } = lineOf([sheet]);
    expect(line).toMatchObject({ picks: 70_000, picksBy: 'readings', readingMinutes: null });
    expect(line.readings.map((one) => one.at)).toEqual([at(0), at(480)]);
    expect(flags('reading-off-boundary', 'corrected-twice')).toEqual([]);
  });

  it('or picks alone, which then need no reading', () => {
    const { book } = readings();
    const { line, flags } = lineOf([book('sheet', 700, { picks: 64_000, counts: {}, minutes: {} })]);
    expect(line).toMatchObject({ picks: 64_000, picksBy: 'sheet' });
    expect(line.stretches).toMatchObject([{ picks: 64_000, picksBy: 'sheet' }]);
    expect(flags('no-start-reading', 'no-end-reading')).toEqual([]);
  });

  it('serves the neighbour, and disagrees with it like any reading', () => {
    const night = readings(PREVIOUS, 100);
    const sheet = night.book('sheet', 20, { end: 5_000, counts: {}, minutes: {} });
    const { read } = readings();
    const end = read(480, 'end', 75_000);
    expect(lineOf([sheet, end], { previous: PREVIOUS }).line.picks).toBe(70_000);
    const rival = lineOf([sheet, end, read(0, 'start', 5_100)], { previous: PREVIOUS });
    expect(rival.flags('readings-disagree')).toMatchObject([{ value: 100 }]);
  });

  it.each([
    [70_100, []],
    [70_101, [101]],
  ])('says when its picks and its readings differ by more than a unit: %d', (picks, apart) => {
    const { book } = readings();
    const sheet = book('sheet', 700, { start: 0, end: 700, picks, counts: {}, minutes: {} });
    const { line, flags } = lineOf([sheet], { loomVersions: clock({ unit: 100, digits: 4 }) });
    expect(line).toMatchObject({ picks: 70_000, picksBy: 'readings' });
    expect(flags('readings-disagree').map((flag) => flag.value)).toEqual(apart);
  });

  it('with picks does not hide that two readings disagree', () => {
    const { book, read } = readings();
    const sheet = book('sheet', 700, { start: 0, end: 70_000, picks: 70_000, counts: {}, minutes: {} });
    const { line, flags } = lineOf([sheet, read(480, 'end', 71_000)]);
    expect(line).toMatchObject({ picks: 70_000, picksBy: 'sheet' });
    expect(flags('readings-disagree', 'no-start-reading')).toMatchObject([{ value: 1_000 }]);
    const half = book('sheet', 700, { end: 70_000, picks: 70_000, counts: {}, minutes: {} });
    expect(lineOf([half, read(480, 'end', 71_000)]).flags('readings-disagree', 'no-start-reading')).toEqual([
      expect.objectContaining({ code: 'readings-disagree' }),
    ]);
  });

  it('typed in twice holds as last typed, and says so', () => {
    const { book } = readings();
    const last = book('sheet', 701, { picks: 65_000, counts: {}, minutes: {} });
    const first = book('sheet', 700, { picks: 64_000, counts: {}, minutes: {} });
    const { line, flags } = lineOf([last, first]);
    expect(line.picks).toBe(65_000);
    expect(flags('corrected-twice')).toEqual([{ code: 'corrected-twice', entryId: last.entry.id }]);
  });
});
