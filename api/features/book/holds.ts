import type { EntityManager } from 'typeorm';
import type { HoldReason } from '../../../shared/contract/errors.js';
import { insertRows, list } from './bulk.js';

/** Whatever the shift. */
export const EVERY_SHIFT = '*';

export interface Hold {
  readonly entryId: string;
  readonly shiftKey: string;
  readonly reason: HoldReason;
  readonly state: 'held' | 'accepted' | 'refused';
}

export async function hold(
  tx: EntityManager,
  holds: readonly { entryId: string; shiftKey: string; reason: HoldReason }[],
): Promise<void> {
  await insertRows(
    tx,
    'entry_hold',
    ['entryId', 'shiftKey', 'reason', 'state', 'decidedBy'],
    holds.map((one) => [one.entryId, one.shiftKey, one.reason, 'held', null]),
    'INSERT OR IGNORE',
  );
}

export async function holdsOf(tx: EntityManager, entryIds: Iterable<string>): Promise<Hold[]> {
  return tx.query<Hold[]>(
    `SELECT "entryId", "shiftKey", "reason", "state" FROM "entry_hold"
      WHERE "entryId" IN (SELECT value FROM json_each(?)) ORDER BY "entryId", "shiftKey"`,
    [list(entryIds)],
  );
}

/** Decides what waits of an entry; gives what waited. */
export async function decide(
  tx: EntityManager,
  entryId: string,
  state: 'accepted' | 'refused',
  decidedBy: string,
): Promise<Hold[]> {
  const waiting = (await holdsOf(tx, [entryId])).filter((one) => one.state === 'held');
  if (waiting.length > 0)
    await tx.query(
      `UPDATE "entry_hold" SET "state" = ?, "decidedBy" = ? WHERE "entryId" = ? AND "state" = 'held'`,
      [state, decidedBy, entryId],
    );
  return waiting;
}

/** How many entries wait for a decision since a shift was closed before they came. */
export async function undecidedOf(tx: EntityManager, shiftKey: string): Promise<number> {
  const [row] = await tx.query<{ n: number }[]>(
    `SELECT COUNT(*) AS "n" FROM "entry_hold" WHERE "shiftKey" = ? AND "state" = 'held'`,
    [shiftKey],
  );
  return row?.n ?? 0;
}
