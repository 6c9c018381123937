/**
 * Calendar dates as the book names them (`YYYY-MM-DD`, the date on which a shift starts) and moments as people read
 * them. A date has no time zone: its sums are done in UTC.
 */
const DAY = 86_400_000;

const dayAndDate = new Intl.DateTimeFormat('en-GB', {
  weekday: 'short',
  day: 'numeric',
  month: 'short',
  timeZone: 'UTC',
});
const dateAlone = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', timeZone: 'UTC' });
const clockTime = new Intl.DateTimeFormat('en-GB', { hour: '2-digit', minute: '2-digit' });
const dayOfMoment = new Intl.DateTimeFormat('en-GB', { weekday: 'short', day: 'numeric', month: 'short' });

const utc = (date: string) => Date.parse(`${date}T00:00Z`);

/** Whether a text names a day of the calendar. */
export function isDate(text: string): boolean {
  return /^\d{4}-\d{2}-\d{2}$/.test(text) && new Date(utc(text)).toJSON()?.startsWith(text) === true;
}

export function addDays(date: string, days: number): string {
  return new Date(utc(date) + days * DAY).toISOString().slice(0, 10);
}

/** The Monday of the date's week (ISO 8601). */
export function mondayOf(date: string): string {
  return addDays(date, -((new Date(utc(date)).getUTCDay() + 6) % 7));
}

/** The calendar date of a moment where this device is. */
export function dateOf(at: number): string {
  const day = new Date(at);
  const two = (n: number) => String(n).padStart(2, '0');
  return `${day.getFullYear()}-${two(day.getMonth() + 1)}-${two(day.getDate())}`;
}

/** "Mon 11 May". */
export function formatDay(date: string): string {
  return dayAndDate.format(utc(date)).replace(',', '');
}

/** "11 May". */
export function formatDate(date: string): string {
  return dateAlone.format(utc(date));
}

/** "10:12". */
export function formatTime(at: number): string {
  return clockTime.format(at);
}

/** "10:12" today, "Mon 11 May, 10:12" on another day. */
export function formatMoment(at: number, now: number): string {
  return dateOf(at) === dateOf(now)
    ? formatTime(at)
    : `${dayOfMoment.format(at).replace(',', '')}, ${formatTime(at)}`;
}
