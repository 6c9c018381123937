import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  cChart,
  laneyChart,
  laneySigmaZ,
  meanMovingRange,
  pearsonWidening,
  sideOut,
  uChart,
  type ChartPoint,
  type CountChart,
} from './control-charts.js';

const u = (...args: Parameters<typeof uChart>) => uChart(...args) as CountChart;
const point = (chart: CountChart, at: number) => chart.points[at] as ChartPoint;

describe('sideOut', () => {
  it('lets a point lie on its limit, also by the last bits of a division', () => {
    expect(sideOut(28, 4, 28)).toBeNull();
    expect(sideOut(4, 4, 28)).toBeNull();
    expect(sideOut(0.1 + 0.2, 0, 0.3)).toBeNull();
    expect(sideOut(28.001, 4, 28)).toBe('above');
    expect(sideOut(3.999, 4, 28)).toBe('below');
  });
});

describe('uChart', () => {
  const counted = [
    { count: 4, exposure: 1 },
    { count: 12, exposure: 3 },
    { count: 0, exposure: 0 },
    { count: 20, exposure: 5 },
  ];

  it('gives each point its own limits, wider where less was woven', () => {
    const chart = u(counted);
    expect(chart).toMatchObject({ centre: 4, widening: 1 });
    expect(point(chart, 0)).toEqual({ value: 4, low: 0, high: 10, out: null });
    expect(point(chart, 3).low).toBeCloseTo(4 - 6 / Math.sqrt(5), 12);
    expect(point(chart, 3).high).toBeCloseTo(4 + 6 / Math.sqrt(5), 12);
    expect(chart.points[2]).toEqual({ none: 'no-exposure' });
  });

  it('is widened as asked', () => {
    expect(point(u(counted, 2), 0).high).toBe(16);
  });

  it('names points above and below', () => {
    const chart = u([
      { count: 100, exposure: 10 },
      { count: 10, exposure: 10 },
      { count: 55, exposure: 10 },
    ]);
    expect(chart.points.map((one) => (one as ChartPoint).out)).toEqual(['above', 'below', null]);
  });

  it('puts nothing out where nothing was counted', () => {
    const chart = u([
      { count: 0, exposure: 10 },
      { count: 0, exposure: 20 },
    ]);
    expect(chart.centre).toBe(0);
    expect(point(chart, 1)).toEqual({ value: 0, low: 0, high: 0, out: null });
  });

  it('leaves stops of looms that did not weave out of the centre', () => {
    expect(u([...counted, { count: 50, exposure: 0 }]).centre).toBe(4);
  });

  it('has no figure without exposure, nor from impossible input', () => {
    expect(uChart([])).toEqual({ none: 'no-exposure' });
    expect(uChart([{ count: 0, exposure: 0 }])).toEqual({ none: 'no-exposure' });
    expect(uChart([{ count: NaN, exposure: 1 }])).toEqual({ none: 'missing-input' });
    expect(uChart([{ count: 1.5, exposure: 1 }])).toEqual({ none: 'out-of-range' });
    expect(uChart(counted, NaN)).toEqual({ none: 'missing-input' });
    expect(uChart(counted, -1)).toEqual({ none: 'out-of-range' });
    expect(uChart(counted, Infinity)).toEqual({ none: 'out-of-range' });
  });

  it('always holds the centre between its limits', () => {
    const shift = fc.record({
      count: fc.integer({ min: 0, max: 90 }),
      exposure: fc.integer({ min: 1, max: 9 }),
    });
    fc.assert(
      fc.property(fc.array(shift, { minLength: 1, maxLength: 20 }), (many) => {
        const chart = u(many);
        for (const one of chart.points as readonly ChartPoint[]) {
          expect(one.low).toBeLessThanOrEqual(chart.centre);
          expect(one.high).toBeGreaterThanOrEqual(chart.centre);
          expect(one.low).toBeGreaterThanOrEqual(0);
        }
      }),
    );
  });
});

describe('cChart', () => {
  it('is a u chart of equal lengths', () => {
    expect(cChart([9, 9, 9])).toMatchObject({ centre: 9, points: [{ low: 0, high: 18 }, {}, {}] });
  });

  it('has no figure from nothing or from what is no count', () => {
    expect(cChart([])).toEqual({ none: 'missing-input' });
    expect(cChart([1, -1])).toEqual({ none: 'out-of-range' });
  });
});

describe('pearsonWidening', () => {
  const of = (...counts: number[]) => pearsonWidening(counts.map((count) => ({ count, exposure: 10 })));

  it('is the root of X² ÷ degrees, never below 1', () => {
    // about 20: (100 + 0 + 100) ÷ 20 = 10 on 2 degrees
    expect(of(10, 20, 30)).toBeCloseTo(Math.sqrt(5), 12);
    expect(of(20, 20, 21)).toBe(1);
    expect(of(0, 0)).toBe(1);
  });

  it('has no figure from fewer than two looms, nor from impossible input', () => {
    expect(of(5)).toEqual({ none: 'no-exposure' });
    expect(of()).toEqual({ none: 'no-exposure' });
    expect(
      pearsonWidening([
        { count: 5, exposure: 10 },
        { count: 0, exposure: 0 },
      ]),
    ).toEqual({ none: 'no-exposure' });
    expect(of(-5, 1)).toEqual({ none: 'out-of-range' });
  });
});

describe('laneyChart', () => {
  const of = (...counts: number[]) => counts.map((count) => ({ count, exposure: 4 }));

  it('takes the spread between neighbours, not a drift', () => {
    const drift = laneySigmaZ(of(10, 20, 30, 40)) as number;
    // z steps are 10 ÷ √25 = 2
    expect(drift).toBeCloseTo(2 / 1.128, 12);
    expect(laneySigmaZ(of(10, 40, 20, 30)) as number).toBeGreaterThan(drift);
    const chart = laneyChart(of(10, 20, 30, 40)) as CountChart;
    expect(chart.widening).toBe(drift);
    expect((chart.points[0] as ChartPoint).high).toBeCloseTo(6.25 + 3 * drift * Math.sqrt(6.25 / 4), 12);
  });

  it('passes over shifts without picks', () => {
    const [first, ...rest] = of(10, 20, 30, 40);
    const chart = laneyChart([first, { count: 0, exposure: 0 }, ...rest]) as CountChart;
    expect(chart.widening).toBeCloseTo(2 / 1.128, 12);
    expect(chart.points[1]).toEqual({ none: 'no-exposure' });
  });

  it('has no figure from fewer than two shifts, from no events, nor from impossible input', () => {
    expect(laneyChart(of(5))).toEqual({ none: 'no-exposure' });
    expect(laneyChart([])).toEqual({ none: 'no-exposure' });
    expect(laneyChart(of(0, 0, 0))).toEqual({ none: 'no-events' });
    expect(laneyChart(of(1, NaN))).toEqual({ none: 'missing-input' });
  });
});

describe('meanMovingRange', () => {
  it('is the mean step between neighbours', () => {
    expect(meanMovingRange([1, 4, 2])).toBe(2.5);
  });
});
