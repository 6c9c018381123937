import { describe, it } from 'vitest';
import { poissonInterval, ratePer } from '../../shared/chance/poisson-interval.js';
import { expectClose, given } from './close-to.js';

// F. Garwood, Fiducial limits for the Poisson distribution, Biometrika 28 (1936); computed with R 4.2.2 qchisq.
const LIMITS = [
  { x: 0, ci90: [0, 2.99573227355399], ci95: [0, 3.68887945411394], ci99: [0, 5.29831736654804] },
  {
    x: 1,
    ci90: [0.0512932943875505, 4.74386451839058],
    ci95: [0.0253178079842899, 5.5716433909389],
    ci99: [0.00501254182354429, 7.43012950028012],
  },
  {
    x: 3,
    ci90: [0.817691447163953, 7.75365652793273],
    ci95: [0.618672122895602, 8.76727306974232],
    ci99: [0.337863388727733, 10.9774774953298],
  },
  {
    x: 10,
    ci90: [5.42540569709129, 16.9622192357219],
    ci95: [4.79538869613243, 18.3903560420178],
    ci99: [3.71692213146712, 21.3978274996543],
  },
  {
    x: 25,
    ci90: [17.3821258417509, 34.9160801699241],
    ci95: [16.1786818478293, 36.9049316975304],
    ci99: [13.9953744331867, 41.0004128513877],
  },
  {
    x: 100,
    ci90: [84.1392772183142, 118.079272782097],
    ci95: [81.3639912509232, 121.626793792426],
    ci99: [76.1204958436892, 128.760580120102],
  },
];

describe('Garwood 1936: exact interval of a Poisson count', () => {
  for (const { x, ci90, ci95, ci99 } of LIMITS) {
    it(`of ${x}`, () => {
      for (const [level, limits] of [[0.9, ci90] as const, [0.95, ci95] as const, [0.99, ci99] as const]) {
        const { low, high } = given(poissonInterval(x, level));
        expectClose(low, limits[0]);
        expectClose(high, limits[1]);
      }
    });
  }

  // What the limits mean, without any chi-square: at the lower one as many or more are seen in 2.5% of cases, at the
  // higher one as few or fewer. Counts of a shed's weeks go far beyond the printed tables.
  for (const x of [3, 100, 920, 3000]) {
    it(`of ${x}: 2.5% of Poisson counts lie beyond, on either side`, () => {
      const { low, high } = given(poissonInterval(x));
      expectClose(1 - poissonUpTo(x - 1, low), 0.025);
      expectClose(poissonUpTo(x, high), 0.025);
    });
  }

  it('as breaks per 100,000 picks: 3 in 74,250', () => {
    const { rate, low, high } = given(ratePer(3, 74_250, 1e5));
    expectClose(rate, 4.04040404, 1e-8);
    expectClose(low, 0.833228, 1e-6);
    expectClose(high, 11.807775, 1e-7);
  });
});

/** P(X ≤ x), added up from its terms. */
function poissonUpTo(x: number, mean: number): number {
  let log = -mean;
  let sum = Math.exp(log);
  for (let k = 1; k <= x; k++) {
    log += Math.log(mean / k);
    sum += Math.exp(log);
  }
  return sum;
}
