import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { poissonInterval } from '../chance/poisson-interval.js';
import type { LineTotals, LoomLine } from '../entries/loom-line.js';
import { noInterval } from './breaks.js';
import { noFigure, numberOrNull } from './no-figure.js';
import {
  figuresOfTotals,
  groupFigures,
  groupFiguresOfSums,
  isCounted,
  mostPicks,
  sumTotals,
  type GroupLine,
} from './totals.js';

/** Totals of a loom at 200 ppm that ran `picks`/200 of `minutes`, with a third of the rest logged. */
function totals(minutes: number, picks: number | null, changes: Partial<LineTotals> = {}): LineTotals {
  const logged = 12;
  return {
    minutes,
    plannedMinutes: 6,
    shedStopMinutes: 3,
    stopMinutes: logged,
    measuredMinutes: 10,
    estimatedMinutes: 2,
    possiblePicks: minutes * 200,
    possibleScheduled: (minutes - 6) * 200,
    possibleLessShed: (minutes - 9) * 200,
    measuredPicks: 2_000,
    estimatedPicks: 400,
    picks,
    weavingMinutes: picks === null ? null : picks / 200,
    warpBreaks: 2,
    weftBreaks: 3,
    stops: 6,
    perns: 20,
    pickEnds: picks === null ? null : picks * 1_000,
    minutesByCause: { smash: { measured: 10, estimated: 0 }, 'weft-break': { measured: 0, estimated: 2 } },
    ...changes,
  };
}
const line = (
  minutes: number,
  picks: number | null,
  picksBy: LoomLine['picksBy'] = 'readings',
  changes: Partial<LineTotals> = {},
): GroupLine => ({ totals: totals(minutes, picks, changes), picksBy });
const OPTIONS = { interval: poissonInterval, asOf: 0 };

describe('sumTotals', () => {
  it('adds everything up, by cause too', () => {
    const other = totals(100, 15_000, {
      minutesByCause: { boxes: { measured: 4, estimated: 0 }, smash: { measured: 1, estimated: 0.5 } },
    });
    const sum = sumTotals([totals(480, 80_000), other]);
    expect(sum).toEqual({
      minutes: 580,
      plannedMinutes: 12,
      shedStopMinutes: 6,
      stopMinutes: 24,
      measuredMinutes: 20,
      estimatedMinutes: 4,
      possiblePicks: 116_000,
      possibleScheduled: 113_600,
      possibleLessShed: 112_400,
      measuredPicks: 4_000,
      estimatedPicks: 800,
      picks: 95_000,
      weavingMinutes: 475,
      warpBreaks: 4,
      weftBreaks: 6,
      stops: 12,
      perns: 40,
      pickEnds: 95_000_000,
      minutesByCause: {
        boxes: { measured: 4, estimated: 0 },
        smash: { measured: 11, estimated: 0.5 },
        'weft-break': { measured: 0, estimated: 2 },
      },
    });
    expect(Object.keys(sum.minutesByCause)).toEqual(['boxes', 'smash', 'weft-break']);
  });

  it('does not know what one of them does not know', () => {
    const sum = sumTotals([totals(480, 80_000), totals(480, null, { possiblePicks: null })]);
    expect(sum).toMatchObject({
      picks: null,
      possiblePicks: null,
      weavingMinutes: null,
      pickEnds: null,
      stops: 12,
    });
  });

  it('takes a cause with any name', () => {
    const odd = totals(1, 1, { minutesByCause: { constructor: { measured: 1, estimated: 0 } } });
    expect(sumTotals([odd, odd]).minutesByCause).toEqual({ constructor: { measured: 2, estimated: 0 } });
  });

  it('of nothing is nothing', () => {
    expect(sumTotals([])).toMatchObject({ minutes: 0, picks: 0, minutesByCause: {} });
  });
});

describe('figuresOfTotals', () => {
  it('gives each figure by its formula', () => {
    const figures = figuresOfTotals(totals(480, 80_000), { why: 'no-end-reading', interval: noInterval });
    expect(figures).toMatchObject({
      efficiency: 80_000 / 96_000,
      efficiencyScheduled: 80_000 / 94_800,
      efficiencyLessShed: 80_000 / 94_200,
      picks: 80_000,
      picksPerHour: 10_000,
      warp: { count: 2, rate: 2.5 },
      weft: { count: 3, rate: 3.75 },
      warpPer1000Ends: 2.5,
      lostPicks: 16_000,
      unaccountedMinutes: 68,
      measuredMinutes: 10,
      estimatedMinutes: 2,
      stopMinutes: 12,
      minutes: 480,
      atMost: null,
    });
    expect(figures.picksPerRunningHour).toBeCloseTo(80_000 / 7.8, 9);
  });

  it('gives the reason wherever picks are not known', () => {
    const none = noFigure('no-end-reading');
    expect(
      figuresOfTotals(totals(480, null), { why: 'no-end-reading', interval: poissonInterval }),
    ).toMatchObject({
      efficiency: none,
      efficiencyScheduled: none,
      efficiencyLessShed: none,
      picks: none,
      picksPerHour: none,
      picksPerRunningHour: none,
      warp: { count: 2, rate: none, low: null, high: null },
      weft: { count: 3, rate: none, low: null, high: null },
      warpPer1000Ends: none,
      lostPicks: none,
      unaccountedMinutes: none,
      minutes: 480,
    });
  });
});

describe('a group', () => {
  it('is a ratio of sums, not a mean of percentages', () => {
    const group = groupFigures([line(480, 96_000), line(60, 0)], OPTIONS);
    expect(group.figures.efficiency).toBeCloseTo(96_000 / 108_000, 12); // the mean would be 50%
    expect(group).toMatchObject({ lines: 2, linesLeftOut: 0, agreedPicks: 0 });
    expect(group.figures.atMost).toBeNull();
    expect(group.figures.warp.count).toBe(4);
    expect(group.figures.warp.low).toBeGreaterThan(0);
  });

  it('leaves lines without figure out of numerator and denominator, and counts them', () => {
    const lines = [
      line(480, 80_000),
      line(480, null, 'none'),
      line(480, 70_000, 'readings', { possiblePicks: null }),
    ];
    const group = groupFigures(lines, OPTIONS);
    expect(group).toMatchObject({ lines: 3, linesLeftOut: 2, agreedPicks: 0 });
    expect(group.figures).toMatchObject({ efficiency: 80_000 / 96_000, picks: 80_000, minutes: 480 });
    expect(group.figures.warp.count).toBe(2);
  });

  it('leaves agreed picks out of statistics, and reports them', () => {
    const group = groupFigures(
      [line(480, 80_000), line(480, 60_000, 'agreed'), line(480, 50_000, 'sheet')],
      OPTIONS,
    );
    expect(group).toMatchObject({ lines: 3, linesLeftOut: 1, agreedPicks: 60_000 });
    expect(group.figures.picks).toBe(130_000);
  });

  it('says why, where all of its lines lack the same', () => {
    const why = (reasons: readonly (GroupLine['why'] | undefined)[]) =>
      groupFigures(
        reasons.map((reason) => ({ ...line(480, null, 'none'), ...(reason ? { why: reason } : {}) })),
        OPTIONS,
      ).figures.efficiency;
    expect(why(['shift-not-over', 'shift-not-over'])).toEqual(noFigure('shift-not-over'));
    expect(why(['shift-not-over', 'no-start-reading'])).toEqual(noFigure('missing-input'));
    expect(why([undefined])).toEqual(noFigure('missing-input'));
    expect(why([])).toEqual(noFigure('missing-input'));
  });

  it('is at most, while a line is not read, what was read and what can have been woven', () => {
    const lines = [line(480, 80_000), line(100, null, 'none'), line(480, 60_000, 'agreed')];
    const group = groupFigures(lines, { ...OPTIONS, asOf: 77 });
    // 80,000 and 200 × 100 − 2,400
    expect(group.figures.atMost).toEqual({ efficiency: 97_600 / 116_000, picks: 97_600, asOf: 77 });
    const none = groupFigures([line(100, null, 'none', { possiblePicks: null })], OPTIONS);
    expect(none.figures.atMost).toMatchObject({ picks: noFigure('no-speed') });
    const half = groupFigures([line(100, null, 'none', { measuredPicks: null })], OPTIONS);
    expect(half.figures.atMost?.picks).toEqual(noFigure('no-speed'));
  });

  it('is the same from sums that a database made', () => {
    const lines = [line(480, 80_000), line(470, 60_000), line(480, 60_000, 'agreed')];
    const sums = sumTotals(lines.filter(isCounted).map((one) => one.totals));
    const bySql = groupFiguresOfSums(
      { sums, lines: 3, linesLeftOut: 1, agreedPicks: 60_000 },
      { interval: poissonInterval },
    );
    expect(bySql).toEqual(groupFigures(lines, OPTIONS));
  });

  it('without any line that counts has a reason for every figure', () => {
    const empty = groupFiguresOfSums(
      { sums: null, lines: 2, linesLeftOut: 2, agreedPicks: 9 },
      { interval: poissonInterval, why: 'no-end-reading' },
    );
    expect(empty).toMatchObject({ lines: 2, linesLeftOut: 2, agreedPicks: 9 });
    expect(empty.figures).toMatchObject({
      efficiency: noFigure('no-end-reading'),
      picks: noFigure('no-end-reading'),
      minutes: 0,
    });
  });
});

describe('ratio of sums, whatever the lines', () => {
  const anyLine = fc
    .record({
      minutes: fc.integer({ min: 1, max: 600 }),
      share: fc.double({ min: 0, max: 1.1, noNaN: true }),
      by: fc.constantFrom('readings', 'agreed', 'sheet', 'none'),
    })
    .map(({ minutes, share, by }) =>
      line(minutes, by === 'none' ? null : 200 * Math.round(minutes * share), by as LoomLine['picksBy']),
    );

  it('lies between its lines, and does not depend on how they are grouped first', () => {
    fc.assert(
      fc.property(fc.array(anyLine, { minLength: 1, maxLength: 12 }), fc.nat(12), (lines, cut) => {
        const counted = lines.filter(isCounted);
        const group = groupFigures(lines, OPTIONS);
        const efficiency = numberOrNull(group.figures.efficiency);
        expect(group.lines).toBe(lines.length);
        expect(group.linesLeftOut).toBe(lines.length - counted.length);
        if (counted.length === 0) {
          expect(efficiency).toBeNull();
          return;
        }
        const each = counted.map((one) => (one.totals.picks ?? 0) / (one.totals.possiblePicks ?? 1));
        const picks = counted.reduce((sum, one) => sum + (one.totals.picks ?? 0), 0);
        const possible = counted.reduce((sum, one) => sum + (one.totals.possiblePicks ?? 0), 0);
        expect(efficiency).toBeCloseTo(picks / possible, 12);
        expect(efficiency).toBeGreaterThanOrEqual(Math.min(...each) - 1e-12);
        expect(efficiency).toBeLessThanOrEqual(Math.max(...each) + 1e-12);
        const parts = [counted.slice(0, cut), counted.slice(cut)].map((part) =>
          sumTotals(part.map((one) => one.totals)),
        );
        expect(sumTotals(parts)).toEqual(sumTotals(counted.map((one) => one.totals)));
      }),
    );
  });
});

describe('mostPicks', () => {
  it('is possible less logged, never below nothing, and unknown without speed', () => {
    const known = { possiblePicks: 1_000, measuredPicks: 300, estimatedPicks: 50 };
    expect(mostPicks(known)).toBe(650);
    expect(mostPicks({ ...known, measuredPicks: 1_200 })).toBe(0);
    for (const what of ['possiblePicks', 'measuredPicks', 'estimatedPicks'])
      expect(mostPicks({ ...known, [what]: null })).toEqual(noFigure('no-speed'));
  });
});
