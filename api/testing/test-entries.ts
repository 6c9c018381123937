import type { EntityManager } from 'typeorm';
import { v7 as uuid } from 'uuid';
import type { EntryKind, EntryOf } from '../../shared/entries/entry.js';
import { GrantRow } from '../database/entities/index.js';
import { MILL_SINCE, TEST_PEOPLE, TEST_TABLETS, testShiftKey, type TestPersonKey } from './test-mill.js';

export const HOUR = 3_600_000;
export const MINUTE = 60_000;
/** Monday 9 March 2026, 06:00 in London: yesterday, by the test clock. Its three shifts adjoin, and Tuesday's first. */
export const MONDAY = Date.UTC(2026, 2, 9, 6);
export const EARLY = testShiftKey('2026-03-09', 'early');
export const LATE = testShiftKey('2026-03-09', 'late');
export const NIGHT = testShiftKey('2026-03-09', 'night');
export const TUESDAY = testShiftKey('2026-03-10', 'early');

/** Tests that do not sign in: everybody may log on every tablet. */
export async function insertTestGrants(tx: EntityManager): Promise<void> {
  await tx.insert(
    GrantRow,
    Object.values(TEST_PEOPLE).flatMap(({ id }) =>
      Object.values(TEST_TABLETS).map((tablet) => ({
        id: testGrant(id, tablet.id),
        personId: id,
        deviceId: tablet.id,
        issuedAt: MILL_SINCE,
      })),
    ),
  );
}

function testGrant(personId: string, deviceId: string): string {
  return `${personId}.${deviceId}`;
}

let deviceSeq = 0;

type Stamped =
  'id' | 'schema' | 'kind' | 'shedId' | 'by' | 'grantId' | 'deviceId' | 'deviceSeq' | 'recordedAt' | 'source';
/** What a test says of an entry; the rest is stamped. */
export type Said<K extends EntryKind> = Omit<EntryOf<K>, Stamped> & {
  readonly who?: TestPersonKey;
} & Partial<Pick<EntryOf<K>, Stamped>>;

/** An entry, by the weaver on the north shed's tablet unless said, tapped at its own moment. */
export function entry<K extends EntryKind>(kind: K, said: Said<K>): EntryOf<K> {
  const { who = 'weaver', ...rest } = said;
  const by = TEST_PEOPLE[who].id;
  const deviceId = rest.deviceId ?? TEST_TABLETS.north.id;
  deviceSeq += 1;
  const stamped = {
    id: uuid(),
    schema: 1,
    kind,
    shedId: 'north',
    by,
    grantId: testGrant(by, deviceId),
    deviceId,
    deviceSeq,
    recordedAt: rest.at,
    source: 'tap',
    ...rest,
  };
  return stamped as unknown as EntryOf<K>;
}
