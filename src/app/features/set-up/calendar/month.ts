import type { CalendarDay, Pattern } from '@shared/contract/set-up';
import { addDays, formatDay, mondayOf } from '../../../core/dates';
import { inForceOn } from '../shifts/week-ribbons';
import { ALL } from './day-form';

/** A day of the month's picture. */
export interface MonthDay {
  readonly date: string;
  readonly number: number;
  readonly inMonth: boolean;
  /** Names of the shifts that start on it. */
  readonly shifts: readonly string[];
  /** What the calendar says of it. */
  readonly marks: readonly DayMark[];
}

export interface DayMark {
  readonly day: CalendarDay;
  readonly kind: CalendarDay['kind'];
  /** "Holiday: Christmas Day". */
  readonly words: string;
}

export const KIND_WORDS: Readonly<Record<CalendarDay['kind'], string>> = {
  off: 'Holiday',
  short: 'Short day',
  overtime: 'Overtime',
};

const weekdayOf = (date: string) => ((new Date(`${date}T00:00Z`).getUTCDay() + 6) % 7) + 1;

/** Whether a pattern has a shift on a date, leaving the calendar aside. */
export function runsOn(pattern: Pattern, date: string): boolean {
  return inForceOn(pattern, date) && pattern.weekdays.includes(weekdayOf(date));
}

/** The weeks of a month (YYYY-MM), Monday to Sunday, with what lies on each day. */
export function monthWeeks(
  month: string,
  shedId: string,
  patterns: readonly Pattern[],
  calendar: readonly CalendarDay[],
): MonthDay[][] {
  const own = patterns
    .filter((pattern) => pattern.shedId === shedId)
    .sort((a, b) => a.startsLocal.localeCompare(b.startsLocal));
  const days = calendar.filter((day) => day.shedId === shedId);
  const weeks: MonthDay[][] = [];
  for (let monday = mondayOf(`${month}-01`); monday.slice(0, 7) <= month; monday = addDays(monday, 7))
    weeks.push(
      Array.from({ length: 7 }, (_, at) => {
        const date = addDays(monday, at);
        const ofDay = days.filter((day) => day.date === date);
        return {
          date,
          number: Number(date.slice(8)),
          inMonth: date.startsWith(month),
          shifts: own.filter((pattern) => worksOn(pattern, date, ofDay)).map(({ name }) => name),
          marks: ofDay.map((day) => ({ day, kind: day.kind, words: dayWords(day, patterns) })),
        };
      }),
    );
  return weeks;
}

/** Whether a pattern has a shift on a date, the calendar's word for it before that for all. */
function worksOn(pattern: Pattern, date: string, ofDay: readonly CalendarDay[]): boolean {
  const day = ofDay.find((one) => one.patternId === pattern.id) ?? ofDay.find((one) => one.patternId === ALL);
  if (day?.kind === 'off') return false;
  return day?.kind === 'overtime' ? inForceOn(pattern, date) : runsOn(pattern, date);
}

/** "Short day, Early 06:00 to 10:00: stocktaking". */
export function dayWords(day: CalendarDay, patterns: readonly Pattern[]): string {
  const pattern = patterns.find(({ id }) => id === day.patternId)?.name;
  const hours = day.startsLocal && day.endsLocal ? `${day.startsLocal} to ${day.endsLocal}` : '';
  const who = [day.patternId === ALL ? '' : (pattern ?? ''), hours].filter(Boolean).join(' ');
  return `${KIND_WORDS[day.kind]}${who ? `, ${who}` : ''}: ${day.reason}`;
}

/** What a day's square says to who does not see it. */
export function spokenDay({ date, shifts, marks }: MonthDay): string {
  const work = shifts.length > 0 ? shifts.join(', ') : 'No shift';
  return [formatDay(date), ...marks.map(({ words }) => words), work].join('. ');
}

/** YYYY-MM, so many months on. */
export function addMonths(month: string, months: number): string {
  const [year, number] = month.split('-').map(Number);
  return new Date(Date.UTC(year ?? 2000, (number ?? 1) - 1 + months, 1)).toISOString().slice(0, 7);
}

/** The date that a key goes to from another; null: none of the calendar's keys. */
export function dateByKey(key: string, date: string): string | null {
  switch (key) {
    case 'ArrowLeft':
      return addDays(date, -1);
    case 'ArrowRight':
      return addDays(date, 1);
    case 'ArrowUp':
      return addDays(date, -7);
    case 'ArrowDown':
      return addDays(date, 7);
    case 'Home':
      return mondayOf(date);
    case 'End':
      return addDays(mondayOf(date), 6);
    case 'PageUp':
      return sameDay(date, -1);
    case 'PageDown':
      return sameDay(date, 1);
    default:
      return null;
  }
}

/** The same day of another month, or that month's last. */
function sameDay(date: string, months: number): string {
  const month = addMonths(date.slice(0, 7), months);
  const last = Number(addDays(`${addMonths(month, 1)}-01`, -1).slice(8));
  return `${month}-${String(Math.min(last, Number(date.slice(8)))).padStart(2, '0')}`;
}

const monthAndYear = new Intl.DateTimeFormat('en-GB', { month: 'long', year: 'numeric', timeZone: 'UTC' });

/** "December 2026". */
export function monthName(month: string): string {
  return monthAndYear.format(Date.parse(`${month}-01T00:00Z`));
}
