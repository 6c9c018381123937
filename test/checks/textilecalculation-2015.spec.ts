import { describe, expect, it } from 'vitest';
import { shippedCauses } from '../../shared/entries/causes.js';
import { projectLine } from '../../shared/entries/projection.js';
import { clothLength } from '../../shared/figures/cloth.js';
import { noInterval } from '../../shared/figures/breaks.js';
import { lineFigures, lineTotals } from '../../shared/figures/loom-line.js';
import { possiblePicks } from '../../shared/figures/pick-clock.js';
import { CM_PER_INCH, yardsFromMetres } from '../../shared/figures/units.js';
import { aLineInput, aShift, at, entryBuilder, SHIFT_START } from '../../shared/testing/builders.js';
import { expectClose, given } from './close-to.js';

// textilecalculation.blogspot.com, 2015-02 and 2015-03: worked examples of loom efficiency and production.

describe('efficiency of a loom by its stops, 2015-03', () => {
  // Per 100,000 picks at 180 ppm: 20 warp stops of .85 min, 15 weft of .30, 6 others of .12. Three times as many
  // here, so that the running time is a whole number of milliseconds.
  const TIMES = 3;
  const allowances: Record<string, number> = { 'warp-break': 51, 'weft-break': 18, 'cut-off': 7.2 };
  const runningMs = (TIMES * 1e5 * 60_000) / 180;
  const stoppedMs = TIMES * (20 * 51 + 15 * 18 + 6 * 7.2) * 1000;
  const shift = aShift({ endsAt: SHIFT_START + runningMs + stoppedMs });
  const { book } = entryBuilder(1, shift);
  const line = projectLine(
    aLineInput({
      shift,
      causeVersions: shippedCauses(at(-1)).map((cause) => ({
        ...cause,
        allowanceS: allowances[cause.causeId] ?? cause.allowanceS,
      })),
      entries: [
        book('reading', 0, { boundary: 'start', value: 900_000 }),
        book('stop', 10, { cause: 'warp-break', count: 20 * TIMES }),
        book('stop', 20, { cause: 'weft-break', count: 15 * TIMES }),
        book('stop', 30, { cause: 'cut-off', count: 6 * TIMES }),
        { ...book('reading', 0, { boundary: 'end', value: 200_000 }), at: shift.endsAt },
      ],
    }),
  );
  const totals = lineTotals(line, shift.endsAt);

  it('runs 555.5556 min and stands 22.22 per 100,000 picks', () => {
    expectClose((totals.minutes - totals.stopMinutes) / TIMES, 555.5556, 1e-7);
    expectClose(totals.stopMinutes / TIMES, 22.22, 1e-12);
    expect(line.picks).toBe(300_000);
  });

  it('is 96.154216% efficient (the page rounds to 96.16), with nothing unaccounted for', () => {
    const figures = lineFigures(line, shift.endsAt, noInterval);
    expectClose(figures.efficiency, 0.96154216, 5e-9);
    expect(given(figures.unaccountedMinutes)).toBeCloseTo(0, 9);
    expectClose(figures.picksPerRunningHour, 180 * 60, 1e-12);
  });
});

describe('yards an hour, 2015-02 and 2015-03', () => {
  const yards = (picks: number, picksPerInch: number) =>
    given(yardsFromMetres(given(clothLength(picks, picksPerInch / CM_PER_INCH))));

  it('192 ppm, 80 picks/in: 4 yd/h at 100%, 3 yd/h at 75%', () => {
    const picks = given(possiblePicks(192, 60));
    expectClose(yards(picks, 80), 4, 1e-12);
    expectClose(yards(picks * 0.75, 80), 3, 1e-12);
  });

  it('200 ppm, 9 h, 78%, 80 picks/in: 29.25 yd', () => {
    expectClose(yards(given(possiblePicks(200, 540)) * 0.78, 80), 29.25, 1e-12);
  });
});
