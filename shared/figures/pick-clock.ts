import type { LoomVersion } from '../contract/reference.js';
import { noFigure, type Figure } from './no-figure.js';

/** A pick clock as the loom's version describes it. */
export type PickClock = LoomVersion['clock'];

/** How far above its book speed a loom is believed before the question "more than this loom can weave". */
export const SPEED_TOLERANCE = 1.05;

/** The clock's whole range in its own units: one more than the largest value it can show. */
export function clockRange(clock: Pick<PickClock, 'digits'>): number {
  return 10 ** clock.digits;
}

/**
 * Picks woven between two readings of one clock: ((end − start) mod 10^digits) × unit. A clock that rolled over
 * once in between is read rightly; a clock that could roll over twice in a shift is refused at set-up.
 *
 * @param clock digits and picks per unit
 * @param start,end what the clock showed, whole units, 0 … 10^digits − 1
 * @returns picks ≥ 0, or `out-of-range` where the clock cannot show a reading, or has no such unit
 */
export function picksBetween(clock: Pick<PickClock, 'digits' | 'unit'>, start: number, end: number): Figure {
  const range = clockRange(clock);
  const shown = (value: number) => Number.isInteger(value) && value >= 0 && value < range;
  if (!Number.isInteger(clock.digits) || clock.digits < 1 || !Number.isInteger(clock.unit) || clock.unit < 1)
    return noFigure('out-of-range');
  if (!shown(start) || !shown(end)) return noFigure('out-of-range');
  return ((end - start + range) % range) * clock.unit;
}

/** How far two readings of one moment lie apart, in picks, the short way round the clock. */
export function disagreement(clock: Pick<PickClock, 'digits' | 'unit'>, a: number, b: number): number {
  const range = clockRange(clock);
  const forward = (((b - a) % range) + range) % range;
  return Math.min(forward, range - forward) * clock.unit;
}

/** Whether a clock counts otherwise than the one before it, so that their readings do not go together. */
export function isAnotherClock(before: PickClock | null, now: PickClock | null): boolean {
  return before !== null && now !== null && (before.unit !== now.unit || before.digits !== now.digits);
}

/**
 * n·T: the picks a loom weaves in `minutes` at `ppm` without a stop.
 *
 * @param ppm running speed, picks a minute, > 0
 * @param minutes ≥ 0
 */
export function possiblePicks(ppm: number, minutes: number): Figure {
  if (Number.isNaN(ppm) || Number.isNaN(minutes)) return noFigure('missing-input');
  if (!(ppm > 0 && ppm < Infinity) || !(minutes >= 0 && minutes < Infinity)) return noFigure('out-of-range');
  return ppm * minutes;
}

/** The most picks that are taken without a question: possible × 1.05 + one unit of the clock. */
export function mostBelievable(possible: number, unit: number): number {
  return possible * SPEED_TOLERANCE + unit;
}

/**
 * Whether a loom can have woven so much: the question asked on the spot is "more than this loom can weave", when
 * picks exceed speed × T × 1.05 + one unit. Fewer picks are always plausible: looms stand.
 *
 * @param what picks between the readings; ppm; minutes between them (T); unit, picks per step of the clock
 */
export function isPlausible(what: { picks: number; ppm: number; minutes: number; unit: number }): boolean {
  return what.picks >= 0 && what.picks <= mostBelievable(what.ppm * what.minutes, what.unit);
}

/**
 * Whether a clock is wide enough for a loom: its whole range must not be less than one shift's possible picks,
 * else a roll-over more would go unseen. Asked at set-up.
 */
export function isWideEnough(
  clock: Pick<PickClock, 'digits' | 'unit'>,
  ppm: number,
  minutes: number,
): boolean {
  return clockRange(clock) * clock.unit >= ppm * minutes;
}
