import type { Bookkeeper } from './bookkeeper.js';
import { insertRows } from './bulk.js';
import { entriesById, type StoredEntry } from './entry-store.js';
import { decide, EVERY_SHIFT } from './holds.js';
import { signedTotals } from './signed-totals.js';
import { versionIdsOf, versionsKnownTo } from './kept-versions.js';

/** Carries out what a foreman decided: close, reopen, accept, refuse. */
export async function carryOut(book: Bookkeeper, entry: StoredEntry): Promise<void> {
  switch (entry.entry.kind) {
    case 'close':
      return close(book, entry, entry.entry.shiftKey);
    case 'reopen':
      return reopen(book, entry.entry.shiftKey);
    case 'accept':
      return accept(book, entry, entry.entry.targetId);
    case 'refuse':
      return refuse(book, entry, entry.entry.targetId);
    default:
      return;
  }
}

async function close(book: Bookkeeper, entry: StoredEntry, shiftKey: string): Promise<void> {
  const shift = await book.shifts.named(shiftKey);
  if (!shift || shift.state === 'closed') return;
  await setState(book, shiftKey, 'closed');
  await sign(book, entry, shiftKey, true);
}

async function reopen(book: Bookkeeper, shiftKey: string): Promise<void> {
  const shift = await book.shifts.named(shiftKey);
  if (!shift || shift.state === 'open') return;
  await setState(book, shiftKey, 'open');
  // Open again, it shows the looms that stood there by what is set up now.
  const shown = book.lines.loomsNow(shift);
  await book.lines.dropOthers(shift, shown);
  for (const loomId of shown) book.toWrite.add(shiftKey, loomId);
}

/** A held entry counts, in closed shifts too: what was signed there is stated again, beside the earlier version. */
async function accept(book: Bookkeeper, entry: StoredEntry, targetId: string): Promise<void> {
  const [target] = await entriesById(book.tx, [targetId]);
  const decided = target ? await decide(book.tx, targetId, 'accepted', entry.entry.by) : [];
  if (!target || decided.length === 0) return;
  book.changes.add(target.shedId, 'entry', target.id);
  if (target.shiftKey !== null) book.toWrite.touch(target.shiftKey);
  const altogether = decided.some((one) => one.shiftKey === EVERY_SHIFT);
  const touched = await book.book([target], [], true);
  const restated = altogether ? touched : decided.map((one) => one.shiftKey);
  for (const shiftKey of restated) {
    const shift = await book.shifts.named(shiftKey);
    if (shift?.state === 'closed') await sign(book, entry, shiftKey, false);
    else for (const loomId of shift ? book.lines.loomsNow(shift) : []) book.toWrite.add(shiftKey, loomId);
  }
  if (altogether) await carryOut(book, target);
}

async function refuse(book: Bookkeeper, entry: StoredEntry, targetId: string): Promise<void> {
  const [target] = await entriesById(book.tx, [targetId]);
  const decided = target ? await decide(book.tx, targetId, 'refused', entry.entry.by) : [];
  if (target && decided.length > 0) book.changes.add(target.shedId, 'entry', target.id);
}

async function setState(book: Bookkeeper, shiftKey: string, state: 'open' | 'closed'): Promise<void> {
  const { tx } = book;
  await tx.query(`UPDATE "shift" SET "state" = ? WHERE "key" = ?`, [state, shiftKey]);
  book.shifts.changed(shiftKey, state);
  const shift = await book.shifts.named(shiftKey);
  book.changes.add(shift?.shedId ?? null, 'shift', shiftKey);
}

/**
 * Writes all the shift's lines and their totals as its next signed version. `fresh`: with what is in force now. Held
 * entries accepted in one act are one restatement, however many they are.
 */
async function sign(book: Bookkeeper, entry: StoredEntry, shiftKey: string, fresh: boolean): Promise<void> {
  const shift = await book.shifts.named(shiftKey);
  if (!shift) return;
  book.toWrite.drop(shiftKey);
  const looms = fresh ? book.lines.loomsNow(shift) : await book.lines.loomsOf(shift);
  await book.lines.dropOthers(shift, looms);
  const kept = fresh ? null : await versionIdsOf(book.tx, shiftKey);
  const lines = await book.lines.write(shift, looms, { fresh });
  const [last] = await book.tx.query<{ version: number; batchId: string | null }[]>(
    `SELECT t."version", e."batchId" FROM "signed_totals" t LEFT JOIN "entry" e ON e."id" = t."entryId"
      WHERE t."shiftKey" = ? ORDER BY t."version" DESC LIMIT 1`,
    [shiftKey],
  );
  const sameAct = entry.batchId !== null && last?.batchId === entry.batchId;
  await insertRows(
    book.tx,
    'signed_totals',
    ['shiftKey', 'version', 'at', 'by', 'entryId', 'totals', 'versionIds'],
    [
      [
        shiftKey,
        (last?.version ?? 0) + (sameAct ? 0 : 1),
        entry.at,
        entry.entry.by,
        entry.id,
        signedTotals(lines),
        JSON.stringify(versionsKnownTo(lines, book.facts, kept)),
      ],
    ],
    sameAct ? 'INSERT OR REPLACE' : undefined,
  );
}
