import type { EntityManager } from 'typeorm';
import type { RecordedEntry } from '../../../shared/contract/shift-records.js';
import { list, push } from '../book/bulk.js';
import type { StoredEntry } from '../book/entry-store.js';

/** Entries as a foreman's record shows them: with names in place of ids, and what was decided of each. */
export async function recordedEntries(
  from: EntityManager,
  entries: readonly StoredEntry[],
): Promise<RecordedEntry[]> {
  const ids = list(entries.map((one) => one.id));
  const about = await from.query<{ id: string; receivedAt: number; by: string; device: string }[]>(
    `SELECT e."id", e."receivedAt", COALESCE(p."name", e."by") AS "by", COALESCE(d."name", e."deviceId") AS "device"
       FROM "entry" e LEFT JOIN "person" p ON p."id" = e."by" LEFT JOIN "device" d ON d."id" = e."deviceId"
      WHERE e."id" IN (SELECT value FROM json_each(?))`,
    [ids],
  );
  const holds = await from.query<(RecordedEntry['holds'][number] & { entryId: string })[]>(
    `SELECT h."entryId", h."shiftKey", h."reason", h."state", COALESCE(p."name", h."decidedBy") AS "decidedBy"
       FROM "entry_hold" h LEFT JOIN "person" p ON p."id" = h."decidedBy"
      WHERE h."entryId" IN (SELECT value FROM json_each(?)) ORDER BY h."entryId", h."shiftKey"`,
    [ids],
  );
  const aboutOf = new Map(about.map((row) => [row.id, row]));
  const holdsOf = new Map<string, RecordedEntry['holds'][number][]>();
  for (const { entryId, ...hold } of holds) push(holdsOf, entryId, hold);
  return entries.flatMap((one) => {
    const row = aboutOf.get(one.id);
    if (!row) return [];
    return {
      entry: { ...one.entry },
      at: one.at,
      until: one.until,
      changedAt: one.changedAt,
      shiftKey: one.shiftKey,
      by: row.by,
      device: row.device,
      receivedAt: row.receivedAt,
      holds: holdsOf.get(one.id) ?? [],
    };
  });
}
