import { isNoFigure, noFigure, type NoFigure } from '../figures/no-figure.js';
import { isShare } from './count.js';

/**
 * Adjusts p-values so that, of those kept at or below q, at most a share q is expected to be false.
 *
 * Source: Y. Benjamini and Y. Hochberg, J. R. Statist. Soc. B 57 (1995); R `p.adjust(p, "BH")`: from the
 * largest down, the least so far of p·m ÷ rank.
 *
 * @param p p-values, each 0 to 1, in any order
 * @returns the adjusted values in the same order, or no figure: `missing-input` for NaN, else `out-of-range`
 */
export function benjaminiHochberg(p: readonly number[]): readonly number[] | NoFigure {
  if (p.some(Number.isNaN)) return noFigure('missing-input');
  if (p.some((value) => value < 0 || value > 1)) return noFigure('out-of-range');
  return adjust(p);
}

/** `benjaminiHochberg` of p-values that are known to be possible. */
export function adjust(p: readonly number[]): readonly number[] {
  const largestFirst = p.map((_, at) => at).sort((a, b) => p[b] - p[a]);
  const adjusted = new Array<number>(p.length);
  let least = 1;
  largestFirst.forEach((at, k) => {
    least = Math.min(least, (p[at] * p.length) / (p.length - k));
    adjusted[at] = least;
  });
  return adjusted;
}

/**
 * Which of a page of p-values are discoveries at false discovery rate `rate`.
 *
 * @param rate expected share of false ones among those named, between 0 and 1, .05 unless said
 * @returns one truth value for each p, or no figure as `benjaminiHochberg`
 */
export function discoveries(p: readonly number[], rate = 0.05): readonly boolean[] | NoFigure {
  if (Number.isNaN(rate)) return noFigure('missing-input');
  if (!isShare(rate)) return noFigure('out-of-range');
  const adjusted = benjaminiHochberg(p);
  return isNoFigure(adjusted) ? adjusted : adjusted.map((value) => value <= rate);
}
