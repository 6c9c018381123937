import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { noFigure } from './no-figure.js';
import {
  clockRange,
  disagreement,
  isPlausible,
  isWideEnough,
  mostBelievable,
  picksBetween,
  possiblePicks,
} from './pick-clock.js';

describe('picksBetween', () => {
  it.each([
    [{ digits: 6, unit: 1 }, 100_000, 174_250, 74_250],
    [{ digits: 6, unit: 1 }, 990_000, 64_250, 74_250],
    [{ digits: 4, unit: 100 }, 9_950, 692, 74_200],
    [{ digits: 3, unit: 1000 }, 999, 0, 1_000],
    [{ digits: 5, unit: 1 }, 7, 7, 0],
  ])('is ((end − start) mod 10^digits) × unit: %o, %d to %d', (clock, start, end, picks) => {
    expect(picksBetween(clock, start, end)).toBe(picks);
  });

  it.each([
    [{ digits: 4, unit: 1 }, 10_000, 5],
    [{ digits: 4, unit: 1 }, 5, 10_000],
    [{ digits: 4, unit: 1 }, -1, 5],
    [{ digits: 4, unit: 1 }, 5, 5.5],
    [{ digits: 4, unit: 1 }, Number.NaN, 5],
    [{ digits: 0, unit: 1 }, 0, 0],
    [{ digits: 1.5, unit: 1 }, 0, 0],
    [{ digits: 4, unit: 0 }, 0, 0],
    [{ digits: 4, unit: 0.5 }, 0, 0],
  ])('has no figure for what the clock cannot show: %o, %d to %d', (clock, start, end) => {
    expect(picksBetween(clock, start, end)).toEqual(noFigure('out-of-range'));
  });

  it('finds again what was woven, for less than one round', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 7 }), fc.nat(), fc.nat(), (digits, a, b) => {
        const range = 10 ** digits;
        const [start, woven] = [a % range, b % range];
        return picksBetween({ digits, unit: 100 }, start, (start + woven) % range) === woven * 100;
      }),
    );
  });
});

describe('disagreement', () => {
  it.each([
    [100, 90, 1_000],
    [90, 100, 1_000],
    [9_998, 3, 500],
    [3, 9_998, 500],
    [0, 5_000, 500_000],
    [7, 7, 0],
  ])('is the short way round: %d and %d', (a, b, picks) => {
    expect(disagreement({ digits: 4, unit: 100 }, a, b)).toBe(picks);
  });
});

describe('possiblePicks', () => {
  it('is n·T', () => {
    expect(possiblePicks(180, 480)).toBe(86_400);
    expect(possiblePicks(180, 0)).toBe(0);
  });

  it.each([
    [0, 10, 'out-of-range'],
    [Infinity, 10, 'out-of-range'],
    [180, -1, 'out-of-range'],
    [180, Infinity, 'out-of-range'],
    [Number.NaN, 10, 'missing-input'],
    [180, Number.NaN, 'missing-input'],
  ] as const)('has no figure for %d ppm in %d min', (ppm, minutes, reason) => {
    expect(possiblePicks(ppm, minutes)).toEqual(noFigure(reason));
  });
});

describe('more than this loom can weave', () => {
  it('is asked above speed × T × 1.05 + one unit', () => {
    const what = { ppm: 200, minutes: 60, unit: 100 };
    expect(mostBelievable(12_000, 100)).toBe(12_700);
    expect(isPlausible({ ...what, picks: 12_700 })).toBe(true);
    expect(isPlausible({ ...what, picks: 12_701 })).toBe(false);
    expect(isPlausible({ ...what, picks: 0 })).toBe(true);
    expect(isPlausible({ ...what, picks: -1 })).toBe(false);
  });

  it('cannot be told of a clock narrower than a shift: it is refused at set-up', () => {
    expect(clockRange({ digits: 5 })).toBe(100_000);
    expect(isWideEnough({ digits: 5, unit: 1 }, 180, 480)).toBe(true);
    expect(isWideEnough({ digits: 4, unit: 1 }, 180, 480)).toBe(false);
    expect(isWideEnough({ digits: 4, unit: 100 }, 180, 480)).toBe(true);
    expect(isWideEnough({ digits: 5, unit: 1 }, 200, 500)).toBe(true);
    expect(isWideEnough({ digits: 5, unit: 1 }, 200, 500.01)).toBe(false);
  });
});
