import { describe, it } from 'vitest';
import { crimpOf } from '../../shared/figures/crimp.js';
import { kilogramsFromPounds, metresFromYards, poundsFromKilograms } from '../../shared/figures/units.js';
import { texFrom, yarnMass } from '../../shared/figures/yarn.js';
import { weftAhead } from '../../shared/ahead/weft-ahead.js';
import { expectClose, given } from './close-to.js';

// W. S. Taylor, 1909, the example as recomputed: 70 reed (ends per inch), 30 in, 95 yd of warp to 90 yd of
// cloth, 80 picks per inch, 30s warp and 40s weft.
describe('Taylor 1909', () => {
  it('warp 7.916667 lb', () => {
    const grams = given(yarnMass(70 * 30 * given(metresFromYards(95)), given(texFrom(30, 'Ne'))));
    expectClose(poundsFromKilograms(grams / 1000), 7.916667, 1e-7);
  });

  it('weft 6.428571 lb, as what lies ahead reckons it', () => {
    const [need] = given(
      weftAhead([
        {
          cloth: 'Taylor',
          weft: '40s',
          picks: 90 * 36 * 80,
          reedWidthCm: 30 * 2.54,
          waste: 0,
          tex: given(texFrom(40, 'Ne')),
          pernMassG: 28,
        },
      ]),
    );
    expectClose(poundsFromKilograms(need.kilograms), 6.428571, 1e-7);
    expectClose(kilogramsFromPounds(6.428571), need.kilograms, 1e-7);
  });

  it('crimp of 95 yd of warp to 90 yd of cloth 5.555556%', () => {
    expectClose(100 * given(crimpOf(95, 90)), 5.555556, 1e-7);
  });
});
