import { noFigure, type Figure, type NoFigure } from '../figures/no-figure.js';
import { isShare, whyNotCounted, type Counted } from './count.js';
import { betaQuantile } from './distributions.js';

/** The exact comparison of two rates. */
export interface TwoRates {
  /** First rate over second rate; `no-events` where the second count is 0. */
  readonly ratio: Figure;
  /** Exact limits of the ratio; `no-limit` above where the second count is 0. */
  readonly low: number;
  readonly high: Figure;
  /** Two-sided p: the probability of all divisions of the events that are no likelier than the one seen. */
  readonly p: number;
  /** p against "the first rate is lower" and "the first rate is higher". */
  readonly pLess: number;
  readonly pGreater: number;
}

/** Two outcomes whose probabilities differ by less than this share count as equally likely, as in R. */
const TIE = 1 + 1e-7;

/**
 * Compares the rates of two Poisson counts exactly: given the sum of the counts, the first is binomial.
 *
 * Source: R `poisson.test` (conditional test; two-sided p by the outcomes no likelier than the observed);
 * interval of the ratio by Clopper and Pearson, Biometrika 26 (1934), on the binomial share.
 * It holds for Poisson counts only: where shifts differ more than that it cries wolf (see two-weeks.ts).
 *
 * @param first, second events and exposures, in the same unit of exposure
 * @param level coverage of the interval, between 0 and 1
 * @returns the comparison, or no figure: `no-exposure` where either exposure is 0, `missing-input` for NaN,
 *   `out-of-range` otherwise. Tail probabilities under 1e-300 come out as 0.
 */
export function compareTwoRates(first: Counted, second: Counted, level = 0.95): TwoRates | NoFigure {
  const refused = whyNotCounted(first) ?? whyNotCounted(second);
  if (refused) return refused;
  if (Number.isNaN(level)) return noFigure('missing-input');
  if (!isShare(level)) return noFigure('out-of-range');
  if (first.exposure === 0 || second.exposure === 0) return noFigure('no-exposure');

  const tail = (1 - level) / 2;
  const stretch = second.exposure / first.exposure;
  return {
    ratio: second.count === 0 ? noFigure('no-events') : (first.count / second.count) * stretch,
    low: first.count === 0 ? 0 : oddsQuantile(tail, first.count, second.count + 1) * stretch,
    high:
      second.count === 0
        ? noFigure('no-limit')
        : oddsQuantile(1 - tail, first.count + 1, second.count) * stretch,
    ...conditionalTails(first.count, first.count + second.count, first.exposure, second.exposure),
  };
}

/**
 * The quantile of share ÷ (1 − share) for a beta-distributed share. 1 − share is a beta quantile of its own:
 * subtracting would lose the digits of a share near 1.
 */
function oddsQuantile(p: number, a: number, b: number): number {
  return betaQuantile(p, a, b) / betaQuantile(1 - p, b, a);
}

/**
 * The binomial probabilities, outward from the likeliest outcome by their ratios: no factorials to overflow.
 * Divided by their sum they are as exact as the additions.
 */
function conditionalTails(x: number, n: number, t1: number, t2: number) {
  const odds = t1 / t2;
  const weights = new Float64Array(n + 1);
  const mode = Math.min(n, Math.floor(((n + 1) * t1) / (t1 + t2)));
  weights[mode] = 1;
  for (let k = mode; k < n; k++) weights[k + 1] = weights[k] * ((n - k) / (k + 1)) * odds;
  for (let k = mode; k > 0; k--) weights[k - 1] = (weights[k] * (k / (n - k + 1))) / odds;

  let below = 0;
  let above = 0;
  let noLikelier = 0;
  weights.forEach((weight, k) => {
    if (k < x) below += weight;
    if (k > x) above += weight;
    if (weight <= weights[x] * TIE) noLikelier += weight;
  });
  const all = below + above + weights[x];
  return {
    p: Math.min(1, noLikelier / all),
    pLess: (below + weights[x]) / all,
    pGreater: (above + weights[x]) / all,
  };
}
