import { fQuantile } from '../chance/distributions.js';
import { isNoFigure, noFigure, type Figure, type NoFigure } from '../figures/no-figure.js';

const HOUR = 3_600_000;

/** A beam in the loom and the cloth woven from it. */
export interface BeamLeft {
  /** Warp left on the beam, metres: length gaited less warp used. May be negative where the books are. */
  readonly left: number;
  /** Warp at the end that cannot be woven, metres, ≥ 0. */
  readonly thrum: number;
  /** Crimp as (L − S) ÷ S, ≥ 0: .06 for 6%. */
  readonly crimp: number;
  /** Picks per cm of cloth, loom state, > 0. */
  readonly picksPerCm: number;
}

/** A recent shift of the loom, warp and speed as now. */
export interface RecentShift {
  readonly picks: number;
  /** Shift hours that the picks are held against, > 0. */
  readonly hours: number;
}

/** A shift of the calendar, from this moment to that, in milliseconds since 1970. */
export interface ShiftAhead {
  readonly start: number;
  readonly end: number;
  /** Hours that looms may run in it, less a meal with looms stopped; the whole of it unless said. */
  readonly hours?: number;
}

/** When a warp runs out. Moments in milliseconds since 1970. */
export interface WarpOut {
  readonly picksPerHour: number;
  /** Shift hours of weaving left. */
  readonly hours: number;
  readonly expected: Figure;
  /** Range that holds the moment as often as asked; `missing-input` with fewer than two recent shifts. */
  readonly earliest: Figure;
  readonly latest: Figure;
}

/**
 * Picks left in a warp: (beam left − thrum) ÷ (1 + crimp) · picks per cm · 100; 0 where no more can be woven.
 *
 * @returns picks, or no figure: `no-cloth` where picks per cm are 0, `missing-input` for NaN, else `out-of-range`
 */
export function picksLeft({ left, thrum, crimp, picksPerCm }: BeamLeft): Figure {
  const all = [left, thrum, crimp, picksPerCm];
  if (all.some(Number.isNaN)) return noFigure('missing-input');
  if (picksPerCm === 0) return noFigure('no-cloth');
  if (!all.every(Number.isFinite) || thrum < 0 || crimp < 0 || picksPerCm < 0)
    return noFigure('out-of-range');
  return Math.max(0, ((left - thrum) / (1 + crimp)) * picksPerCm * 100);
}

/**
 * The moment at which a warp runs out, over the shifts of the calendar, with a range.
 *
 * The rate is a ratio of sums over recent shifts. Picks in h hours to come are foretold as rate·h ± t·σ·√(h +
 * h² ÷ H): σ² is the spread of recent shifts about the rate for one hour, and H their hours together, so that
 * both the run of the shifts ahead and the doubt about the rate count (prediction from a mean, common practice).
 * Earliest and latest are where the upper and the lower of the two reach the picks left.
 *
 * @param picks picks left, ≥ 0 (see `picksLeft`)
 * @param recent shifts of this loom, cloth and speed; shifts without hours are left out
 * @param now the moment from which on it weaves, milliseconds since 1970
 * @param shifts the calendar in order of time, not overlapping; shifts and parts before `now` are passed over
 * @param level how often the range is to hold the moment, .8 unless said: eight warps in ten
 * @returns moments, `beyond-calendar` for those that the calendar does not reach and `no-limit` where the loom
 *   may not weave at all; or no figure: `no-picks` where recent shifts wove none, `no-time` where they have no
 *   hours, `missing-input` for NaN, `out-of-range` otherwise
 */
export function warpOut(
  picks: number,
  recent: readonly RecentShift[],
  now: number,
  shifts: readonly ShiftAhead[],
  level = 0.8,
): WarpOut | NoFigure {
  const all = [picks, now, level, ...recent.flatMap((shift) => [shift.picks, shift.hours])];
  if (all.some(Number.isNaN)) return noFigure('missing-input');
  const impossible = recent.some((shift) => !(shift.picks >= 0 && shift.hours >= 0));
  if (impossible || !all.every(Number.isFinite) || picks < 0 || !(level > 0 && level < 1)) {
    return noFigure('out-of-range');
  }
  if (!shifts.every(isShift)) return noFigure('out-of-range');
  const woven = recent.filter((shift) => shift.hours > 0);
  const recentHours = woven.reduce((sum, shift) => sum + shift.hours, 0);
  if (recentHours === 0) return noFigure('no-time');
  const picksPerHour = woven.reduce((sum, shift) => sum + shift.picks, 0) / recentHours;
  if (picksPerHour === 0) return noFigure('no-picks');

  const hours = picks / picksPerHour;
  const reach = reachOf(woven, picksPerHour, level);
  const moment = (after: Figure) => (isNoFigure(after) ? after : momentAfter(after, now, shifts));
  return {
    picksPerHour,
    hours,
    expected: moment(hours),
    earliest: moment(hoursAt(picks, picksPerHour, reach, recentHours, 1)),
    latest: moment(hoursAt(picks, picksPerHour, reach, recentHours, -1)),
  };
}

/** t·σ, picks by the square root of hours. */
function reachOf(woven: readonly RecentShift[], rate: number, level: number): Figure {
  if (woven.length < 2) return noFigure('missing-input');
  const squares = woven.reduce((sum, { picks, hours }) => sum + (picks - rate * hours) ** 2 / hours, 0);
  const variance = squares / (woven.length - 1);
  // The square of a t variable is F with one degree above.
  return Math.sqrt(fQuantile(level, 1, woven.length - 1) * variance);
}

/** The hours at which rate·h + side·reach·√(h + h² ÷ H) comes to the picks left. */
function hoursAt(picks: number, rate: number, reach: Figure, recentHours: number, side: 1 | -1): Figure {
  if (isNoFigure(reach)) return reach;
  if (picks === 0) return 0;
  // (picks − rate·h)² = reach²·(h + h²/H), a quadratic in h with one root on either side of picks ÷ rate
  const a = rate ** 2 - reach ** 2 / recentHours;
  const half = rate * picks + reach ** 2 / 2;
  const root = Math.sqrt(Math.max(0, half ** 2 - a * picks ** 2));
  if (side > 0) return picks ** 2 / (half + root);
  return a > 0 ? (half + root) / a : noFigure('no-limit');
}

/**
 * The moment by which so many hours have been woven, over the shifts of a calendar from `now` on.
 *
 * @param hours shift hours to weave, ≥ 0
 * @returns milliseconds since 1970, or `beyond-calendar`
 */
export function momentAfter(hours: number, now: number, shifts: readonly ShiftAhead[]): Figure {
  let left = hours;
  if (left === 0) return now;
  for (const shift of shifts) {
    const from = Math.max(now, shift.start);
    if (from >= shift.end) continue;
    const length = (shift.end - shift.start) / HOUR;
    // A meal with looms stopped has no moment in the calendar: it is spread over its shift.
    const pace = (shift.hours ?? length) / length;
    const held = ((shift.end - from) / HOUR) * pace;
    if (held > 0 && left <= held) return from + (left / pace) * HOUR;
    left -= held;
  }
  return noFigure('beyond-calendar');
}

function isShift({ start, end, hours = 0 }: ShiftAhead): boolean {
  return end > start && Number.isFinite(end - start) && hours >= 0 && hours <= (end - start) / HOUR;
}
