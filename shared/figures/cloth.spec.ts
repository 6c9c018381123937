import { describe, expect, it } from 'vitest';
import { allWidths, beamLeft, clothFromWarp, clothLength, picksInCloth, warpUsed } from './cloth.js';
import { noFigure } from './no-figure.js';

const missing = noFigure('missing-input');
const outside = noFigure('out-of-range');

describe('clothLength', () => {
  it('is A / (picks per cm · 100), by either setting', () => {
    expect(clothLength(84_000, 21)).toBe(40); // loom state
    expect(clothLength(84_000, 20)).toBe(42); // on the loom
    expect(clothLength(0, 20)).toBe(0);
  });

  it('is that of one width where cloths are woven abreast', () => {
    expect(allWidths(clothLength(84_000, 21), 2)).toBe(80);
    expect(allWidths(40, 1)).toBe(40);
    expect(allWidths(missing, 2)).toEqual(missing);
    expect(allWidths(40, 0)).toEqual(outside);
    expect(allWidths(40, 1.5)).toEqual(outside);
  });

  it('has no figure for what cannot be', () => {
    expect(clothLength(84_000, 0)).toEqual(outside);
    expect(clothLength(-1, 20)).toEqual(outside);
    expect(clothLength(Infinity, 20)).toEqual(outside);
    expect(clothLength(1, Number.NaN)).toEqual(missing);
  });

  it('is undone by picksInCloth', () => {
    expect(picksInCloth(40, 21)).toBe(84_000);
    expect(picksInCloth(40, 0)).toEqual(outside);
    expect(picksInCloth(-1, 21)).toEqual(outside);
    expect(picksInCloth(Number.NaN, 21)).toEqual(missing);
  });
});

describe('warp', () => {
  it('used is cloth · (1 + crimp), and back', () => {
    expect(warpUsed(160, 0.12)).toBeCloseTo(179.2, 10);
    expect(clothFromWarp(800, 0.08)).toBeCloseTo(740.740741, 6);
    expect(warpUsed(-1, 0.1)).toEqual(outside);
    expect(warpUsed(1, -0.1)).toEqual(outside);
    expect(warpUsed(Number.NaN, 0.1)).toEqual(missing);
    expect(clothFromWarp(1, -0.1)).toEqual(outside);
    expect(clothFromWarp(1, Number.NaN)).toEqual(missing);
  });

  it('left on the beam is length − used − thrum, negative where the ticket was wrong', () => {
    expect(beamLeft(800, 179.2, 3)).toBeCloseTo(617.8, 10);
    expect(beamLeft(100, 99, 3)).toBe(-2);
    expect(beamLeft(2, 0, 3)).toEqual(outside);
    expect(beamLeft(-1, 0, -2)).toEqual(outside);
    expect(beamLeft(800, Number.NaN, 3)).toEqual(missing);
  });
});
