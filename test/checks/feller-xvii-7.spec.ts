import { describe, it } from 'vitest';
import { exponentialInterference } from '../../shared/looms-per-weaver/interference.js';
import { expectClose, given } from './close-to.js';

// W. Feller, An Introduction to Probability Theory and Its Applications I, XVII.7, servicing of machines
// (tables recalled from memory, then recomputed; held to the printed digits).
describe('Feller XVII.7', () => {
  it('6 machines, one repairman, ρ .1', () => {
    const { probabilities, waiting } = given(exponentialInterference(6, 0.1));
    const printed = [0.4845149, 0.2907089, 0.1453545, 0.0581418, 0.0174425, 0.0034885, 0.0003489];
    printed.forEach((p, n) => expectClose(probabilities[n] - p, 0, 5.1e-8));
    expectClose(waiting / 6 - 0.0549, 0, 5e-5);
  });

  // p₂ is p₁ · 19 · .1 ÷ 2. The recalled table goes on from its own rounded p₁, .27250 · .95 = .258875, and rounds
  // that up to .25888; unrounded it is .2588746. A unit of the last digit is allowed there, half a unit elsewhere.
  it('20 machines, three repairmen, ρ .1', () => {
    const { probabilities, waiting } = given(exponentialInterference(20, 0.1, 3));
    [0.13625, 0.2725].forEach((p, n) => expectClose(probabilities[n] - p, 0, 5e-6));
    expectClose(probabilities[2] - 0.25888, 0, 1e-5);
    expectClose(probabilities[2], 0.2588746, 1e-7);
    expectClose(0.2725 * 0.95, 0.258875, 1e-12);
    expectClose(waiting / 20 - 0.01694, 0, 5e-6);
  });
});
