import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { noFigure, type Figure } from './no-figure.js';
import * as units from './units.js';

describe('units, exact by definition', () => {
  it('lengths', () => {
    expect(units.cmFromInches(30)).toBeCloseTo(76.2, 12);
    expect(units.inchesFromCm(2.54)).toBe(1);
    expect(units.metresFromYards(1000)).toBeCloseTo(914.4, 12);
    expect(units.yardsFromMetres(914.4)).toBeCloseTo(1000, 12);
  });

  it('setts', () => {
    expect(units.perCmFromPerInch(80)).toBeCloseTo(31.496062992125985, 12);
    expect(units.perInchFromPerCm(25)).toBe(63.5);
  });

  it('masses', () => {
    expect(units.kilogramsFromPounds(100)).toBeCloseTo(45.359237, 12);
    expect(units.poundsFromKilograms(0.45359237)).toBeCloseTo(1, 14);
    expect(units.gramsFromOunces(16)).toBeCloseTo(453.59237, 12);
    expect(units.ouncesFromGrams(453.59237)).toBeCloseTo(16, 12);
  });

  it('come back from the other system', () => {
    const pairs: readonly [(figure: Figure) => Figure, (figure: Figure) => Figure][] = [
      [units.cmFromInches, units.inchesFromCm],
      [units.metresFromYards, units.yardsFromMetres],
      [units.perCmFromPerInch, units.perInchFromPerCm],
      [units.kilogramsFromPounds, units.poundsFromKilograms],
      [units.gramsFromOunces, units.ouncesFromGrams],
    ];
    fc.assert(
      fc.property(
        fc.double({ min: 1e-6, max: 1e9, noNaN: true }),
        fc.constantFrom(...pairs),
        (value, [to, back]) => {
          expect((back(to(value)) as number) / value).toBeCloseTo(1, 14);
        },
      ),
    );
  });

  it('let "no figure" through and make one of what is no number', () => {
    expect(units.yardsFromMetres(noFigure('no-picks'))).toEqual(noFigure('no-picks'));
    expect(units.yardsFromMetres(NaN)).toEqual(noFigure('missing-input'));
    expect(units.yardsFromMetres(Infinity)).toEqual(noFigure('out-of-range'));
  });
});
