import type { Rate } from '../entries/loom-line.js';
import { ratio } from './efficiency.js';
import { isNoFigure, noFigure, type Figure, type NoFigure } from './no-figure.js';

/**
 * The exact interval of a count: `poissonInterval` of shared/chance. It is handed in, since it brings a statistics
 * package along that the loomside screen loads only after it is shown; until then `noInterval` stands in for it.
 */
export type CountInterval = (count: number) => { readonly low: number; readonly high: number } | NoFigure;

/** For a screen that shows no interval (yet). */
export const noInterval: CountInterval = () => noFigure('missing-input');

/** Breaks are stated per so many picks. */
export const BREAKS_PER = 1e5;

/**
 * Breaks per 10⁵ picks, 10⁵·B / A, with the exact 95% interval of the count (Garwood 1936) scaled likewise.
 *
 * @param count B, a whole number ≥ 0
 * @param picks A; no figure where A = 0 (`no-picks`)
 * @param interval the interval of the count, widened or not
 */
export function breakRate(count: number, picks: Figure, interval: CountInterval): Rate {
  const rate = ratio(count * BREAKS_PER, picks, 'no-picks');
  const limits = isNoFigure(rate) ? rate : interval(count);
  if (isNoFigure(limits) || isNoFigure(picks)) return { count, rate, low: null, high: null };
  const scale = BREAKS_PER / picks;
  return { count, rate, low: limits.low * scale, high: limits.high * scale };
}

/**
 * Warp breaks per 10³ ends per 10⁵ picks, 10⁸·B / (A·ends): compares setts.
 *
 * @param pickEnds Σ picks × ends over stretches; no figure where it is 0 (`no-picks`)
 */
export function warpBreaksPer1000Ends(count: number, pickEnds: Figure): Figure {
  return ratio(count * BREAKS_PER * 1000, pickEnds, 'no-picks');
}
