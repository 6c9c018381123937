import type { EntityManager } from 'typeorm';
import type { ShiftRow } from '../../database/entities/index.js';
import { Bookkeeper, BY_THE_BOOK } from './bookkeeper.js';
import { list, push } from './bulk.js';
import { carryOut } from './closing.js';
import { entriesById, EntryWeb, type StoredEntry } from './entry-store.js';
import { decide, EVERY_SHIFT, holdsOf } from './holds.js';
import { readMillFacts } from './mill-facts.js';

/**
 * Books what was logged before its shift was there: entries that name one of these shifts, and those of no shift whose
 * moment lies in one. What waited for want of a shift counts from now. Whoever makes shifts calls this, once, with
 * those that were not there before.
 */
export async function bookIntoMadeShifts(tx: EntityManager, keys: readonly string[]): Promise<void> {
  if (keys.length === 0) return;
  const ids = await nameShifts(tx, keys);
  if (ids.length === 0) return;
  const entries = await entriesById(tx, ids);
  await nameShiftsByLoom(tx, entries);
  const keeper = new Bookkeeper(tx, await readMillFacts(tx));
  for (const entry of entries) {
    keeper.changes.add(entry.shedId, 'entry', entry.id);
    if (entry.shiftKey !== null) keeper.toWrite.touch(entry.shiftKey);
  }
  const counting = await free(tx, entries);
  await keeper.book(counting);
  // A closing that came before its shift could not be carried out then; all that it closes is booked now.
  for (const entry of counting)
    if (entry.kind === 'close' || entry.kind === 'reopen') await carryOut(keeper, entry);
  await keeper.finish();
}

/** Gives entries without a shift the one that they name, or that holds their moment where they name none; their ids. */
async function nameShifts(tx: EntityManager, keys: readonly string[]): Promise<string[]> {
  const rows = await tx.query<ShiftRow[]>(
    `SELECT * FROM "shift" WHERE "key" IN (SELECT value FROM json_each(?))`,
    [list(keys)],
  );
  const without = await tx.query<{ id: string; shedId: string; moment: number; named: string | null }[]>(
    `SELECT "id", "shedId", COALESCE("changedAt", "at") AS "moment", json_extract("body", '$.shiftKey') AS "named"
       FROM "entry" WHERE "shiftKey" IS NULL`,
  );
  const given: string[] = [];
  for (const { key, shedId, startsAt, endsAt } of rows) {
    const own = without
      .filter((one) => one.shedId === shedId)
      .filter(({ named, moment }) => (named === null ? startsAt <= moment && moment < endsAt : named === key))
      .map((one) => one.id);
    if (own.length === 0) continue;
    given.push(...own);
    await tx.query(`UPDATE "entry" SET "shiftKey" = ? WHERE "id" IN (SELECT value FROM json_each(?))`, [
      key,
      list(own),
    ]);
  }
  return given;
}

/** The same where a line finds its entries by loom: an amendment that moves nothing in time goes with what it amends. */
async function nameShiftsByLoom(tx: EntityManager, entries: readonly StoredEntry[]): Promise<void> {
  const web = new EntryWeb(tx);
  await web.add(entries);
  const seqs = new Map<string, number[]>();
  for (const one of web.byId.values()) {
    const isBeside = one.kind === 'amend' && one.changedAt === null;
    const key = isBeside ? web.rootsOf(one)[0]?.shiftKey : one.shiftKey;
    if (key) push(seqs, key, one.seq);
  }
  for (const [key, ofShift] of seqs)
    await tx.query(
      `UPDATE "entry_loom" SET "shiftKey" = ? WHERE "shiftKey" IS NULL
         AND "loomId" IN (SELECT "id" FROM "loom") AND "seq" IN (SELECT value FROM json_each(?))`,
      [key, list(ofShift)],
    );
}

/** Decides what waited for want of a shift alone; gives the entries that count, those too that waited for nothing. */
async function free(tx: EntityManager, entries: readonly StoredEntry[]): Promise<StoredEntry[]> {
  const holdsBy = new Map(
    (
      await holdsOf(
        tx,
        entries.map((one) => one.id),
      )
    )
      .filter((one) => one.shiftKey === EVERY_SHIFT)
      .map((one) => [one.entryId, one]),
  );
  const counting: StoredEntry[] = [];
  for (const entry of entries) {
    const hold = holdsBy.get(entry.id);
    const freed = hold?.state === 'held' && hold.reason === 'no-shift';
    if (freed) await decide(tx, entry.id, 'accepted', BY_THE_BOOK);
    if (!hold || freed || hold.state === 'accepted') counting.push(entry);
  }
  return counting;
}
