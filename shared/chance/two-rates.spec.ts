import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { isNoFigure } from '../figures/no-figure.js';
import { compareTwoRates, type TwoRates } from './two-rates.js';

const compare = (x1: number, t1: number, x2: number, t2: number, level?: number) =>
  compareTwoRates({ count: x1, exposure: t1 }, { count: x2, exposure: t2 }, level) as TwoRates;

const near = (value: number): unknown => expect.closeTo(value, 12);

const count = fc.integer({ min: 0, max: 400 });
const exposure = fc.integer({ min: 1000, max: 1_000_000 });

describe('compareTwoRates', () => {
  it('sums exactly in a case small enough to count by hand', () => {
    // 4 events, even odds: P(0..4) = 1 4 6 4 1 of 16
    const one = compare(1, 1, 3, 1);
    expect([one.p, one.pLess, one.pGreater].map((p) => 16 * p)).toEqual([10, 5, 15].map(near));
    expect(one.ratio).toBe(1 / 3);
    const even = compare(2, 1, 2, 1);
    expect([even.p, even.pLess, even.pGreater].map((p) => 16 * p)).toEqual([16, 11, 11].map(near));
    expect(even.ratio).toBe(1);
  });

  it('holds counts to their exposure', () => {
    const { ratio, low, high, p } = compare(11, 800, 21, 3011);
    expect(ratio).toBeCloseTo((11 * 3011) / (21 * 800), 12);
    expect(low).toBeCloseTo(0.858426403, 8);
    expect(high).toBeCloseTo(4.277265944, 8);
    expect(p).toBeCloseTo(0.079668633, 8);
    expect(compare(11, 800, 21, 3011, 0.99).low).toBeLessThan(low);
  });

  it('does not overflow on a mill’s year', () => {
    const year = compare(50_000, 1e9, 50_700, 1e9);
    expect(year.p).toBeGreaterThan(0.02);
    expect(year.p).toBeLessThan(0.04);
    expect(compare(100_000, 1e9, 10, 1e9)).toMatchObject({ p: 0, pGreater: 0, pLess: 1 });
  });

  it('has no figure without exposure, nor from impossible input', () => {
    const good = { count: 3, exposure: 100 };
    expect(compareTwoRates(good, { count: 0, exposure: 0 })).toEqual({ none: 'no-exposure' });
    expect(compareTwoRates({ count: 0, exposure: 0 }, good)).toEqual({ none: 'no-exposure' });
    expect(compareTwoRates({ count: NaN, exposure: 1 }, good)).toEqual({ none: 'missing-input' });
    expect(compareTwoRates(good, { count: 1, exposure: NaN })).toEqual({ none: 'missing-input' });
    expect(compareTwoRates(good, good, NaN)).toEqual({ none: 'missing-input' });
    for (const bad of [
      { count: -1, exposure: 1 },
      { count: 0.5, exposure: 1 },
      { count: 1, exposure: -1 },
      { count: 1, exposure: Infinity },
    ]) {
      expect(compareTwoRates(good, bad)).toEqual({ none: 'out-of-range' });
    }
    for (const level of [0, 1]) expect(compareTwoRates(good, good, level)).toEqual({ none: 'out-of-range' });
  });

  it('has an interval that contains its ratio, and p-values that are probabilities', () => {
    fc.assert(
      fc.property(count, exposure, count, exposure, (x1, t1, x2, t2) => {
        const { ratio, low, high, p, pLess, pGreater } = compare(x1, t1, x2, t2);
        if (!isNoFigure(ratio)) expect(low).toBeLessThanOrEqual(ratio);
        if (!isNoFigure(ratio) && !isNoFigure(high)) expect(high).toBeGreaterThan(ratio);
        for (const one of [p, pLess, pGreater]) {
          expect(one).toBeGreaterThanOrEqual(0);
          expect(one).toBeLessThanOrEqual(1 + 1e-12);
        }
        expect(pLess + pGreater).toBeGreaterThanOrEqual(1 - 1e-12);
      }),
    );
  });

  it('says the same when the two change places', () => {
    fc.assert(
      fc.property(count, exposure, count, exposure, (x1, t1, x2, t2) => {
        const one = compare(x1, t1, x2, t2);
        const other = compare(x2, t2, x1, t1);
        expect(other.p).toBeCloseTo(one.p, 10);
        expect(other.pLess).toBeCloseTo(one.pGreater, 10);
        if (!isNoFigure(one.high)) expect(other.low * one.high).toBeCloseTo(x2 === 0 ? 0 : 1, 6);
      }),
    );
  });

  it('shrinks as exposure grows at the same rates', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 50 }), fc.integer({ min: 1, max: 50 }), (x1, x2) => {
        const less = compare(x1, 1000, x2, 1000);
        const more = compare(3 * x1, 3000, 3 * x2, 3000);
        expect(more.low).toBeGreaterThan(less.low);
        expect(more.high).toBeLessThan(less.high as number);
      }),
    );
  });
});
