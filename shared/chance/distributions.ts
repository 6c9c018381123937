/// <reference types="./jstat.js" />
import gammaIncomplete from '@stdlib/math-base-special-gammainc';
import betaQuantileOf from '@stdlib/stats-base-dists-beta-quantile';
import fCdf from '@stdlib/stats-base-dists-f-cdf';
import fQuantileOf from '@stdlib/stats-base-dists-f-quantile';
import jstat from 'jstat';

/**
 * The one door to the statistics packages: nobody else in the project imports them. Each function comes from
 * the package that is exact where the project needs it. Arguments are checked by the callers.
 */

/**
 * The x with P(X ≤ x) = `p` of a chi-square variable with `degrees` > 0 (which need not be whole), 0 < p < 1.
 * jstat: within 1.3e-11 of R over 1 to 6000 degrees; the other package errs by up to 4e-4 from 1840 up.
 */
export function chiSquareQuantile(p: number, degrees: number): number {
  return jstat.chisquare.inv(p, degrees);
}

/**
 * P(X > x) of a chi-square variable with `degrees` > 0, x ≥ 0.
 *
 * jstat has only the lower tail, and `1 - cdf` has lost its digits by 1e-6: down to there it is good to 1e-9. A
 * deeper tail comes from the other package's upper incomplete gamma function: to 1e-12 as long as x ≤ 2,000, above
 * that up to .7% too large (measured against the sum of Poisson terms), which no reader of so small a p will miss.
 */
export function chiSquareUpperTail(x: number, degrees: number): number {
  const upper = 1 - jstat.chisquare.cdf(x, degrees);
  return upper > 1e-6 ? upper : gammaIncomplete(x / 2, degrees / 2, true, true);
}

/** The z that a standard normal variable stays within, either side of 0, with probability `p`: 1.96 for .95. */
export function normalHalfWidth(p: number): number {
  return Math.sqrt(jstat.chisquare.inv(p, 1));
}

/** The x with P(X ≤ x) = `p` of a beta variable with shapes `a`, `b` > 0. */
export function betaQuantile(p: number, a: number, b: number): number {
  return betaQuantileOf(p, a, b);
}

/** The x with P(X ≤ x) = `p` of an F variable. */
export function fQuantile(p: number, numerator: number, denominator: number): number {
  return fQuantileOf(p, numerator, denominator);
}

/**
 * P(F > x) of an F variable. Its reciprocal is F with the degrees exchanged, so the upper tail is a lower tail
 * and stays exact where `1 - cdf` would underflow to 0.
 */
export function fUpperTail(x: number, numerator: number, denominator: number): number {
  return x <= 0 ? 1 : fCdf(1 / x, denominator, numerator);
}
