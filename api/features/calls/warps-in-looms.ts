import type { EntityManager } from 'typeorm';
import type { LoomLine } from '../../../shared/entries/loom-line.js';
import type { EntryOf } from '../../../shared/entries/entry.js';
import { entriesById } from '../book/entry-store.js';
import { list, push } from '../book/bulk.js';

/** What is in a loom, with what its ticket said and what was woven on it. */
export interface WarpInLoom {
  readonly loomId: string;
  readonly since: number;
  readonly how: EntryOf<'warp-change'>['how'];
  readonly warpId: string | null;
  readonly warpName: string | null;
  readonly clothId: string;
  readonly clothName: string;
  /** By the ticket, else by the list of beams; null: not known. */
  readonly lengthM: number | null;
  /** What is expected to be left at its end, metres. */
  readonly thrumM: number;
  readonly sizeSet: string | null;
  readonly weftLot: string | null;
  /** Woven on it up to `known`, the end of the last shift whose picks are known. */
  readonly picks: number;
  readonly known: number;
  /** Its latest woven shifts: picks, and the hours that they are held against. */
  readonly recent: readonly { readonly picks: number; readonly hours: number }[];
}

interface FittingRecord {
  id: string;
  loomId: string;
  effectiveAt: number;
  warpId: string | null;
  clothId: string;
  how: WarpInLoom['how'];
  warpName: string | null;
  lengthM: number | null;
  thrumM: number | null;
  clothName: string;
}

interface WovenRecord {
  loomId: string;
  endsAt: number;
  picks: number;
  hours: number;
  counted: number;
  /** The line itself, where its shift holds the change. */
  line: string | null;
}

/** Shifts by which a warp's pace is judged. */
const RECENT = 9;

/** What lies in these looms at a moment; looms of which the book does not know are left out. */
export async function warpsInLooms(
  from: EntityManager,
  loomIds: readonly string[],
  asOf: number,
): Promise<ReadonlyMap<string, WarpInLoom>> {
  const fittings = await from.query<FittingRecord[]>(
    `SELECT f.*, w."name" AS "warpName", w."lengthM", w."thrumM", COALESCE(c."name", f."clothId") AS "clothName"
       FROM json_each(?) j
       JOIN "fitting" f ON f."loomId" = j.value AND f."effectiveAt" =
         (SELECT MAX(g."effectiveAt") FROM "fitting" g WHERE g."loomId" = j.value AND g."effectiveAt" <= ?)
       LEFT JOIN "warp" w ON w."id" = f."warpId" LEFT JOIN "cloth" c ON c."id" = f."clothId"
      ORDER BY f."loomId", f."id"`,
    [list(loomIds), asOf],
  );
  const inLoom = new Map(fittings.map((fitting) => [fitting.loomId, fitting]));
  const said = new Map<string, EntryOf<'warp-change'>>();
  for (const { entry } of await entriesById(
    from,
    [...inLoom.values()].map(({ id }) => id),
  ))
    if (entry.kind === 'warp-change') said.set(entry.id, entry);
  const woven = await wovenOn(from, [...inLoom.values()]);
  return new Map(
    [...inLoom.values()].map((fitting) => [
      fitting.loomId,
      warpOf(fitting, said.get(fitting.id), woven.get(fitting.loomId) ?? []),
    ]),
  );
}

function warpOf(
  fitting: FittingRecord,
  said: EntryOf<'warp-change'> | undefined,
  woven: readonly WovenRecord[],
): WarpInLoom {
  const since = fitting.effectiveAt;
  return {
    loomId: fitting.loomId,
    since,
    how: fitting.how,
    warpId: fitting.warpId,
    warpName: fitting.warpName,
    clothId: fitting.clothId,
    clothName: fitting.clothName,
    lengthM: said?.lengthM ?? fitting.lengthM,
    thrumM: fitting.thrumM ?? 0,
    sizeSet: said?.sizeSet ?? null,
    weftLot: said?.weftLot ?? null,
    picks: Math.round(woven.reduce((sum, one) => sum + picksSince(one, since), 0)),
    known: woven.at(-1)?.endsAt ?? since,
    recent: woven
      .filter(({ line, counted, hours }) => line === null && counted === 1 && hours > 0)
      .slice(-RECENT)
      .map(({ picks, hours }) => ({ picks, hours })),
  };
}

/** Of the shift in which it came in, only the stretches from then on. */
function picksSince({ line, picks }: WovenRecord, since: number): number {
  if (line === null) return picks;
  const { stretches } = JSON.parse(line) as LoomLine;
  return stretches
    .filter((stretch) => stretch.from >= since)
    .reduce((sum, stretch) => sum + (stretch.picks ?? 0), 0);
}

async function wovenOn(
  from: EntityManager,
  fittings: readonly FittingRecord[],
): Promise<ReadonlyMap<string, WovenRecord[]>> {
  const asked = fittings.map(({ loomId, effectiveAt }) => ({
    loom: loomId,
    at: effectiveAt,
    date: new Date(effectiveAt - 86_400_000).toISOString().slice(0, 10),
  }));
  const rows = await from.query<WovenRecord[]>(
    `SELECT l."loomId", s."endsAt", l."picks", l."minutes" / 60 AS "hours", l."counted",
        CASE WHEN s."startsAt" < c.value ->> 'at' THEN l."line" END AS "line"
       FROM json_each(?) c
       JOIN "loom_line" l ON l."loomId" = c.value ->> 'loom' AND l."date" >= c.value ->> 'date' AND l."picks" IS NOT NULL
       JOIN "shift" s ON s."key" = l."shiftKey" AND s."endsAt" > c.value ->> 'at'
      ORDER BY s."endsAt"`,
    [JSON.stringify(asked)],
  );
  const byLoom = new Map<string, WovenRecord[]>();
  for (const row of rows) push(byLoom, row.loomId, row);
  return byLoom;
}
