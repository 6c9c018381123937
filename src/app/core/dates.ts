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
/** Formats of moments by time zone: the mill's, or (undefined) the device's own. */
const formats = new Map<
  string | undefined,
  { time: Intl.DateTimeFormat; day: Intl.DateTimeFormat; date: Intl.DateTimeFormat }
>();

function formatsIn(timeZone: string | undefined) {
  let found = formats.get(timeZone);
  if (!found) {
    found = {
      time: new Intl.DateTimeFormat('en-GB', { hour: '2-digit', minute: '2-digit', timeZone }),
      day: new Intl.DateTimeFormat('en-GB', { weekday: 'short', day: 'numeric', month: 'short', timeZone }),
      // Swedish writes dates as ISO 8601 does.
      date: new Intl.DateTimeFormat('sv-SE', { dateStyle: 'short', timeZone }),
    };
    formats.set(timeZone, found);
  }
  return found;
}

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

/** The calendar date of a moment in the mill's time zone (the device's own where none is named). */
export function dateOf(at: number, timeZone?: string): string {
  return formatsIn(timeZone).date.format(at);
}

/** "Mon 11 May". */
export function formatDay(date: string): string {
  return dayAndDate.format(utc(date)).replace(',', '');
}

/** "11 May". */
export function formatDate(date: string): string {
  return dateAlone.format(utc(date));
}

/** "10:12" in the mill's time zone (the device's own where none is named). */
export function formatTime(at: number, timeZone?: string): string {
  return formatsIn(timeZone).time.format(at);
}

/** "10:12" today, "Mon 11 May, 10:12" on another day. */
export function formatMoment(at: number, now: number, timeZone?: string): string {
  const time = formatTime(at, timeZone);
  if (dateOf(at, timeZone) === dateOf(now, timeZone)) return time;
  return `${formatsIn(timeZone).day.format(at).replace(',', '')}, ${time}`;
}
