import type { EntityManager } from 'typeorm';
import { LIMITS } from '../../../shared/contract/limits.js';
import type { Fitting, Shift } from '../../../shared/contract/reference.js';
import type { PullResponse } from '../../../shared/contract/sync.js';
import type { FittingRow, ShiftRow } from '../../database/entities/index.js';
import {
  entriesById,
  entriesBySeq,
  EntryWeb,
  storedEntry,
  type EntryRecordRow,
  type StoredEntry,
  withLoomsAsBooked,
} from '../book/entry-store.js';
import { shiftOf } from '../book/which-shift.js';
import { writeCursor, type Cursor } from './cursor.js';
import type { Pull } from './pull.service.js';
import { pulledEntries } from './pulled-entries.js';
import { readPeople, readReference } from './reference.js';
import { scopeName } from './scope.js';

const HOUR = 3_600_000;
/** Entries of shifts that ended so long ago are still sent. */
const WINDOW = { floor: 36 * HOUR, shed: 9 * 24 * HOUR } as const;
/** Shifts are sent from so long ago, whoever asks. */
const SHIFTS_BACK = 9 * 24 * HOUR;
/** A reading may be typed so long before the shift that it serves. */
const TYPED_EARLY = HOUR;
/** Earlier readings of each loom: to show what the clock stood at, and what was woven between shifts. */
const READINGS_BEFORE = 2;

/**
 * The book as a device needs it, in pages of entries. The first page carries all that is not entries, and says
 * `snapshot`; the number that changes are counted from is fixed then, so nothing that comes meanwhile is missed.
 */
export async function snapshotPage(
  from: EntityManager,
  asked: Pull,
  going: Cursor | null,
  resend: boolean,
): Promise<PullResponse> {
  const { scope, now, epoch } = asked;
  const shedId = scope.shedId ?? '';
  const last = going ?? (await lastChange(from));
  const since = going?.snapshot?.from ?? (await windowFrom(from, shedId, now - WINDOW[scope.of]));
  const after = going?.snapshot?.seq ?? 0;
  const rows = await from.query<EntryRecordRow[]>(
    `SELECT * FROM "entry" WHERE "shedId" = ? AND "at" >= ? AND "seq" > ? ORDER BY "seq" LIMIT ?`,
    [shedId, since, after, LIMITS.changesPerPull + 1],
  );
  const page = await withLoomsAsBooked(from, rows.slice(0, LIMITS.changesPerPull).map(storedEntry));
  const more = rows.length > page.length;
  const earlier = going ? [] : await reachingIn(from, shedId, since);
  const entries = await withWhatTheyReferTo(from, [...earlier, ...page], since);
  return {
    serverNow: now,
    snapshot: !going,
    resend,
    cursor: writeCursor({
      epoch,
      scope: scopeName(scope),
      seq: last.seq,
      ref: last.ref,
      snapshot: more ? { from: since, seq: page.at(-1)?.seq ?? after } : null,
    }),
    more,
    entries: await pulledEntries(from, entries, asked),
    shifts: going ? [] : await shiftsAround(from, shedId, now),
    fittings: going ? [] : await fittingsSince(from, shedId, since),
    reference: going ? null : await readReference(from),
    people: going ? null : await readPeople(from, scope),
  };
}

export async function lastChange(from: EntityManager): Promise<{ seq: number; ref: string }> {
  const [row] = await from.query<{ seq: number; ref: string }[]>(
    `SELECT "seq", COALESCE("mark", "ref") AS "ref" FROM "change"
      WHERE "seq" = (SELECT MAX("seq") FROM "change")`,
  );
  return row ?? { seq: 0, ref: '' };
}

/** The start of the first shift that ended after `ended`. */
async function windowFrom(from: EntityManager, shedId: string, ended: number): Promise<number> {
  const [row] = await from.query<{ startsAt: number | null }[]>(
    `SELECT MIN("startsAt") AS "startsAt" FROM "shift"
      WHERE "shedId" = ? AND "startsAt" > ? AND "endsAt" > ?`,
    [shedId, ended - 48 * HOUR, ended],
  );
  return Math.max(0, Math.min(row?.startsAt ?? ended, ended) - TYPED_EARLY);
}

/** Entries from before the window that reach into it: stops that stood then, the looms' last readings. */
async function reachingIn(from: EntityManager, shedId: string, since: number): Promise<StoredEntry[]> {
  const stops = await from.query<{ stopId: string }[]>(
    `SELECT DISTINCT "stopId" FROM "stand" WHERE "loomId" IN (SELECT "id" FROM "loom" WHERE "shedId" = ?)
      AND ("until" IS NULL OR "until" >= ?) AND "from" < ?`,
    [shedId, since, since],
  );
  const looms = await from.query<{ id: string }[]>(`SELECT "id" FROM "loom" WHERE "shedId" = ?`, [shedId]);
  const seqs: number[] = [];
  for (const { id } of looms) {
    const readings = await from.query<{ seq: number }[]>(
      `SELECT l."seq" FROM "entry_loom" l JOIN "entry" e ON e."seq" = l."seq"
        WHERE l."loomId" = ? AND l."at" < ? AND e."kind" IN ('reading', 'sheet')
        ORDER BY l."at" DESC LIMIT ?`,
      [id, since, READINGS_BEFORE],
    );
    seqs.push(...readings.map((one) => one.seq));
  }
  return [
    ...(await entriesById(
      from,
      stops.map((one) => one.stopId),
    )),
    ...(await entriesBySeq(from, seqs)),
  ];
}

/** With the entries from before the window that these correct, end or attend to, and what else was said of those. */
async function withWhatTheyReferTo(
  from: EntityManager,
  entries: readonly StoredEntry[],
  since: number,
): Promise<StoredEntry[]> {
  const web = new EntryWeb(from);
  await web.add(entries);
  const own = new Set(entries.map((one) => one.id));
  return [...web.byId.values()]
    .filter((one) => own.has(one.id) || one.at < since)
    .sort((a, b) => a.seq - b.seq);
}

async function shiftsAround(from: EntityManager, shedId: string, now: number): Promise<Shift[]> {
  const rows = await from.query<ShiftRow[]>(
    `SELECT * FROM "shift" WHERE "shedId" = ? AND "startsAt" >= ? AND "startsAt" < ? ORDER BY "startsAt"`,
    [shedId, now - SHIFTS_BACK, now + LIMITS.shiftsAhead],
  );
  return rows.map(shiftOf);
}

/** Fittings that were in force in the window. */
async function fittingsSince(from: EntityManager, shedId: string, since: number): Promise<Fitting[]> {
  const rows = await from.query<FittingRow[]>(
    `SELECT f.* FROM "fitting" f JOIN "loom" l ON l."id" = f."loomId" WHERE l."shedId" = ?
        AND NOT EXISTS (SELECT 1 FROM "fitting" later
          WHERE later."loomId" = f."loomId" AND later."effectiveAt" > f."effectiveAt" AND later."effectiveAt" <= ?)
      ORDER BY f."effectiveAt", f."id"`,
    [shedId, since],
  );
  return rows.map((row) => ({ ...row }));
}
