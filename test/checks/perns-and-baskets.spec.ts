import { describe, expect, it } from 'vitest';
import { weftAhead } from '../../shared/ahead/weft-ahead.js';
import { yarnLength } from '../../shared/figures/yarn.js';
import { expectClose, given } from './close-to.js';

// The project's own numbers on the definition of tex (ISO 1144); a gross to the basket is common practice.
describe('perns of 28 g of 25 tex, 1.2 m a pick', () => {
  it('hold 1,120 m, 933.333 picks', () => {
    expectClose(yarnLength(28, 25), 1120, 0);
    expectClose(given(yarnLength(28, 25)) / 1.2, 933.333, 1e-6);
  });

  it('100,000 picks take 107.142857 perns, .744047619 of a basket: 108 to fetch', () => {
    const [need] = given(
      weftAhead([{ cloth: 'a', weft: 'b', picks: 1e5, reedWidthCm: 120, waste: 0, tex: 25, pernMassG: 28 }]),
    );
    expectClose(need.perns, 107.142857142857);
    expectClose(need.baskets, 0.744047619);
    expect(need).toMatchObject({ wholeBaskets: 0, oddPerns: 108 });
  });
});
