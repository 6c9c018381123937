import { DateTime } from 'luxon';
import { Between, type EntityManager } from 'typeorm';
import { LIMITS } from '../../../shared/contract/limits.js';
import { CalendarDayRow, MillRow, ShiftPatternRow, type ShiftRow } from '../../database/entities/index.js';
import type { Deps } from '../../deps.js';
import { bookIntoMadeShifts } from './awaited-shifts.js';
import { insertRows, push } from './bulk.js';
import { ChangeLog } from './change-log.js';
import { datesBetween, shiftsOn } from './pattern-shifts.js';

const DAY = 86_400_000;

export const SHIFT_COLUMNS = [
  'key',
  'shedId',
  'date',
  'patternId',
  'name',
  'startsAt',
  'endsAt',
  'mealStartsAt',
  'mealEndsAt',
  'mealLooms',
  'state',
] as const satisfies readonly (keyof ShiftRow)[];

/**
 * Makes the shifts of the dates from one moment to another, as patterns and calendar say. A shift that is there is
 * left as it is: its instants are frozen. What would overlap another of its shed is not made.
 */
export async function ensureShifts(
  tx: EntityManager,
  from: number,
  until: number,
): Promise<{ made: number; shedIds: readonly (string | null)[]; seq: number | null }> {
  const mill = await tx.findOneBy(MillRow, { id: 1 });
  const patterns = await tx.find(ShiftPatternRow, { order: { id: 'ASC' } });
  if (!mill || patterns.length === 0) return { made: 0, shedIds: [], seq: null };
  const date = (at: number) => DateTime.fromMillis(at, { zone: mill.timeZone }).toISODate() ?? '';
  const dates = datesBetween(date(from), date(until));
  const calendar = await tx.findBy(CalendarDayRow, { date: Between(date(from), date(until)) });
  const there = await tx.query<Pick<ShiftRow, 'key' | 'shedId' | 'startsAt' | 'endsAt'>[]>(
    `SELECT "key", "shedId", "startsAt", "endsAt" FROM "shift" WHERE "endsAt" > ? AND "startsAt" < ?`,
    [from - 3 * DAY, until + 3 * DAY],
  );
  const keys = new Set(there.map((one) => one.key));
  const taken = new Map<string, { startsAt: number; endsAt: number }[]>();
  for (const one of there) push(taken, one.shedId, one);
  const made: ShiftRow[] = [];
  const wanted = dates.flatMap((one) => shiftsOn(one, patterns, calendar, mill.timeZone));
  for (const shift of wanted.sort((a, b) => a.startsAt - b.startsAt)) {
    if (keys.has(shift.key)) continue;
    const others = taken.get(shift.shedId) ?? [];
    if (others.some((one) => one.startsAt < shift.endsAt && one.endsAt > shift.startsAt)) continue;
    push(taken, shift.shedId, shift);
    made.push(shift);
  }
  await insertRows(
    tx,
    'shift',
    SHIFT_COLUMNS,
    made.map((shift) => SHIFT_COLUMNS.map((column) => shift[column])),
  );
  await bookIntoMadeShifts(
    tx,
    made.map((shift) => shift.key),
  );
  const changes = new ChangeLog();
  for (const shift of made) changes.add(shift.shedId, 'shift', shift.key);
  return { made: made.length, ...(await changes.write(tx)) };
}

/** Makes shifts five weeks ahead, now and once a day. Gives the function that stops it. */
export async function startShiftMaker(
  deps: Pick<Deps, 'writer' | 'feed' | 'now' | 'log'>,
): Promise<() => void> {
  const make = async () => {
    const now = deps.now();
    // From yesterday: a night shift that runs now began then.
    const { made, shedIds, seq } = await deps.writer.write((tx) =>
      ensureShifts(tx, now - DAY, now + LIMITS.shiftsAhead + DAY),
    );
    if (made > 0) deps.log.info({ made }, 'shifts made');
    if (seq !== null) for (const shedId of shedIds) deps.feed.announce(shedId, seq);
  };
  await make();
  const timer = setInterval(() => {
    make().catch((error: unknown) => deps.log.error({ err: error }, 'shifts could not be made'));
  }, DAY);
  timer.unref();
  return () => clearInterval(timer);
}
