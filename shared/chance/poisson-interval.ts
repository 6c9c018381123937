import { isNoFigure, noFigure, type NoFigure } from '../figures/no-figure.js';
import { chiSquareQuantile } from './distributions.js';

/** Limits of a confidence interval, in the unit of the estimate. */
export interface Interval {
  readonly low: number;
  readonly high: number;
}

/** A rate with its interval, all per the same exposure. */
export interface Rate extends Interval {
  readonly rate: number;
}

/**
 * The exact confidence interval for the mean of a count of rare events, such as the breaks of a loom line.
 *
 * Source: F. Garwood, Biometrika 28 (1936): low = ½χ²(α/2; 2x), high = ½χ²(1 − α/2; 2x + 2); low is 0 at x = 0.
 *
 * Over-dispersion: where shifts differ more than Poisson allows (`dispersion` φ > 1), count and exposure are
 * divided by φ, the exact interval of that effective count is taken, and multiplied by φ again. A count with
 * variance φ·mean, divided by φ, has a variance equal to its mean, as a Poisson count has: x breaks then carry
 * no more knowledge than x/φ breaks would without over-dispersion.
 *
 * @param count events counted, a whole number ≥ 0
 * @param level coverage, between 0 and 1, .95 unless said
 * @param dispersion φ, variance over mean, ≥ 1 (see over-dispersion.ts)
 * @returns limits of the mean count, or no figure: `missing-input` for NaN, `out-of-range` otherwise
 */
export function poissonInterval(count: number, level = 0.95, dispersion = 1): Interval | NoFigure {
  if ([count, level, dispersion].some(Number.isNaN)) return noFigure('missing-input');
  if (!Number.isSafeInteger(count) || count < 0) return noFigure('out-of-range');
  if (!(level > 0 && level < 1) || !(dispersion >= 1 && dispersion < Infinity))
    return noFigure('out-of-range');
  const tail = (1 - level) / 2;
  const effective = count / dispersion;
  return {
    low: count === 0 ? 0 : (dispersion * chiSquareQuantile(tail, 2 * effective)) / 2,
    high: (dispersion * chiSquareQuantile(1 - tail, 2 * effective + 2)) / 2,
  };
}

/**
 * A count as a rate per so much exposure, with its exact interval: 3 breaks in 74,250 picks, per 100,000 picks,
 * is 4.04 (.83 to 11.81).
 *
 * @param count events counted, a whole number ≥ 0
 * @param exposure what they were counted over (picks, metres, shifts), > 0
 * @param per the exposure that the rate is stated for, in the same unit, > 0: 1e5 for breaks per 10⁵ picks
 * @returns rate and limits, or no figure: `no-exposure` where nothing was woven, else as `poissonInterval`
 */
export function ratePer(
  count: number,
  exposure: number,
  per: number,
  level = 0.95,
  dispersion = 1,
): Rate | NoFigure {
  const interval = poissonInterval(count, level, dispersion);
  if (isNoFigure(interval)) return interval;
  if (Number.isNaN(exposure) || Number.isNaN(per)) return noFigure('missing-input');
  if (exposure === 0) return noFigure('no-exposure');
  if (!(exposure > 0 && exposure < Infinity) || !(per > 0 && per < Infinity)) return noFigure('out-of-range');
  const scale = per / exposure;
  return { rate: count * scale, low: interval.low * scale, high: interval.high * scale };
}
