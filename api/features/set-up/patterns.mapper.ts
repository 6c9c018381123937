import type { CalendarDay, Pattern } from '../../../shared/contract/set-up.js';
import type { CalendarDayRow, ShiftPatternRow } from '../../database/entities/index.js';
import { holdsOn, rootOf } from '../book/pattern-shifts.js';

export function toPattern({ rootId: _root, ...row }: ShiftPatternRow): Pattern {
  return row;
}

/** The calendar names patterns by their root; the wire names the one that holds on the date. */
export function dayOnWire(day: CalendarDayRow, patterns: readonly ShiftPatternRow[]): CalendarDay {
  const holding = patterns.find((one) => rootOf(one) === day.patternId && holdsOn(one, day.date));
  return { ...day, patternId: holding?.id ?? day.patternId };
}
