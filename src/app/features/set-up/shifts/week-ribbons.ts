import type { Pattern, PatternFacts } from '@shared/contract/set-up';
import { minutesBetween, minutesOf } from './local-time';

/** Minutes of a week, Monday 00:00 to Sunday 24:00. */
const DAY = 1_440;
const WEEK = 7 * DAY;

/** A piece of a ribbon, in shares of the week. */
export interface RibbonPiece {
  readonly left: number;
  readonly width: number;
  readonly kind: 'shift' | 'meal-stopped' | 'meal-running';
}

export interface Ribbon {
  readonly id: string;
  readonly name: string;
  readonly facts: PatternFacts;
  readonly pieces: readonly RibbonPiece[];
}

/** A shed's week: each pattern that is in force on a date as a ribbon, by its start. */
export function weekRibbons(patterns: readonly Pattern[], shedId: string, date: string): Ribbon[] {
  return patterns
    .filter((pattern) => pattern.shedId === shedId && inForceOn(pattern, date))
    .sort((a, b) => a.startsLocal.localeCompare(b.startsLocal) || a.name.localeCompare(b.name))
    .map((pattern) => ({
      id: pattern.id,
      name: pattern.name,
      facts: pattern,
      pieces: ribbonPieces(pattern),
    }));
}

export function inForceOn({ from, until }: Pick<Pattern, 'from' | 'until'>, date: string): boolean {
  return (from === null || from <= date) && (until === null || date < until);
}

/** Where in the week a pattern runs and eats; what reaches past Sunday comes back in at Monday. */
export function ribbonPieces(facts: PatternFacts): RibbonPiece[] {
  const { startsLocal, endsLocal, meal } = facts;
  const length = minutesBetween(startsLocal, endsLocal);
  return facts.weekdays.flatMap((weekday) => {
    const start = (weekday - 1) * DAY + minutesOf(startsLocal);
    const pieces = wrapped(start, length, 'shift');
    if (!meal) return pieces;
    const at = start + (minutesBetween(startsLocal, meal.startsLocal) % DAY);
    const lasts = minutesBetween(meal.startsLocal, meal.endsLocal);
    return [...pieces, ...wrapped(at, lasts, meal.looms === 'stopped' ? 'meal-stopped' : 'meal-running')];
  });
}

/** Hours of a week in which nobody weaves: what patterns leave open. */
export function uncoveredMinutes(ribbons: readonly Ribbon[]): number {
  const covered = new Uint8Array(WEEK);
  for (const { pieces } of ribbons)
    for (const { left, width, kind } of pieces)
      if (kind === 'shift') covered.fill(1, Math.round(left * WEEK), Math.round((left + width) * WEEK));
  return covered.reduce((sum, one) => sum + (one === 0 ? 1 : 0), 0);
}

function wrapped(from: number, minutes: number, kind: RibbonPiece['kind']): RibbonPiece[] {
  const start = from % WEEK;
  const first = Math.min(minutes, WEEK - start);
  const piece = (at: number, length: number) => ({ left: at / WEEK, width: length / WEEK, kind });
  return [piece(start, first), ...(minutes > first ? [piece(0, minutes - first)] : [])];
}
