import { noFigure, type Figure, type NoFigure } from '../figures/no-figure.js';
import { isShare, whyNotCounted, type Counted } from './count.js';
import { fQuantile, fUpperTail } from './distributions.js';
import type { Dispersion } from './over-dispersion.js';

/** A statistic held against F with 1 and the dispersion's degrees of freedom, and its upper tail. */
export interface FTest {
  readonly f: number;
  readonly p: number;
}

/** The comparison of two rates that carries the dispersion between shifts. */
export interface QuasiComparison extends FTest {
  /** Rate after ÷ rate before; `no-events` where there were none before. */
  readonly ratio: Figure;
  /** Limits of the ratio, `no-limit` above with none before; they leave out 1 just where p is under 1 − level. */
  readonly low: number;
  readonly high: Figure;
  /** The same question asked of the deviance, as R's analysis of deviance does. */
  readonly deviance: FTest;
}

/**
 * Compares two rates with the dispersion between shifts (quasi-Poisson): how far the events of two weeks
 * divide otherwise than their exposures, over φ, held against F.
 *
 * `f` and `p` are of the score form, (seen − expected)² ÷ expected; `deviance` is what R's `anova(glm(breaks ~
 * week + offset(log(picks)), quasipoisson), test = "F")` prints. They agree but far out, where the deviance
 * calls too often on the few, skewed counts of a shed: at dispersion 4 some 6% of simulated pages without
 * change named a loom by it, under 5% by the score form (test/checks/false-alarms.spec.ts). The limits turn the
 * score form round: Wilson's interval of a share (J. Am. Statist. Assoc. 22, 1927), its events divided by φ.
 *
 * Source: P. McCullagh and J. A. Nelder, Generalized Linear Models, 1989 (from memory).
 *
 * @param before, after the sums over each week's shifts, in the same unit of exposure
 * @param dispersion φ ≥ 1 and the degrees of freedom that it rests on, ≥ 1
 * @param level coverage of the interval
 * @returns the comparison, or no figure: `no-exposure` where a week has none, `missing-input` for NaN,
 *   `out-of-range` otherwise. Without any events p is 1.
 */
export function compareWithDispersion(
  before: Counted,
  after: Counted,
  { dispersion, degrees }: Pick<Dispersion, 'dispersion' | 'degrees'>,
  level = 0.95,
): QuasiComparison | NoFigure {
  const refused = whyNotCounted(before) ?? whyNotCounted(after);
  if (refused) return refused;
  if ([dispersion, degrees, level].some(Number.isNaN)) return noFigure('missing-input');
  const possible = dispersion >= 1 && dispersion < Infinity && degrees >= 1 && degrees < Infinity;
  if (!possible || !isShare(level)) return noFigure('out-of-range');
  if (before.exposure === 0 || after.exposure === 0) return noFigure('no-exposure');

  const events = before.count + after.count;
  const expectedBefore = (events * before.exposure) / (before.exposure + after.exposure);
  const expectedAfter = events - expectedBefore;
  const off = after.count - expectedAfter;
  const score = events === 0 ? 0 : off ** 2 / expectedAfter + off ** 2 / expectedBefore;
  const deviance = 2 * (excess(after.count, expectedAfter) + excess(before.count, expectedBefore));
  const test = (statistic: number): FTest => {
    const f = Math.max(0, statistic) / dispersion;
    return { f, p: fUpperTail(f, 1, degrees) };
  };

  const bar = fQuantile(level, 1, degrees) * dispersion;
  const stretch = before.exposure / after.exposure;
  return {
    ratio: before.count === 0 ? noFigure('no-events') : (after.count / before.count) * stretch,
    low: after.count === 0 ? 0 : stretch / oddsAbove(before.count, after.count, bar),
    high: before.count === 0 ? noFigure('no-limit') : oddsAbove(after.count, before.count, bar) * stretch,
    ...test(score),
    deviance: test(deviance),
  };
}

function excess(count: number, expected: number): number {
  return count === 0 ? 0 : count * Math.log(count / expected);
}

/** Wilson's upper limit of a share as odds, share ÷ (1 − share), for counts of this and of the others > 0. */
function oddsAbove(count: number, others: number, bar: number): number {
  const events = count + others;
  const reach = Math.sqrt(bar * ((count * others) / events + bar / 4));
  const above = count + bar / 2 + reach;
  // The others' lower limit, written so that a small one is not lost in a difference.
  const othersBelow = (others ** 2 * (1 + bar / events)) / (others + bar / 2 + reach);
  return above / othersBelow;
}
