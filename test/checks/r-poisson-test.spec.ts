import { describe, expect, it } from 'vitest';
import { compareTwoRates } from '../../shared/chance/two-rates.js';
import { expectClose, given } from './close-to.js';

// R 4.2.2 poisson.test(x, t): the first is R's own help example (breast cancer, x-ray fluoroscopy).
const CASES = [
  {
    x: [11, 21],
    t: [800, 3011],
    ratio: 1.9714880952381,
    p: 0.0796686330333295,
    pLess: 0.975931823227312,
    pGreater: 0.0560086597876997,
    ci95: [0.858426403391639, 4.27726594365407],
  },
  {
    x: [10, 20],
    t: [100000, 100000],
    ratio: 0.5,
    p: 0.0987371467053889,
    pLess: 0.0493685733526945,
    pGreater: 0.978613027371466,
    ci95: [0.209005965023833, 1.1191830442442],
  },
  {
    x: [0, 5],
    t: [100000, 100000],
    ratio: 0,
    p: 0.0625,
    pLess: 0.03125,
    pGreater: 1,
    ci95: [0, 1.09127910518255],
  },
  {
    x: [5, 0],
    t: [100000, 100000],
    ratio: null,
    p: 0.0625,
    pLess: 1,
    pGreater: 0.03125,
    ci95: [0.91635585731546, null],
  },
  {
    x: [3, 12],
    t: [74250, 187500],
    ratio: 0.631313131313131,
    p: 0.578543914035907,
    pLess: 0.346640851314344,
    pGreater: 0.842949259374674,
    ci95: [0.114325413145133, 2.33933887302451],
  },
] as const;

describe('R poisson.test: exact comparison of two rates', () => {
  for (const { x, t, ratio, p, pLess, pGreater, ci95 } of CASES) {
    it(`${x[0]} in ${t[0]} against ${x[1]} in ${t[1]}`, () => {
      const compared = given(
        compareTwoRates({ count: x[0], exposure: t[0] }, { count: x[1], exposure: t[1] }),
      );
      expectClose(compared.p, p);
      expectClose(compared.pLess, pLess);
      expectClose(compared.pGreater, pGreater);
      expectClose(compared.low, ci95[0]);
      if (ratio === null) expect(compared.ratio).toEqual({ none: 'no-events' });
      else expectClose(compared.ratio, ratio);
      if (ci95[1] === null) expect(compared.high).toEqual({ none: 'no-limit' });
      else expectClose(compared.high, ci95[1]);
    });
  }

  it('nothing on either side: p 1, no ratio', () => {
    const compared = given(compareTwoRates({ count: 0, exposure: 1e5 }, { count: 0, exposure: 1e5 }));
    expect(compared).toMatchObject({
      p: 1,
      ratio: { none: 'no-events' },
      low: 0,
      high: { none: 'no-limit' },
    });
  });
});
