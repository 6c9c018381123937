import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { constantInterference, exponentialInterference, type Interference } from './interference.js';
import {
  curveOfSets,
  loomsForEfficiency,
  loomsForLoad,
  setFigures,
  type SetFigures,
  type SetWork,
} from './set-of-looms.js';

const WORK: SetWork = { rho: 0.05, picksPerMinute: 180 };
const figures = (looms: number, work: SetWork) => setFigures(looms, work) as SetFigures;

describe('setFigures', () => {
  it('without added work is the model, and picks per weaver-hour follow', () => {
    const model = exponentialInterference(8, 0.05) as Interference;
    const set = figures(8, WORK);
    expect(set.efficiency).toBe(model.efficiency);
    expect(set.mending).toBeCloseTo(model.busy, 12);
    expect(set).toMatchObject({ looms: 8, filling: 0, patrol: 0, waiting: model.waiting });
    expect(set.load).toBe(set.mending);
    expect(set.picksPerWeaverHour).toBeCloseTo(8 * 180 * 60 * model.efficiency, 6);
    expect(figures(8, { ...WORK, times: 'constant' }).efficiency).toBe(
      (constantInterference(8, 0.05) as Interference).efficiency,
    );
  });

  it('shares picks and mending between weavers', () => {
    const model = exponentialInterference(20, 0.1, 3) as Interference;
    const set = figures(20, { rho: 0.1, picksPerMinute: 180, weavers: 3 });
    expect(set.mending).toBeCloseTo(model.busy, 12);
    expect(set.picksPerWeaverHour).toBeCloseTo((20 * 180 * 60 * model.efficiency) / 3, 6);
  });

  it('patrol slows mending: ρ ÷ (1 − share)', () => {
    const model = exponentialInterference(8, 0.0625) as Interference;
    const set = figures(8, { ...WORK, patrolShare: 0.2 });
    expect(set.efficiency).toBe(model.efficiency);
    expect(set.mending).toBeCloseTo(0.8 * model.busy, 12);
    expect(set.load).toBeCloseTo(set.mending + 0.2, 12);
  });

  it('filling grows with the efficiency that it lowers, and the two agree', () => {
    const work = { ...WORK, patrolShare: 0.1, fillingPerRunningMinute: 0.03 };
    const set = figures(10, work);
    expect(set.filling).toBeCloseTo(10 * 0.03 * set.efficiency, 10);
    const model = exponentialInterference(10, 0.05 / (1 - 0.1 - set.filling)) as Interference;
    expect(set.efficiency).toBeCloseTo(model.efficiency, 10);
    expect(set.waiting).toBeCloseTo(model.waiting, 8);
    expect(set.load).toBeCloseTo(set.mending + set.filling + 0.1, 12);
  });

  it('filling alone cannot take more than the whole of the time', () => {
    const set = figures(40, { rho: 0, picksPerMinute: 180, fillingPerRunningMinute: 0.1 });
    expect(set.efficiency).toBeCloseTo(0.25, 12);
    expect(set.load).toBeCloseTo(1, 12);
  });

  it('has no figure without speed, nor from impossible input', () => {
    expect(setFigures(8, { ...WORK, picksPerMinute: 0 })).toEqual({ none: 'no-speed' });
    for (const bad of [
      { picksPerMinute: NaN },
      { patrolShare: NaN },
      { fillingPerRunningMinute: NaN },
      { rho: NaN },
    ]) {
      expect(setFigures(8, { ...WORK, ...bad })).toEqual({ none: 'missing-input' });
    }
    for (const bad of [
      { picksPerMinute: -1 },
      { picksPerMinute: Infinity },
      { patrolShare: 1 },
      { patrolShare: -0.1 },
      { fillingPerRunningMinute: -0.1 },
      { fillingPerRunningMinute: Infinity },
      { rho: 1.5 },
      { weavers: 0 },
      { weavers: 2, times: 'constant' as const },
    ]) {
      expect(setFigures(8, { ...WORK, ...bad })).toEqual({ none: 'out-of-range' });
    }
    expect(setFigures(0, WORK)).toEqual({ none: 'out-of-range' });
  });

  it('loads nobody beyond the whole of the time, and more work never raises efficiency', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 60 }),
        fc.double({ min: 0, max: 0.5, noNaN: true }),
        fc.double({ min: 0, max: 0.2, noNaN: true }),
        fc.double({ min: 0, max: 0.9, noNaN: true }),
        (looms, rho, fillingPerRunningMinute, patrolShare) => {
          const set = figures(looms, { rho, fillingPerRunningMinute, patrolShare, picksPerMinute: 180 });
          const bare = figures(looms, { rho, picksPerMinute: 180 });
          expect(set.load).toBeLessThanOrEqual(1 + 1e-9);
          expect(set.efficiency).toBeLessThanOrEqual(bare.efficiency + 1e-12);
          expect(set.efficiency).toBeGreaterThan(0);
        },
      ),
    );
  });
});

describe('the largest set', () => {
  it('for an efficiency: one more would not reach it', () => {
    const set = loomsForEfficiency(0.93, WORK) as SetFigures;
    expect(set.looms).toBe(8);
    expect(set.efficiency).toBeGreaterThanOrEqual(0.93);
    expect(figures(9, WORK).efficiency).toBeLessThan(0.93);
  });

  it('for a load: one more would pass it', () => {
    const work = { ...WORK, patrolShare: 0.1, fillingPerRunningMinute: 0.01 };
    const set = loomsForLoad(0.7, work) as SetFigures;
    expect(set.load).toBeLessThanOrEqual(0.7);
    expect(figures(set.looms + 1, work).load).toBeGreaterThan(0.7);
  });

  it('ends at 200 looms', () => {
    expect(loomsForEfficiency(0.5, { rho: 0, picksPerMinute: 180 })).toMatchObject({ looms: 200 });
  });

  it('has no figure where one loom is too many, nor from impossible input', () => {
    expect(loomsForEfficiency(0.99, WORK)).toEqual({ none: 'no-limit' });
    expect(loomsForLoad(0.01, WORK)).toEqual({ none: 'no-limit' });
    expect(loomsForLoad(NaN, WORK)).toEqual({ none: 'missing-input' });
    for (const wanted of [0, 1]) expect(loomsForLoad(wanted, WORK)).toEqual({ none: 'out-of-range' });
    expect(loomsForEfficiency(0.9, { ...WORK, rho: 2 })).toEqual({ none: 'out-of-range' });
  });
});

describe('curveOfSets', () => {
  it('has a point for each set, efficiency falling and picks per weaver-hour rising', () => {
    const curve = curveOfSets(30, WORK) as readonly SetFigures[];
    expect(curve.map((set) => set.looms)).toEqual(Array.from({ length: 30 }, (_, at) => at + 1));
    expect(curve[7]).toEqual(figures(8, WORK));
    for (let at = 1; at < curve.length; at++) {
      expect(curve[at].efficiency).toBeLessThan(curve[at - 1].efficiency);
      expect(curve[at].picksPerWeaverHour).toBeGreaterThan(curve[at - 1].picksPerWeaverHour);
    }
  });

  it('has no figure from impossible input', () => {
    expect(curveOfSets(201, WORK)).toEqual({ none: 'out-of-range' });
  });
});
