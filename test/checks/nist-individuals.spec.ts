import { describe, expect, it } from 'vitest';
import { individualsChart } from '../../shared/chance/individuals-chart.js';
import { expectClose, given } from './close-to.js';

// NIST/SEMATECH e-Handbook of Statistical Methods, 6.3.2.2: flow rate of ten batches, d2 = 1.128.
const BATCHES = [49.6, 47.6, 49.9, 51.3, 47.8, 51.2, 52.6, 52.4, 53.6, 52.1];

describe('NIST individuals chart', () => {
  it('has mean 50.81, mean moving range 1.8778 and limits 45.8159 and 55.8041', () => {
    const chart = given(individualsChart(BATCHES));
    expectClose(chart.mean, 50.81);
    expectClose(chart.meanRange, 1.87777777778);
    expectClose(chart.points[0].low, 45.81591016548);
    expectClose(chart.points[0].high, 55.80408983452);
    expect(chart.points.every((point) => point.out === null)).toBe(true);
  });
});
