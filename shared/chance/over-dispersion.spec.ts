import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { dispersionBetweenShifts, type Dispersion } from './over-dispersion.js';

const shifts = (...counts: number[]) => counts.map((count) => ({ count, exposure: 1000 }));
const found = (groups: Parameters<typeof dispersionBetweenShifts>[0]) =>
  dispersionBetweenShifts(groups) as Dispersion;

describe('dispersionBetweenShifts', () => {
  it('pools X² and degrees over groups, each about its own rate', () => {
    // about 2: (1 + 1)/2 = 1 on 1 degree; about 20: (100 + 0 + 100)/20 = 10 on 2 degrees
    const pooled = found([shifts(1, 3), shifts(10, 20, 30)]);
    expect(pooled.pearson).toBeCloseTo(11, 12);
    expect(pooled.degrees).toBe(3);
    expect(pooled.asFound).toBeCloseTo(11 / 3, 12);
    expect(pooled.dispersion).toBe(pooled.asFound);
    expect(pooled.p).toBeCloseTo(0.0117, 4);
  });

  it('holds shifts to their exposure', () => {
    const even = found([
      [
        { count: 2, exposure: 1000 },
        { count: 4, exposure: 2000 },
      ],
    ]);
    expect(even.pearson).toBeCloseTo(0, 12);
  });

  it('is never below 1, but says what was found', () => {
    expect(found([shifts(5, 5, 5, 6)])).toMatchObject({ dispersion: 1, degrees: 3 });
    expect(found([shifts(5, 5, 5, 6)]).asFound).toBeLessThan(0.1);
  });

  it('leaves out shifts without picks, groups of one and groups without a break', () => {
    const base = found([shifts(1, 3)]);
    const idle = { count: 2, exposure: 0 };
    expect(found([[...shifts(1, 3), idle], shifts(9), shifts(0, 0, 0), []])).toEqual(base);
  });

  it('has no figure where nothing can be told, nor from impossible input', () => {
    expect(dispersionBetweenShifts([])).toEqual({ none: 'no-exposure' });
    expect(dispersionBetweenShifts([shifts(3), shifts(0, 0)])).toEqual({ none: 'no-exposure' });
    expect(dispersionBetweenShifts([shifts(NaN, 1)])).toEqual({ none: 'missing-input' });
    expect(dispersionBetweenShifts([shifts(-1, 1)])).toEqual({ none: 'out-of-range' });
  });

  it('does not depend on the order of shifts or groups, nor on the unit of exposure', () => {
    const group = fc.array(
      fc.record({ count: fc.integer({ min: 0, max: 30 }), exposure: fc.integer({ min: 1, max: 9 }) }),
      { minLength: 2, maxLength: 8 },
    );
    fc.assert(
      fc.property(fc.array(group, { minLength: 1, maxLength: 5 }), (groups) => {
        fc.pre(groups.some((one) => one.some((shift) => shift.count > 0)));
        const one = found(groups);
        const turned = found([...groups].reverse().map((shift) => [...shift].reverse()));
        const scaled = found(
          groups.map((each) => each.map(({ count, exposure }) => ({ count, exposure: exposure * 1000 }))),
        );
        expect(turned.pearson).toBeCloseTo(one.pearson, 9);
        expect(scaled.pearson).toBeCloseTo(one.pearson, 9);
        expect(one.dispersion).toBeGreaterThanOrEqual(1);
      }),
    );
  });
});
