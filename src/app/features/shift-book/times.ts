import { clockTime } from '../../ui/clock-time';

const MINUTE = 60_000;
const HALF_DAY = 12 * 60;

/** "7:05", "07:05", "0705" as the clock shows it; null: not a time. */
function asShown(text: string): string | null {
  const typed = /^(\d{1,2})[:.]?(\d{2})$/.exec(text.trim());
  return typed ? `${(typed[1] ?? '').padStart(2, '0')}:${typed[2] ?? ''}` : null;
}

/**
 * The moment at which the mill's clock shows "HH:MM", nearest to another moment; of two as near, the earlier. Where
 * the clocks go forward some times do not exist, where they go back some exist twice. Null: not a time.
 */
export function momentNear(text: string, near: number, timeZone: string): number | null {
  const shown = asShown(text);
  if (shown === null) return null;
  const middle = Math.floor(near / MINUTE) * MINUTE;
  for (let minutes = 0; minutes <= HALF_DAY + 60; minutes++)
    for (const at of [middle - minutes * MINUTE, middle + minutes * MINUTE])
      if (clockTime(at, timeZone) === shown) return at;
  return null;
}

/** The first moment from another on at which the mill's clock shows "HH:MM". Null: not a time. */
export function momentAfter(text: string, from: number, timeZone: string): number | null {
  const shown = asShown(text);
  if (shown === null) return null;
  const first = Math.floor(from / MINUTE) * MINUTE;
  for (let minutes = 0; minutes <= 2 * HALF_DAY + 60; minutes++)
    if (clockTime(first + minutes * MINUTE, timeZone) === shown) return first + minutes * MINUTE;
  return null;
}
