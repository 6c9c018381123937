import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { seeded } from '../testing/seeded.js';
import { enoughToSee, type Enough } from './enough.js';
import { compareWithDispersion, type QuasiComparison } from './quasi-poisson.js';

const enough = (...args: Parameters<typeof enoughToSee>) => enoughToSee(...args) as Enough;

/** A count with variance dispersion × mean: Poisson, or negative binomial as a Poisson number of log-series. */
function draw(mean: number, dispersion: number, random: () => number): number {
  const clusters = dispersion === 1 ? mean : (mean * Math.log(dispersion)) / (dispersion - 1);
  let number = 0;
  for (let time = -Math.log(random()); time < clusters; time -= Math.log(random())) number++;
  if (dispersion === 1) return number;
  const p = 1 - 1 / dispersion;
  let count = 0;
  for (; number > 0; number--) {
    let k = 1;
    let weight = -p / Math.log(1 - p);
    for (let left = random() - weight; left > 0 && k < 500; left -= weight) {
      weight *= (p * k) / (k + 1);
      k++;
    }
    count += k;
  }
  return count;
}

describe('enoughToSee', () => {
  it('asks some 23 breaks a week for a doubling, four times in five', () => {
    const { events, exposure } = enough(2.5 / 1e5);
    // ((1.959964 + .841621) ÷ (√2 − 1))² ÷ 2
    expect(events).toBeCloseTo(22.8733, 4);
    expect(exposure).toBeCloseTo(events * 40_000, 6);
  });

  it('asks for more where shifts differ more, and where more looms are judged', () => {
    expect(enough(1, 3).events).toBeCloseTo(3 * enough(1).events, 10);
    expect(enough(1, 1, { comparisons: 24 }).events).toBeCloseTo(
      enough(1, 1, { level: 0.05 / 24 }).events,
      10,
    );
    expect(enough(1, 1, { comparisons: 24 }).events).toBeGreaterThan(enough(1).events);
  });

  for (const dispersion of [1, 2, 4]) {
    it(`is enough: simulated power at dispersion ${dispersion}`, () => {
      const { events } = enough(1, dispersion);
      const random = seeded(41 + dispersion);
      let found = 0;
      const weeks = 4000;
      for (let week = 0; week < weeks; week++) {
        const before = { count: draw(events, dispersion, random), exposure: 1 };
        const after = { count: draw(2 * events, dispersion, random), exposure: 1 };
        const { p } = compareWithDispersion(before, after, { dispersion, degrees: 900 }) as QuasiComparison;
        if (p <= 0.05) found++;
      }
      expect(found / weeks).toBeGreaterThan(0.77);
      expect(found / weeks).toBeLessThan(0.83);
    });
  }

  it('asks for less the greater the change, the weaker the power and the looser the level', () => {
    fc.assert(
      fc.property(fc.double({ min: 1.1, max: 5, noNaN: true }), (ratio) => {
        const { events } = enough(1, 1, { ratio });
        expect(enough(1, 1, { ratio: ratio * 1.1 }).events).toBeLessThan(events);
        expect(enough(1, 1, { ratio, power: 0.7 }).events).toBeLessThan(events);
        expect(enough(1, 1, { ratio, level: 0.1 }).events).toBeLessThan(events);
      }),
    );
  });

  it('has no figure without events, nor from impossible input', () => {
    expect(enoughToSee(0)).toEqual({ none: 'no-events' });
    expect(enoughToSee(NaN)).toEqual({ none: 'missing-input' });
    expect(enoughToSee(1, NaN)).toEqual({ none: 'missing-input' });
    expect(enoughToSee(1, 1, { ratio: NaN })).toEqual({ none: 'missing-input' });
    expect(enoughToSee(-1)).toEqual({ none: 'out-of-range' });
    expect(enoughToSee(Infinity)).toEqual({ none: 'out-of-range' });
    for (const dispersion of [0.5, Infinity])
      expect(enoughToSee(1, dispersion)).toEqual({ none: 'out-of-range' });
    for (const aim of [
      { ratio: 1 },
      { ratio: 0 },
      { ratio: Infinity },
      { power: 0.5 },
      { power: 1 },
      { level: 0 },
      { comparisons: 0 },
      { comparisons: Infinity },
    ]) {
      expect(enoughToSee(1, 1, aim)).toEqual({ none: 'out-of-range' });
    }
  });
});
