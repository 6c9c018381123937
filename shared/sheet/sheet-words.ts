import type { ShiftSheet } from '../contract/reports.js';
import { formatCount } from '../figures/format.js';
import { coverageWords } from './coverage-words.js';
import { totalFigures } from './sheet-rows.js';

/** A moment in the mill's time zone: "06:00". */
export function sheetTime(at: number, timeZone: string): string {
  return new Intl.DateTimeFormat('en-GB', { hour: '2-digit', minute: '2-digit', timeZone }).format(at);
}

/** "Tue 1 Dec 2026" of a calendar date. */
export function sheetDate(date: string): string {
  const words = new Intl.DateTimeFormat('en-GB', {
    weekday: 'short',
    day: 'numeric',
    month: 'short',
    year: 'numeric',
    timeZone: 'UTC',
  });
  return words.format(Date.parse(`${date}T00:00Z`)).replace(',', '');
}

/** "Tue 1 Dec 2026, 14:02" of a moment. */
export function sheetMoment(at: number, timeZone: string): string {
  // Swedish writes dates as ISO 8601 does.
  const date = new Intl.DateTimeFormat('sv-SE', { dateStyle: 'short', timeZone }).format(at);
  return `${sheetDate(date)}, ${sheetTime(at, timeZone)}`;
}

/** "Long shed · Early shift, Tue 1 Dec 2026, 06:00 to 14:00". */
export function sheetTitle(
  { shift, shedName }: Pick<ShiftSheet, 'shift' | 'shedName'>,
  timeZone: string,
): string {
  const hours = `${sheetTime(shift.startsAt, timeZone)} to ${sheetTime(shift.endsAt, timeZone)}`;
  return `${shedName} · ${shift.name}, ${sheetDate(shift.date)}, ${hours}`;
}

/** The shed's figures in a sentence: "Shed efficiency 81.4% · 1,234,500 picks, from 22 of 24 looms". */
export function sheetTotalWords(sheet: Pick<ShiftSheet, 'total' | 'asOf' | 'shift'>): string {
  const { efficiency, picks } = totalFigures(sheet);
  if (efficiency.why) return `No shed efficiency: ${efficiency.why}`;
  const most = (atMost: boolean) => (atMost ? 'at most ' : '');
  const covered = efficiency.atMost ? '' : coverageWords(sheet.total, 'looms');
  return `Shed efficiency ${most(efficiency.atMost)}${efficiency.text} · ${most(picks.atMost)}${picks.text} picks${covered && `, ${covered}`}`;
}

/** Whether it is signed, by whom, and what is still open about it. */
export function sheetStateWords(
  sheet: Pick<ShiftSheet, 'closed' | 'held' | 'asOf'>,
  timeZone: string,
): string {
  const held =
    sheet.held === 0
      ? ''
      : sheet.held === 1
        ? ' · 1 entry is held'
        : ` · ${formatCount(sheet.held)} entries are held`;
  if (!sheet.closed) return `Not closed; as of ${sheetMoment(sheet.asOf, timeZone)}${held}`;
  const { at, by, version } = sheet.closed;
  const again = version > 1 ? `, signed version ${version}` : '';
  return `Closed ${sheetMoment(at, timeZone)} by ${by}${again}${held}`;
}
