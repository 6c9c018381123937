import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { isNoFigure } from '../figures/no-figure.js';
import { poissonInterval, ratePer, type Interval, type Rate } from './poisson-interval.js';

const interval = (...args: Parameters<typeof poissonInterval>) => poissonInterval(...args) as Interval;
const rate = (...args: Parameters<typeof ratePer>) => ratePer(...args) as Rate;

type Asked = Parameters<typeof poissonInterval>;

describe('poissonInterval', () => {
  it('of 3 is .6187 to 8.7673, 2.5% on either side', () => {
    expect(interval(3).low).toBeCloseTo(0.618672123, 9);
    expect(interval(3).high).toBeCloseTo(8.76727307, 8);
    // Of none, 90%: the mean that would give none one time in twenty.
    expect(interval(0, 0.9).high).toBeCloseTo(-Math.log(0.05), 10);
  });

  it('widens with the dispersion: an effective count, multiplied back', () => {
    expect(interval(12, 0.95, 4).low).toBeCloseTo(4 * interval(3).low, 10);
    expect(interval(12, 0.95, 4).high).toBeCloseTo(4 * interval(3).high, 10);
    expect(interval(0, 0.95, 2)).toEqual({ low: 0, high: 2 * interval(0).high });
  });

  it('refuses what cannot be', () => {
    const missing: readonly Asked[] = [[NaN], [3, NaN], [3, 0.95, NaN]];
    for (const args of missing) expect(poissonInterval(...args)).toEqual({ none: 'missing-input' });
    const impossible: readonly Asked[] = [
      [-1],
      [1.5],
      [Infinity],
      [3, 0],
      [3, 1],
      [3, 0.95, 0.9],
      [3, 0.95, Infinity],
    ];
    for (const args of impossible) expect(poissonInterval(...args)).toEqual({ none: 'out-of-range' });
  });

  it('contains its estimate, at every level and dispersion', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 3000 }),
        fc.double({ min: 0.5, max: 0.999, noNaN: true }),
        fc.double({ min: 1, max: 20, noNaN: true }),
        (count, level, dispersion) => {
          const { low, high } = interval(count, level, dispersion);
          expect(low).toBeLessThanOrEqual(count);
          expect(high).toBeGreaterThan(count);
          expect(low).toBeGreaterThanOrEqual(0);
        },
      ),
    );
  });

  it('is wider at a higher level and a higher dispersion', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 500 }),
        fc.double({ min: 1, max: 8, noNaN: true }),
        (count, more) => {
          const width = ({ low, high }: Interval) => high - low;
          expect(width(interval(count, 0.99))).toBeGreaterThan(width(interval(count, 0.95)));
          expect(width(interval(count, 0.95, 1.01 * more))).toBeGreaterThan(width(interval(count, 0.95)));
        },
      ),
    );
  });
});

describe('ratePer', () => {
  it('states rate and limits for the exposure asked', () => {
    const { low, high } = interval(3);
    expect(rate(3, 50_000, 1e5)).toEqual({ rate: 6, low: 2 * low, high: 2 * high });
    expect(rate(3, 50_000, 1e5, 0.9, 2).high).toBeCloseTo(2 * interval(3, 0.9, 2).high, 10);
  });

  it('has no figure where nothing was woven, nor from impossible input', () => {
    expect(ratePer(0, 0, 1e5)).toEqual({ none: 'no-exposure' });
    expect(ratePer(-1, 0, 1e5)).toEqual({ none: 'out-of-range' });
    expect(ratePer(3, NaN, 1e5)).toEqual({ none: 'missing-input' });
    expect(ratePer(3, 1e5, NaN)).toEqual({ none: 'missing-input' });
    for (const [exposure, per] of [
      [-1, 1e5],
      [Infinity, 1e5],
      [1e5, 0],
      [1e5, Infinity],
    ]) {
      expect(ratePer(3, exposure, per)).toEqual({ none: 'out-of-range' });
    }
  });

  it('shrinks about the same rate as exposure grows', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 200 }), fc.integer({ min: 2, max: 10 }), (count, times) => {
        const less = rate(count, 1e5, 1e5);
        const more = rate(count * times, 1e5 * times, 1e5);
        expect(more.rate).toBeCloseTo(less.rate, 10);
        expect(more.low).toBeGreaterThan(less.low);
        expect(more.high).toBeLessThan(less.high);
        expect(isNoFigure(more)).toBe(false);
      }),
    );
  });
});
