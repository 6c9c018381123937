import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { crimpOf, crimpOfTakeUp, takeUpOf, takeUpOfCrimp } from './crimp.js';
import { noFigure } from './no-figure.js';

const missing = noFigure('missing-input');
const outside = noFigure('out-of-range');

describe('crimp and take-up', () => {
  it('are (L − S)/S and (L − S)/L', () => {
    expect(crimpOf(21.2, 20)).toBeCloseTo(0.06, 12);
    expect(takeUpOf(21.2, 20)).toBeCloseTo(1.2 / 21.2, 12);
    expect(crimpOf(20, 20)).toBe(0);
  });

  it('have no figure for a thread shorter than its cloth, or none', () => {
    expect(crimpOf(19, 20)).toEqual(outside);
    expect(takeUpOf(0, 0)).toEqual(outside);
    expect(crimpOf(Infinity, 20)).toEqual(outside);
    expect(crimpOf(Number.NaN, 20)).toEqual(missing);
    expect(takeUpOf(20, Number.NaN)).toEqual(missing);
  });

  it('say the same in two ways', () => {
    expect(takeUpOfCrimp(0.25)).toBe(0.2);
    expect(crimpOfTakeUp(0.2)).toBe(0.25);
    expect(takeUpOfCrimp(0)).toBe(0);
    fc.assert(
      fc.property(fc.double({ min: 0, max: 5, noNaN: true }), (crimp) => {
        expect(crimpOfTakeUp(takeUpOfCrimp(crimp) as number)).toBeCloseTo(crimp, 9);
      }),
    );
  });

  it('are shares that can be', () => {
    expect(takeUpOfCrimp(-0.1)).toEqual(outside);
    expect(takeUpOfCrimp(Infinity)).toEqual(outside);
    expect(takeUpOfCrimp(Number.NaN)).toEqual(missing);
    expect(crimpOfTakeUp(1)).toEqual(outside);
    expect(crimpOfTakeUp(-0.1)).toEqual(outside);
    expect(crimpOfTakeUp(Number.NaN)).toEqual(missing);
  });
});
