import type { EntityManager } from 'typeorm';
import { list } from '../book/bulk.js';

/** How many entries of each shift wait for a decision: held for that shift, or altogether. */
export async function heldOf(
  from: EntityManager,
  shiftKeys: readonly string[],
): Promise<ReadonlyMap<string, number>> {
  const rows = await from.query<{ shiftKey: string; held: number }[]>(
    `SELECT "shiftKey", COUNT(DISTINCT "entryId") AS "held" FROM (
        SELECT "shiftKey", "entryId" FROM "entry_hold"
          WHERE "shiftKey" IN (SELECT value FROM json_each(?)) AND "state" = 'held'
        UNION ALL
        SELECT e."shiftKey", h."entryId" FROM "entry_hold" h JOIN "entry" e ON e."id" = h."entryId"
          WHERE h."shiftKey" = '*' AND h."state" = 'held'
            AND e."shiftKey" IN (SELECT value FROM json_each(?)))
      GROUP BY "shiftKey"`,
    [list(shiftKeys), list(shiftKeys)],
  );
  return new Map(rows.map((row) => [row.shiftKey, row.held]));
}

/** The entries of one shift that wait for a decision: held for it, or altogether. */
export async function heldEntryIds(from: EntityManager, shiftKey: string): Promise<string[]> {
  const rows = await from.query<{ entryId: string }[]>(
    `SELECT "entryId" FROM "entry_hold" WHERE "shiftKey" = ? AND "state" = 'held'
      UNION
      SELECT h."entryId" FROM "entry_hold" h JOIN "entry" e ON e."id" = h."entryId"
        WHERE h."shiftKey" = '*' AND h."state" = 'held' AND e."shiftKey" = ?`,
    [shiftKey, shiftKey],
  );
  return rows.map((row) => row.entryId);
}
