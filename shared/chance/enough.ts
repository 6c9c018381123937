import { noFigure, type NoFigure } from '../figures/no-figure.js';
import { isShare } from './count.js';
import { normalHalfWidth } from './distributions.js';

/** What would be enough to see a change, in each of two equally long weeks. */
export interface Enough {
  /** Exposure needed in each week, in the unit of the rate's exposure: picks where the rate is per pick. */
  readonly exposure: number;
  /** Events expected in that exposure before the change. */
  readonly events: number;
}

/** What counts as enough. */
export interface EnoughAim {
  /** The change to be seen, rate after ÷ rate before, > 0 and not 1: a doubling unless said. */
  readonly ratio?: number;
  /** How often a change of that size is to be found: .8 unless said. */
  readonly power?: number;
  /** Share of false alarms allowed to one comparison: .05 unless said. */
  readonly level?: number;
  /** Comparisons on the page: the level is divided by it, the strictest that false discovery control asks. */
  readonly comparisons?: number;
}

/**
 * How much must be woven in each week for a change of rate to be found.
 *
 * Square roots of counts have a steady variance of φ/4, so √after − √before = (√r − 1)·√events must be
 * (z of level + z of power)·√(φ/2). Source: the square-root statistic for two Poisson rates, Gu, Ng, Tang
 * and Schucany, Biometrical Journal 50 (2008) (from memory; its power is confirmed by simulation in the spec).
 *
 * @param rate events per unit of exposure before the change, > 0
 * @param dispersion φ between shifts, ≥ 1
 * @returns exposure and events, or no figure: `no-events` where the rate is 0, `missing-input` for NaN,
 *   `out-of-range` otherwise
 */
export function enoughToSee(rate: number, dispersion = 1, aim: EnoughAim = {}): Enough | NoFigure {
  const { ratio = 2, power = 0.8, level = 0.05, comparisons = 1 } = aim;
  if ([rate, dispersion, ratio, power, level, comparisons].some(Number.isNaN))
    return noFigure('missing-input');
  if (rate === 0) return noFigure('no-events');
  const possible =
    rate > 0 &&
    rate < Infinity &&
    dispersion >= 1 &&
    dispersion < Infinity &&
    ratio > 0 &&
    ratio < Infinity &&
    ratio !== 1 &&
    power > 0.5 &&
    power < 1 &&
    isShare(level) &&
    comparisons >= 1 &&
    comparisons < Infinity;
  if (!possible) return noFigure('out-of-range');
  const z = normalHalfWidth(1 - level / comparisons) + normalHalfWidth(2 * power - 1);
  const events = (dispersion * z ** 2) / (2 * (Math.sqrt(ratio) - 1) ** 2);
  return { exposure: events / rate, events };
}
