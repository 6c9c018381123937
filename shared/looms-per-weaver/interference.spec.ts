import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { noFigure } from '../figures/no-figure.js';
import {
  constantInterference,
  exponentialInterference,
  solve,
  type Interference,
  type InterferenceWithStates,
} from './interference.js';

const exponential = (...args: Parameters<typeof exponentialInterference>) =>
  exponentialInterference(...args) as InterferenceWithStates;
const constant = (...args: Parameters<typeof constantInterference>) =>
  constantInterference(...args) as Interference;

const looms = fc.integer({ min: 1, max: 200 });
const rho = fc.double({ min: 0.0001, max: 1, noNaN: true });

describe('one loom', () => {
  it('runs 1 of 1 + ρ, whatever the spread of attending times', () => {
    for (const each of [exponential(1, 0.25), constant(1, 0.25)]) {
      expect(each.efficiency).toBeCloseTo(0.8, 14);
      expect(each.busy).toBeCloseTo(0.2, 14);
      expect(each.waiting).toBeCloseTo(0, 14);
    }
  });
});

describe('two looms, constant attending time', () => {
  it('agrees with the sum written out: B = 1 + (e^ρ − 1)', () => {
    // busy = 2ρe^ρ ÷ (1 + 2ρe^ρ)
    const product = 2 * 0.3 * Math.exp(0.3);
    expect(constant(2, 0.3).busy).toBeCloseTo(product / (1 + product), 14);
    expect(constant(2, 1).busy).toBeCloseTo((2 * Math.E) / (1 + 2 * Math.E), 14);
  });
});

describe('either end', () => {
  it('no stops: everything runs', () => {
    expect(exponential(6, 0)).toMatchObject({ efficiency: 1, busy: 0, running: 6, mended: 0, waiting: 0 });
    expect(constant(6, 0)).toEqual({ efficiency: 1, busy: 0, running: 6, mended: 0, waiting: 0 });
  });

  it('200 looms at ρ = 1: the weaver is always busy, nothing overflows', () => {
    for (const each of [exponential(200, 1), constant(200, 1)]) {
      expect(each.busy).toBeCloseTo(1, 12);
      expect(each.efficiency).toBeCloseTo(1 / 200, 12);
      expect(each.waiting).toBeCloseTo(198, 9);
    }
    const chances = exponential(200, 1).probabilities;
    expect(chances.every((p) => p >= 0 && p <= 1)).toBe(true);
    expect(chances.reduce((sum, p) => sum + p)).toBeCloseTo(1, 12);
  });

  it('as many weavers as looms: nobody waits', () => {
    const { efficiency, waiting } = exponential(8, 0.25, 8);
    expect(waiting).toBe(0);
    expect(efficiency).toBeCloseTo(0.8, 12);
    expect(exponential(8, 0.25, 20).efficiency).toBeCloseTo(0.8, 12);
  });
});

describe('impossible sets', () => {
  it('have no figure', () => {
    for (const [n, r] of [
      [NaN, 0.1],
      [6, NaN],
    ]) {
      expect(exponentialInterference(n, r)).toEqual(noFigure('missing-input'));
      expect(constantInterference(n, r)).toEqual(noFigure('missing-input'));
    }
    for (const [n, r] of [
      [0, 0.1],
      [201, 0.1],
      [2.5, 0.1],
      [6, -0.1],
      [6, 1.01],
    ]) {
      expect(exponentialInterference(n, r)).toEqual(noFigure('out-of-range'));
      expect(constantInterference(n, r)).toEqual(noFigure('out-of-range'));
    }
    expect(exponentialInterference(6, 0.1, NaN)).toEqual(noFigure('missing-input'));
    for (const weavers of [0, 1.5]) {
      expect(exponentialInterference(6, 0.1, weavers)).toEqual(noFigure('out-of-range'));
    }
  });
});

describe('properties of a set', () => {
  it('running, mended and waiting looms sum to N, and mended = ρ·running', () => {
    fc.assert(
      fc.property(looms, rho, fc.integer({ min: 1, max: 12 }), (n, r, weavers) => {
        for (const each of [exponential(n, r, weavers), constant(n, r)]) {
          expect(each.running + each.mended + each.waiting).toBeCloseTo(n, 8);
          expect(each.mended).toBeCloseTo(r * each.running, 8);
          expect(each.busy).toBeGreaterThanOrEqual(0);
          expect(each.busy).toBeLessThanOrEqual(1 + 1e-12);
        }
      }),
    );
  });

  it('efficiency falls in N and in ρ, and rises with weavers', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 199 }),
        fc.double({ min: 0.001, max: 0.9, noNaN: true }),
        (n, r) => {
          for (const times of ['exponential', 'constant'] as const) {
            const { efficiency } = solve(times, n, r, 1);
            expect(solve(times, n + 1, r, 1).efficiency).toBeLessThan(efficiency);
            expect(solve(times, n, r * 1.05, 1).efficiency).toBeLessThan(efficiency);
          }
          const alone = exponential(n, r).efficiency;
          expect(exponential(n, r, 2).efficiency).toBeGreaterThanOrEqual(alone);
        },
      ),
    );
  });

  it('constant attending times wait less than scattered ones, and neither beats no waiting or the weaver', () => {
    fc.assert(
      fc.property(looms, rho, (n, r) => {
        const scattered = exponential(n, r).efficiency;
        const even = constant(n, r).efficiency;
        const most = Math.min(1 / (1 + r), 1 / (n * r));
        expect(even).toBeGreaterThanOrEqual(scattered * (1 - 1e-12));
        expect(even).toBeLessThanOrEqual(most * (1 + 1e-12));
      }),
    );
  });
});
