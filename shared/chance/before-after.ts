import { breakRate, type CountInterval } from '../figures/breaks.js';
import { isNoFigure, noFigure, type Figure } from '../figures/no-figure.js';
import type { Rate } from '../entries/loom-line.js';
import type { Dispersion } from './over-dispersion.js';
import { poissonInterval } from './poisson-interval.js';
import { compareWithDispersion } from './quasi-poisson.js';

/** A woven shift of one loom. Moments in milliseconds since 1970. */
export interface WovenShift {
  readonly startsAt: number;
  readonly endsAt: number;
  readonly picks: number;
  readonly warpBreaks: number;
  readonly weftBreaks: number;
}

export interface Side {
  readonly shifts: number;
  readonly picks: number;
  /** Breaks per 10⁵ picks with the interval of the count. */
  readonly warp: Rate;
  readonly weft: Rate;
}

/** After ÷ before with its 95% interval; `shown`: the interval leaves out 1. */
export interface Change {
  readonly ratio: Figure;
  readonly low: number | null;
  readonly high: number | null;
  readonly shown: boolean;
}

export interface BeforeAfter {
  readonly before: Side;
  readonly after: Side;
  readonly warpChange: Change;
  readonly weftChange: Change;
  /** Another warp lay in the loom in some of the shifts on one side: those are left out. */
  readonly otherWarp: boolean;
}

/** Shifts on either side that a repair is judged by. */
export const SIDE_SHIFTS = 9;

/**
 * Breaks of a loom before and after a moment, such as a repair: so many shifts on either side, the shift of the moment
 * itself left out, since it belongs to neither. Only shifts that lie whole within `bounds` (one warp) count. Intervals
 * carry the dispersion between shifts, or a change would be seen on most pages where nothing changed.
 *
 * @param shifts of the loom with known picks, in order of time
 * @param bounds when this warp came in, and when the next one did (`Infinity`: it is still in)
 * @param dispersion φ and its degrees of freedom between shifts of the shed; null: not known, then no change is judged
 */
export function beforeAfter(
  shifts: readonly WovenShift[],
  at: number,
  bounds: { readonly from: number; readonly until: number },
  dispersion: Pick<Dispersion, 'dispersion' | 'degrees'> | null,
): BeforeAfter {
  const earlier = shifts.filter((shift) => shift.endsAt <= at).slice(-SIDE_SHIFTS);
  const later = shifts.filter((shift) => shift.startsAt > at).slice(0, SIDE_SHIFTS);
  const same = ({ startsAt, endsAt }: WovenShift) => startsAt >= bounds.from && endsAt <= bounds.until;
  const [before, after] = [earlier.filter(same), later.filter(same)];
  const interval: CountInterval = (count) => poissonInterval(count, 0.95, dispersion?.dispersion ?? 1);
  const change = (breaks: 'warpBreaks' | 'weftBreaks'): Change => {
    if (!dispersion) return NOT_JUDGED;
    const found = compareWithDispersion(counted(before, breaks), counted(after, breaks), dispersion);
    if (isNoFigure(found)) return { ...NOT_JUDGED, ratio: found };
    const high = isNoFigure(found.high) ? null : found.high;
    const shown = found.p < 0.05;
    return { ratio: found.ratio, low: found.low, high, shown };
  };
  return {
    before: sideOf(before, interval),
    after: sideOf(after, interval),
    warpChange: change('warpBreaks'),
    weftChange: change('weftBreaks'),
    otherWarp: before.length < earlier.length || after.length < later.length,
  };
}

const NOT_JUDGED: Change = { ratio: noFigure('not-comparable'), low: null, high: null, shown: false };

function counted(shifts: readonly WovenShift[], breaks: 'warpBreaks' | 'weftBreaks') {
  return { count: sum(shifts.map((one) => one[breaks])), exposure: sum(shifts.map((one) => one.picks)) };
}

function sideOf(shifts: readonly WovenShift[], interval: CountInterval): Side {
  const picks = sum(shifts.map((one) => one.picks));
  const rate = (breaks: 'warpBreaks' | 'weftBreaks') =>
    breakRate(counted(shifts, breaks).count, picks, interval);
  return { shifts: shifts.length, picks, warp: rate('warpBreaks'), weft: rate('weftBreaks') };
}

function sum(values: readonly number[]): number {
  return values.reduce((all, one) => all + one, 0);
}
