import type { EntityManager } from 'typeorm';
import type { PulledEntry } from '../../../shared/contract/sync.js';
import { push } from '../book/bulk.js';
import type { StoredEntry } from '../book/entry-store.js';
import { holdsOf } from '../book/holds.js';
import type { Scope } from './scope.js';

const NOBODY = '-';

/** Who logged an entry stays out of the floor's sight, but for people who sign in on that tablet. */
export interface Sight {
  readonly scope: Scope;
  readonly deviceId: string | null;
}

export async function pulledEntries(
  from: EntityManager,
  entries: readonly StoredEntry[],
  sight: Sight,
): Promise<PulledEntry[]> {
  const holds = new Map<string, PulledEntry['holds']>();
  for (const { entryId, shiftKey, reason, state } of await holdsOf(
    from,
    entries.map((one) => one.id),
  ))
    push(holds, entryId, { shiftKey, reason, state });
  const shown = sight.scope.of === 'shed' ? null : await peopleOf(from, sight.deviceId);
  return entries.map((one) => ({
    entry:
      shown === null || shown.has(one.entry.by)
        ? { ...one.entry }
        : { ...one.entry, by: NOBODY, grantId: NOBODY, deviceId: NOBODY },
    at: one.at,
    until: one.until,
    changedAt: one.changedAt,
    shiftKey: one.shiftKey,
    holds: holds.get(one.id) ?? [],
  }));
}

/** People who hold a grant on the device. */
async function peopleOf(from: EntityManager, deviceId: string | null): Promise<ReadonlySet<string>> {
  const rows = await from.query<{ personId: string }[]>(
    `SELECT DISTINCT "personId" FROM "access_grant" WHERE "deviceId" = ?`,
    [deviceId ?? ''],
  );
  return new Set(rows.map((row) => row.personId));
}
