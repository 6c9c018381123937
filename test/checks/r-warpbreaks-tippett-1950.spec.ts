import { describe, expect, it } from 'vitest';
import { cChart } from '../../shared/chance/control-charts.js';
import { chiSquareUpperTail } from '../../shared/chance/distributions.js';
import { dispersionBetweenShifts, pearsonStatistic } from '../../shared/chance/over-dispersion.js';
import { expectClose, given } from './close-to.js';
import { ALL_WARPBREAKS, WARPBREAKS } from './warpbreaks.js';

// R 4.2.2 on datasets::warpbreaks; L. H. C. Tippett, Technological Applications of Statistics, 1950, p. 106.
const one = (count: number) => ({ count, exposure: 1 });

describe("Tippett's warp breaks", () => {
  it('add up by wool and tension, 1520 in all', () => {
    const sums = Object.entries(WARPBREAKS).map(([group, breaks]) => [group, breaks.reduce((a, b) => a + b)]);
    expect(sums).toEqual([
      ['AL', 401],
      ['AM', 216],
      ['AH', 221],
      ['BL', 254],
      ['BM', 259],
      ['BH', 169],
    ]);
    expect(ALL_WARPBREAKS.reduce((a, b) => a + b)).toBe(1520);
  });

  it('have an index of dispersion of 328.00789 on 53 degrees, p 2.688782e-41', () => {
    const found = given(dispersionBetweenShifts([ALL_WARPBREAKS.map(one)]));
    expectClose(found.pearson, 328.00789, 2e-8);
    expect(found.degrees).toBe(53);
    expectClose(found.p, 2.688782e-41, 2e-7);
    expect(found.p).toBe(chiSquareUpperTail(found.pearson, 53));
    expectClose(found.dispersion, 328.00789 / 53, 2e-8);
  });

  it('on a c chart have mean 28.148148, limits 12.2317 and 44.0646 and seven rows out', () => {
    const chart = given(cChart(ALL_WARPBREAKS));
    expectClose(chart.centre, 28.148148, 1e-8);
    expectClose(given(chart.points[0]).low, 12.2317, 1e-7);
    expectClose(given(chart.points[0]).high, 44.064597, 1e-8);
    const out = chart.points.flatMap((point, at) => (given(point).out ? [at + 1] : []));
    expect(out).toEqual([3, 5, 6, 7, 9, 14, 23]);
  });

  // R's dispersion of wool + tension, 4.261522 on 50 degrees, has fitted means of an additive model. The
  // project pools within groups instead, 48 degrees: the two agree where R fits wool × tension. Here the
  // additive fitted means, found by iterative proportional fitting, are taken as exposures of rate 1.
  it('have a dispersion of 4.261522 about the means of wool + tension', () => {
    const fitted = additiveMeans();
    const expected = Object.entries(WARPBREAKS).flatMap(([group, breaks]) =>
      breaks.map((count) => ({ count, exposure: fitted.get(group) ?? 0 })),
    );
    expectClose(pearsonStatistic(expected) / 50, 4.261522, 1e-7);
    expectClose(devianceOf(expected), 210.39189, 1e-8);
  });
});

function devianceOf(expected: readonly { count: number; exposure: number }[]): number {
  return 2 * expected.reduce((sum, { count, exposure }) => sum + count * Math.log(count / exposure), 0);
}

/** Fitted means of a loom by wool + tension: the margins of the table are kept. */
function additiveMeans(): Map<string, number> {
  const groups = Object.entries(WARPBREAKS);
  const seen = new Map(groups.map(([group, breaks]) => [group, breaks.reduce((a, b) => a + b) / 9]));
  const fitted = new Map(groups.map(([group]) => [group, 1]));
  const of = (means: Map<string, number>, letter: string) =>
    [...means].filter(([group]) => group.includes(letter)).reduce((sum, [, mean]) => sum + mean, 0);
  for (let round = 0; round < 50; round++) {
    for (const letter of ['A', 'B', 'L', 'M', 'H']) {
      const scale = of(seen, letter) / of(fitted, letter);
      for (const [group, mean] of fitted) if (group.includes(letter)) fitted.set(group, mean * scale);
    }
  }
  return fitted;
}
