import { describe, expect, it } from 'vitest';
import { noFigure } from '../figures/no-figure.js';
import { beforeAfter, SIDE_SHIFTS, type WovenShift } from './before-after.js';
import { poissonInterval } from './poisson-interval.js';
import { compareWithDispersion } from './quasi-poisson.js';

const HOUR = 3_600_000;
/** Shifts of eight hours, one after the other. */
const shifts = (warpBreaks: readonly number[], picks = 80_000): WovenShift[] =>
  warpBreaks.map((breaks, i) => ({
    startsAt: i * 8 * HOUR,
    endsAt: (i + 1) * 8 * HOUR,
    picks,
    warpBreaks: breaks,
    weftBreaks: 1,
  }));
const ALL = { from: -Infinity, until: Infinity };
const PHI = { dispersion: 2, degrees: 40 };

describe('breaks before and after a moment', () => {
  it('leave out the shift of the moment and take nine on either side', () => {
    const woven = shifts([
      99,
      ...Array<number>(SIDE_SHIFTS).fill(6),
      99,
      ...Array<number>(SIDE_SHIFTS).fill(2),
      99,
    ]);
    const found = beforeAfter(woven, (SIDE_SHIFTS + 1) * 8 * HOUR + HOUR, ALL, PHI);
    expect(found.before).toMatchObject({ shifts: 9, picks: 720_000, warp: { count: 54, rate: 7.5 } });
    expect(found.after).toMatchObject({ shifts: 9, picks: 720_000, warp: { count: 18, rate: 2.5 } });
    expect(found.before.warp.low).toBeCloseTo(
      (poissonInterval(54, 0.95, 2) as { low: number }).low / 7.2,
      10,
    );
    const expected = compareWithDispersion(
      { count: 54, exposure: 720_000 },
      { count: 18, exposure: 720_000 },
      PHI,
    );
    expect(found.warpChange).toMatchObject({ ratio: 18 / 54, shown: true });
    expect(found.warpChange.low).toBe((expected as { low: number }).low);
    expect(found.warpChange.high).toBeLessThan(1);
    expect(found.weftChange).toMatchObject({ ratio: 1, shown: false });
  });

  it('a shift that ends as the repair is made lies before it, one that begins then holds it', () => {
    const found = beforeAfter(shifts([1, 2, 3]), 8 * HOUR, ALL, PHI);
    expect([found.before.warp.count, found.after.warp.count]).toEqual([1, 3]);
  });

  it('leave out shifts of another warp, and say so', () => {
    const woven = shifts([5, 5, 5, 0, 5, 5, 5]);
    const bounds = { from: 8 * HOUR, until: 6 * 8 * HOUR };
    const found = beforeAfter(woven, 3.5 * 8 * HOUR, bounds, PHI);
    expect([found.before.shifts, found.after.shifts, found.otherWarp]).toEqual([2, 2, true]);
    expect(beforeAfter(woven, 3.5 * 8 * HOUR, ALL, PHI).otherWarp).toBe(false);
  });

  it('judge nothing without shifts on a side, or without a dispersion', () => {
    expect(beforeAfter(shifts([5, 0]), 12 * HOUR, ALL, PHI)).toMatchObject({
      after: { shifts: 0, picks: 0, warp: { count: 0, rate: noFigure('no-picks'), low: null } },
      warpChange: { ratio: noFigure('no-exposure'), shown: false },
    });
    expect(beforeAfter(shifts([5, 0, 0]), 12 * HOUR, ALL, null).warpChange).toMatchObject({
      ratio: noFigure('not-comparable'),
      shown: false,
    });
  });
});
