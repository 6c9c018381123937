import { ENTRY_SCHEMA_VERSION } from './entry.js';

/** Makes an entry of one schema version into the next: pure, proven on frozen payloads, never deleted. */
export type EntryUpgrade = (entry: Readonly<Record<string, unknown>>) => Record<string, unknown>;

/**
 * By the version they start from. Version 2 brought a kind and changed none: an entry of version 1 is one of version 2
 * as it stands, and keeps its number.
 */
export const ENTRY_UPGRADES: ReadonlyMap<number, EntryUpgrade> = new Map([[1, (entry) => ({ ...entry })]]);

/** How many versions back are read. */
export const OLDEST_READ = Math.max(1, ENTRY_SCHEMA_VERSION - 2);

export type Upgraded =
  | { readonly is: 'current'; readonly entry: Readonly<Record<string, unknown>> }
  /** A schema newer than this program: keep it, send it after the upgrade. */
  | { readonly is: 'later' }
  | { readonly is: 'too-old' }
  /** It names no schema version. */
  | { readonly is: 'unversioned' };

/** Brings an entry to the current schema, version by version. */
export function upgradeEntry(
  raw: Readonly<Record<string, unknown>>,
  upgrades: ReadonlyMap<number, EntryUpgrade> = ENTRY_UPGRADES,
  current: number = ENTRY_SCHEMA_VERSION,
): Upgraded {
  const version = raw['schema'];
  if (typeof version !== 'number' || !Number.isInteger(version) || version < 1) return { is: 'unversioned' };
  if (version > current) return { is: 'later' };
  let entry = raw;
  for (let at = version; at < current; at += 1) {
    const upgrade = upgrades.get(at);
    if (!upgrade) return { is: 'too-old' };
    entry = upgrade(entry);
  }
  return { is: 'current', entry };
}
