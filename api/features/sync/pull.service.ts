import type { DataSource, EntityManager } from 'typeorm';
import { LIMITS } from '../../../shared/contract/limits.js';
import type { Fitting } from '../../../shared/contract/reference.js';
import type { PullResponse } from '../../../shared/contract/sync.js';
import type { ChangeRow, FittingRow, ShiftRow } from '../../database/entities/index.js';
import { list } from '../book/bulk.js';
import { entriesById } from '../book/entry-store.js';
import { shiftOf } from '../book/which-shift.js';
import { readCursor, writeCursor, type Cursor } from './cursor.js';
import { pulledEntries, type Sight } from './pulled-entries.js';
import { readPeople, readReference } from './reference.js';
import { scopeName } from './scope.js';
import { snapshotPage } from './snapshot.js';

export interface Pull extends Sight {
  readonly after: string | undefined;
  /** What the book said when it last acknowledged something. */
  readonly seen?: string | undefined;
  readonly epoch: string;
  readonly now: number;
}

/**
 * What a device has not seen yet. Where its cursor is not of this book, or of another view of it, it gets the whole
 * again; where the book is not the one it last spoke to, it is told to send again what that one had acknowledged.
 */
export async function pull(reads: DataSource, asked: Pull): Promise<PullResponse> {
  const from = reads.manager;
  const cursor = asked.after === undefined ? null : readCursor(asked.after);
  const forgot = asked.seen !== undefined && !(await isOfThisBook(from, asked.epoch, readCursor(asked.seen)));
  if (asked.after === undefined) return snapshotPage(from, asked, null, forgot);
  if (forgot || !cursor || !(await isOfThisBook(from, asked.epoch, cursor)))
    return snapshotPage(from, asked, null, true);
  if (cursor.scope !== scopeName(asked.scope)) return snapshotPage(from, asked, null, false);
  if (cursor.snapshot) return snapshotPage(from, asked, cursor, false);
  return changesAfter(from, asked, cursor);
}

/** Whether what a cursor names is in this book: it may be another's, or an older copy of this one. */
export async function isOfThisBook(
  from: EntityManager,
  epoch: string,
  said: Cursor | null,
): Promise<boolean> {
  return said !== null && said.epoch === epoch && (await refAt(from, said.seq)) === said.ref;
}

/** The mark of the change of a number; '' before the first; null: there is no such change. */
async function refAt(from: EntityManager, seq: number): Promise<string | null> {
  if (seq === 0) return '';
  const [row] = await from.query<{ ref: string }[]>(
    `SELECT COALESCE("mark", "ref") AS "ref" FROM "change" WHERE "seq" = ?`,
    [seq],
  );
  return row?.ref ?? null;
}

async function changesAfter(from: EntityManager, asked: Pull, cursor: Cursor): Promise<PullResponse> {
  const { shedId } = asked.scope;
  const limit = LIMITS.changesPerPull;
  const rows = await from.query<ChangeRow[]>(
    `SELECT * FROM "change" WHERE "seq" > ? AND ("shedId" = ? OR "shedId" IS NULL) ORDER BY "seq" LIMIT ?`,
    [cursor.seq, shedId ?? '', limit + 1],
  );
  const taken = rows.slice(0, limit);
  const last = taken.at(-1);
  const refs = (kind: ChangeRow['kind']) =>
    new Set(taken.filter((row) => row.kind === kind).map((row) => row.ref));
  const has = (kind: ChangeRow['kind']) => taken.some((row) => row.kind === kind);
  const shifts = has('shift') ? await shiftsByKey(from, refs('shift')) : [];
  const gone = [...refs('shift')].filter((key) => !shifts.some((shift) => shift.key === key));
  return {
    serverNow: asked.now,
    snapshot: false,
    resend: false,
    cursor: writeCursor(last ? { ...cursor, seq: last.seq, ref: last.mark ?? last.ref } : cursor),
    more: rows.length > limit,
    entries: await pulledEntries(from, await entriesById(from, refs('entry')), asked),
    shifts,
    ...(gone.length > 0 && { goneShifts: gone }),
    fittings: has('fitting') ? await fittingsOfLooms(from, refs('fitting')) : [],
    ...(has('fitting') && { fittingsOf: [...refs('fitting')] }),
    reference: has('reference') ? await readReference(from) : null,
    people: has('people') ? await readPeople(from, asked.scope) : null,
  };
}

async function shiftsByKey(from: EntityManager, keys: Iterable<string>): Promise<PullResponse['shifts']> {
  const rows = await from.query<ShiftRow[]>(
    `SELECT * FROM "shift" WHERE "key" IN (SELECT value FROM json_each(?)) ORDER BY "startsAt"`,
    [list(keys)],
  );
  return rows.map(shiftOf);
}

async function fittingsOfLooms(from: EntityManager, loomIds: Iterable<string>): Promise<Fitting[]> {
  const rows = await from.query<FittingRow[]>(
    `SELECT * FROM "fitting" WHERE "loomId" IN (SELECT value FROM json_each(?)) ORDER BY "effectiveAt", "id"`,
    [list(loomIds)],
  );
  return rows.map((row) => ({ ...row }));
}
