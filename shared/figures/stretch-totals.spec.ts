import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { LineTotals } from '../entries/loom-line.js';
import { projectLine } from '../entries/projection.js';
import { entriesOfActs } from '../testing/acts.js';
import { anyActs } from '../testing/any-acts.js';
import { aFitting, aClothVersion, aLineInput, aLoomVersion, at, entryBuilder } from '../testing/builders.js';
import { noInterval } from './breaks.js';
import { lineTotals } from './loom-line.js';
import { stretchTotals } from './stretch-totals.js';
import { figuresOfTotals, sumTotals } from './totals.js';

const CLOTHS = [aClothVersion(), aClothVersion({ id: 'c2', clothId: 'cloth-2', ends: 2_000 })];
const FASTER = [aLoomVersion(), aLoomVersion({ id: 'faster', effectiveAt: at(300), ppm: 200 })];
/** 300 min of cloth 1 at 180 ppm, 180 min of cloth 2 at 200. */
const CHANGED = {
  loomVersions: FASTER,
  clothVersions: CLOTHS,
  fittings: [aFitting(), aFitting({ id: 'f2', effectiveAt: at(300), warpId: 'warp-2', clothId: 'cloth-2' })],
};

describe('a line whose cloth changed in mid-shift', () => {
  const { book } = entryBuilder();
  const entries = [
    book('reading', 0, { boundary: 'start', value: 0 }),
    book('reading', 300, { boundary: 'change', value: 45_000 }),
    book('reading', 480, { boundary: 'end', value: 75_000 }),
    book('stop', 100, { cause: 'warp-break', count: 3 }),
    book('stop', 290, { cause: 'smash', count: 1, until: at(310) }),
    book('stop', 400, { cause: 'warp-break', count: 5 }),
    book('count', 480, { cause: 'pern-change', total: 81 }),
  ];
  const line = projectLine(aLineInput({ ...CHANGED, entries }));
  const [early, late] = stretchTotals(line, at(480));

  it('has its figures by cloth', () => {
    expect(early?.stretch.clothId).toBe('cloth-1');
    expect(early?.totals).toMatchObject({ minutes: 300, possiblePicks: 54_000, picks: 45_000 });
    expect(late?.totals).toMatchObject({ minutes: 180, possiblePicks: 36_000, picks: 30_000 });
    const figures = [early, late].map((one) =>
      figuresOfTotals(one!.totals, { why: 'missing-input', interval: noInterval }),
    );
    expect(figures.map((one) => one.efficiency)).toEqual([45 / 54, 30 / 36]);
    expect(figures[0]?.warp.rate).toBeCloseTo(4e5 / 45_000, 12);
    expect(figures[1]?.warpPer1000Ends).toBeCloseTo((5 * 1e8) / (30_000 * 2_000), 12);
  });

  it('counts a stop where it began, and its minutes where they fell', () => {
    expect([early?.totals.warpBreaks, late?.totals.warpBreaks]).toEqual([4, 5]);
    expect([early?.totals.measuredMinutes, late?.totals.measuredMinutes]).toEqual([10, 10]);
  });

  it('shares what was counted for the whole shift by length', () => {
    expect([early?.totals.perns, late?.totals.perns]).toEqual([51, 30]);
    expect(early?.totals.minutesByCause['pern-change']?.estimated).toBe((51 * 15) / 60);
  });

  it('leaves timed perns where they were, and shares fewer than were timed by these', () => {
    const timed = [10, 20, 400].map((minute) =>
      book('stop', minute, { cause: 'pern-change', count: 1, until: at(minute + 1) }),
    );
    const counts = (total: number) => {
      const counted = book('count', 480, { cause: 'pern-change', total });
      const of = projectLine(aLineInput({ ...CHANGED, entries: [...timed, counted] }));
      return stretchTotals(of, at(480)).map(({ totals }) => [totals.perns, totals.estimatedMinutes]);
    };
    expect(counts(11)).toEqual([
      [2 + 5, (5 * 15) / 60],
      [1 + 3, (3 * 15) / 60],
    ]);
    expect(counts(2)).toEqual([
      [1, 0],
      [1, 0],
    ]);
  });

  it('shares a sheet’s minutes by length, beyond what was timed', () => {
    const sheet = book('sheet', 500, { counts: {}, minutes: { smash: 36 } });
    const of = projectLine(aLineInput({ ...CHANGED, entries: [entries[4]!, sheet] }));
    const minutes = stretchTotals(of, at(480)).map(({ totals }) => totals.stopMinutes);
    expect(minutes).toEqual([10 + 10, 10 + 6]);
  });

  it('before any time has gone by gives what is stated for the shift to the last', () => {
    const counted = book('count', -5, { cause: 'pern-change', total: 7 });
    const of = projectLine(aLineInput({ ...CHANGED, entries: [counted] }));
    expect(stretchTotals(of, at(-1)).map(({ totals }) => totals.perns)).toEqual([0, 7]);
  });
});

describe('stretches of any line', () => {
  it.each([
    ['at one speed, whatever was said', aLineInput().loomVersions, true],
    ['at two speeds, without counts at hand-over', FASTER, false],
  ])('%s add up to it', (_, loomVersions, withCounts) => {
    fc.assert(
      fc.property(anyActs, fc.integer({ min: -30, max: 700 }), (acts, minute) => {
        const entries = entriesOfActs(acts.filter((act) => withCounts || act.is !== 'count'));
        const line = projectLine(aLineInput({ ...CHANGED, loomVersions, entries }));
        const parts = stretchTotals(line, at(minute)).map((one) => one.totals);
        expect(rounded(sumTotals(parts))).toEqual(rounded(lineTotals(line, at(minute))));
      }),
      { numRuns: 200 },
    );
  });
});

/** Totals to nine digits, causes without a minute left out. */
function rounded({ minutesByCause, ...sums }: LineTotals) {
  const round = (value: number | null) => (value === null ? null : Math.round(value * 1e6) / 1e6 + 0);
  const causes = Object.entries(minutesByCause).filter(
    ([, { measured, estimated }]) => measured + estimated > 0,
  );
  return {
    ...Object.fromEntries(Object.entries(sums).map(([name, value]) => [name, round(value)])),
    causes: causes.map(([cause, { measured, estimated }]) => [cause, round(measured), round(estimated)]),
  };
}
