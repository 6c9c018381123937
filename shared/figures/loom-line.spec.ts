import { describe, expect, it } from 'vitest';
import { poissonInterval } from '../chance/poisson-interval.js';
import type { BookEntry } from '../entries/entry.js';
import type { LineInput } from '../entries/projection-input.js';
import { projectLine } from '../entries/projection.js';
import {
  aFitting,
  aClothVersion,
  aLineInput,
  aLoomVersion,
  aShift,
  at,
  entryBuilder,
  uuidV7,
} from '../testing/builders.js';
import { noInterval } from './breaks.js';
import { lineFigures, lineTotals, windowOf } from './loom-line.js';
import { noFigure } from './no-figure.js';

const lineOf = (entries: readonly BookEntry[], changes: Partial<LineInput> = {}) =>
  projectLine(aLineInput({ entries, ...changes }));

/**
 * A shift worked out by hand. 180 ppm, 06:00 to 14:00: 480 min, 86,400 picks possible, 70,200 woven.
 * Planned 07:00–08:00 (60), power 07:30–08:30 (30 after precedence), smash 08:20–08:50 (20 after precedence),
 * 10 weft breaks of 30 s (5), 2 warp breaks of 60 s (2): 117 min stood.
 */
function byHand() {
  const { book } = entryBuilder();
  const read = (minute: number, boundary: 'start' | 'end', value: number) =>
    book('reading', minute, { boundary, value });
  return [
    read(0, 'start', 950_000),
    read(480, 'end', 20_200),
    book('stop', 60, { cause: 'no-order', count: 1, until: at(120) }),
    book('shed-stop', 90, { cause: 'power', scope: { of: 'shed' }, until: at(150) }),
    book('stop', 140, { cause: 'smash', count: 1, until: at(170) }),
    book('stop', 300, { cause: 'weft-break', count: 10 }),
    book('stop', 310, { cause: 'warp-break', count: 2 }),
  ];
}

describe('a shift worked out by hand', () => {
  const line = lineOf(byHand());

  it('adds up', () => {
    expect(lineTotals(line, at(480))).toEqual({
      minutes: 480,
      plannedMinutes: 60,
      shedStopMinutes: 30,
      stopMinutes: 117,
      measuredMinutes: 110,
      estimatedMinutes: 7,
      possiblePicks: 86_400,
      possibleScheduled: 180 * 420,
      possibleLessShed: 180 * 390,
      measuredPicks: 180 * 110,
      estimatedPicks: 180 * 7,
      picks: 70_200,
      weavingMinutes: 390,
      warpBreaks: 3, // a smash is one too
      weftBreaks: 10,
      stops: 15,
      perns: 0,
      pickEnds: 70_200 * 3_120,
      minutesByCause: {
        'no-order': { measured: 60, estimated: 0 },
        power: { measured: 30, estimated: 0 },
        smash: { measured: 20, estimated: 0 },
        'warp-break': { measured: 0, estimated: 2 },
        'weft-break': { measured: 0, estimated: 5 },
      },
    });
  });

  it('has its figures', () => {
    const figures = lineFigures(line, at(480), poissonInterval);
    expect(figures).toMatchObject({
      efficiency: 70_200 / 86_400,
      efficiencyScheduled: 70_200 / 75_600,
      efficiencyLessShed: 1,
      picks: 70_200,
      picksPerHour: 8_775,
      picksPerRunningHour: expect.closeTo(70_200 / (363 / 60), 9) as number,
      lostPicks: 16_200,
      // 90 min lost at the loom's speed, 117 logged: over-logged by 27
      unaccountedMinutes: -27,
      measuredMinutes: 110,
      estimatedMinutes: 7,
      stopMinutes: 117,
      minutes: 480,
      atMost: null,
    });
    expect(figures.weft.rate).toBeCloseTo(1e6 / 70_200, 9);
    expect(figures.weft.low).toBeCloseTo((4.795389 * 1e5) / 70_200, 5);
    expect(figures.weft.high).toBeCloseTo((18.390356 * 1e5) / 70_200, 5);
    expect(figures.warpPer1000Ends).toBeCloseTo((3 * 1e8) / (70_200 * 3_120), 12);
    expect(line.flags).toContainEqual({ code: 'over-logged', value: 27 * 180 });
  });

  it('is the same at any later moment', () => {
    expect(lineTotals(line, at(99_999))).toEqual(lineTotals(line, at(480)));
  });
});

describe('T', () => {
  it('leaves a meal with looms stopped out, stops in it too; a running one counts', () => {
    const { book } = entryBuilder();
    const stop = book('stop', 230, { cause: 'smash', count: 1, until: at(280) });
    const meal = { startsAt: at(240), endsAt: at(270) };
    const stopped = lineOf([stop], { shift: aShift({ meal: { ...meal, looms: 'stopped' } }) });
    expect(lineTotals(stopped, at(480))).toMatchObject({
      minutes: 450,
      measuredMinutes: 20,
      possiblePicks: 180 * 450,
    });
    const running = lineOf([stop], { shift: aShift({ meal: { ...meal, looms: 'running' } }) });
    expect(lineTotals(running, at(480))).toMatchObject({ minutes: 480, measuredMinutes: 50 });
  });

  it('and its stops are those between the readings where one lies off its boundary', () => {
    const { book } = entryBuilder();
    const line = lineOf([
      book('reading', 30, { boundary: 'start', value: 0 }),
      book('reading', 450, { boundary: 'end', value: 60_000 }),
      book('stop', 0, { cause: 'smash', count: 1, until: at(50) }),
      book('stop', 440, { cause: 'boxes', count: 1, until: at(470) }),
    ]);
    expect(windowOf(line)).toEqual({ from: at(30), until: at(450) });
    expect(lineTotals(line, at(480))).toMatchObject({ minutes: 420, measuredMinutes: 30, stops: 1 });
  });

  it('has only the breaks and allowances of its own minutes: taps before and after the readings do not count', () => {
    const { book } = entryBuilder();
    const line = lineOf([
      book('reading', 30, { boundary: 'start', value: 0 }),
      book('reading', 450, { boundary: 'end', value: 50_000 }),
      book('stop', 29, { cause: 'warp-break', count: 1 }),
      book('stop', 30, { cause: 'warp-break', count: 1 }),
      book('stop', 449, { cause: 'weft-break', count: 2 }),
      book('stop', 450, { cause: 'weft-break', count: 4 }),
    ]);
    // 1 warp break at 60 s and 2 weft breaks at 30 s lie between the readings.
    expect(lineTotals(line, at(480))).toMatchObject({ warpBreaks: 1, weftBreaks: 2, estimatedMinutes: 2 });
    expect(lineFigures(line, at(480), noInterval).warp.rate).toBe(2);
  });

  it('is the shift’s of a line without stretches', () => {
    expect(windowOf({ ...lineOf([]), stretches: [] })).toEqual({ from: at(0), until: at(480) });
  });
});

describe('stretches at their own speed', () => {
  const loomVersions = [aLoomVersion(), aLoomVersion({ id: 'v2', effectiveAt: at(240), ppm: 200 })];

  it('make the possible picks, and those that stops cost', () => {
    const { book } = entryBuilder();
    const line = lineOf(
      [
        book('stop', 230, { cause: 'no-order', count: 1, until: at(260) }),
        book('stop', 100, { cause: 'warp-break', count: 1 }),
        book('stop', 300, { cause: 'warp-break', count: 2 }),
        book('shed-stop', 400, { cause: 'power', scope: { of: 'shed' }, until: at(410) }),
      ],
      { loomVersions },
    );
    expect(lineTotals(line, at(480))).toMatchObject({
      possiblePicks: 240 * 180 + 240 * 200,
      possibleScheduled: 230 * 180 + 220 * 200,
      possibleLessShed: 230 * 180 + 210 * 200,
      measuredPicks: 10 * 180 + 20 * 200 + 10 * 200,
      estimatedPicks: 180 + 400,
    });
  });

  it('and what has no moment of its own costs the mean speed', () => {
    const { book } = entryBuilder();
    const line = lineOf([book('count', 480, { cause: 'warp-break', total: 3 })], { loomVersions });
    expect(lineTotals(line, at(480)).estimatedPicks).toBe(3 * 190);
  });

  it('weave their picks in their own minutes', () => {
    const { book } = entryBuilder();
    const entries = [
      book('reading', 0, { boundary: 'start', value: 0 }),
      book('reading', 240, { boundary: 'change', value: 36_000 }),
      book('reading', 480, { boundary: 'end', value: 76_000 }),
    ];
    const line = lineOf(entries, { loomVersions });
    expect(lineTotals(line, at(480)).weavingMinutes).toBe(400);
    expect(lineFigures(line, at(480), noInterval).unaccountedMinutes).toBe(80);
  });
});

describe('what is not known', () => {
  it('of the speed leaves minutes and counts, and no picks possible', () => {
    const line = lineOf(byHand(), { loomVersions: [] });
    expect(lineTotals(line, at(480))).toMatchObject({
      minutes: 480,
      stopMinutes: 117,
      possiblePicks: null,
      possibleScheduled: null,
      possibleLessShed: null,
      measuredPicks: null,
      estimatedPicks: null,
      picks: null,
    });
    const figures = lineFigures(line, at(480), poissonInterval);
    expect(figures.efficiency).toEqual(noFigure('no-speed'));
    expect(figures.atMost).toEqual({
      efficiency: noFigure('no-speed'),
      picks: noFigure('no-speed'),
      asOf: at(480),
    });
  });

  it('of the speed alone: picks from a sheet are picks all the same', () => {
    const { book } = entryBuilder();
    const line = lineOf([book('sheet', 490, { picks: 60_000, counts: {}, minutes: {} })], {
      loomVersions: [],
    });
    expect(lineFigures(line, at(480), noInterval)).toMatchObject({
      picks: 60_000,
      picksPerHour: 7_500,
      efficiency: noFigure('no-speed'),
      lostPicks: noFigure('no-speed'),
      unaccountedMinutes: noFigure('no-speed'),
    });
  });

  it('of the cloth leaves breaks per 10³ ends out', () => {
    const figures = lineFigures(lineOf(byHand(), { fittings: [] }), at(480), poissonInterval);
    expect(figures.warpPer1000Ends).toEqual(noFigure('no-ends'));
    expect(figures.warp.rate).toBeCloseTo(3e5 / 70_200, 9);
  });

  it('of a stretch in which nothing was woven does not matter', () => {
    const { book } = entryBuilder(100);
    const gaiting = book('stop', 0, { cause: 'gaiting', count: 1, until: at(200) });
    const fitted = aFitting({ id: uuidV7(900), effectiveAt: at(200) });
    const line = lineOf([...byHand(), gaiting], { fittings: [fitted] });
    expect(line.stretches.map((one) => one.ends)).toEqual([null, 3_120]);
    expect(lineTotals(line, at(480)).pickEnds).toBe(70_200 * 3_120);
    const ran = lineOf(byHand(), { fittings: [fitted] });
    expect(lineTotals(ran, at(480)).pickEnds).toBeNull();
  });

  it('is said for each stretch’s own ends', () => {
    const fittings = [aFitting(), aFitting({ id: uuidV7(900), effectiveAt: at(200), clothId: 'gone' })];
    const line = lineOf(byHand(), { fittings, clothVersions: [aClothVersion()] });
    expect(lineTotals(line, at(480)).pickEnds).toBeNull();
  });
});

describe('no picks woven', () => {
  it('give 0% and no rate of breaks', () => {
    const { book } = entryBuilder();
    const figures = lineFigures(
      lineOf([
        book('reading', 0, { boundary: 'start', value: 7 }),
        book('reading', 480, { boundary: 'end', value: 7 }),
        book('stop', 10, { cause: 'warp-break', count: 1 }),
        book('stop', 20, { cause: 'holiday', count: 1, until: at(480) }),
        book('stop', 0, { cause: 'holiday', count: 1, until: at(20) }),
      ]),
      at(480),
      poissonInterval,
    );
    expect(figures).toMatchObject({
      efficiency: 0,
      efficiencyScheduled: noFigure('no-time'),
      efficiencyLessShed: noFigure('no-time'),
      picksPerHour: 0,
      picksPerRunningHour: noFigure('no-time'),
      warp: { count: 1, rate: noFigure('no-picks'), low: null, high: null },
      warpPer1000Ends: noFigure('no-picks'),
      lostPicks: 86_400,
    });
  });
});

describe('over 100%', () => {
  it('is shown and flagged', () => {
    const { book } = entryBuilder();
    const line = lineOf([
      book('reading', 0, { boundary: 'start', value: 0 }),
      book('reading', 480, { boundary: 'end', value: 95_040 }),
    ]);
    expect(lineFigures(line, at(480), noInterval)).toMatchObject({ efficiency: 1.1, lostPicks: -8_640 });
    expect(line.flags.map((flag) => flag.code)).toContain('more-than-possible');
  });
});
