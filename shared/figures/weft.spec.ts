import { describe, expect, it } from 'vitest';
import { noFigure } from './no-figure.js';
import {
  baskets,
  picksPerPern,
  picksPerPernLogged,
  threadOnPern,
  weftPerPick,
  weftUsed,
  type Weft,
} from './weft.js';

const missing = noFigure('missing-input');
const outside = noFigure('out-of-range');
const flax: Weft = { name: 'Flax', tex: 25, share: 1, waste: 0.02, pernMassG: 28 };
const close = (value: number) => expect.closeTo(value, 9) as number;

describe('weft used', () => {
  it('is A · reed width, m · (1 + waste); its mass m · tex / 10⁶ kg', () => {
    expect(weftPerPick(150, 0.02)).toBeCloseTo(1.53, 12);
    expect(weftUsed(100_000, { reedWidthCm: 150, wefts: [flax] })).toEqual([
      { name: 'Flax', metres: close(153_000), kilograms: close(3.825), perns: close(3825 / 28) },
    ]);
  });

  it('of several wefts is by their shares of the picks', () => {
    const wefts = [
      { ...flax, share: 0.75 },
      { name: 'Cotton', tex: 20, share: 0.25, waste: 0, pernMassG: 30 },
    ];
    expect(weftUsed(80_000, { reedWidthCm: 100, wefts })).toEqual([
      { name: 'Flax', metres: close(61_200), kilograms: close(1.53), perns: close(1530 / 28) },
      { name: 'Cotton', metres: close(20_000), kilograms: close(0.4), perns: close(400 / 30) },
    ]);
  });

  it('takes shares that were rounded, and refuses others', () => {
    const thirds = [0.333, 0.333, 0.333].map((share) => ({ ...flax, share }));
    expect(weftUsed(1, { reedWidthCm: 100, wefts: thirds })).toHaveLength(3);
    const half = [{ ...flax, share: 0.5 }];
    expect(weftUsed(1, { reedWidthCm: 100, wefts: half })).toEqual(outside);
    const below = [
      { ...flax, share: 1.5 },
      { ...flax, share: -0.5 },
    ];
    expect(weftUsed(1, { reedWidthCm: 100, wefts: below })).toEqual(outside);
  });

  it('has no figure for what is missing or cannot be', () => {
    expect(weftUsed(1, { reedWidthCm: 100, wefts: [] })).toEqual(noFigure('no-cloth'));
    expect(weftUsed(Number.NaN, { reedWidthCm: 100, wefts: [flax] })).toEqual(missing);
    expect(weftUsed(-1, { reedWidthCm: 100, wefts: [flax] })).toEqual(outside);
    expect(weftUsed(Infinity, { reedWidthCm: 100, wefts: [flax] })).toEqual(outside);
    expect(weftUsed(1, { reedWidthCm: 0, wefts: [flax] })).toEqual(outside);
    expect(weftUsed(1, { reedWidthCm: 100, wefts: [{ ...flax, tex: 0 }] })).toEqual(outside);
    expect(weftPerPick(150, -0.1)).toEqual(outside);
    expect(weftPerPick(Infinity, 0)).toEqual(outside);
    expect(weftPerPick(150, Infinity)).toEqual(outside);
    expect(weftPerPick(Number.NaN, 0)).toEqual(missing);
    expect(weftPerPick(150, Number.NaN)).toEqual(missing);
    expect(weftUsed(1, { reedWidthCm: 100, wefts: [{ ...flax, pernMassG: 0 }] })).toMatchObject([
      { perns: missing },
    ]);
  });
});

describe('a pern', () => {
  it('holds mass, g · 1000 / tex metres', () => {
    expect(threadOnPern(28, 25)).toBe(1_120);
    expect(threadOnPern(0, 25)).toEqual(outside);
    expect(threadOnPern(28, 0)).toEqual(outside);
    expect(threadOnPern(Infinity, 25)).toEqual(outside);
    expect(threadOnPern(28, Infinity)).toEqual(outside);
    expect(threadOnPern(Number.NaN, 25)).toEqual(missing);
    expect(threadOnPern(28, Number.NaN)).toEqual(missing);
  });

  it('lasts for so many picks, by its mass and as logged', () => {
    expect(picksPerPern({ pernMassG: 28, tex: 25, waste: 0 }, 120)).toBeCloseTo(933.3333, 4);
    expect(picksPerPern({ pernMassG: 28, tex: 25, waste: 0.02 }, 120)).toBeCloseTo(1_120 / 1.224, 9);
    expect(picksPerPern({ pernMassG: 0, tex: 25, waste: 0 }, 120)).toEqual(outside);
    expect(picksPerPern({ pernMassG: 28, tex: 25, waste: 0 }, 0)).toEqual(outside);
    expect(picksPerPernLogged(74_250, 80)).toBe(928.125);
    expect(picksPerPernLogged(74_250, 0)).toEqual(noFigure('no-exposure'));
    expect(picksPerPernLogged(-1, 4)).toEqual(outside);
    expect(picksPerPernLogged(1, -4)).toEqual(outside);
    expect(picksPerPernLogged(Number.NaN, 4)).toEqual(missing);
    expect(picksPerPernLogged(1, Number.NaN)).toEqual(missing);
  });

  it('goes by the gross into baskets', () => {
    expect(baskets(300)).toEqual({ whole: 2, odd: 12, exact: 300 / 144 });
    expect(baskets(144)).toEqual({ whole: 1, odd: 0, exact: 1 });
    expect(baskets(0)).toEqual({ whole: 0, odd: 0, exact: 0 });
  });
});
