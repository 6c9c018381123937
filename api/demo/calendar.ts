import { DateTime } from 'luxon';
import type { CalendarDayRow, ShiftPatternRow } from '../database/entities/index.js';
import { DEMO_SHED, DEMO_ZONE } from './mill.js';

export const DEMO_WEEKS = 12;

/** Three patterns round the clock, Monday to Friday; the night's meal stops the looms, the day's meals are relieved. */
export function demoPatterns(): ShiftPatternRow[] {
  const weekdays = [1, 2, 3, 4, 5];
  const base = { shedId: DEMO_SHED, weekdays, rootId: null, from: null, until: null };
  return [
    {
      ...base,
      id: 'early',
      name: 'Early shift',
      startsLocal: '06:00',
      endsLocal: '14:00',
      meal: { startsLocal: '09:30', endsLocal: '10:00', looms: 'running' },
    },
    {
      ...base,
      id: 'late',
      name: 'Late shift',
      startsLocal: '14:00',
      endsLocal: '22:00',
      meal: { startsLocal: '17:30', endsLocal: '18:00', looms: 'running' },
    },
    {
      ...base,
      id: 'night',
      name: 'Night shift',
      startsLocal: '22:00',
      endsLocal: '06:00',
      meal: { startsLocal: '02:00', endsLocal: '02:30', looms: 'stopped' },
    },
  ];
}

/** The date whose shift is running at a moment: before six in the morning it is yesterday's night. */
export function workingDate(now: number): string {
  const local = DateTime.fromMillis(now, { zone: DEMO_ZONE });
  return (local.hour < 6 ? local.minus({ days: 1 }) : local).toISODate() ?? '';
}

/** The pattern whose hours hold a moment; the three cover the day. */
export function patternAt(now: number): string {
  const { hour } = DateTime.fromMillis(now, { zone: DEMO_ZONE });
  if (hour >= 6 && hour < 14) return 'early';
  return hour >= 14 && hour < 22 ? 'late' : 'night';
}

/**
 * Weekends are off by the patterns; one Monday is a holiday. Whatever day the demo starts on is a working day, so that
 * a shift is always in progress: on a weekend as overtime.
 */
export function demoCalendar(now: number): CalendarDayRow[] {
  const today = DateTime.fromISO(workingDate(now), { zone: DEMO_ZONE });
  const holiday = today.minus({ weeks: 5 }).startOf('week');
  const row = (
    date: DateTime,
    patternId: string,
    kind: CalendarDayRow['kind'],
    reason: string,
  ): CalendarDayRow => ({
    shedId: DEMO_SHED,
    date: date.toISODate() ?? '',
    patternId,
    kind,
    startsLocal: null,
    endsLocal: null,
    reason,
  });
  const days = [row(holiday, '*', 'off', 'Mill holiday')];
  if (today.weekday > 5)
    for (const pattern of demoPatterns())
      days.push({
        ...row(today, pattern.id, 'overtime', 'Overtime'),
        startsLocal: pattern.startsLocal,
        endsLocal: pattern.endsLocal,
      });
  return days;
}

/** When the demo's book begins: the Monday morning so many weeks before. */
export function demoBegins(now: number, weeks: number = DEMO_WEEKS): number {
  return DateTime.fromISO(workingDate(now), { zone: DEMO_ZONE })
    .startOf('week')
    .minus({ weeks })
    .set({ hour: 6 })
    .toMillis();
}
