import { describe, expect, it } from 'vitest';
import { lineTotals } from '../figures/loom-line.js';
import { aLoomVersion, aShift, at, uuidV7 } from '../testing/builders.js';
import { clock, lineOf, NEXT, PREVIOUS, readings } from '../testing/read-lines.js';

describe('where two shifts adjoin', () => {
  it('one’s end is the next one’s start, both ways', () => {
    const before = readings(PREVIOUS, 100).read(0, 'end', 10_000);
    const after = readings(NEXT, 200).read(480, 'start', 80_000);
    const { line, flags } = lineOf([before, after], { previous: PREVIOUS, next: NEXT });
    expect(line.picks).toBe(70_000);
    expect(line.readings.map((one) => [one.boundary, one.from])).toEqual([
      ['start', 'neighbour'],
      ['end', 'neighbour'],
    ]);
    expect(flags('no-start-reading', 'no-end-reading', 'readings-disagree')).toEqual([]);
  });

  it('prefers the shift’s own of two that agree', () => {
    const { read } = readings();
    const before = readings(PREVIOUS, 100).read(-2, 'end', 10_000);
    const own = read(1, 'start', 10_000);
    const { line } = lineOf([before, own, read(480, 'end', 80_000)], { previous: PREVIOUS });
    expect(line.startReadingId).toBe(own.entry.id);
    expect(line.readings).toHaveLength(2);
  });

  it('gives no picks where they disagree, until the foreman decides', () => {
    const { read, book } = readings();
    const before = readings(PREVIOUS, 100).read(0, 'end', 10_000);
    const own = read(0, 'start', 10_750);
    const entries = [before, own, read(480, 'end', 80_000)];
    const open = lineOf(entries, { previous: PREVIOUS });
    expect(open.line).toMatchObject({ picks: null, picksBy: 'none', startReadingId: null });
    expect(open.flags('readings-disagree')).toEqual([
      { code: 'readings-disagree', value: 750, entryId: own.entry.id },
    ]);
    expect(open.line.readings).toHaveLength(3);

    const decide = book('decide', 500, { about: { boundary: 'start', readingId: before.entry.id } });
    const decided = lineOf([...entries, decide], { previous: PREVIOUS });
    expect(decided.line).toMatchObject({ picks: 70_000, startReadingId: before.entry.id });
    expect(decided.flags('readings-disagree')).toEqual([]);

    const again = book('decide', 501, { about: { boundary: 'start', readingId: own.entry.id } });
    expect(lineOf([...entries, again, decide], { previous: PREVIOUS }).line.picks).toBe(69_250);
    const undone = book('void', 502, { targetId: again.entry.id });
    expect(lineOf([...entries, again, decide, undone], { previous: PREVIOUS }).line.picks).toBe(70_000);
  });

  it('takes a decision about the neighbour’s side of the same boundary', () => {
    const { read } = readings();
    const night = readings(PREVIOUS, 100);
    const before = night.read(0, 'end', 10_000);
    const decide = night.book('decide', 5, { about: { boundary: 'end', readingId: before.entry.id } });
    const entries = [before, read(0, 'start', 10_750), read(480, 'end', 80_000), decide];
    expect(lineOf(entries, { previous: PREVIOUS }).line.picks).toBe(70_000);
    // The other boundary of that shift, and a reading that is no candidate, decide nothing here.
    const elsewhere = night.book('decide', 6, { about: { boundary: 'start', readingId: before.entry.id } });
    const unknown = night.book('decide', 6, { about: { boundary: 'end', readingId: uuidV7(9999) } });
    expect(
      lineOf([...entries.slice(0, 3), elsewhere, unknown], { previous: PREVIOUS }).line.picks,
    ).toBeNull();
  });

  it('measures a disagreement the short way round the clock', () => {
    const { read } = readings();
    const before = readings(PREVIOUS, 100).read(0, 'end', 9_998);
    const entries = [before, read(0, 'start', 3), read(480, 'end', 700)];
    const { flags } = lineOf(entries, { previous: PREVIOUS, loomVersions: clock({ digits: 4, unit: 100 }) });
    expect(flags('readings-disagree')).toMatchObject([{ value: 500 }]);
  });

  it('flags two own readings of one boundary that disagree', () => {
    const { read } = readings();
    const entries = [read(0, 'start', 0), read(478, 'end', 70_000), read(480, 'end', 70_360)];
    const { line, flags } = lineOf(entries);
    expect(line.picks).toBeNull();
    expect(flags('readings-disagree')).toMatchObject([{ value: 360 }]);
  });

  it('takes the one nearest to the boundary of two that agree', () => {
    const { read } = readings();
    const near = read(481, 'end', 70_000);
    const entries = [read(0, 'start', 0), read(470, 'end', 70_000), near];
    expect(lineOf(entries).line.endReadingId).toBe(near.entry.id);
  });

  it('says by how many picks only where it knows the clock', () => {
    const { read } = readings();
    const entries = [read(0, 'start', 0), read(480, 'end', 1), read(480, 'end', 2)];
    expect(lineOf(entries, { loomVersions: [] }).flags('readings-disagree')).toMatchObject([{ value: 0 }]);
  });
});

describe('where no shift adjoins', () => {
  const friday = aShift({ date: '2026-05-29', startsAt: at(-4320), endsAt: at(-3840) });

  it('picks between shifts show as woven between them', () => {
    const { read } = readings();
    const last = readings(friday, 100).read(-3840, 'end', 999_000);
    const older = readings(friday, 200).read(-9000, 'end', 900_000);
    const start = read(0, 'start', 1_200);
    const { line, flags } = lineOf([start, read(480, 'end', 71_200), older, last]);
    expect(line.picks).toBe(70_000);
    expect(flags('woven-between-shifts')).toEqual([
      { code: 'woven-between-shifts', value: 2_200, entryId: start.entry.id },
    ]);
  });

  it('none are shown where none were woven, or the clock was changed meanwhile, or not known', () => {
    const { read } = readings();
    const last = readings(friday, 100).read(-3840, 'end', 1_200);
    const entries = [last, read(0, 'start', 1_200), read(480, 'end', 71_200)];
    expect(lineOf(entries).flags('woven-between-shifts')).toEqual([]);
    const changed = [
      aLoomVersion({ effectiveAt: at(-9000), clock: { kind: 'continuous', unit: 1, digits: 5 } }),
      aLoomVersion({ id: 'new', effectiveAt: at(-100) }),
    ];
    const moved = [last, read(0, 'start', 1_300)];
    expect(lineOf(moved, { loomVersions: changed }).flags('woven-between-shifts')).toEqual([]);
    const unknownThen = [aLoomVersion({ effectiveAt: at(-100) })];
    expect(lineOf(moved, { loomVersions: unknownThen }).flags('woven-between-shifts')).toEqual([]);
    const otherUnit = [
      aLoomVersion({ effectiveAt: at(-9000), clock: { kind: 'continuous', unit: 100, digits: 6 } }),
      aLoomVersion({ id: 'new', effectiveAt: at(-100) }),
    ];
    expect(lineOf(moved, { loomVersions: otherUnit }).flags('woven-between-shifts')).toEqual([]);
  });
});

describe('T', () => {
  const read5 = (startMinute: number, endMinute: number) => {
    const { read } = readings();
    return [read(startMinute, 'start', 0), read(endMinute, 'end', 70_000)];
  };

  it('is the shift’s length where readings lie within 5 min of their boundaries', () => {
    const { line, flags } = lineOf(read5(5, 475));
    expect(line.readingMinutes).toBeNull();
    expect(lineTotals(line, at(480)).minutes).toBe(480);
    expect(flags('reading-off-boundary')).toEqual([]);
  });

  it('is the time between the readings where one was taken more than 5 min off, and the line says so', () => {
    const entries = read5(5.001, 478);
    const { line, flags } = lineOf(entries);
    expect(line.readingMinutes).toBeCloseTo(472.999, 9);
    expect(lineTotals(line, at(480)).minutes).toBeCloseTo(472.999, 9);
    expect(flags('reading-off-boundary')).toEqual([
      { code: 'reading-off-boundary', value: line.readingMinutes, entryId: entries[0]?.entry.id },
    ]);
  });

  it('reaches beyond the shift where the reading does, less a meal with the looms stopped', () => {
    const shift = aShift({ meal: { startsAt: at(240), endsAt: at(270), looms: 'stopped' } });
    const { line } = lineOf(read5(-10, 500), { shift });
    expect(line.readingMinutes).toBe(480);
    expect(line.stretches).toMatchObject([{ from: at(-10), until: at(500) }]);
    expect(lineTotals(line, at(600)).minutes).toBe(480);
  });

  it('stays the shift’s where the other reading is missing, or lies before it', () => {
    const { read } = readings();
    const alone = lineOf([read(30, 'start', 0)]);
    expect(alone.line.readingMinutes).toBeNull();
    expect(alone.flags('reading-off-boundary')).toMatchObject([{ code: 'reading-off-boundary' }]);
    expect(alone.flags('reading-off-boundary')[0]).not.toHaveProperty('value');
    expect(lineOf(read5(200, 100)).line.readingMinutes).toBeNull();
  });
});
