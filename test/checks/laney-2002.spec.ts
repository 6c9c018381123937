import { describe, expect, it } from 'vitest';
import { laneyChart } from '../../shared/chance/control-charts.js';
import { expectClose, given } from './close-to.js';
import { ALL_WARPBREAKS } from './warpbreaks.js';

// D. B. Laney, Improved control charts for attributes, Quality Engineering 14 (2002); evaluated with R 4.2.2.
describe("Laney's u′ chart on Tippett's warp breaks", () => {
  const chart = given(laneyChart(ALL_WARPBREAKS.map((count) => ({ count, exposure: 1 }))));

  it('has σz 2.0304 and limits 0 and 60.4645', () => {
    expectClose(chart.centre, 28.1481481481);
    expectClose(chart.widening, 2.03037372245);
    expectClose(given(chart.points[0]).high, 60.4644869679);
    expect(given(chart.points[0]).low).toBe(0);
  });

  it('puts rows 5 and 9 out', () => {
    expect(chart.points.flatMap((point, at) => (given(point).out ? [at + 1] : []))).toEqual([5, 9]);
  });
});
