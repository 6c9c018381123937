import { isNoFigure, noFigure, type Figure, type NoFigure } from '../figures/no-figure.js';
import { total, whyNotCounted, type Counted } from './count.js';
import { pearsonStatistic } from './over-dispersion.js';

/** The mean range of two normal values in standard deviations, as the printed tables round it. */
export const D2 = 1.128;

/** On which side of its limits a point is out, or null where it is not. */
export type Side = 'above' | 'below';

export interface ChartPoint {
  readonly value: number;
  readonly low: number;
  readonly high: number;
  readonly out: Side | null;
}

/** A control chart of counts or rates, three standard deviations to either side. */
export interface CountChart {
  readonly centre: number;
  /** What the Poisson standard deviation was multiplied by: 1 on a plain chart. */
  readonly widening: number;
  /** A point for each count given, in their order; `no-exposure` where nothing was woven. */
  readonly points: readonly (ChartPoint | NoFigure)[];
}

/**
 * Whether a value is out of its limits. A point exactly on a limit is not out; the last bits of a division
 * must not put it there.
 */
export function sideOut(value: number, low: number, high: number): Side | null {
  const slack = 1e-12 * Math.max(Math.abs(value), Math.abs(low), Math.abs(high));
  if (value > high + slack) return 'above';
  if (value < low - slack) return 'below';
  return null;
}

/**
 * c chart: counts over equal lengths. Mean ± 3√mean, the lower limit not below 0.
 *
 * Source: NIST/SEMATECH e-Handbook 6.3.3.1.
 *
 * @param counts whole numbers ≥ 0, one for each equal length
 * @returns the chart, or no figure: `missing-input` where there are no counts or NaN, else `out-of-range`
 */
export function cChart(counts: readonly number[]): CountChart | NoFigure {
  if (counts.length === 0) return noFigure('missing-input');
  return uChart(counts.map((count) => ({ count, exposure: 1 })));
}

/**
 * u chart: rates over varying exposures. Each point has its own limits, u ± 3·widening·√(u ÷ exposure).
 *
 * Source: SAS/QC `UCHART`, NIST/SEMATECH e-Handbook 6.3.3.1; widened limits, D. B. Laney, Quality Engineering
 * 14 (2002).
 *
 * @param counted counts and exposures; exposure in the unit that the rate is wanted for
 * @param widening what the limits are widened by, ≥ 0: 1, `pearsonWidening` or `laneySigmaZ`
 * @returns the chart, centre and limits in events per unit of exposure, or no figure: `no-exposure` where
 *   there is none at all, `missing-input` for NaN, `out-of-range` otherwise
 */
export function uChart(counted: readonly Counted[], widening = 1): CountChart | NoFigure {
  const refused = whyNone(counted);
  if (refused) return refused;
  if (Number.isNaN(widening)) return noFigure('missing-input');
  if (!(widening >= 0 && widening < Infinity)) return noFigure('out-of-range');
  const sum = total(counted.filter((one) => one.exposure > 0));
  const centre = sum.count / sum.exposure;
  const points = counted.map(({ count, exposure }) => {
    if (exposure === 0) return noFigure('no-exposure');
    const reach = 3 * widening * Math.sqrt(centre / exposure);
    const value = count / exposure;
    const low = Math.max(0, centre - reach);
    const high = centre + reach;
    return { value, low, high, out: sideOut(value, low, high) };
  });
  return { centre, widening, points };
}

/**
 * What the limits of a u chart across looms are widened by: √(Pearson X² ÷ degrees of freedom), never below 1.
 * Many looms in one week have no order in time, so all of them together say how far looms differ.
 *
 * @returns the factor, or no figure: `no-exposure` where fewer than two have any, else as `uChart`
 */
export function pearsonWidening(counted: readonly Counted[]): Figure {
  const refused = whyNone(counted);
  if (refused) return refused;
  const woven = counted.filter((one) => one.exposure > 0);
  if (woven.length < 2) return noFigure('no-exposure');
  const sum = total(woven);
  if (sum.count === 0) return 1;
  return Math.sqrt(Math.max(1, pearsonStatistic(woven, sum) / (woven.length - 1)));
}

/**
 * What the limits of a chart of one loom over time are widened by: the mean moving range of the standardised
 * rates, ÷ 1.128. Neighbours in time tell the usual spread from a drift. As published it may fall below 1 and
 * then narrows the limits.
 *
 * Source: D. B. Laney, Quality Engineering 14 (2002), 531–537.
 *
 * @param counted counts and exposures in the order of time; those without exposure are passed over
 * @returns σz, or no figure: `no-exposure` where fewer than two have any, `no-events` where nothing was counted
 */
export function laneySigmaZ(counted: readonly Counted[]): Figure {
  const refused = whyNone(counted);
  if (refused) return refused;
  const woven = counted.filter((one) => one.exposure > 0);
  if (woven.length < 2) return noFigure('no-exposure');
  const sum = total(woven);
  if (sum.count === 0) return noFigure('no-events');
  const centre = sum.count / sum.exposure;
  return (
    meanMovingRange(
      woven.map(({ count, exposure }) => (count / exposure - centre) / Math.sqrt(centre / exposure)),
    ) / D2
  );
}

/** Laney's u′ chart: a u chart over time, its limits widened by `laneySigmaZ`. */
export function laneyChart(counted: readonly Counted[]): CountChart | NoFigure {
  const sigmaZ = laneySigmaZ(counted);
  return isNoFigure(sigmaZ) ? sigmaZ : uChart(counted, sigmaZ);
}

/** The mean of the absolute differences between neighbours; at least two values. */
export function meanMovingRange(values: readonly number[]): number {
  let sum = 0;
  for (let at = 1; at < values.length; at++) sum += Math.abs(values[at] - values[at - 1]);
  return sum / (values.length - 1);
}

function whyNone(counted: readonly Counted[]): NoFigure | null {
  for (const one of counted) {
    const refused = whyNotCounted(one);
    if (refused) return refused;
  }
  return counted.some((one) => one.exposure > 0) ? null : noFigure('no-exposure');
}
