import { dateOf, formatTime, isDate } from '../../../core/dates';

const MINUTE = 60_000;

/**
 * The moment at which a time zone's clock shows a date (YYYY-MM-DD) and a time (HH:mm, also H:mm). Where the clocks go
 * back and it shows it twice: the first. Null: no date, no time, or a time that the night left out.
 */
export function momentOf(date: string, time: string, timeZone: string): number | null {
  const typed = /^(\d{1,2})[:.](\d{2})$/.exec(time.trim());
  if (!isDate(date) || !typed) return null;
  const shown = `${(typed[1] ?? '').padStart(2, '0')}:${typed[2] ?? ''}`;
  const asUtc = Date.parse(`${date}T${shown}Z`);
  if (Number.isNaN(asUtc)) return null;
  const guesses = [
    asUtc - offsetAt(asUtc - 86_400_000, timeZone),
    asUtc - offsetAt(asUtc + 86_400_000, timeZone),
  ];
  const right = guesses.filter((at) => dateOf(at, timeZone) === date && formatTime(at, timeZone) === shown);
  return right.length ? Math.min(...right) : null;
}

/** How far a time zone's clock is ahead of UTC, ms. */
function offsetAt(at: number, timeZone: string): number {
  const whole = Math.floor(at / MINUTE) * MINUTE;
  return Date.parse(`${dateOf(whole, timeZone)}T${formatTime(whole, timeZone)}Z`) - whole;
}

const long = new Map<string, Intl.DateTimeFormat>();

/** "1 May 2026, 10:12" by the mill's clock: for what may lie years back. */
export function longMoment(at: number, timeZone: string): string {
  let format = long.get(timeZone);
  if (!format) {
    format = new Intl.DateTimeFormat('en-GB', { dateStyle: 'medium', timeStyle: 'short', timeZone });
    long.set(timeZone, format);
  }
  return format.format(at);
}
