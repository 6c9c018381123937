import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { isNoFigure } from '../figures/no-figure.js';
import { compareWithDispersion, type QuasiComparison } from './quasi-poisson.js';

const counted = (count: number, exposure = 1000) => ({ count, exposure });
const compare = (...args: Parameters<typeof compareWithDispersion>) =>
  compareWithDispersion(...args) as QuasiComparison;
const PAGE = { dispersion: 2, degrees: 40 };

describe('compareWithDispersion', () => {
  it('divides score and deviance by the dispersion', () => {
    // 20 and 40 about 30: 2·100/30; deviance 2(20 ln ⅔ + 40 ln 4⁄3)
    const { f, deviance, ratio } = compare(counted(20), counted(40), PAGE);
    expect(f).toBeCloseTo(200 / 30 / 2, 12);
    expect(deviance.f).toBeCloseTo(20 * Math.log(2 / 3) + 40 * Math.log(4 / 3), 12);
    expect(ratio).toBe(2);
  });

  it('has a p of the F distribution, from both statistics', () => {
    const { f, p, deviance } = compare(counted(20), counted(40), { dispersion: 1, degrees: 2 });
    // With 1 and 2 degrees the tail is 1 − √(f ÷ (f + 2)).
    expect(p).toBeCloseTo(1 - Math.sqrt(f / (f + 2)), 12);
    expect(deviance.p).toBeCloseTo(1 - Math.sqrt(deviance.f / (deviance.f + 2)), 12);
  });

  it('takes account of exposure', () => {
    expect(compare(counted(20, 1000), counted(40, 2000), PAGE)).toMatchObject({ ratio: 1, f: 0, p: 1 });
  });

  it('says what it can where a week had no breaks', () => {
    const began = compare(counted(0), counted(9), PAGE);
    expect(began).toMatchObject({ ratio: { none: 'no-events' }, high: { none: 'no-limit' } });
    expect(began.low).toBeGreaterThan(0);
    const ended = compare(counted(9), counted(0), PAGE);
    expect(ended).toMatchObject({ ratio: 0, low: 0 });
    expect(ended.high).toBeCloseTo(1 / began.low, 10);
    const quiet = compare(counted(0), counted(0), PAGE);
    expect(quiet).toMatchObject({
      p: 1,
      f: 0,
      low: 0,
      high: { none: 'no-limit' },
      ratio: { none: 'no-events' },
    });
  });

  it('has no figure without exposure, nor from impossible input', () => {
    expect(compare(counted(0, 0), counted(3), PAGE)).toEqual({ none: 'no-exposure' });
    expect(compare(counted(3), counted(0, 0), PAGE)).toEqual({ none: 'no-exposure' });
    expect(compare(counted(NaN), counted(3), PAGE)).toEqual({ none: 'missing-input' });
    expect(compare(counted(3), counted(-3), PAGE)).toEqual({ none: 'out-of-range' });
    for (const page of [
      { dispersion: NaN, degrees: 40 },
      { dispersion: 2, degrees: NaN },
    ]) {
      expect(compare(counted(3), counted(4), page)).toEqual({ none: 'missing-input' });
    }
    expect(compare(counted(3), counted(4), PAGE, NaN)).toEqual({ none: 'missing-input' });
    for (const page of [
      { dispersion: 0.9, degrees: 40 },
      { dispersion: Infinity, degrees: 40 },
      { dispersion: 2, degrees: 0 },
      { dispersion: 2, degrees: Infinity },
    ]) {
      expect(compare(counted(3), counted(4), page)).toEqual({ none: 'out-of-range' });
    }
    for (const level of [0, 1]) {
      expect(compare(counted(3), counted(4), PAGE, level)).toEqual({ none: 'out-of-range' });
    }
  });

  const count = fc.integer({ min: 0, max: 300 });
  const exposure = fc.integer({ min: 100, max: 100_000 });
  const page = fc.record({
    dispersion: fc.double({ min: 1, max: 8, noNaN: true }),
    degrees: fc.integer({ min: 2, max: 1000 }),
  });

  it('has an interval that contains its ratio and leaves out 1 just where p is under 5%', () => {
    fc.assert(
      fc.property(count, exposure, count, exposure, page, (x1, t1, x2, t2, dispersion) => {
        const { ratio, low, high, p } = compare(counted(x1, t1), counted(x2, t2), dispersion);
        const top = isNoFigure(high) ? Infinity : high;
        if (!isNoFigure(ratio)) {
          expect(low).toBeLessThanOrEqual(ratio);
          expect(top).toBeGreaterThan(ratio);
        }
        if (Math.abs(p - 0.05) > 1e-6) expect(low > 1 || top < 1).toBe(p < 0.05);
      }),
      { numRuns: 500 },
    );
  });

  it('shrinks with exposure and widens with dispersion', () => {
    const some = fc.integer({ min: 1, max: 100 });
    fc.assert(
      fc.property(some, some, page, (x1, x2, dispersion) => {
        const width = ({ low, high }: QuasiComparison) => Math.log(high as number) - Math.log(low);
        const usual = compare(counted(x1), counted(x2), dispersion);
        const longer = compare(counted(4 * x1, 4000), counted(4 * x2, 4000), dispersion);
        const rougher = compare(counted(x1), counted(x2), {
          ...dispersion,
          dispersion: 2 * dispersion.dispersion,
        });
        expect(width(longer)).toBeLessThan(width(usual));
        expect(width(rougher)).toBeGreaterThan(width(usual));
      }),
    );
  });
});
