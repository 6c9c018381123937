import { noFigure, type NoFigure } from '../figures/no-figure.js';

/** Stops of one kind that the weaver attends. A tackler's stops are not the weaver's load and stay out. */
export interface AttendedStops {
  /** How often, per 100,000 picks; for pern changes by hand, 100,000 ÷ picks per pern. */
  readonly per100000Picks: number;
  /** Mean minutes to mend one and start the loom, from the mill's time study, without waiting. */
  readonly attendingMinutes: number;
}

/** What the weaver's stops come to on one loom. */
export interface StopWork {
  /** Stops per minute that the loom runs. */
  readonly stopsPerRunningMinute: number;
  /** Mean minutes to attend one, over all kinds. */
  readonly attendingMinutes: number;
  /** ρ, the product of the two: minutes of mending asked by a minute of running. */
  readonly rho: number;
}

/**
 * Adds the weaver's stops of all kinds into ρ.
 *
 * @param stops by kind, rates and minutes ≥ 0
 * @param picksPerMinute running speed, ppm, > 0
 * @returns rate, mean minutes and ρ, or no figure: `no-speed` where the speed is 0, `no-events` where no kind
 *   has any, `missing-input` for NaN, `out-of-range` otherwise
 */
export function stopWork(stops: readonly AttendedStops[], picksPerMinute: number): StopWork | NoFigure {
  const all = stops.flatMap((kind) => [kind.per100000Picks, kind.attendingMinutes]);
  if ([...all, picksPerMinute].some(Number.isNaN)) return noFigure('missing-input');
  if (picksPerMinute === 0) return noFigure('no-speed');
  if (![...all, picksPerMinute].every((value) => value >= 0 && value < Infinity))
    return noFigure('out-of-range');
  const perMinute = picksPerMinute / 1e5;
  const stopsPerRunningMinute = stops.reduce((sum, kind) => sum + kind.per100000Picks * perMinute, 0);
  const rho = stops.reduce((sum, kind) => sum + kind.per100000Picks * perMinute * kind.attendingMinutes, 0);
  if (stopsPerRunningMinute === 0) return noFigure('no-events');
  return { stopsPerRunningMinute, attendingMinutes: rho / stopsPerRunningMinute, rho };
}
