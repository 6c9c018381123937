import { describe, expect, it } from 'vitest';
import { uChart } from '../../shared/chance/control-charts.js';
import { runRules } from '../../shared/chance/run-rules.js';
import { expectClose, given } from './close-to.js';

// SAS/QC User's Guide, data set 'Fabric3': defects in 20 rolls of fabric, 30 units each.
const ROLLS = [6, 9, 14, 17, 3, 8, 9, 2, 14, 1, 3, 5, 6, 9, 10, 12, 11, 4, 9, 4];

describe("SAS/QC 'Fabric3', u chart of equal rolls", () => {
  const chart = given(uChart(ROLLS.map((count) => ({ count, exposure: 30 }))));

  it('has limits 0 and .53928480 and roll 4 out', () => {
    const points = chart.points.map(given);
    expectClose(points[0].high, 0.5392848);
    expect(points[0].low).toBe(0);
    expect(points.flatMap((point, at) => (point.out ? [at + 1] : []))).toEqual([4]);
  });

  it('has six rising in a row that end at roll 15', () => {
    const runs = given(runRules(ROLLS, chart.centre * 30, Math.sqrt(chart.centre * 30)));
    const first = runs.find((run) => run.rule === '6-in-a-row');
    expect(first).toEqual({ rule: '6-in-a-row', side: 'rising', from: 9, to: 14 });
  });
});
