import { describe, expect, it } from 'vitest';
import { noFigure } from '../figures/no-figure.js';
import { toFetch, weftAhead, type WeftNeed, type WeftPlan } from './weft-ahead.js';

const PLAN: WeftPlan = {
  cloth: 'sheeting',
  weft: 'grey',
  picks: 80_000,
  reedWidthCm: 125,
  waste: 0.02,
  tex: 25,
  pernMassG: 28,
};
const needs = (plans: readonly WeftPlan[]) => weftAhead(plans) as readonly WeftNeed[];

describe('weftAhead', () => {
  it('reckons metres, kilograms and perns', () => {
    const [need] = needs([PLAN]);
    expect(need).toMatchObject({ cloth: 'sheeting', weft: 'grey' });
    expect(need.metres).toBeCloseTo(102_000, 8);
    expect(need.kilograms).toBeCloseTo(2.55, 12);
    expect(need.perns).toBeCloseTo(2550 / 28, 10);
    expect(need.baskets).toBeCloseTo(2550 / 28 / 144, 12);
    expect(need).toMatchObject({ wholeBaskets: 0, oddPerns: 92 });
  });

  it('adds looms of one cloth and weft before it rounds, and keeps others apart', () => {
    const all = needs([PLAN, { ...PLAN, weft: 'blue' }, PLAN, { ...PLAN, cloth: 'drill' }]);
    expect(all.map((need) => [need.cloth, need.weft])).toEqual([
      ['sheeting', 'grey'],
      ['sheeting', 'blue'],
      ['drill', 'grey'],
    ]);
    expect(all[0].metres).toBeCloseTo(204_000, 8);
    expect(all[0].kilograms).toBeCloseTo(5.1, 12);
    expect(all[0]).toMatchObject({ wholeBaskets: 1, oddPerns: 183 - 144 });
  });

  it('divides the picks between several wefts', () => {
    const [ground, figure] = needs([
      { ...PLAN, share: 0.75 },
      { ...PLAN, weft: 'blue', share: 0.25, tex: 50 },
    ]);
    expect(ground.kilograms).toBeCloseTo(0.75 * 2.55, 12);
    expect(figure.kilograms).toBeCloseTo(0.5 * 2.55, 12);
    expect(ground.metres + figure.metres).toBeCloseTo(102_000, 8);
  });

  it('needs nothing for no picks and for no plans', () => {
    expect(needs([])).toEqual([]);
    expect(needs([{ ...PLAN, picks: 0 }])[0]).toMatchObject({
      metres: 0,
      perns: 0,
      wholeBaskets: 0,
      oddPerns: 0,
    });
  });

  it('has no figure from a missing or impossible input', () => {
    for (const bad of [{ picks: NaN }, { share: NaN }, { waste: NaN }, { tex: NaN }, { pernMassG: NaN }]) {
      expect(weftAhead([PLAN, { ...PLAN, ...bad }])).toEqual(noFigure('missing-input'));
    }
    for (const bad of [
      { picks: -1 },
      { picks: Infinity },
      { share: 1.01 },
      { share: -0.1 },
      { reedWidthCm: 0 },
      { waste: -0.1 },
      { tex: 0 },
      { pernMassG: 0 },
    ]) {
      expect(weftAhead([{ ...PLAN, ...bad }])).toEqual(noFigure('out-of-range'));
    }
  });
});

describe('toFetch', () => {
  it('rounds up to whole perns, but not for rounding alone', () => {
    expect(toFetch(144)).toEqual({ baskets: 1, wholeBaskets: 1, oddPerns: 0 });
    expect(toFetch(287.2)).toMatchObject({ wholeBaskets: 2, oddPerns: 0 });
    expect(toFetch(288.5)).toMatchObject({ wholeBaskets: 2, oddPerns: 1 });
    expect(toFetch(3 * (0.1 + 0.2) * 10)).toMatchObject({ oddPerns: 9 });
    expect(toFetch(0.2)).toMatchObject({ wholeBaskets: 0, oddPerns: 1 });
  });
});
