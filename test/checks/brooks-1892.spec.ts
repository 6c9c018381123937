import { describe, it } from 'vitest';
import {
  inchesFromCm,
  metresFromYards,
  poundsFromKilograms,
  yardsFromMetres,
  YARDS_PER_HANK,
} from '../../shared/figures/units.js';
import { texFrom, yarnMass } from '../../shared/figures/yarn.js';
import { expectClose, given } from './close-to.js';

// C. P. Brooks, Cotton Manufacturing, 1892: the weight of a piece.
/** Pounds of so many yards of cotton of that count, by way of metres, tex and grams. */
export function poundsOfCotton(yards: number, count: number): number {
  const grams = given(yarnMass(given(metresFromYards(yards)), given(texFrom(count, 'Ne'))));
  return given(poundsFromKilograms(grams / 1000));
}

describe('Brooks 1892', () => {
  it('2,280 ends × 38 yd of 30s: 103.142857 hanks, 3.438095 lb', () => {
    expectClose((2280 * 38) / YARDS_PER_HANK, 103.142857, 1e-8);
    expectClose(poundsOfCotton(2280 * 38, 30), 103.142857142857 / 30, 1e-12);
    expectClose(poundsOfCotton(2280 * 38, 30), 3.438095, 1e-7);
  });

  it('weft 37.5 in × 64 picks × 36 yd of 36s: 2.857143 lb', () => {
    const picks = given(inchesFromCm(given(metresFromYards(36)) * 100)) * 64;
    const yards = given(yardsFromMetres((picks * 37.5 * 2.54) / 100));
    expectClose(poundsOfCotton(yards, 36), 2.857143, 1e-7);
  });
});
