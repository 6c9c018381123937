import { isNoFigure, noFigure, type Figure, type NoFigure } from '../figures/no-figure.js';
import { total, whyNotCounted, type Counted } from './count.js';
import { enoughToSee, type Enough } from './enough.js';
import { adjust } from './false-discovery.js';
import { dispersionBetweenShifts, type Dispersion } from './over-dispersion.js';
import { compareWithDispersion, type QuasiComparison } from './quasi-poisson.js';

/** One loom in one shift: its breaks of one kind, its picks, and what it wove. */
export interface WovenShift extends Counted {
  readonly cloth: string;
  readonly beam: string;
}

/** One loom's shifts in the two weeks compared. */
export interface LoomWeeks {
  readonly loom: string;
  readonly before: readonly WovenShift[];
  readonly after: readonly WovenShift[];
}

/**
 * What the page says of a loom. `changed`: named at the page's false discovery rate. `no-change-shown`: not
 * named, though a doubling would most likely have been seen. `too-little`: not named, and a doubling could
 * easily have been missed. `warp-changed`: another cloth or beam, so the loom itself is not judged.
 */
export type Verdict = 'changed' | 'no-change-shown' | 'too-little' | 'warp-changed';

export interface LoomVerdict {
  readonly loom: string;
  readonly verdict: Verdict;
  readonly before: Counted;
  readonly after: Counted;
  /** Ratio after ÷ before, interval and p; none where a week has no picks or the warp changed. */
  readonly comparison: QuasiComparison | NoFigure;
  /** p adjusted for the looms judged on the page; `not-comparable` where the loom is not judged. */
  readonly adjusted: Figure;
  /** What would be enough, in each week, to see a doubling four times in five. */
  readonly enough: Enough | NoFigure;
}

export interface TwoWeeksPage {
  /** Dispersion between shifts within loom, cloth, beam and week, pooled over the looms shown. */
  readonly dispersion: Dispersion;
  readonly looms: readonly LoomVerdict[];
}

/** Expected share of looms named falsely among those named. */
const FALSE_DISCOVERY = 0.05;

/**
 * A page that compares two weeks, loom by loom: which looms changed, and which differ by no more than shifts
 * do anyhow. Each comparison carries the page's dispersion; Benjamini–Hochberg over the looms judged.
 *
 * @param looms breaks and picks of each loom's shifts; shifts without picks are left out
 * @returns the page, or no figure: `no-exposure` where no loom has two woven shifts and a break in one week,
 *   `missing-input` for NaN, `out-of-range` otherwise
 */
export function compareTwoWeeks(looms: readonly LoomWeeks[]): TwoWeeksPage | NoFigure {
  for (const shift of looms.flatMap((loom) => [...loom.before, ...loom.after])) {
    const refused = whyNotCounted(shift);
    if (refused) return refused;
  }
  const dispersion = dispersionBetweenShifts(looms.flatMap(groupsOf));
  if (isNoFigure(dispersion)) return dispersion;

  const compared = looms.map((loom) => compareLoom(loom, dispersion));
  const judged = compared.flatMap(({ comparison }, at) =>
    isNoFigure(comparison) ? [] : [{ at, p: comparison.p }],
  );
  const adjustedP = adjust(judged.map(({ p }) => p));
  const adjustedAt = new Map(judged.map(({ at }, rank) => [at, adjustedP[rank]]));
  const shed = total(compared.flatMap((one) => [one.before, one.after]));
  const verdicts = compared.map((one, at): LoomVerdict => {
    const seen = total([one.before, one.after]);
    const { count, exposure } = seen.count > 0 ? seen : shed;
    const comparisons = Math.max(1, judged.length);
    const enough = enoughToSee(count / exposure, dispersion.dispersion, { comparisons });
    const adjusted = adjustedAt.get(at) ?? noFigure('not-comparable');
    return { ...one, adjusted, enough, verdict: verdictOn(one, adjusted, enough) };
  });
  return { dispersion, looms: verdicts };
}

type Compared = Pick<LoomVerdict, 'loom' | 'before' | 'after' | 'comparison'>;

function compareLoom(weeks: LoomWeeks, dispersion: Dispersion): Compared {
  const before = total(woven(weeks.before));
  const after = total(woven(weeks.after));
  const bothWove = before.exposure > 0 && after.exposure > 0;
  const comparison =
    bothWove && warpsOf(weeks.before) !== warpsOf(weeks.after)
      ? noFigure('not-comparable')
      : compareWithDispersion(before, after, dispersion);
  return { loom: weeks.loom, before, after, comparison };
}

function verdictOn(one: Compared, adjusted: Figure, enough: Enough | NoFigure): Verdict {
  if (isNoFigure(one.comparison) && one.comparison.none === 'not-comparable') return 'warp-changed';
  if (isNoFigure(adjusted)) return 'too-little';
  if (adjusted <= FALSE_DISCOVERY) return 'changed';
  const least = Math.min(one.before.exposure, one.after.exposure);
  return !isNoFigure(enough) && least >= enough.exposure ? 'no-change-shown' : 'too-little';
}

/** Within a group nothing but chance and the run of the shed sets shifts apart. */
function groupsOf(weeks: LoomWeeks): WovenShift[][] {
  return [weeks.before, weeks.after].flatMap((week) => {
    const groups = new Map<string, WovenShift[]>();
    for (const shift of woven(week)) groups.set(warpOf(shift), [...(groups.get(warpOf(shift)) ?? []), shift]);
    return [...groups.values()];
  });
}

function woven(week: readonly WovenShift[]): WovenShift[] {
  return week.filter((shift) => shift.exposure > 0);
}

function warpOf(shift: WovenShift): string {
  return JSON.stringify([shift.cloth, shift.beam]);
}

/** The cloths and beams of a week, as one key. */
function warpsOf(week: readonly WovenShift[]): string {
  return [...new Set(woven(week).map(warpOf))].sort().join();
}
