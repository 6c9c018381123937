import { describe, it } from 'vitest';
import { shopFloorFigures } from '../../shared/figures/shop-floor.js';
import { expectClose } from './close-to.js';

// ISO 22400-2 formulas: availability APT/PBT, effectiveness PRI·PQ/APT, quality GQ/PQ, OEE index their product.
// The numbers are the project's own.
describe('ISO 22400-2', () => {
  it('480 min planned, 420 run, 79,800 picks at 200 ppm, 78,600 good', () => {
    const figures = shopFloorFigures({
      plannedBusyMinutes: 480,
      actualProductionMinutes: 420,
      plannedMinutesPerItem: 1 / 200,
      produced: 79_800,
      good: 78_600,
    });
    expectClose(figures.availability, 0.875);
    expectClose(figures.effectiveness, 0.95);
    expectClose(figures.quality, 0.984962406);
    expectClose(figures.oee, 0.81875);
  });
});
