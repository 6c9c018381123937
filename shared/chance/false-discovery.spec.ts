import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { benjaminiHochberg, discoveries } from './false-discovery.js';

describe('benjaminiHochberg', () => {
  it('adjusts ties, one and none', () => {
    expect(benjaminiHochberg([])).toEqual([]);
    expect(benjaminiHochberg([0.3])).toEqual([0.3]);
    expect(benjaminiHochberg([0.04, 0.04, 1])).toEqual([0.06, 0.06, 1]);
  });

  it('refuses what is no probability', () => {
    expect(benjaminiHochberg([0.1, NaN])).toEqual({ none: 'missing-input' });
    expect(benjaminiHochberg([0.1, 1.1])).toEqual({ none: 'out-of-range' });
    expect(benjaminiHochberg([-0.1])).toEqual({ none: 'out-of-range' });
  });

  it('never lowers a p, never passes 1, keeps the order', () => {
    fc.assert(
      fc.property(fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { maxLength: 40 }), (p) => {
        const adjusted = benjaminiHochberg(p) as readonly number[];
        expect(adjusted).toHaveLength(p.length);
        p.forEach((value, at) => {
          expect(adjusted[at]).toBeGreaterThanOrEqual(value * (1 - 1e-12));
          expect(adjusted[at]).toBeLessThanOrEqual(1);
          p.forEach((other, to) => {
            if (value < other) expect(adjusted[at]).toBeLessThanOrEqual(adjusted[to]);
          });
        });
      }),
    );
  });
});

describe('discoveries', () => {
  it('are those at or below the rate once adjusted', () => {
    expect(discoveries([0.01, 0.02, 0.5, 0.04])).toEqual([true, true, false, false]);
    expect(discoveries([0.025, 0.05])).toEqual([true, true]);
    expect(discoveries([0.01, 0.2], 0.01)).toEqual([false, false]);
  });

  it('refuse what cannot be', () => {
    expect(discoveries([0.1], NaN)).toEqual({ none: 'missing-input' });
    expect(discoveries([0.1], 1)).toEqual({ none: 'out-of-range' });
    expect(discoveries([NaN])).toEqual({ none: 'missing-input' });
  });
});
