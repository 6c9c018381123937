import type { EntityManager } from 'typeorm';
import type { CauseVersion, ClothVersion, LoomVersion, Shift } from '../../../shared/contract/reference.js';
import { push } from './bulk.js';
import type { ProjectedLine } from './line-store.js';
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
 * The looms of a closed shift are known, so one without a version had none.
 */
export async function keptVersions(
  tx: EntityManager,
  facts: MillFacts,
  shift: Shift,
  fresh: boolean,
): Promise<Versions> {
  const kept = shift.state === 'closed' && !fresh ? await versionIdsOf(tx, shift.key) : null;
  const loomVersions = new Map<string, LoomVersion[]>();
  for (const version of facts.loomVersions)
    if (kept === null || kept.has(version.id)) push(loomVersions, version.loomId, version);
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

/** What the last signing of a shift kept; null: it never was signed. */
export async function versionIdsOf(tx: EntityManager, shiftKey: string): Promise<ReadonlySet<string> | null> {
  const [row] = await tx.query<{ versionIds: string }[]>(
    `SELECT "versionIds" FROM "signed_totals" WHERE "shiftKey" = ? ORDER BY "version" DESC LIMIT 1`,
    [shiftKey],
  );
  return row ? new Set(JSON.parse(row.versionIds) as string[]) : null;
}

/**
 * What a closing keeps: every version, as the book has them now, of the looms, cloths and causes that the lines used.
 * Those in force before and after are among them, since a line asks them too (was the clock another one before?).
 *
 * @param kept what the signing before kept, where the shift is stated again with that: no version made since joins it,
 *   but those of a thing that only now is used
 */
export function versionsKnownTo(
  lines: readonly ProjectedLine[],
  facts: MillFacts,
  kept: ReadonlySet<string> | null = null,
): string[] {
  const looms = new Set(lines.map(({ loom }) => loom.id));
  const used = new Set(lines.flatMap(({ line }) => line.versionIds));
  const cloths = new Set(facts.clothVersions.filter((one) => used.has(one.id)).map((one) => one.clothId));
  const causes = new Set(facts.causeVersions.filter((one) => used.has(one.id)).map((one) => one.causeId));
  return [
    ...facts.loomVersions.filter((one) => looms.has(one.loomId) && (kept === null || kept.has(one.id))),
    ...keep(facts.clothVersions, (one) => one.clothId, kept).filter((one) => cloths.has(one.clothId)),
    ...keep(facts.causeVersions, (one) => one.causeId, kept).filter((one) => causes.has(one.causeId)),
  ]
    .map((one) => one.id)
    .sort();
}
