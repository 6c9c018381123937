import { describe, expect, it } from 'vitest';
import { noFigure } from './no-figure.js';
import { shopFloorFigures, type ShopFloorInput } from './shop-floor.js';

const SHIFT: ShopFloorInput = {
  plannedBusyMinutes: 400,
  actualProductionMinutes: 320,
  plannedMinutesPerItem: 1 / 160,
  produced: 48_000,
  good: 47_040,
};

describe('shopFloorFigures', () => {
  it('are availability, effectiveness, quality and their product', () => {
    const { availability, effectiveness, quality, oee } = shopFloorFigures(SHIFT);
    expect(availability).toBeCloseTo(0.8, 14);
    expect(effectiveness).toBeCloseTo(0.9375, 14);
    expect(quality).toBeCloseTo(0.98, 14);
    expect(oee).toBeCloseTo(0.8 * 0.9375 * 0.98, 14);
  });

  it('show more than 100%', () => {
    expect(shopFloorFigures({ ...SHIFT, actualProductionMinutes: 500 }).availability).toBe(1.25);
  });

  it('say why one is missing, and the product with it', () => {
    expect(shopFloorFigures({ ...SHIFT, plannedBusyMinutes: 0 })).toMatchObject({
      availability: noFigure('no-time'),
      quality: 0.98,
      oee: noFigure('no-time'),
    });
    expect(shopFloorFigures({ ...SHIFT, actualProductionMinutes: 0 })).toMatchObject({
      availability: 0,
      effectiveness: noFigure('no-time'),
      oee: noFigure('no-time'),
    });
    expect(shopFloorFigures({ ...SHIFT, produced: 0, good: 0 })).toMatchObject({
      effectiveness: 0,
      quality: noFigure('no-picks'),
      oee: noFigure('no-picks'),
    });
  });

  it('have no figure from impossible input', () => {
    const none = (reason: 'missing-input' | 'out-of-range') => ({
      availability: noFigure(reason),
      effectiveness: noFigure(reason),
      quality: noFigure(reason),
      oee: noFigure(reason),
    });
    expect(shopFloorFigures({ ...SHIFT, produced: NaN })).toEqual(none('missing-input'));
    expect(shopFloorFigures({ ...SHIFT, good: 48_001 })).toEqual(none('out-of-range'));
    expect(shopFloorFigures({ ...SHIFT, plannedBusyMinutes: -1 })).toEqual(none('out-of-range'));
    expect(shopFloorFigures({ ...SHIFT, plannedMinutesPerItem: Infinity })).toEqual(none('out-of-range'));
  });
});
