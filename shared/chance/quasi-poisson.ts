import { isNoFigure, noFigure, type Figure, type NoFigure } from '../figures/no-figure.js';
import { isShare, whyNotCounted, type Counted } from './count.js';
import { fQuantile, fUpperTail } from './distributions.js';
import type { Dispersion } from './over-dispersion.js';

/** The comparison of two rates that carries the dispersion between shifts. */
export interface QuasiComparison {
  /** Rate after ÷ rate before; `no-events` where there were none before. */
  readonly ratio: Figure;
  /** Limits of the ratio; they leave out 1 just where p is under 1 − level. */
  readonly low: number;
  readonly high: Figure;
  /** F statistic, 1 and `degrees` degrees of freedom. */
  readonly f: number;
  readonly p: number;
}

/**
 * Compares two rates with the dispersion between shifts: the fall in deviance from one rate to two, over φ,
 * held against F. The interval holds the ratios that the same test would not refuse (profile likelihood).
 *
 * Source: R `anova(glm(breaks ~ week + offset(log(picks)), quasipoisson), test = "F")`; McCullagh and Nelder,
 * Generalized Linear Models, 1989 (from memory).
 *
 * @param before, after the sums over each week's shifts, in the same unit of exposure
 * @param dispersion φ ≥ 1 and the degrees of freedom it rests on, ≥ 1
 * @param level coverage of the interval
 * @returns the comparison, or no figure: `no-exposure` where a week has none, `missing-input` for NaN,
 *   `out-of-range` otherwise
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
  if (
    !isShare(level) ||
    !(dispersion >= 1 && dispersion < Infinity) ||
    !(degrees >= 1 && degrees < Infinity)
  ) {
    return noFigure('out-of-range');
  }
  if (before.exposure === 0 || after.exposure === 0) return noFigure('no-exposure');

  const f = devianceAt(1, before, after) / dispersion;
  const bar = fQuantile(level, 1, degrees) * dispersion;
  const ratio = rateRatio(before, after);
  const high = before.count === 0 ? Infinity : limit(before, after, bar, ratio, 1);
  return {
    ratio,
    low: after.count === 0 ? 0 : limit(before, after, bar, ratio, -1),
    high: Number.isFinite(high) ? high : noFigure('no-limit'),
    f,
    p: fUpperTail(f, 1, degrees),
  };
}

function rateRatio(before: Counted, after: Counted): Figure {
  if (before.count === 0) return noFigure('no-events');
  return (after.count / before.count) * (before.exposure / after.exposure);
}

/** Twice the loss of log likelihood where the ratio of rates is held at `ratio` instead of fitted. */
function devianceAt(ratio: number, before: Counted, after: Counted): number {
  const sum = before.count + after.count;
  const odds = (ratio * after.exposure) / before.exposure;
  const loss = excess(after.count, sum / (1 + 1 / odds)) + excess(before.count, sum / (1 + odds));
  return Math.max(0, 2 * loss);
}

function excess(count: number, expected: number): number {
  return count === 0 ? 0 : count * Math.log(count / expected);
}

/**
 * The ratio on one side of the estimate where the deviance reaches `bar`, by bisection of its logarithm. With
 * no events in a week the estimate is 0 or has no bound, the deviance rises from there in one direction only.
 * With a single degree of freedom and few events a limit can lie beyond all numbers: 0 or Infinity then.
 */
function limit(before: Counted, after: Counted, bar: number, ratio: Figure, side: 1 | -1): number {
  const level = isNoFigure(ratio) || ratio === 0 ? before.exposure / after.exposure : ratio;
  let inside = Math.log(level);
  let step = 1;
  while (devianceAt(Math.exp(inside), before, after) > bar) inside -= side;
  let outside = inside + side;
  while (devianceAt(Math.exp(outside), before, after) < bar) {
    inside = outside;
    step *= 2;
    outside += side * step;
  }
  for (let halving = 0; halving < 200 && Math.abs(outside - inside) > 1e-14; halving++) {
    const middle = (inside + outside) / 2;
    if (devianceAt(Math.exp(middle), before, after) < bar) inside = middle;
    else outside = middle;
  }
  return Math.exp((inside + outside) / 2);
}
