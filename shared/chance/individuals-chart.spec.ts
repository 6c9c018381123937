import { describe, expect, it } from 'vitest';
import { individualsChart, type IndividualsChart } from './individuals-chart.js';

describe('individualsChart', () => {
  it('takes its limits from the steps between neighbours', () => {
    const chart = individualsChart([10, 12, 10, 12, 10, 12, 30]) as IndividualsChart;
    expect(chart.mean).toBeCloseTo(96 / 7, 12);
    expect(chart.meanRange).toBeCloseTo(28 / 6, 12);
    expect(chart.sigma).toBeCloseTo(28 / 6 / 1.128, 12);
    expect(chart.rangeHigh).toBeCloseTo((3.267 * 28) / 6, 12);
    expect(chart.points[0].low).toBeCloseTo(chart.mean - 3 * chart.sigma, 12);
    expect(chart.points[0].high).toBeCloseTo(chart.mean + 3 * chart.sigma, 12);
    expect(chart.points.map((one) => one.out)).toEqual([null, null, null, null, null, null, 'above']);
    expect(chart.ranges.map((one) => one.value)).toEqual([2, 2, 2, 2, 2, 18]);
    expect(chart.ranges[5]).toMatchObject({ low: 0, high: chart.rangeHigh, out: 'above' });
    expect(chart.ranges[0].out).toBeNull();
  });

  it('puts a point below', () => {
    const chart = individualsChart([0.8, 0.81, 0.8, 0.81, 0.8, 0.81, 0.7]) as IndividualsChart;
    expect(chart.points[6].out).toBe('below');
  });

  it('has no figure from fewer than two values, nor from impossible input', () => {
    expect(individualsChart([])).toEqual({ none: 'missing-input' });
    expect(individualsChart([1])).toEqual({ none: 'missing-input' });
    expect(individualsChart([1, NaN])).toEqual({ none: 'missing-input' });
    expect(individualsChart([1, Infinity])).toEqual({ none: 'out-of-range' });
    expect(individualsChart([5, 5])).toMatchObject({
      mean: 5,
      sigma: 0,
      points: [{ out: null }, { out: null }],
    });
  });
});
