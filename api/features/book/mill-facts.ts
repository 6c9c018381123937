import type { EntityManager } from 'typeorm';
import type {
  CauseVersion,
  Cloth,
  ClothVersion,
  Loom,
  LoomVersion,
  Warp,
} from '../../../shared/contract/reference.js';
import {
  CauseVersionRow,
  ClothRow,
  ClothVersionRow,
  LoomRow,
  LoomVersionRow,
  WarpRow,
} from '../../database/entities/index.js';

/** What the book needs to know of the mill, read once a batch. */
export interface MillFacts {
  readonly looms: ReadonlyMap<string, Loom>;
  readonly loomVersions: readonly LoomVersion[];
  readonly cloths: ReadonlyMap<string, Cloth>;
  readonly clothVersions: readonly ClothVersion[];
  readonly warps: ReadonlyMap<string, Warp>;
  readonly causeVersions: readonly CauseVersion[];
  readonly causes: ReadonlySet<string>;
}

export async function readMillFacts(tx: EntityManager): Promise<MillFacts> {
  const looms = await tx.find(LoomRow);
  const cloths = await tx.find(ClothRow);
  const warps = await tx.find(WarpRow);
  const causeVersions = (await tx.find(CauseVersionRow)).map((row) => ({ ...row }));
  const byId = <T extends { id: string }>(rows: T[]) => new Map(rows.map((row) => [row.id, { ...row }]));
  return {
    looms: byId(looms),
    loomVersions: (await tx.find(LoomVersionRow)).map((row) => ({ ...row })),
    cloths: byId(cloths),
    clothVersions: (await tx.find(ClothVersionRow)).map((row) => ({ ...row })),
    warps: byId(warps),
    causeVersions,
    causes: new Set(causeVersions.map((version) => version.causeId)),
  };
}

/** Looms of a shed that stood in it during [from, until), by row and place. */
export function loomsInShed(facts: MillFacts, shedId: string, from: number, until: number): Loom[] {
  return [...facts.looms.values()]
    .filter((loom) => loom.shedId === shedId && loom.from < until && (loom.until ?? Infinity) > from)
    .sort((a, b) => a.row - b.row || a.position - b.position);
}
