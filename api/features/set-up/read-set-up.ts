import type { EntityManager } from 'typeorm';
import { LIMITS } from '../../../shared/contract/limits.js';
import type { SetUp } from '../../../shared/contract/set-up.js';
import { CalendarDayRow, type ShiftRow, ShiftPatternRow } from '../../database/entities/index.js';
import { ApiError } from '../../middleware/api-error.js';
import { shiftOf } from '../book/which-shift.js';
import { readReference } from '../sync/reference.js';
import { dayOnWire, toPattern } from './patterns.mapper.js';

const DAY = 86_400_000;

/** The whole mill as set-up shows it. Throws `not-found` where it has no first manager yet. */
export async function readSetUp(from: EntityManager, now: number): Promise<SetUp> {
  const reference = await readReference(from);
  if (!reference) throw new ApiError('not-found');
  const { warps, alleys = [], targets = [], parts = [], jobs = [], ...mill } = reference;
  const patterns = await from.find(ShiftPatternRow, {
    order: { shedId: 'ASC', startsLocal: 'ASC', id: 'ASC' },
  });
  const calendar = await from.find(CalendarDayRow, {
    order: { date: 'ASC', shedId: 'ASC', patternId: 'ASC' },
  });
  const shifts = await from.query<ShiftRow[]>(
    `SELECT * FROM "shift" WHERE "startsAt" >= ? AND "startsAt" < ? ORDER BY "startsAt", "shedId"`,
    [now - DAY, now + LIMITS.shiftsAhead],
  );
  return {
    ...mill,
    alleys,
    targets,
    parts,
    jobs,
    beams: await withWhereabouts(from, warps, now),
    patterns: patterns.map(toPattern),
    calendar: calendar.map((day) => dayOnWire(day, patterns)),
    shifts: shifts.map(shiftOf),
  };
}

type Warps = NonNullable<Awaited<ReturnType<typeof readReference>>>['warps'];

/** Where each beam is, and whether some warp change, counting or not, names it. */
async function withWhereabouts(from: EntityManager, warps: Warps, now: number): Promise<SetUp['beams']> {
  const onLooms = await beamsOnLooms(from, now);
  const used = await usedBeams(from);
  return warps.map((warp) => ({ ...warp, onLoomId: onLooms.get(warp.id) ?? null, used: used.has(warp.id) }));
}

/** Beams that are on a loom now, and on which. */
export async function beamsOnLooms(from: EntityManager, now: number): Promise<ReadonlyMap<string, string>> {
  const rows = await from.query<{ warpId: string; loomId: string }[]>(
    `SELECT f."warpId", f."loomId" FROM "fitting" f WHERE f."effectiveAt" <= ? AND f."warpId" IS NOT NULL
       AND NOT EXISTS (SELECT 1 FROM "fitting" later WHERE later."loomId" = f."loomId" AND later."effectiveAt" <= ?
         AND (later."effectiveAt" > f."effectiveAt"
           OR (later."effectiveAt" = f."effectiveAt" AND later."id" > f."id")))
       ORDER BY f."effectiveAt"`,
    [now, now],
  );
  return new Map(rows.map((row) => [row.warpId, row.loomId]));
}

/** Beams that some warp change names. */
export async function usedBeams(from: EntityManager): Promise<ReadonlySet<string>> {
  const rows = await from.query<{ warpId: string | null }[]>(
    `SELECT "warpId" FROM "fitting"
     UNION SELECT json_extract(e."body", '$.warpId') FROM "shed" s
       JOIN "entry" e ON e."shedId" = s."id" AND e."kind" = 'warp-change'`,
  );
  return new Set(rows.flatMap((row) => row.warpId ?? []));
}
