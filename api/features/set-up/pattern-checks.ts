import { DateTime } from 'luxon';
import type { PatternFacts } from '../../../shared/contract/set-up.js';
import type { WrongField } from './loom-places.js';
import { DAY_MINUTES, lengthOf, minuteOf, minutesUntil } from './local-times.js';

/** What of a pattern says when its shifts are. */
export type PatternTimes = Pick<PatternFacts, 'startsLocal' | 'endsLocal' | 'weekdays'> & {
  readonly from: string | null;
  readonly until: string | null;
};

/** What is wrong with a pattern by itself. */
export function wrongFacts({ meal, weekdays, ...facts }: PatternFacts): WrongField[] {
  const wrong: WrongField[] = [];
  if (new Set(weekdays).size < weekdays.length)
    wrong.push({ path: 'facts.weekdays', message: 'A weekday stands here twice.' });
  if (!meal) return wrong;
  const begins = minutesUntil(facts.startsLocal, meal.startsLocal) % DAY_MINUTES;
  const lasts = (minuteOf(meal.endsLocal) - minuteOf(meal.startsLocal) + DAY_MINUTES) % DAY_MINUTES;
  if (lasts === 0) wrong.push({ path: 'facts.meal.endsLocal', message: 'A meal ends later than it begins.' });
  else if (begins >= lengthOf(facts)) wrong.push({ path: 'facts.meal.startsLocal', message: outside(facts) });
  else if (begins + lasts > lengthOf(facts))
    wrong.push({ path: 'facts.meal.endsLocal', message: outside(facts) });
  else if (lasts === lengthOf(facts))
    wrong.push({ path: 'facts.meal.endsLocal', message: 'A meal is shorter than its shift.' });
  return wrong;
}

const outside = ({ startsLocal, endsLocal }: Pick<PatternFacts, 'startsLocal' | 'endsLocal'>) =>
  `The meal must lie within the shift, between ${startsLocal} and ${endsLocal}.`;

/** Whether some shift of one pattern overlaps some shift of another, by the clock on the wall. */
export function overlap(one: PatternTimes, other: PatternTimes): boolean {
  const begins = minuteOf(one.startsLocal);
  const ends = begins + lengthOf(one);
  // A shift lasts a day at most: it can only overlap those of its own date and of the dates beside it.
  return [-1, 0, 1].some((later) => {
    const otherBegins = later * DAY_MINUTES + minuteOf(other.startsLocal);
    const atOnce = begins < otherBegins + lengthOf(other) && otherBegins < ends;
    return atOnce && haveDates(one, other, later);
  });
}

/** Whether one pattern has a shift on some date, and the other on the date so many days later. */
function haveDates(one: PatternTimes, other: PatternTimes, later: number): boolean {
  const first = latest(one.from, moved(other.from, -later));
  const end = earliest(one.until, moved(other.until, -later));
  const start = first ?? (end === null ? '2000-01-03' : moved(end, -7));
  for (let days = 0; days < 7; days += 1) {
    const date = moved(start, days);
    if (end !== null && date >= end) return false;
    const otherDate = moved(date, later);
    if (one.weekdays.includes(weekdayOf(date)) && other.weekdays.includes(weekdayOf(otherDate))) return true;
  }
  return false;
}

function moved(date: string, days: number): string;
function moved(date: string | null, days: number): string | null;
function moved(date: string | null, days: number): string | null {
  return date === null ? null : DateTime.fromISO(date, { zone: 'utc' }).plus({ days }).toISODate();
}

const weekdayOf = (date: string) => DateTime.fromISO(date, { zone: 'utc' }).weekday;

function latest(one: string | null, other: string | null): string | null {
  if (one === null || other === null) return one ?? other;
  return one > other ? one : other;
}

function earliest(one: string | null, other: string | null): string | null {
  if (one === null || other === null) return one ?? other;
  return one < other ? one : other;
}

/** Why a date of a form cannot be: the form's own shape lets the 31st of February through. */
export function wrongDate(date: string, path: string): WrongField[] {
  return DateTime.fromISO(date, { zone: 'utc' }).isValid
    ? []
    : [{ path, message: 'There is no such date. Write it as 2026-12-31.' }];
}
