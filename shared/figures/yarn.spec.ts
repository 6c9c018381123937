import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { noFigure } from './no-figure.js';
import { countFromTex, texFrom, yarnLength, yarnMass, type CountSystem } from './yarn.js';

const SYSTEMS: readonly CountSystem[] = ['tex', 'denier', 'Ne', 'lea', 'Nm'];

describe('yarn counts', () => {
  it('in tex', () => {
    expect(texFrom(20, 'tex')).toBe(20);
    expect(texFrom(90, 'denier')).toBe(10);
    expect(texFrom(50, 'Nm')).toBe(20);
    expect(texFrom(30, 'Ne')).toBeCloseTo(19.6847082, 7);
    expect(texFrom(40, 'lea')).toBeCloseTo(41.3378873, 7);
  });

  it('from tex', () => {
    expect(countFromTex(20, 'tex')).toBe(20);
    expect(countFromTex(10, 'denier')).toBe(90);
    expect(countFromTex(20, 'Nm')).toBe(50);
    expect(countFromTex(19.6847082, 'Ne')).toBeCloseTo(30, 6);
  });

  it('come back from tex', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.01, max: 5000, noNaN: true }),
        fc.constantFrom(...SYSTEMS),
        (count, system) => {
          expect((countFromTex(texFrom(count, system) as number, system) as number) / count).toBeCloseTo(
            1,
            12,
          );
        },
      ),
    );
  });

  it('have no figure from 0, less, infinite or nothing', () => {
    for (const system of SYSTEMS) {
      for (const bad of [0, -1, Infinity]) {
        expect(texFrom(bad, system)).toEqual(noFigure('out-of-range'));
        expect(countFromTex(bad, system)).toEqual(noFigure('out-of-range'));
      }
      expect(texFrom(NaN, system)).toEqual(noFigure('missing-input'));
      expect(countFromTex(NaN, system)).toEqual(noFigure('missing-input'));
    }
  });
});

describe('mass and length of yarn', () => {
  it('are one another’s reverse', () => {
    expect(yarnMass(1120, 25)).toBe(28);
    expect(yarnLength(28, 25)).toBe(1120);
    expect(yarnMass(0, 25)).toBe(0);
    expect(yarnLength(0, 25)).toBe(0);
  });

  it('have no figure from impossible input', () => {
    for (const of of [yarnMass, yarnLength]) {
      expect(of(NaN, 25)).toEqual(noFigure('missing-input'));
      expect(of(1, NaN)).toEqual(noFigure('missing-input'));
      for (const [much, tex] of [
        [-1, 25],
        [Infinity, 25],
        [1, 0],
        [1, -1],
        [1, Infinity],
      ]) {
        expect(of(much, tex)).toEqual(noFigure('out-of-range'));
      }
    }
  });
});
