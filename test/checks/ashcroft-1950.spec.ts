import { describe, it } from 'vitest';
import { constantInterference } from '../../shared/looms-per-weaver/interference.js';
import { expectClose, given } from './close-to.js';
import { INTERFERENCE } from './interference-values.js';

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
});
