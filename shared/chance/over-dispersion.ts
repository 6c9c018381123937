import { noFigure, type NoFigure } from '../figures/no-figure.js';
import { total, whyNotCounted, type Counted } from './count.js';
import { chiSquareUpperTail } from './distributions.js';

/** How much more shifts differ than Poisson counts would. */
export interface Dispersion {
  /** φ, variance over mean, never below 1: what intervals and comparisons carry. */
  readonly dispersion: number;
  /** Pearson X² ÷ degrees of freedom as it came out, which chance can put below 1. */
  readonly asFound: number;
  /** Pearson X², the sum of (seen − expected)² ÷ expected. */
  readonly pearson: number;
  /** Degrees of freedom: shifts that counted, less one for each group. */
  readonly degrees: number;
  /** The probability of an X² as large if shifts differed by chance alone. */
  readonly p: number;
}

/**
 * Estimates the dispersion between shifts within groups, pooled over the groups. A group holds shifts that
 * nothing but chance and the run of the shed sets apart: one loom, one cloth, one beam (and one of two weeks,
 * where weeks are compared, so that a change does not pass for dispersion).
 *
 * Pearson's statistic with each group's own rate: the dispersion of R's `glm(…, quasipoisson)`; P. McCullagh
 * and J. A. Nelder, Generalized Linear Models, 1989, chapters 4.5 and 6 (from memory). With equal exposures
 * its expectation at φ = 1 is exact however small the counts are.
 *
 * Shifts without picks have nothing to hold their stops against and are left out; so are groups without a
 * single break, which would count as perfectly even and pull φ down, and groups of one shift.
 *
 * @param groups shifts by group, counts whole and ≥ 0
 * @returns φ and its grounds, or no figure: `no-exposure` where no group has two shifts and a break,
 *   `missing-input` for NaN, `out-of-range` otherwise
 */
export function dispersionBetweenShifts(groups: readonly (readonly Counted[])[]): Dispersion | NoFigure {
  let pearson = 0;
  let degrees = 0;
  for (const group of groups) {
    for (const shift of group) {
      const refused = whyNotCounted(shift);
      if (refused) return refused;
    }
    const woven = group.filter((shift) => shift.exposure > 0);
    const sum = total(woven);
    if (woven.length < 2 || sum.count === 0) continue;
    pearson += pearsonStatistic(woven, sum);
    degrees += woven.length - 1;
  }
  if (degrees === 0) return noFigure('no-exposure');
  const asFound = pearson / degrees;
  const p = chiSquareUpperTail(pearson, degrees);
  return { dispersion: Math.max(1, asFound), asFound, pearson, degrees, p };
}

/** Σ (seen − expected)² ÷ expected of counts against one common rate. Exposures and the sum of counts are > 0. */
export function pearsonStatistic(counted: readonly Counted[], sum = total(counted)): number {
  return counted.reduce((statistic, { count, exposure }) => {
    const expected = (sum.count / sum.exposure) * exposure;
    return statistic + (count - expected) ** 2 / expected;
  }, 0);
}
