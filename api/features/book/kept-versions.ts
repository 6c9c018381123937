import type { EntityManager } from 'typeorm';
import type { CauseVersion, ClothVersion, LoomVersion, Shift } from '../../../shared/contract/reference.js';
import { push } from './bulk.js';
import type { MillFacts } from './mill-facts.js';

export interface Versions {
  readonly loomVersions: ReadonlyMap<string, readonly LoomVersion[]>;
  readonly clothVersions: readonly ClothVersion[];
  readonly causeVersions: readonly CauseVersion[];
}

/**
 * The versions that a shift's lines are projected with. An open shift's: all, the projection takes what was in force.
 * A closed one's: those that its closing kept, so that a setting made later does not change history. A thing that the
 * shift did not use when it was closed (a cause that a later accepted stop brings) has kept none: it takes its own.
 */
export async function keptVersions(
  tx: EntityManager,
  facts: MillFacts,
  shift: Shift,
  fresh: boolean,
): Promise<Versions> {
  const kept = shift.state === 'closed' && !fresh ? await versionIdsOf(tx, shift.key) : null;
  const loomVersions = new Map<string, LoomVersion[]>();
  for (const version of keep(facts.loomVersions, (one) => one.loomId, kept))
    push(loomVersions, version.loomId, version);
  return {
    loomVersions,
    clothVersions: keep(facts.clothVersions, (one) => one.clothId, kept),
    causeVersions: keep(facts.causeVersions, (one) => one.causeId, kept),
  };
}

function keep<V extends { id: string }>(
  all: readonly V[],
  thingOf: (version: V) => string,
  kept: ReadonlySet<string> | null,
): readonly V[] {
  if (kept === null) return all;
  const known = new Set(all.filter((one) => kept.has(one.id)).map(thingOf));
  return all.filter((one) => kept.has(one.id) || !known.has(thingOf(one)));
}

async function versionIdsOf(tx: EntityManager, shiftKey: string): Promise<ReadonlySet<string> | null> {
  const [row] = await tx.query<{ versionIds: string }[]>(
    `SELECT "versionIds" FROM "signed_totals" WHERE "shiftKey" = ? ORDER BY "version" DESC LIMIT 1`,
    [shiftKey],
  );
  return row ? new Set(JSON.parse(row.versionIds) as string[]) : null;
}
