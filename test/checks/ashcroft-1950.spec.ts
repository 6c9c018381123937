import { describe, expect, it } from 'vitest';
import { constantInterference } from '../../shared/looms-per-weaver/interference.js';
import { expectClose, given } from './close-to.js';
import { INTERFERENCE } from './interference-values.js';
import { print } from './print.js';
import { seeded } from '../../shared/testing/seeded.js';

// H. Ashcroft, The productivity of several machines under the care of one operator, J. R. Statist. Soc. B 12
// (1950): formula from memory, confirmed by simulation; evaluated with R 4.2.2.
describe('one weaver, constant attending time (Ashcroft)', () => {
  for (const [looms, rho, , , , efficiency, busy] of INTERFERENCE) {
    it(`N ${looms}, ρ ${rho}`, () => {
      const set = given(constantInterference(looms, rho));
      expectClose(set.efficiency, efficiency);
      expectClose(set.busy, busy);
    });
  }

  for (const [looms, rho] of [
    [6, 0.1],
    [10, 0.2],
  ]) {
    it(`as a weaver simulated: N ${looms}, ρ ${rho}`, () => {
      const efficiency = simulate(looms, rho);
      const formula = given(constantInterference(looms, rho)).efficiency;
      print(
        `N ${looms}, ρ ${rho}: simulated efficiency ${efficiency.toFixed(4)}, formula ${formula.toFixed(4)}`,
      );
      expect(Math.abs(efficiency - formula)).toBeLessThan(0.002);
    });
  }
});

/**
 * The share of time that looms run, over 400,000 stops: each loom runs for an exponential time of mean 1 and is
 * then attended for ρ, first come, first served.
 */
function simulate(looms: number, rho: number): number {
  const random = seeded(1950);
  const stopsAt = Array.from({ length: looms }, () => -Math.log(random()));
  let free = 0;
  let ran = stopsAt.reduce((sum, time) => sum + time, 0);
  for (let stop = 0; stop < 400_000; stop++) {
    const loom = stopsAt.indexOf(Math.min(...stopsAt));
    free = Math.max(free, stopsAt[loom]) + rho;
    const run = -Math.log(random());
    ran += run;
    stopsAt[loom] = free + run;
  }
  return ran / (looms * free);
}
