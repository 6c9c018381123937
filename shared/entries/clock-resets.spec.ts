import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { lineFigures } from '../figures/loom-line.js';
import { noInterval } from '../figures/breaks.js';
import { noFigure } from '../figures/no-figure.js';
import { aLoomVersion, aShift, at } from '../testing/builders.js';
import { clock, lineOf, NEXT, PREVIOUS, readings } from '../testing/read-lines.js';

describe('picks over a reset', () => {
  it('add up on both sides', () => {
    const { read } = readings();
    const entries = [read(0, 'start', 100_000), read(200, 'reset', 130_000, 500), read(480, 'end', 40_500)];
    expect(lineOf(entries).line.picks).toBe(70_000);
  });

  it('add up over several resets, each to 0 unless said', () => {
    const { read } = readings();
    const entries = [
      read(300, 'reset', 20_000),
      read(0, 'start', 100_000),
      read(200, 'reset', 130_000),
      read(480, 'end', 15_000),
    ];
    expect(lineOf(entries).line.picks).toBe(65_000);
  });

  it('leave out a reset that lies before the start reading', () => {
    const { read } = readings();
    const entries = [read(1, 'reset', 130_000), read(3, 'start', 0), read(480, 'end', 60_000)];
    expect(lineOf(entries).line.picks).toBe(60_000);
  });

  it('use the new clock after it was changed', () => {
    const { read } = readings();
    const loomVersions = [
      aLoomVersion(),
      aLoomVersion({
        id: 'new',
        effectiveAt: at(200),
        clock: { kind: 'continuous', unit: 100, digits: 4 },
      }),
    ];
    const entries = [read(0, 'start', 980_000), read(200, 'reset', 10_000, 9_900), read(480, 'end', 300)];
    expect(lineOf(entries, { loomVersions }).line.picks).toBe(30_000 + 40_000);
  });
});

describe('a reset at the boundary of two shifts', () => {
  // The clock stood at 990,000 at two minutes to, and at 0 a minute later; both readings name the night.
  const night = readings(PREVIOUS, 100);
  const last = night.read(-2, 'end', 990_000);
  const reset = night.read(-1, 'reset', 990_000, 0);
  const { read } = readings();
  const end = read(480, 'end', 60_000);

  it('counts where it was read, whichever of the two shifts it names', () => {
    const { line } = lineOf([last, reset, end], { previous: PREVIOUS });
    expect(line.picks).toBe(60_000);
    expect(line.readings.map((one) => [one.boundary, one.from])).toEqual([
      ['start', 'neighbour'],
      ['reset', 'neighbour'],
      ['end', 'own'],
    ]);
    const first = night.read(-480, 'start', 920_000);
    const before = lineOf([first, last, reset, end], { shift: PREVIOUS, next: lineOf([]).line.shift });
    expect(before.line.picks).toBe(70_000);
  });

  it('and once only, where the next shift’s own reading was taken after it', () => {
    const late = [read(480, 'end', 60_000), readings(NEXT, 200).read(485, 'reset', 60_400, 0)];
    expect(lineOf([read(0, 'start', 0), ...late], { next: NEXT }).line.picks).toBe(60_000);
    expect(lineOf([last, reset, read(1, 'start', 0), end]).line.picks).toBe(60_000);
  });

  it.each([
    ['before the start reading', [0, 990_000, 0], [0, 0], [480, 60_000]],
    ['after the start reading', [0, 990_000, 0], [0, 990_000], [480, 60_000]],
    ['before the end reading', [480, 60_000, 0], [0, 0], [480, 0]],
    ['after the end reading', [480, 60_000, 0], [0, 0], [480, 60_000]],
  ] as const)('of the very same moment: %s', (_, [minute, value, newValue], start, stop) => {
    const entries = [read(minute, 'reset', value, newValue), read(start[0], 'start', start[1])];
    expect(lineOf([...entries, read(stop[0], 'end', stop[1])]).line.picks).toBe(60_000);
  });

  it('in a gap between shifts is no picks woven there', () => {
    const before = readings(PREVIOUS, 100).read(-2, 'end', 990_000);
    const gap = [before, read(-1, 'reset', 990_100, 0), read(0, 'start', 50), end];
    const { line, flags } = lineOf(gap, { previous: null });
    expect(line.picks).toBe(59_950);
    expect(flags('woven-between-shifts')).toMatchObject([{ value: 150 }]);
  });
});

describe('a reset anywhere in two adjoining shifts', () => {
  it('costs neither of them a pick', () => {
    const minute = fc.integer({ min: 1, max: 479 });
    fc.assert(
      fc.property(minute, minute, fc.boolean(), (cut, reset, namesEarly) => {
        fc.pre(cut !== reset);
        const early = aShift({ key: 'early', patternId: 'early', endsAt: at(cut) });
        const late = aShift({ key: 'late', patternId: 'late', startsAt: at(cut) });
        const shows = (m: number) => (m < reset ? 900_000 + m * 150 : (m - reset) * 150) % 1e6;
        const { read: inEarly } = readings(early, 100);
        const { read: inLate } = readings(late, 200);
        const old = (900_000 + reset * 150) % 1e6;
        const entries = [
          inEarly(0, 'start', 900_000),
          inEarly(cut, 'end', shows(cut)),
          inLate(480, 'end', shows(480)),
          (namesEarly ? inEarly : inLate)(reset, 'reset', old, 0),
        ];
        expect(lineOf(entries, { shift: early, next: late }).line.picks).toBe(cut * 150);
        expect(lineOf(entries, { shift: late, previous: early }).line.picks).toBe((480 - cut) * 150);
      }),
      { numRuns: 200 },
    );
  });
});

describe('a clock exchanged without a reset reading', () => {
  const loomVersions = (minute: number) => [
    aLoomVersion(),
    aLoomVersion({
      id: 'new',
      effectiveAt: at(minute),
      clock: { kind: 'continuous', unit: 100, digits: 4 },
    }),
  ];
  const { read } = readings();

  it('gives no picks, and says why', () => {
    const entries = [read(0, 'start', 1_000), read(480, 'end', 1_400)];
    const { line, flags } = lineOf(entries, { loomVersions: loomVersions(200) });
    expect(line.picks).toBeNull();
    expect(flags('clock-changed', 'no-end-reading')).toEqual([{ code: 'clock-changed' }]);
    expect(lineFigures(line, at(480), noInterval).efficiency).toEqual(noFigure('not-comparable'));
  });

  it('where two shifts adjoin does not serve the shift after with the old clock’s reading', () => {
    const last = readings(PREVIOUS, 100).read(0, 'end', 1_000);
    const entries = [last, read(480, 'end', 1_400)];
    const { line, flags } = lineOf(entries, { previous: PREVIOUS, loomVersions: loomVersions(0) });
    expect(line.picks).toBeNull();
    expect(flags('no-start-reading')).toHaveLength(1);
  });

  it('at the end of the shift is none of this shift’s', () => {
    const entries = [read(0, 'start', 1_000), read(482, 'end', 71_000)];
    expect(lineOf(entries, { loomVersions: loomVersions(480) }).line.picks).toBe(70_000);
  });

  it('is met by agreed picks', () => {
    const { book } = readings();
    const entries = [read(0, 'start', 1_000), read(480, 'end', 1_400)];
    const agreed = book('decide', 500, { about: { agreedPicks: 61_000 } });
    const { line, flags } = lineOf([...entries, agreed], { loomVersions: loomVersions(200) });
    expect(line.picks).toBe(61_000);
    expect(flags('clock-changed')).toEqual([]);
  });

  it('says so too where the clock cannot show a reading', () => {
    const entries = [read(0, 'start', 5), read(480, 'end', 70_005)];
    expect(lineOf(entries, { loomVersions: clock({ digits: 4 }) }).flags('clock-changed')).toHaveLength(1);
  });
});
