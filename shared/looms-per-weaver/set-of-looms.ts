import { noFigure, type NoFigure } from '../figures/no-figure.js';
import { MOST_LOOMS, solve, whyNotSet, type AttendingTimes } from './interference.js';

/** What the looms of a set ask of those who mind them. */
export interface SetWork {
  /** ρ, stops per running minute × attending minutes (see `stopWork`), 0 to 1. */
  readonly rho: number;
  /** Work that grows with picks but stops no loom: minutes of filling batteries by a minute of running, ≥ 0. */
  readonly fillingPerRunningMinute?: number;
  /** Share of each weaver's time on patrol, meals covered and other fixed work, 0 to under 1. */
  readonly patrolShare?: number;
  /** Running speed, ppm, > 0. */
  readonly picksPerMinute: number;
  /** Weavers who share the set, a whole number ≥ 1; 1 with constant attending times. */
  readonly weavers?: number;
  readonly times?: AttendingTimes;
}

/** What a set of so many looms comes to. */
export interface SetFigures {
  readonly looms: number;
  /** Share of time that a loom runs, as far as the weaver's stops go. */
  readonly efficiency: number;
  /** Shares of a weaver's time, 0 to 1: mending, filling, patrol, and the three together. */
  readonly mending: number;
  readonly filling: number;
  readonly patrol: number;
  readonly load: number;
  /** Mean number of looms standing for want of a free weaver. */
  readonly waiting: number;
  readonly picksPerWeaverHour: number;
}

/**
 * Efficiency, load and picks of a set of looms with the weaver's added work.
 *
 * Added work of share v keeps the weaver from a stopped loom: mending goes at 1 − v of its pace, so the model
 * is asked with ρ ÷ (1 − v) (common practice; exact where added work is spread thinly through the shift).
 * Filling grows with the picks and so with the efficiency that it lowers: the one efficiency that agrees with
 * its own filling is found by bisection.
 *
 * @param looms N, a whole number 1 to 200
 * @returns the figures, or no figure: `no-speed` where the speed is 0, `missing-input` for NaN,
 *   `out-of-range` otherwise
 */
export function setFigures(looms: number, work: SetWork): SetFigures | NoFigure {
  return whyNotWork(looms, work) ?? reckon(looms, work);
}

/**
 * The largest set that still keeps a wanted efficiency.
 *
 * @param efficiency the least wanted share of time that a loom runs, between 0 and 1
 * @returns figures of that set, 200 looms at most, or no figure: `no-limit` where even one loom does not reach
 *   it, else as `setFigures`
 */
export function loomsForEfficiency(efficiency: number, work: SetWork): SetFigures | NoFigure {
  return largest(efficiency, work, (set) => set.efficiency >= efficiency);
}

/**
 * The largest set that does not load a weaver beyond a wanted share of the time.
 *
 * @param load the most wanted share of a weaver's time, mending, filling and patrol, between 0 and 1
 * @returns as `loomsForEfficiency`
 */
export function loomsForLoad(load: number, work: SetWork): SetFigures | NoFigure {
  return largest(load, work, (set) => set.load <= load);
}

/**
 * Figures of sets of 1 to `most` looms, for the curve of efficiency and of picks per weaver-hour.
 *
 * @param most the largest set on the curve, 1 to 200
 */
export function curveOfSets(most: number, work: SetWork): readonly SetFigures[] | NoFigure {
  const refused = whyNotWork(most, work);
  if (refused) return refused;
  return Array.from({ length: most }, (_, at) => reckon(at + 1, work));
}

function largest(wanted: number, work: SetWork, holds: (set: SetFigures) => boolean): SetFigures | NoFigure {
  const refused = whyNotWork(1, work);
  if (refused) return refused;
  if (Number.isNaN(wanted)) return noFigure('missing-input');
  if (!(wanted > 0 && wanted < 1)) return noFigure('out-of-range');
  let found: SetFigures | NoFigure = noFigure('no-limit');
  for (let looms = 1; looms <= MOST_LOOMS; looms++) {
    const set = reckon(looms, work);
    if (!holds(set)) return found;
    found = set;
  }
  return found;
}

function whyNotWork(looms: number, work: SetWork): NoFigure | null {
  const { fillingPerRunningMinute = 0, patrolShare = 0, weavers = 1, picksPerMinute, times } = work;
  const refused = whyNotSet(looms, work.rho, weavers);
  if (refused) return refused;
  if ([fillingPerRunningMinute, patrolShare, picksPerMinute].some(Number.isNaN))
    return noFigure('missing-input');
  if (picksPerMinute === 0) return noFigure('no-speed');
  const possible =
    fillingPerRunningMinute >= 0 &&
    fillingPerRunningMinute < Infinity &&
    patrolShare >= 0 &&
    patrolShare < 1 &&
    picksPerMinute > 0 &&
    picksPerMinute < Infinity;
  return possible && !(times === 'constant' && weavers > 1) ? null : noFigure('out-of-range');
}

function reckon(looms: number, work: SetWork): SetFigures {
  const { rho, fillingPerRunningMinute: filling = 0, patrolShare: patrol = 0, picksPerMinute } = work;
  const { weavers = 1, times = 'exponential' } = work;
  const added = (efficiency: number) => patrol + (filling * looms * efficiency) / weavers;
  const slowed = (efficiency: number) => solve(times, looms, rho / (1 - added(efficiency)), weavers);

  let set = slowed(0);
  if (filling > 0) {
    let low = 0;
    // Filling alone cannot take more than the time that patrol leaves.
    let high = Math.min(1, ((1 - patrol) * weavers) / (filling * looms));
    for (let halving = 0; halving < 60; halving++) {
      const middle = (low + high) / 2;
      if (added(middle) < 1 && slowed(middle).efficiency > middle) low = middle;
      else high = middle;
    }
    set = { ...slowed(low), efficiency: low };
  }
  const mending = (looms * set.efficiency * rho) / weavers;
  const fill = (looms * set.efficiency * filling) / weavers;
  return {
    looms,
    efficiency: set.efficiency,
    mending,
    filling: fill,
    patrol,
    load: mending + fill + patrol,
    waiting: set.waiting,
    picksPerWeaverHour: (looms * picksPerMinute * 60 * set.efficiency) / weavers,
  };
}
