import { describe, expect, it } from 'vitest';
import type { CauseGroup } from '../contract/reference.js';
import { overlapMs, standingTime, standsAs, without, type Standing } from './standing-time.js';

type Stop = Parameters<typeof standingTime>[0][number];

function stop(id: string, group: CauseGroup, from: number, until: number | null, shedWide = false): Stop {
  return { id, from, shedWide, phases: [{ cause: `${group}-cause`, group, from, until }] };
}
const WINDOW = { from: 0, until: 100 };
const spans = (stops: readonly Stop[], window = WINDOW) =>
  standingTime(stops, window).map((one: Standing) => [one.from, one.until, one.cause, one.as]);

describe('standingTime', () => {
  it('is the union of intervals, clipped to the window', () => {
    expect(
      spans([
        stop('a', 'loom', -10, 20),
        stop('b', 'warp', 50, 60),
        stop('c', 'weft', 90, 120),
        stop('d', 'loom', 30, 30),
      ]),
    ).toEqual([
      [0, 20, 'loom-cause', 'own'],
      [50, 60, 'warp-cause', 'own'],
      [90, 100, 'weft-cause', 'own'],
    ]);
  });

  it('is empty for stops outside the window, and for none', () => {
    expect(spans([stop('a', 'loom', -10, 0), stop('b', 'loom', 100, 110)])).toEqual([]);
    expect(spans([])).toEqual([]);
  });

  it('takes a stop that still stands to stand until the window ends', () => {
    expect(spans([stop('a', 'loom', 40, null)])).toEqual([[40, 100, 'loom-cause', 'own']]);
  });

  it('lets the stop that began first keep the time where two overlap', () => {
    const stops = [stop('a', 'warp', 10, 30), stop('b', 'loom', 20, 50)];
    const expected = [
      [10, 30, 'warp-cause', 'own'],
      [30, 50, 'loom-cause', 'own'],
    ];
    expect(spans(stops)).toEqual(expected);
    expect(spans([...stops].reverse())).toEqual(expected);
  });

  it('goes by id where two began together', () => {
    const stops = [stop('b', 'loom', 10, 30), stop('a', 'warp', 10, 20)];
    const expected = [
      [10, 20, 'warp-cause', 'own'],
      [20, 30, 'loom-cause', 'own'],
    ];
    expect(spans(stops)).toEqual(expected);
    expect(spans([...stops].reverse())).toEqual(expected);
  });

  it('gives planned stops precedence over all, shed stops over a loom’s own', () => {
    expect(
      spans([
        stop('own', 'loom', 0, 90),
        stop('power', 'shed', 20, 60, true),
        stop('plan', 'planned', 40, 80),
      ]),
    ).toEqual([
      [0, 20, 'loom-cause', 'own'],
      [20, 40, 'shed-cause', 'shed'],
      [40, 80, 'planned-cause', 'planned'],
      [80, 90, 'loom-cause', 'own'],
    ]);
  });

  it('goes through the phases of a stop', () => {
    const phased: Stop = {
      id: 'a',
      from: 10,
      shedWide: false,
      phases: [
        { cause: 'weft-fork', group: 'loom', from: 10, until: 15 },
        { cause: 'wait-tackler', group: 'waiting', from: 15, until: 40 },
        { cause: 'picking', group: 'loom', from: 40, until: null },
      ],
    };
    expect(spans([phased])).toEqual([
      [10, 15, 'weft-fork', 'own'],
      [15, 40, 'wait-tackler', 'own'],
      [40, 100, 'picking', 'own'],
    ]);
  });

  it('is one span where one cause follows itself', () => {
    expect(spans([stop('a', 'loom', 10, 20), stop('b', 'loom', 20, 30)])).toEqual([
      [10, 30, 'loom-cause', 'own'],
    ]);
    expect(spans([stop('a', 'loom', 10, 20), stop('b', 'loom', 20, 30, true)])).toHaveLength(2);
  });
});

describe('standsAs', () => {
  it.each([
    ['planned', false, 'planned'],
    ['planned', true, 'planned'],
    ['shed', false, 'shed'],
    ['loom', true, 'shed'],
    ['loom', false, 'own'],
    ['waiting', false, 'own'],
  ] as const)('%s, shed-wide %s: %s', (group, shedWide, as) => {
    expect(standsAs(group, shedWide)).toBe(as);
  });
});

describe('overlapMs and without', () => {
  it('measures what two spans share', () => {
    expect(overlapMs({ from: 0, until: 10 }, { from: 4, until: 20 })).toBe(6);
    expect(overlapMs({ from: 0, until: 10 }, { from: 10, until: 20 })).toBe(0);
    expect(overlapMs({ from: 0, until: 10 }, { from: 15, until: 20 })).toBe(0);
  });

  it('cuts a hole', () => {
    const span = { from: 0, until: 10 };
    expect(without([span], null)).toEqual([span]);
    expect(without([span], { from: 4, until: 6 })).toEqual([
      { from: 0, until: 4 },
      { from: 6, until: 10 },
    ]);
    expect(without([span], { from: -5, until: 6 })).toEqual([{ from: 6, until: 10 }]);
    expect(without([span], { from: -5, until: 10 })).toEqual([]);
    expect(without([span], { from: 20, until: 30 })).toEqual([span]);
    expect(without([span], { from: -20, until: -10 })).toEqual([span]);
  });
});
