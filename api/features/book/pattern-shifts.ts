import { DateTime } from 'luxon';
import type { CalendarDayRow, ShiftPatternRow, ShiftRow } from '../../database/entities/index.js';

/** The id by which a pattern's shifts and its days of the calendar go, whatever it was changed to. */
export function rootOf(pattern: Pick<ShiftPatternRow, 'id' | 'rootId'>): string {
  return pattern.rootId ?? pattern.id;
}

/** Whether a pattern holds for shifts that start on a date. */
export function holdsOn({ from, until }: Pick<ShiftPatternRow, 'from' | 'until'>, date: string): boolean {
  return (from === null || date >= from) && (until === null || date < until);
}

/** Dates from one to another, both included, YYYY-MM-DD. */
export function datesBetween(from: string, to: string): string[] {
  const dates: string[] = [];
  let date = DateTime.fromISO(from, { zone: 'utc' });
  const last = DateTime.fromISO(to, { zone: 'utc' });
  for (; date <= last; date = date.plus({ days: 1 })) dates.push(date.toISODate() ?? '');
  return dates;
}

/**
 * The shifts that patterns and calendar give on a date, with their instants in the mill's time zone: 22:00 to 06:00
 * in London is seven hours on the night the clocks go forward, nine when they go back. A day off has none; a short or
 * overtime day may name other hours, and overtime brings a pattern on a day that it does not have.
 */
export function shiftsOn(
  date: string,
  patterns: readonly ShiftPatternRow[],
  calendar: readonly CalendarDayRow[],
  timeZone: string,
): ShiftRow[] {
  const weekday = DateTime.fromISO(date, { zone: 'utc' }).weekday;
  return patterns.flatMap((pattern) => {
    if (!holdsOn(pattern, date)) return [];
    const root = rootOf(pattern);
    const day = dayOf(pattern, date, calendar);
    if (day?.kind === 'off') return [];
    if (!pattern.weekdays.includes(weekday) && day?.kind !== 'overtime') return [];
    const startsLocal = day?.startsLocal ?? pattern.startsLocal;
    const endsLocal = day?.endsLocal ?? pattern.endsLocal;
    const startsAt = instant(date, startsLocal, timeZone);
    const endsAt = instant(endsLocal > startsLocal ? date : dayAfter(date), endsLocal, timeZone);
    // Hours that the night of the change does not have.
    if (endsAt <= startsAt) return [];
    return [
      {
        key: `${pattern.shedId}:${date}:${root}`,
        shedId: pattern.shedId,
        date,
        patternId: root,
        name: pattern.name,
        startsAt,
        endsAt,
        ...mealOf(pattern, date, startsLocal, { startsAt, endsAt }, timeZone),
        state: 'open',
      },
    ];
  });
}

/** What the calendar says of a pattern on a date; a line for the pattern goes before one for all. */
function dayOf(pattern: ShiftPatternRow, date: string, calendar: readonly CalendarDayRow[]) {
  const ofDate = calendar.filter((one) => one.shedId === pattern.shedId && one.date === date);
  return (
    ofDate.find((one) => one.patternId === rootOf(pattern)) ??
    ofDate.find((one) => one.patternId === '*') ??
    null
  );
}

/** A meal that does not lie whole within the shift (a short day) falls away. */
function mealOf(
  { meal }: ShiftPatternRow,
  date: string,
  shiftStartsLocal: string,
  shift: { startsAt: number; endsAt: number },
  timeZone: string,
): Pick<ShiftRow, 'mealStartsAt' | 'mealEndsAt' | 'mealLooms'> {
  const none = { mealStartsAt: null, mealEndsAt: null, mealLooms: null };
  if (!meal) return none;
  const startDate = meal.startsLocal >= shiftStartsLocal ? date : dayAfter(date);
  const mealStartsAt = instant(startDate, meal.startsLocal, timeZone);
  const endDate = meal.endsLocal > meal.startsLocal ? startDate : dayAfter(startDate);
  const mealEndsAt = instant(endDate, meal.endsLocal, timeZone);
  if (mealStartsAt < shift.startsAt || mealEndsAt > shift.endsAt || mealEndsAt <= mealStartsAt) return none;
  return { mealStartsAt, mealEndsAt, mealLooms: meal.looms };
}

export function dayAfter(date: string): string {
  return DateTime.fromISO(date, { zone: 'utc' }).plus({ days: 1 }).toISODate() ?? '';
}

/**
 * A local time as a moment. One that the night of the change does not have is the change itself, so that what ends
 * then and what begins then still adjoin.
 */
function instant(date: string, local: string, timeZone: string): number {
  let moment = DateTime.fromISO(`${date}T${local}`, { zone: timeZone });
  if (!moment.isValid) throw new Error(`No such time: ${date} ${local} in ${timeZone}.`);
  if (moment.toFormat('HH:mm') !== local)
    for (let before = moment; before.offset === moment.offset; before = before.minus({ minutes: 1 }))
      moment = before;
  return moment.toMillis();
}
