import { noFigure, type NoFigure } from '../figures/no-figure.js';
import { solve, whyNotSet, type AttendingTimes } from './interference.js';

/** What a set's log says of the weaver's stops, summed over its looms. */
export interface LoggedStops {
  /** Stops that the weaver attended, > 0. */
  readonly stops: number;
  /** Minutes that the looms ran, > 0. */
  readonly runningMinutes: number;
  /** Minutes that they stood for those stops, waiting for the weaver included, ≥ 0. */
  readonly standingMinutes: number;
}

export interface SolvedAttendingTime {
  /** Mean minutes to attend a stop, without waiting. */
  readonly attendingMinutes: number;
  /** Mean minutes that a stopped loom waits for the weaver. */
  readonly waitingMinutes: number;
  /** ρ, for the models. */
  readonly rho: number;
}

/**
 * Takes the waiting out of logged standing time. A loom that runs r minutes and stands s has efficiency
 * r ÷ (r + s); the attending time is the one at which the model, with this set's looms, gives that efficiency.
 * Efficiency falls as ρ rises, so there is one such time, between 0 and the whole of the standing time.
 *
 * Source: the model itself (see interference.ts), turned round by bisection; common practice is a time study.
 *
 * @param logged stops and minutes, summed over the looms of the set
 * @param looms N, looms in the set, 1 to 200
 * @param weavers weavers who share the set; 1 with constant attending times
 * @returns minutes and ρ, or no figure: `no-events` without stops, `no-time` without running time,
 *   `missing-input` for NaN, `out-of-range` otherwise, also where ρ comes out above 1
 */
export function attendingTimeFromStanding(
  logged: LoggedStops,
  looms: number,
  weavers = 1,
  times: AttendingTimes = 'exponential',
): SolvedAttendingTime | NoFigure {
  const { stops, runningMinutes, standingMinutes } = logged;
  const refused = whyNotSet(looms, 0, weavers);
  if (refused) return refused;
  if ([stops, runningMinutes, standingMinutes].some(Number.isNaN)) return noFigure('missing-input');
  if (stops === 0) return noFigure('no-events');
  if (runningMinutes === 0) return noFigure('no-time');
  const all = [stops, runningMinutes, standingMinutes];
  if (!all.every((value) => value >= 0 && value < Infinity)) return noFigure('out-of-range');
  if (times === 'constant' && weavers !== 1) return noFigure('out-of-range');

  const asLogged = runningMinutes / (runningMinutes + standingMinutes);
  let low = 0;
  let high = standingMinutes / runningMinutes;
  for (let halving = 0; halving < 200 && high - low > 1e-15 * high; halving++) {
    const middle = (low + high) / 2;
    if (solve(times, looms, middle, weavers).efficiency > asLogged) low = middle;
    else high = middle;
  }
  const rho = (low + high) / 2;
  if (rho > 1) return noFigure('out-of-range');
  const attendingMinutes = (rho * runningMinutes) / stops;
  return { rho, attendingMinutes, waitingMinutes: Math.max(0, standingMinutes / stops - attendingMinutes) };
}
