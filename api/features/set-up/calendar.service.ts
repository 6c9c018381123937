import { DateTime } from 'luxon';
import type * as z from 'zod/mini';
import type { CalendarDay, Changed, dropCalendarDaySchema } from '../../../shared/contract/set-up.js';
import { CalendarDayRow, MillRow, ShiftPatternRow } from '../../database/entities/index.js';
import { ApiError, wrongField } from '../../middleware/api-error.js';
import { holdsOn, rootOf, shiftsOn } from '../book/pattern-shifts.js';
import { DAY_MINUTES, lengthOf, minutesUntil } from './local-times.js';
import { wrongDate } from './pattern-checks.js';
import { remakeShiftsOf } from './patterns.service.js';
import type { SetUpChange } from './set-up-change.js';

const EVERY_PATTERN = '*';

/** Says that a date differs from the patterns; the same shed, date and pattern again takes the place of what was said. */
export async function setCalendarDay(change: SetUpChange, asked: CalendarDay): Promise<Changed> {
  const { tx } = change;
  await change.requireShed(asked.shedId);
  const pattern = await patternOn(change, asked);
  const day = { ...withoutHours(asked), patternId: pattern ? rootOf(pattern) : EVERY_PATTERN };
  requireHours(day, pattern);
  const { shedId, date, patternId } = day;
  const before = await tx.findOneBy(CalendarDayRow, { shedId, date, patternId });
  await tx.delete(CalendarDayRow, { shedId, date, patternId });
  await requireNoOverlap(change, day);
  await tx.insert(CalendarDayRow, day);
  change.record({
    what: 'calendar',
    name: nameOf(date, pattern),
    action: before ? 'changed' : 'added',
    before: before && said(before),
    after: said(day),
    reason: day.reason,
  });
  return remakeDay(change, shedId, date, patternId);
}

/** A date is as the patterns say again. */
export async function dropCalendarDay(
  change: SetUpChange,
  asked: z.infer<typeof dropCalendarDaySchema>,
): Promise<Changed> {
  const { tx } = change;
  await change.requireShed(asked.shedId);
  const pattern =
    asked.patternId === EVERY_PATTERN ? null : await tx.findOneBy(ShiftPatternRow, { id: asked.patternId });
  const key = {
    shedId: asked.shedId,
    date: asked.date,
    patternId: pattern ? rootOf(pattern) : asked.patternId,
  };
  const before = await tx.findOneBy(CalendarDayRow, key);
  if (!before) throw new ApiError('not-found');
  await tx.delete(CalendarDayRow, key);
  change.record({
    what: 'calendar',
    name: nameOf(key.date, pattern),
    action: 'removed',
    before: said(before),
  });
  return remakeDay(change, key.shedId, key.date, key.patternId);
}

async function remakeDay(
  change: SetUpChange,
  shedId: string,
  date: string,
  patternId: string,
): Promise<Changed> {
  const roots = patternId === EVERY_PATTERN ? null : new Set([patternId]);
  return { ids: [], ...(await remakeShiftsOf(change, shedId, roots, date, date)) };
}

/** The pattern that a form names, if it holds on the date; null: all of them. */
async function patternOn(
  { tx }: SetUpChange,
  { shedId, date, patternId }: CalendarDay,
): Promise<ShiftPatternRow | null> {
  const wrong = wrongDate(date, 'date');
  if (wrong.length > 0) throw new ApiError('bad-request', { fields: wrong });
  if (patternId === EVERY_PATTERN) return null;
  const named = await tx.findOneBy(ShiftPatternRow, { id: patternId, shedId });
  if (!named)
    throw wrongField('patternId', 'The shed has no such pattern. Choose one of the list, or all of the day.');
  const chain = (await tx.findBy(ShiftPatternRow, { shedId })).filter((one) => rootOf(one) === rootOf(named));
  const holding = chain.find((one) => holdsOn(one, date));
  if (!holding)
    throw wrongField(
      'patternId',
      `${named.name} is not in force on that date. Choose another pattern or date.`,
    );
  return holding;
}

const withoutHours = (day: CalendarDay): CalendarDay =>
  day.kind === 'off' ? { ...day, startsLocal: null, endsLocal: null } : day;

function requireHours(day: CalendarDay, pattern: ShiftPatternRow | null): void {
  const { kind, startsLocal, endsLocal } = day;
  const hours = startsLocal !== null || endsLocal !== null;
  if (hours && !pattern) throw wrongField('patternId', 'Hours are those of one pattern. Choose which.');
  if (kind === 'short' && !hours) throw wrongField('endsLocal', 'Say when the short day begins or ends.');
  if (kind === 'overtime' && !hours && pattern?.weekdays.includes(weekdayOf(day.date)))
    throw wrongField(
      'date',
      `${pattern.name} runs on that day anyhow. Say longer hours, or choose another date.`,
    );
  if (kind !== 'short' || !pattern) return;
  const begins = startsLocal ?? pattern.startsLocal;
  const ends = endsLocal ?? pattern.endsLocal;
  const offset = minutesUntil(pattern.startsLocal, begins) % DAY_MINUTES;
  const within = offset + minutesUntil(begins, ends) <= lengthOf(pattern);
  if (!within || (begins === pattern.startsLocal && ends === pattern.endsLocal))
    throw wrongField(
      endsLocal === null ? 'startsLocal' : 'endsLocal',
      `A short day lies within ${pattern.name}, ${pattern.startsLocal} to ${pattern.endsLocal}, and is shorter. For other hours choose overtime.`,
    );
}

/** Overtime must not run into another shift of its own date or of those beside it. */
async function requireNoOverlap({ tx }: SetUpChange, day: CalendarDay): Promise<void> {
  if (day.kind !== 'overtime') return;
  const mill = await tx.findOneBy(MillRow, { id: 1 });
  const patterns = await tx.findBy(ShiftPatternRow, { shedId: day.shedId });
  const calendar = [...(await tx.findBy(CalendarDayRow, { shedId: day.shedId })), day];
  const around = [-1, 0, 1].map(
    (days) => DateTime.fromISO(day.date, { zone: 'utc' }).plus({ days }).toISODate() ?? '',
  );
  const shifts = around.flatMap((date) => shiftsOn(date, patterns, calendar, mill?.timeZone ?? 'utc'));
  for (const shift of shifts.filter((one) => one.date === day.date)) {
    const rival = shifts.find(
      (one) => one.key !== shift.key && one.startsAt < shift.endsAt && one.endsAt > shift.startsAt,
    );
    if (rival)
      throw wrongField(
        'endsLocal',
        `${shift.name} would overlap ${rival.name} of ${rival.date}. Choose hours that leave it free.`,
      );
  }
}

const weekdayOf = (date: string) => DateTime.fromISO(date, { zone: 'utc' }).weekday;

const nameOf = (date: string, pattern: ShiftPatternRow | null) =>
  `${date}, ${pattern?.name ?? 'all patterns'}`;

const said = ({ kind, startsLocal, endsLocal, reason }: CalendarDay) => ({
  kind,
  startsLocal,
  endsLocal,
  reason,
});
