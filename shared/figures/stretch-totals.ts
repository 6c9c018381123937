import type { LineStop, LineTotals, LoomLine, Stretch } from '../entries/loom-line.js';
import { lineTotals } from './loom-line.js';
import { ownValue } from './own-value.js';

/** One stretch of a line and what of the line adds up in it. */
export interface TotalsOfStretch {
  readonly stretch: Stretch;
  readonly totals: LineTotals;
}

/**
 * A line's totals, stretch by stretch: for groups by cloth, warp, weaver or speed, where these changed in mid-shift.
 * Stretches added up give the line (`lineTotals`).
 *
 * A stop counts in the stretch in which it began and costs each its minutes. What is stated for the whole shift has
 * no moment: counts at hand-over beyond those that were timed, and a sheet's minutes, are shared by length. Counts
 * stay whole, so that the picks which their allowances cost are the line's but for rounding, where speeds differ.
 *
 * @param asOf as in `lineTotals`
 */
export function stretchTotals(line: LoomLine, asOf: number): TotalsOfStretch[] {
  const parts = line.stretches.map((stretch, at) => ({ stretch, part: partOf(line, stretch, at) }));
  const bare = parts.map(({ part }) => lineTotals({ ...part, handOverCounts: {}, sheetMinutes: {} }, asOf));
  const lengths = bare.map((totals) => totals.minutes);
  const handOver = Object.entries(line.handOverCounts).map(([cause, total]) => {
    const timed = parts.map(({ part }) => timedCount(part, cause, asOf));
    const rest = total - sum(timed);
    const more = rest > 0 ? shareCount(rest, lengths) : timed.map(() => 0);
    const shared = rest >= 0 ? timed.map((count, at) => count + (more[at] ?? 0)) : shareCount(total, timed);
    return [cause, shared] as const;
  });
  const sheet = Object.entries(line.sheetMinutes).map(([cause, minutes]) => {
    const measured = bare.map((totals) => ownValue(totals.minutesByCause, cause)?.measured ?? 0);
    const rest = Math.max(0, minutes - sum(measured));
    const shares = sharesOf(lengths);
    return [cause, measured.map((own, at) => own + rest * (shares[at] ?? 0))] as const;
  });
  return parts.map(({ stretch, part }, at) => {
    const own = (all: readonly (readonly [string, readonly number[]])[]) =>
      Object.fromEntries(all.map(([cause, shared]) => [cause, shared[at] ?? 0]));
    const whole = { ...part, handOverCounts: own(handOver), sheetMinutes: own(sheet) };
    return { stretch, totals: lineTotals(whole, asOf) };
  });
}

/** The line as if it were one stretch alone; its stops stand in it, and count where they began. */
function partOf(line: LoomLine, stretch: Stretch, at: number): LoomLine {
  const [first, last] = [at === 0, at === line.stretches.length - 1];
  const beganHere = ({ from }: LineStop) => (first || from >= stretch.from) && (last || from < stretch.until);
  return {
    ...line,
    stretches: [stretch],
    picks: line.picks === null ? null : stretch.picks,
    stops: line.stops.map((stop) => (beganHere(stop) ? stop : { ...stop, count: 0, estimatedMs: 0 })),
  };
}

/** Stops of a cause that cost no allowance: timed, or inside a timed one. */
function timedCount({ stops }: LoomLine, cause: string, asOf: number): number {
  const timed = stops.filter(
    (stop) => stop.cause === cause && stop.from <= asOf && (stop.timed || stop.estimatedMs === 0),
  );
  return sum(timed.map((stop) => stop.count));
}

/** Whole numbers that add up to `total`, by shares. */
function shareCount(total: number, weights: readonly number[]): number[] {
  let share = 0;
  let given = 0;
  return sharesOf(weights).map((one, at) => {
    share += one;
    const upTo = at === weights.length - 1 ? total : Math.round(total * share);
    const own = upTo - given;
    given = upTo;
    return own;
  });
}

/** Shares by weight; all of it to the last where nothing weighs. */
function sharesOf(weights: readonly number[]): number[] {
  const all = sum(weights);
  return weights.map((weight, at) => (all > 0 ? weight / all : at === weights.length - 1 ? 1 : 0));
}

const sum = (numbers: readonly number[]) => numbers.reduce((total, one) => total + one, 0);
