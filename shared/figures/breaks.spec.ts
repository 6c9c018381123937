import { describe, expect, it } from 'vitest';
import { poissonInterval } from '../chance/poisson-interval.js';
import { breakRate, noInterval, warpBreaksPer1000Ends } from './breaks.js';
import { noFigure } from './no-figure.js';

describe('breakRate', () => {
  it('is 10⁵·B / A with the exact 95% interval of the count', () => {
    const rate = breakRate(3, 74_250, poissonInterval);
    expect(rate).toEqual({
      count: 3,
      rate: expect.closeTo(4.04040404, 8) as number,
      low: expect.closeTo(0.833228, 6) as number,
      high: expect.closeTo(11.807775, 6) as number,
    });
  });

  it('of no breaks is 0, with a high limit', () => {
    const rate = breakRate(0, 100_000, poissonInterval);
    expect(rate).toMatchObject({ rate: 0, low: 0 });
    expect(rate.high).toBeCloseTo(3.68887945, 8);
  });

  it('has no figure where nothing was woven, nor without picks', () => {
    const none = { count: 2, low: null, high: null };
    expect(breakRate(2, 0, poissonInterval)).toEqual({ ...none, rate: noFigure('no-picks') });
    expect(breakRate(2, noFigure('no-end-reading'), poissonInterval)).toEqual({
      ...none,
      rate: noFigure('no-end-reading'),
    });
  });

  it('shows no interval where none is wanted, or there is none', () => {
    expect(breakRate(3, 74_250, noInterval)).toMatchObject({ low: null, high: null });
    expect(breakRate(2.5, 50_000, poissonInterval)).toEqual({ count: 2.5, rate: 5, low: null, high: null });
  });

  it('is as wide as the interval that it is handed: widened where over-dispersed', () => {
    const widened = breakRate(3, 74_250, (count) => poissonInterval(count, 0.95, 4));
    const plain = breakRate(3, 74_250, poissonInterval);
    expect(widened.rate).toBe(plain.rate);
    expect(widened.low).toBeLessThan(plain.low ?? 0);
    expect(widened.high).toBeGreaterThan(plain.high ?? Infinity);
  });
});

describe('warpBreaksPer1000Ends', () => {
  it('is 10⁸·B / (A·ends)', () => {
    expect(warpBreaksPer1000Ends(7, 187_500 * 3_120)).toBeCloseTo(1.1965812, 7);
  });

  it('has no figure without picks or ends', () => {
    expect(warpBreaksPer1000Ends(7, 0)).toEqual(noFigure('no-picks'));
    expect(warpBreaksPer1000Ends(7, noFigure('no-ends'))).toEqual(noFigure('no-ends'));
  });
});
