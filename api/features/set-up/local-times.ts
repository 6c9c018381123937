import type { PatternFacts } from '../../../shared/contract/set-up.js';

export const DAY_MINUTES = 1_440;

/** Minutes since midnight of a local time, HH:mm. */
export function minuteOf(local: string): number {
  return Number(local.slice(0, 2)) * 60 + Number(local.slice(3, 5));
}

/** Minutes by the clock on the wall from one time to the next that is later; the same time is a whole day later. */
export function minutesUntil(from: string, until: string): number {
  const minutes = minuteOf(until) - minuteOf(from);
  return minutes > 0 ? minutes : minutes + DAY_MINUTES;
}

/** A pattern's length by the clock on the wall, meal included. */
export function lengthOf({
  startsLocal,
  endsLocal,
}: Pick<PatternFacts, 'startsLocal' | 'endsLocal'>): number {
  return minutesUntil(startsLocal, endsLocal);
}
