import { describe, expect, it } from 'vitest';
import { poissonInterval } from '../../shared/chance/poisson-interval.js';
import { projectLine } from '../../shared/entries/projection.js';
import { warpBreaksPer1000Ends } from '../../shared/figures/breaks.js';
import { clothFromWarp, warpUsed } from '../../shared/figures/cloth.js';
import { crimpOf } from '../../shared/figures/crimp.js';
import { lineFigures } from '../../shared/figures/loom-line.js';
import { picksBetween } from '../../shared/figures/pick-clock.js';
import { CM_PER_INCH } from '../../shared/figures/units.js';
import { baskets, picksPerPern, threadOnPern, weftPerPick, weftUsed } from '../../shared/figures/weft.js';
import { aLineInput, at, entryBuilder } from '../../shared/testing/builders.js';
import { expectClose, given } from './close-to.js';

// The trade's definitions on numbers of the project's own; where a definition is known from memory only, it says so.

describe('a line from clock to figures', () => {
  // A clock of six digits that rolls over: 990,000 → 64,250.
  const { book } = entryBuilder();
  const line = projectLine(
    aLineInput({
      entries: [
        book('reading', 0, { boundary: 'start', value: 990_000 }),
        book('stop', 100, { cause: 'warp-break', count: 3 }),
        book('reading', 480, { boundary: 'end', value: 64_250 }),
      ],
    }),
  );
  const figures = lineFigures(line, at(480), poissonInterval);

  it('rolls over: 74,250 picks', () => {
    expect(picksBetween({ digits: 6, unit: 1 }, 990_000, 64_250)).toBe(74_250);
    expect(line.picks).toBe(74_250);
  });

  it('weaves 85.9375% of 180 ppm × 480 min, 9,281.25 picks an hour', () => {
    expectClose(figures.efficiency, 0.859375, 1e-12);
    expectClose(figures.picksPerHour, 9_281.25, 1e-12);
  });

  it('breaks 4.04040404 times in 100,000 picks, .833228 to 11.807775 (interval: Garwood 1936)', () => {
    expectClose(figures.warp.rate, 4.04040404, 1e-8);
    expectClose(figures.warp.low ?? 0, 0.833228, 1e-6);
    expectClose(figures.warp.high ?? 0, 11.807775, 1e-7);
  });
});

describe('crimp, (L − S)/S', () => {
  it('is 6% for 21.2 cm from 20 cm of cloth', () => {
    expectClose(crimpOf(21.2, 20), 0.06, 1e-12);
  });

  it('takes 179.2 m of warp for 160 m of cloth at 12%', () => {
    expectClose(warpUsed(160, 0.12), 179.2, 1e-12);
  });

  it('gives 740.740741 m of cloth from 800 m of warp at 8%', () => {
    expectClose(clothFromWarp(800, 0.08), 740.740741, 1e-9);
  });
});

describe('weft', () => {
  it('200 ppm on 44 in of reed: 223.52 m a minute (formula from memory)', () => {
    const reedWidthCm = 44 * CM_PER_INCH;
    expectClose(200 * given(weftPerPick(reedWidthCm, 0)), 223.52, 1e-12);
    const weft = { name: 'Weft', tex: 20, share: 1, waste: 0, pernMassG: 30 };
    expectClose(given(weftUsed(200, { reedWidthCm, wefts: [weft] }))[0]?.metres ?? 0, 223.52, 1e-12);
  });

  // A gross to the basket: common practice.
  it('28 g of 25 tex on a pern is 1,120 m; at 1.2 m a pick 933.333 picks', () => {
    expect(threadOnPern(28, 25)).toBe(1_120);
    expectClose(picksPerPern({ pernMassG: 28, tex: 25, waste: 0 }, 120), 933.333, 1e-6);
  });

  it('107.142857 perns to 100,000 picks, .744047619 of a basket', () => {
    const weft = { name: 'Weft', tex: 25, share: 1, waste: 0, pernMassG: 28 };
    const [used] = given(weftUsed(1e5, { reedWidthCm: 120, wefts: [weft] }));
    const perns = given(used?.perns ?? 0);
    expectClose(perns, 107.142857, 1e-8);
    expectClose(baskets(perns).exact, 0.744047619, 1e-9);
  });
});

describe('warp breaks per 10³ ends per 10⁵ picks', () => {
  it('7 in 187,500 picks on 3,120 ends: 1.19658120 (definition from memory)', () => {
    expectClose(warpBreaksPer1000Ends(7, 187_500 * 3_120), 1.1965812, 1e-8);
  });
});
