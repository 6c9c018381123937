import { DateTime } from 'luxon';
import type { EntityManager } from 'typeorm';
import { LIMITS } from '../../../shared/contract/limits.js';
import { CalendarDayRow, MillRow, ShiftPatternRow, type ShiftRow } from '../../database/entities/index.js';
import { bookIntoMadeShifts } from './awaited-shifts.js';
import { insertRows, list } from './bulk.js';
import { datesBetween, rootOf, shiftsOn } from './pattern-shifts.js';
import { SHIFT_COLUMNS } from './shifts.js';

const DAY = 86_400_000;

export interface ShiftsToRemake {
  readonly shedId: string;
  /** Patterns by their root; null: all of the shed. */
  readonly roots: ReadonlySet<string> | null;
  /** First date; older than entries are taken from, none is made. */
  readonly from: string;
  /** Last date; null: as far ahead as shifts are made. */
  readonly until: string | null;
  readonly now: number;
}

export interface RemadeShifts {
  /** Keys of shifts that were made, are others now, or are no more. */
  readonly changed: readonly string[];
  /** Keys of shifts that are not as patterns and calendar now say, and stay. */
  readonly kept: readonly string[];
  /** The earliest moment that is another shift's now; null: none. */
  readonly since: number | null;
}

/**
 * Makes a shed's shifts as patterns and calendar now say. A shift with an entry stays as it is, and so does every
 * shift that began before a closed one ended: what was signed stands beside its neighbours as they were.
 */
export async function remakeShifts(tx: EntityManager, asked: ShiftsToRemake): Promise<RemadeShifts> {
  const { shedId, now } = asked;
  const mill = await tx.findOneBy(MillRow, { id: 1 });
  if (!mill) return { changed: [], kept: [], since: null };
  const dateOf = (at: number) => DateTime.fromMillis(at, { zone: mill.timeZone }).toISODate() ?? '';
  const oldest = dateOf(now - LIMITS.oldestMoment);
  const first = asked.from > oldest ? asked.from : oldest;
  const all = await tx.query<(ShiftRow & { used: number })[]>(
    `SELECT s.*, EXISTS (SELECT 1 FROM "entry" e WHERE e."shiftKey" = s."key") AS "used" FROM "shift" s
      WHERE s."shedId" = ? AND s."date" >= ?`,
    [shedId, DateTime.fromISO(first, { zone: 'utc' }).minus({ days: 2 }).toISODate() ?? ''],
  );
  const horizon = dateOf(now + LIMITS.shiftsAhead + DAY);
  const last = asked.until ?? all.reduce((date, one) => (one.date > date ? one.date : date), horizon);
  const patterns = (await tx.findBy(ShiftPatternRow, { shedId })).filter(
    (one) => asked.roots === null || asked.roots.has(rootOf(one)),
  );
  const roots = asked.roots ?? new Set(patterns.map(rootOf));
  const calendar = await tx.findBy(CalendarDayRow, { shedId });
  const wanted = new Map(
    datesBetween(first, last)
      .flatMap((date) => shiftsOn(date, patterns, calendar, mill.timeZone))
      .map((shift) => [shift.key, shift]),
  );
  const [signed] = await tx.query<{ until: number | null }[]>(
    `SELECT MAX("endsAt") AS "until" FROM "shift" WHERE "shedId" = ? AND "state" = 'closed'`,
    [shedId],
  );
  const closedUntil = signed?.until ?? 0;
  const concerned = all.filter((one) => one.date >= first && one.date <= last && roots.has(one.patternId));
  const fixed = concerned.filter((one) => one.used || one.state === 'closed' || one.startsAt < closedUntil);
  const fixedKeys = new Set(fixed.map((one) => one.key));
  const free = new Map(concerned.filter((one) => !fixedKeys.has(one.key)).map((one) => [one.key, one]));
  const taken: { startsAt: number; endsAt: number }[] = all.filter((one) => !free.has(one.key));
  const made: ShiftRow[] = [];
  for (const shift of [...wanted.values()].sort((a, b) => a.startsAt - b.startsAt)) {
    if (fixedKeys.has(shift.key) || shift.startsAt < closedUntil) continue;
    if (taken.some((one) => one.startsAt < shift.endsAt && one.endsAt > shift.startsAt)) continue;
    taken.push(shift);
    made.push(shift);
  }
  const fresh = made.filter((shift) => !isSame(free.get(shift.key), shift));
  const stays = new Set(made.filter((shift) => isSame(free.get(shift.key), shift)).map((one) => one.key));
  const gone = [...free.values()].filter((one) => !stays.has(one.key));
  await tx.query(`DELETE FROM "shift" WHERE "key" IN (SELECT value FROM json_each(?))`, [
    list(gone.map((one) => one.key)),
  ]);
  await insertRows(
    tx,
    'shift',
    SHIFT_COLUMNS,
    fresh.map((shift) => SHIFT_COLUMNS.map((column) => shift[column])),
  );
  await bookIntoMadeShifts(
    tx,
    fresh.map((shift) => shift.key),
  );
  const touched = [...gone, ...fresh];
  return {
    changed: [...new Set(touched.map((one) => one.key))],
    kept: fixed.filter((one) => !isSame(one, wanted.get(one.key))).map((one) => one.key),
    since: touched.length > 0 ? Math.min(...touched.map((one) => one.startsAt)) : null,
  };
}

/** Whether two rows of a shift say the same, its state aside. */
function isSame(one: ShiftRow | undefined, other: ShiftRow | undefined): boolean {
  return (
    one !== undefined &&
    other !== undefined &&
    SHIFT_COLUMNS.every((column) => column === 'state' || one[column] === other[column])
  );
}
