import { describe, expect, it } from 'vitest';
import { cChart } from '../../shared/chance/control-charts.js';
import { given } from './close-to.js';

// NIST/SEMATECH e-Handbook of Statistical Methods, 6.3.3.1: defects on 25 wafers.
const WAFERS = [
  16, 14, 28, 16, 12, 20, 10, 12, 10, 17, 19, 17, 14, 16, 15, 13, 14, 16, 11, 20, 11, 19, 16, 31, 13,
];

describe('NIST c chart', () => {
  const chart = given(cChart(WAFERS));

  it('has mean 16 and limits 4 and 28', () => {
    expect(chart.centre).toBe(16);
    expect(chart.points[0]).toMatchObject({ low: 4, high: 28 });
  });

  it('puts wafer 24 out, and not wafer 3, which lies on the limit', () => {
    const out = chart.points.flatMap((point, at) => (given(point).out ? [at + 1] : []));
    expect(out).toEqual([24]);
    expect(chart.points[2]).toMatchObject({ value: 28, high: 28, out: null });
  });
});
