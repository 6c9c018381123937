import type { EntityManager } from 'typeorm';
import type { LoomHistory, RepairRecord } from '../../../shared/contract/calls.js';
import { inForceAt } from '../../../shared/contract/reference.js';
import { beforeAfter, type WovenShift } from '../../../shared/chance/before-after.js';
import type { ResolvedOf } from '../../../shared/entries/corrections.js';
import { repeatsAmong } from '../../../shared/entries/repeats.js';
import { CauseVersionRow, LoomRow } from '../../database/entities/index.js';
import { list } from '../book/bulk.js';
import { mondayOf } from '../book/line-row.js';
import { dispersionRecord } from '../reports/dispersion.js';
import { jobsByPicks } from './jobs-by-picks.js';
import { tacklingSince } from './tackling-entries.js';
import { warpsInLooms, type WarpInLoom } from './warps-in-looms.js';

export interface LoomHistoryInput {
  readonly loomId: string;
  readonly asOf: number;
  /** Whether the asker may see who repaired. */
  readonly names: boolean;
}

const DAY = 86_400_000;
/** How far back repairs and picks are looked at: half a year; the dispersion between shifts: twelve weeks. */
export const HISTORY_DAYS = 182;
const DISPERSION_DAYS = 84;
/** Repairs that an answer holds. */
const SHOWN = 60;

/** One loom for its tackler: repairs with what came of them, what is in it, what is due. Null: no such loom. */
export async function loomHistory(
  from: EntityManager,
  { loomId, asOf, names }: LoomHistoryInput,
): Promise<LoomHistory | null> {
  const loom = await from.findOneBy(LoomRow, { id: loomId });
  if (!loom) return null;
  const since = Math.max(loom.from, asOf - HISTORY_DAYS * DAY);
  const { repairs, cares } = await tacklingSince(from, { shedId: loom.shedId, loomId }, since);
  const inLoom = (await warpsInLooms(from, [loomId], asOf)).get(loomId);
  const jobs = await jobsByPicks(from, [loomId], cares, since);
  return {
    asOf,
    loomId,
    loomNumber: loom.number,
    alley: loom.alley,
    since,
    repairs: await recordsOf(from, loom, repairs, { asOf, since, names }),
    fitting: inLoom ? fittingOf(inLoom) : null,
    jobs: [...(jobs.get(loomId) ?? [])],
  };
}

function fittingOf(warp: WarpInLoom): LoomHistory['fitting'] {
  const { since, how, warpId, warpName, clothId, clothName, lengthM, sizeSet, weftLot, picks } = warp;
  return { since, how, warpId, warpName, clothId, clothName, lengthM, sizeSet, weftLot, picks };
}

async function recordsOf(
  from: EntityManager,
  { id: loomId, shedId }: LoomRow,
  repairs: readonly ResolvedOf<'repair'>[],
  { asOf, since, names }: { asOf: number; since: number; names: boolean },
): Promise<RepairRecord[]> {
  const shown = repairs.slice(-SHOWN);
  if (shown.length === 0) return [];
  const shifts = await shiftsOf(from, loomId, since);
  const woven = shifts.flatMap(({ picks, ...shift }): WovenShift[] =>
    picks === null ? [] : [{ ...shift, picks }],
  );
  const shiftAt = (at: number) => shifts.findIndex(({ endsAt }) => at < endsAt);
  const repeats = repeatsAmong(
    repairs.map(({ root, entry, at }) => {
      const place = shiftAt(at);
      return { id: root.entry.id, cause: entry.cause, shift: place < 0 ? shifts.length : place };
    }),
  );
  const dispersion = await dispersionRecord(from, shedId, {
    from: mondayOf(dateOf(asOf - DISPERSION_DAYS * DAY)),
    to: mondayOf(dateOf(asOf)),
  });
  const changes = (
    await from.query<{ at: number }[]>(
      `SELECT "effectiveAt" AS "at" FROM "fitting" WHERE "loomId" = ? ORDER BY "effectiveAt"`,
      [loomId],
    )
  ).map(({ at }) => at);
  const causes = await from.find(CauseVersionRow);
  const people = names ? await namesOf(from, shown) : null;
  const kept = await keptPhotos(from, shown);
  return shown
    .map(({ root, entry, at }): RepairRecord => {
      const versions = causes.filter(({ causeId }) => causeId === entry.cause);
      const { id, by } = root.entry;
      const bounds = {
        from: changes.filter((change) => change <= at).at(-1) ?? -Infinity,
        until: changes.find((change) => change > at) ?? Infinity,
      };
      return {
        id,
        at,
        cause: entry.cause,
        causeName: (inForceAt(versions, at) ?? versions[0])?.name ?? entry.cause,
        found: entry.found || null,
        done: entry.done || null,
        part: entry.part || null,
        ran: entry.ran ?? null,
        nearMiss: entry.nearMiss || null,
        by: people?.get(by) ?? null,
        photos: (entry.photoIds ?? []).map((photo) => ({ id: photo, kept: kept.has(photo) })),
        repeat: repeats.get(id) ?? null,
        ...beforeAfter(woven, at, bounds, dispersion),
      };
    })
    .reverse();
}

/** The loom's shifts since a moment, in order of time; picks null: not known, or out of order. */
function shiftsOf(from: EntityManager, loomId: string, since: number) {
  return from.query<(Omit<WovenShift, 'picks'> & { picks: number | null })[]>(
    `SELECT s."startsAt", s."endsAt", CASE WHEN l."counted" THEN l."picks" END AS "picks", l."warpBreaks", l."weftBreaks"
       FROM "loom_line" l JOIN "shift" s ON s."key" = l."shiftKey"
      WHERE l."loomId" = ? AND l."date" >= ? ORDER BY s."startsAt"`,
    [loomId, dateOf(since)],
  );
}

async function namesOf(from: EntityManager, repairs: readonly ResolvedOf<'repair'>[]) {
  const rows = await from.query<{ id: string; name: string }[]>(
    `SELECT "id", "name" FROM "person" WHERE "id" IN (SELECT value FROM json_each(?))`,
    [list(new Set(repairs.map(({ root }) => root.entry.by)))],
  );
  return new Map(rows.map(({ id, name }) => [id, name]));
}

async function keptPhotos(
  from: EntityManager,
  repairs: readonly ResolvedOf<'repair'>[],
): Promise<ReadonlySet<string>> {
  const rows = await from.query<{ id: string }[]>(
    `SELECT "id" FROM "photo" WHERE "repairId" IN (SELECT value FROM json_each(?))`,
    [list(repairs.map(({ root }) => root.entry.id))],
  );
  return new Set(rows.map(({ id }) => id));
}

function dateOf(at: number): string {
  return new Date(at).toISOString().slice(0, 10);
}
