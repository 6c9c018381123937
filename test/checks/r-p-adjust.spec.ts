import { describe, it } from 'vitest';
import { benjaminiHochberg } from '../../shared/chance/false-discovery.js';
import { expectClose, given } from './close-to.js';

// R 4.2.2 p.adjust(p, "BH"); Benjamini and Hochberg, J. R. Statist. Soc. B 57 (1995).
const P = [0.0008, 0.004, 0.012, 0.021, 0.03, 0.2, 0.41, 0.74, 0.9, 0.046];
const ADJUSTED = [
  0.008, 0.02, 0.04, 0.0525, 0.06, 0.2857142857143, 0.5125, 0.8222222222222, 0.9, 0.0766666666667,
];

describe('R p.adjust(p, "BH")', () => {
  it('adjusts ten p-values in their own order', () => {
    given(benjaminiHochberg(P)).forEach((adjusted, at) => expectClose(adjusted, ADJUSTED[at]));
  });
});
