import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { noFigure } from '../figures/no-figure.js';
import { momentAfter, picksLeft, warpOut, type BeamLeft, type WarpOut } from './warp-out.js';

const HOUR = 3_600_000;
/** Days of two eight-hour shifts, 06:00 and 14:00, from day 0 on. */
const CALENDAR = Array.from({ length: 14 }, (_, at) => {
  const start = (Math.floor(at / 2) * 24 + 6 + (at % 2) * 8) * HOUR;
  return { start, end: start + 8 * HOUR };
});
const at = (day: number, hour: number) => (day * 24 + hour) * HOUR;

describe('picksLeft', () => {
  const beam: BeamLeft = { left: 108, thrum: 2, crimp: 0.06, picksPerCm: 20 };

  it('are (beam left − thrum) ÷ (1 + crimp) · picks per cm · 100', () => {
    expect(picksLeft(beam)).toBeCloseTo(200_000, 6);
    expect(picksLeft({ ...beam, left: 1 })).toBe(0);
    expect(picksLeft({ ...beam, left: -3 })).toBe(0);
  });

  it('have no figure from a missing or impossible input', () => {
    expect(picksLeft({ ...beam, picksPerCm: 0 })).toEqual(noFigure('no-cloth'));
    expect(picksLeft({ ...beam, left: NaN })).toEqual(noFigure('missing-input'));
    for (const bad of [{ thrum: -1 }, { crimp: -0.1 }, { picksPerCm: -1 }, { left: Infinity }]) {
      expect(picksLeft({ ...beam, ...bad })).toEqual(noFigure('out-of-range'));
    }
  });
});

describe('momentAfter', () => {
  it('weaves only in shifts', () => {
    expect(momentAfter(0, at(0, 3), CALENDAR)).toBe(at(0, 3));
    expect(momentAfter(1, at(0, 3), CALENDAR)).toBe(at(0, 7));
    expect(momentAfter(8, at(0, 6), CALENDAR)).toBe(at(0, 14));
    expect(momentAfter(16, at(0, 6), CALENDAR)).toBe(at(0, 22));
    expect(momentAfter(17, at(0, 6), CALENDAR)).toBe(at(1, 7));
    expect(momentAfter(4, at(0, 20), CALENDAR)).toBe(at(1, 8));
  });

  it('passes over what is before now', () => {
    expect(momentAfter(1, at(3, 10), CALENDAR)).toBe(at(3, 11));
    expect(momentAfter(1, at(0, 22), CALENDAR)).toBe(at(1, 7));
  });

  it('spreads a meal with looms stopped over its shift', () => {
    const meal = [{ start: at(0, 6), end: at(0, 14), hours: 7 }, ...CALENDAR.slice(1)];
    expect(momentAfter(3.5, at(0, 6), meal)).toBe(at(0, 10));
    expect(momentAfter(7, at(0, 6), meal)).toBe(at(0, 14));
    expect(momentAfter(8, at(0, 6), meal)).toBe(at(0, 15));
    expect(momentAfter(1, at(0, 6), [{ ...meal[0], hours: 0 }, ...meal.slice(1)])).toBe(at(0, 15));
  });

  it('says where the calendar does not reach', () => {
    expect(momentAfter(8 * 14, at(0, 0), CALENDAR)).toBe(at(6, 22));
    expect(momentAfter(8 * 14 + 0.1, at(0, 0), CALENDAR)).toEqual(noFigure('beyond-calendar'));
    expect(momentAfter(1, at(0, 0), [])).toEqual(noFigure('beyond-calendar'));
  });
});

describe('warpOut', () => {
  const recent = [
    { picks: 70_000, hours: 8 },
    { picks: 90_000, hours: 8 },
    { picks: 80_000, hours: 8 },
    { picks: 80_000, hours: 8 },
  ];
  const out = (...args: Parameters<typeof warpOut>) => warpOut(...args) as WarpOut;

  it('expects the moment by the ratio of sums over the shifts of the calendar', () => {
    const { picksPerHour, hours, expected } = out(200_000, recent, at(0, 6), CALENDAR);
    expect(picksPerHour).toBe(10_000);
    expect(hours).toBe(20);
    expect(expected).toBe(at(1, 10));
    const uneven = [
      { picks: 10_000, hours: 4 },
      { picks: 50_000, hours: 8 },
    ];
    expect(out(60_000, uneven, at(0, 6), CALENDAR).picksPerHour).toBe(5000);
  });

  it('has a range by the spread of recent shifts', () => {
    const { earliest, latest } = out(200_000, recent, at(0, 6), CALENDAR);
    // σ² = (10,000² + 10,000²) ÷ 8 ÷ 3 a shift hour; t(.9; 3) = 1.637744354; the two roots of
    // (200,000 − 10,000 h)² = (tσ)²·(h + h² ÷ 32)
    const square = (1.637744354 ** 2 * 2e8) / 24;
    const within = (h: number) => (200_000 - 10_000 * h) ** 2 / (square * (h + h ** 2 / 32));
    const hoursOf = (moment: number) => (moment - at(0, 6)) / HOUR - (moment > at(1, 0) ? 8 : 0);
    expect(within(hoursOf(earliest as number))).toBeCloseTo(1, 6);
    expect(within(hoursOf(latest as number))).toBeCloseTo(1, 6);
    expect(earliest).toBeLessThan(at(1, 10));
    expect(latest).toBeGreaterThan(at(1, 10));
  });

  it('has no range from one shift, nor a width where all were alike', () => {
    expect(out(200_000, recent.slice(2, 3), at(0, 6), CALENDAR)).toMatchObject({
      expected: at(1, 10),
      earliest: noFigure('missing-input'),
      latest: noFigure('missing-input'),
    });
    expect(out(200_000, recent.slice(2), at(0, 6), CALENDAR)).toMatchObject({
      earliest: at(1, 10),
      latest: at(1, 10),
    });
  });

  it('is now where nothing is left', () => {
    expect(out(0, recent, at(0, 7), CALENDAR)).toMatchObject({
      expected: at(0, 7),
      earliest: at(0, 7),
      latest: at(0, 7),
    });
  });

  it('says that there may be no end, or that the calendar is too short', () => {
    const wild = [
      { picks: 160_000, hours: 8 },
      { picks: 0, hours: 8 },
    ];
    expect(out(200_000, wild, at(0, 6), CALENDAR).latest).toEqual(noFigure('no-limit'));
    expect(out(200_000, wild, at(0, 6), CALENDAR).earliest).toBeLessThan(at(1, 10));
    expect(out(2_000_000, recent, at(0, 6), CALENDAR).expected).toEqual(noFigure('beyond-calendar'));
  });

  it('leaves out shifts without hours', () => {
    const more = [...recent, { picks: 0, hours: 0 }];
    expect(out(200_000, more, at(0, 6), CALENDAR)).toEqual(out(200_000, recent, at(0, 6), CALENDAR));
  });

  it('has no figure where nothing was woven, nor from impossible input', () => {
    const refused = (...args: Parameters<typeof warpOut>) => warpOut(...args);
    expect(refused(1, [{ picks: 0, hours: 8 }], 0, CALENDAR)).toEqual(noFigure('no-picks'));
    expect(refused(1, [], 0, CALENDAR)).toEqual(noFigure('no-time'));
    expect(refused(NaN, recent, 0, CALENDAR)).toEqual(noFigure('missing-input'));
    expect(refused(1, [{ picks: NaN, hours: 8 }], 0, CALENDAR)).toEqual(noFigure('missing-input'));
    expect(refused(-1, recent, 0, CALENDAR)).toEqual(noFigure('out-of-range'));
    expect(refused(1, recent, Infinity, CALENDAR)).toEqual(noFigure('out-of-range'));
    for (const level of [0, 1])
      expect(refused(1, recent, 0, CALENDAR, level)).toEqual(noFigure('out-of-range'));
    for (const bad of [
      { picks: -1, hours: 8 },
      { picks: 1, hours: -8 },
    ]) {
      expect(refused(1, [bad], 0, CALENDAR)).toEqual(noFigure('out-of-range'));
    }
    for (const bad of [
      { start: 5, end: 5 },
      { start: 0, end: Infinity },
      { start: 0, end: HOUR, hours: 2 },
      { start: 0, end: HOUR, hours: -1 },
    ]) {
      expect(refused(1, recent, 0, [bad])).toEqual(noFigure('out-of-range'));
    }
  });

  it('holds the expected moment in its range, wider at a higher level', () => {
    const shift = fc.record({
      picks: fc.integer({ min: 1, max: 1e5 }),
      hours: fc.integer({ min: 1, max: 12 }),
    });
    const long = [{ start: 0, end: 1e9 * HOUR }];
    fc.assert(
      fc.property(
        fc.array(shift, { minLength: 2, maxLength: 9 }),
        fc.integer({ min: 1, max: 1e6 }),
        (some, picks) => {
          const usual = out(picks, some, 0, long);
          const surer = out(picks, some, 0, long, 0.95);
          const expected = (usual.expected as number) * (1 + 1e-9);
          expect(usual.earliest).toBeLessThanOrEqual(expected);
          expect(surer.earliest).toBeLessThanOrEqual((usual.earliest as number) * (1 + 1e-9));
          if (typeof usual.latest === 'number') {
            expect(usual.latest * (1 + 1e-9)).toBeGreaterThanOrEqual(usual.expected as number);
          }
        },
      ),
    );
  });
});
