import { describe, expect, it } from 'vitest';
import { ENTRY_SCHEMA_VERSION } from './entry.js';
import { ENTRY_UPGRADES, OLDEST_READ, upgradeEntry, type EntryUpgrade } from './upgrades.js';

describe('upgrades of entries', () => {
  const upgrades = new Map<number, EntryUpgrade>([
    [2, ({ cause, ...rest }) => ({ ...rest, schema: 3, why: cause })],
    [3, (entry) => ({ ...entry, schema: 4, count: 1 })],
  ]);

  it('brings an entry to the current schema, version by version', () => {
    const old = { schema: 2, cause: 'picking' };
    expect(upgradeEntry(old, upgrades, 4)).toEqual({
      is: 'current',
      entry: { schema: 4, why: 'picking', count: 1 },
    });
    expect(old).toEqual({ schema: 2, cause: 'picking' });
  });

  it('leaves a current one as it is', () => {
    const entry = { schema: 4, count: 2 };
    expect(upgradeEntry(entry, upgrades, 4)).toEqual({ is: 'current', entry });
  });

  it('keeps a newer one for later, and knows one that is too old', () => {
    expect(upgradeEntry({ schema: 5 }, upgrades, 4)).toEqual({ is: 'later' });
    expect(upgradeEntry({ schema: 1 }, upgrades, 4)).toEqual({ is: 'too-old' });
  });

  it.each([undefined, '1', 0, -1, 1.5, null])('takes %s for no version', (schema) => {
    expect(upgradeEntry({ schema })).toEqual({ is: 'unversioned' });
  });

  it('has an upgrade for every version that is still read', () => {
    for (let version = OLDEST_READ; version < ENTRY_SCHEMA_VERSION; version += 1)
      expect(ENTRY_UPGRADES.has(version)).toBe(true);
  });
});
