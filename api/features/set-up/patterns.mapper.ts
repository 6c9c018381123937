import type { CalendarDay, Pattern } from '../../../shared/contract/set-up.js';
import type { CalendarDayRow, ShiftPatternRow } from '../../database/entities/index.js';

/** The id by which a pattern's shifts go, whatever it was changed to. */
export function rootOf(pattern: Pick<ShiftPatternRow, 'id' | 'rootId'>): string {
  return pattern.rootId ?? pattern.id;
}

/** Whether a pattern holds for shifts that start on a date. */
export function holdsOn({ from, until }: Pick<ShiftPatternRow, 'from' | 'until'>, date: string): boolean {
  return (from === null || date >= from) && (until === null || date < until);
}

export function toPattern({ rootId: _root, ...row }: ShiftPatternRow): Pattern {
  return row;
}

/** The calendar names patterns by their root; the wire names the one that holds on the date. */
export function dayOnWire(day: CalendarDayRow, patterns: readonly ShiftPatternRow[]): CalendarDay {
  const holding = patterns.find((one) => rootOf(one) === day.patternId && holdsOn(one, day.date));
  return { ...day, patternId: holding?.id ?? day.patternId };
}
