/** Local times of day, and the nominal hours between them: what a pattern says, before any clock changes. */
const DAY = 1_440;

/** "7:05", "7.05", "0705", "705" as HH:MM; null: not a time of day. */
export function readLocalTime(text: string): string | null {
  const typed = /^(\d{1,2})[:.]?(\d{2})$/.exec(text.trim());
  if (!typed) return null;
  const [hours, minutes] = [Number(typed[1]), Number(typed[2])];
  return hours <= 23 && minutes <= 59 ? `${pad(hours)}:${pad(minutes)}` : null;
}

/** Why a text is no time of day; empty: it is one. */
export function localTimeProblem(text: string, what: string, usual: string): string {
  if (readLocalTime(text) !== null) return '';
  if (text.trim() === '') return `Type ${what} as hours and minutes, such as ${usual}.`;
  return `“${text.trim()}” is no time of day. Type ${what} as hours and minutes, such as ${usual}.`;
}

/** Minutes since midnight. */
export function minutesOf(local: string): number {
  const [hours, minutes] = local.split(':');
  return Number(hours) * 60 + Number(minutes);
}

/** Minutes from one time of day to the next time the clock shows another: 1 to 1,440. */
export function minutesBetween(startsLocal: string, endsLocal: string): number {
  const minutes = minutesOf(endsLocal) - minutesOf(startsLocal);
  return minutes > 0 ? minutes : minutes + DAY;
}

/** Whether the end lies on the day after. */
export function endsNextDay(startsLocal: string, endsLocal: string): boolean {
  return minutesOf(endsLocal) <= minutesOf(startsLocal);
}

function pad(part: number): string {
  return String(part).padStart(2, '0');
}
