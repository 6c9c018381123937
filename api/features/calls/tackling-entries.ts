import type { EntityManager } from 'typeorm';
import { isKind, resolveCorrections, type ResolvedOf } from '../../../shared/entries/corrections.js';
import { EntryWeb, storedEntry, type EntryRecordRow } from '../book/entry-store.js';
import { holdsOf } from '../book/holds.js';

export interface Tackling {
  /** As they stand after corrections, oldest first. */
  readonly repairs: readonly ResolvedOf<'repair'>[];
  readonly cares: readonly ResolvedOf<'care'>[];
}

/** Repairs and jobs done since a moment, of one loom or of all of a shed; without what was taken back or refused. */
export async function tacklingSince(
  from: EntityManager,
  { shedId, loomId }: { readonly shedId: string; readonly loomId?: string },
  since: number,
): Promise<Tackling> {
  const rows = await from.query<EntryRecordRow[]>(
    `SELECT e.* FROM "entry" e
      WHERE e."shedId" = ? AND e."at" >= ? AND e."kind" IN ('repair', 'care')
        ${loomId === undefined ? '' : `AND EXISTS (SELECT 1 FROM "entry_loom" l WHERE l."loomId" = ? AND l."seq" = e."seq")`}
      ORDER BY e."at", e."seq"`,
    loomId === undefined ? [shedId, since] : [shedId, since, loomId],
  );
  const roots = rows.map(storedEntry);
  const web = new EntryWeb(from);
  await web.add(roots);
  const out = new Set(
    (await holdsOf(from, web.byId.keys()))
      .filter(({ state }) => state !== 'accepted')
      .map((one) => one.entryId),
  );
  const resolved = resolveCorrections(web.reach(roots).filter(({ id }) => !out.has(id)))
    .filter((one) => !one.voided)
    .sort((a, b) => a.at - b.at);
  return {
    repairs: resolved.filter((one) => isKind(one, 'repair')),
    cares: resolved.filter((one) => isKind(one, 'care')),
  };
}
