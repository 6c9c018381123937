import { describe, expect, it } from 'vitest';
import { exponentialInterference } from '../../shared/looms-per-weaver/interference.js';
import { expectClose, given } from './close-to.js';
import { INTERFERENCE } from './interference-values.js';

// M/M/1//N, C. Palm 1947: pₙ = p₀·N!/(N−n)!·ρⁿ, evaluated with R 4.2.2.
describe('one weaver, exponential attending times (Palm)', () => {
  for (const [looms, rho, efficiency, busy, waiting] of INTERFERENCE) {
    it(`N ${looms}, ρ ${rho}`, () => {
      const set = given(exponentialInterference(looms, rho));
      expectClose(set.efficiency, efficiency);
      expectClose(set.busy, busy);
      expectClose(set.waiting, waiting);
    });
  }

  it('p₀ is Erlang’s loss formula B(N, 1/ρ): B(6, 10) = .4845149037', () => {
    expectClose(erlangB(6, 10), 0.4845149037, 1e-10);
    for (const [looms, rho] of [
      [6, 0.1],
      [20, 0.2],
      [200, 0.01],
      [200, 1],
    ]) {
      expectClose(given(exponentialInterference(looms, rho)).probabilities[0], erlangB(looms, 1 / rho));
    }
  });

  it('three weavers on 20 looms, and one on 8, as R reckons M/M/c//N', () => {
    const three = given(exponentialInterference(20, 0.1, 3));
    expectClose(three.efficiency, 0.893688418896);
    expectClose(three.waiting, 0.338854784277);
    expectClose(three.probabilities[0], 0.136249793506);
    const one = given(exponentialInterference(8, 0.05, 1));
    expectClose(one.efficiency, 0.932550852792);
    expectClose(one.waiting, 0.166572836548);
    expectClose(one.probabilities[0], 0.626979658883);
    expect(one.probabilities).toHaveLength(9);
  });
});

/** A. K. Erlang 1917, by its recursion: an independent road to p₀. */
function erlangB(servers: number, offered: number): number {
  let inverse = 1;
  for (let n = 1; n <= servers; n++) inverse = 1 + (inverse * n) / offered;
  return 1 / inverse;
}
