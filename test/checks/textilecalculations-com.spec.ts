import { describe, it } from 'vitest';
import { poissonInterval } from '../../shared/chance/poisson-interval.js';
import { projectLine } from '../../shared/entries/projection.js';
import { clothLength } from '../../shared/figures/cloth.js';
import { lineTotals } from '../../shared/figures/loom-line.js';
import { groupFigures, sumTotals } from '../../shared/figures/totals.js';
import { CM_PER_INCH } from '../../shared/figures/units.js';
import { aLineInput, aLoomVersion, aShift, at, entryBuilder } from '../../shared/testing/builders.js';
import { expectClose } from './close-to.js';

// textilecalculations.com: production of a shed. 45 looms, 350 ppm, 60 picks/in, 7 days, 90%.
describe('a week of 45 looms', () => {
  const minutes = 7 * 24 * 60;
  const shift = aShift({ endsAt: at(minutes) });
  const { book } = entryBuilder(1, shift);
  const line = projectLine(
    aLineInput({
      shift,
      loomVersions: [aLoomVersion({ ppm: 350, clock: { kind: 'continuous', unit: 100, digits: 5 } })],
      entries: [
        book('reading', 0, { boundary: 'start', value: 90_000 }),
        book('reading', minutes, { boundary: 'end', value: 21_752 }),
      ],
    }),
  );
  const lines = Array.from({ length: 45 }, () => ({
    totals: lineTotals(line, at(minutes)),
    picksBy: line.picksBy,
  }));
  const { figures } = groupFigures(lines, { interval: poissonInterval, asOf: at(minutes) });

  it('at 90% is 60,487.56 m with exact inches (the page takes 39.37 in to the metre: 60,487.68)', () => {
    expectClose(figures.efficiency, 0.9, 1e-12);
    const picks = sumTotals(lines.map((one) => one.totals)).picks ?? 0;
    expectClose(figures.picks, picks, 0);
    expectClose(clothLength(picks, 60 / CM_PER_INCH), 60_487.56, 1e-12);
    expectClose(picks / 60 / 39.37, 60_487.68, 1e-7);
  });
});
