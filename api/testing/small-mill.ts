import type { EntityManager } from 'typeorm';
import { v7 as uuid } from 'uuid';
import type { Role } from '../../shared/contract/roles.js';
import { shippedCauses } from '../../shared/entries/causes.js';
import type { Entry, EntryKind, EntryOf } from '../../shared/entries/entry.js';
import {
  CauseVersionRow,
  ClothRow,
  ClothVersionRow,
  DeviceRow,
  GrantRow,
  LoomRow,
  LoomVersionRow,
  MillRow,
  PersonRightsRow,
  PersonRow,
  ShedRow,
  ShiftRow,
  WarpRow,
} from '../database/entities/index.js';

/** Monday 2 November 2026, 06:00 UTC. */
export const MONDAY = Date.UTC(2026, 10, 2, 6);
export const HOUR = 3_600_000;
export const MINUTE = 60_000;
/** Before all of it. */
export const BEGINNING = Date.UTC(2026, 9, 1);

export const SHED = 'shed-1';
export const OTHER_SHED = 'shed-2';
export const TABLET = 'tablet-1';
export const OTHER_TABLET = 'tablet-2';
export const LOOMS = ['loom-1', 'loom-2', 'loom-3'] as const;

/** Three shifts on Monday, adjoining: 06–14, 14–22, 22–06; then Tuesday's first. */
export const SHIFTS = [0, 1, 2, 3].map((n) => ({
  key: `${SHED}:2026-11-0${n < 3 ? 2 : 3}:${['early', 'late', 'night', 'early'][n]}`,
  startsAt: MONDAY + n * 8 * HOUR,
  endsAt: MONDAY + (n + 1) * 8 * HOUR,
}));
export const [EARLY, LATE, NIGHT, TUESDAY] = SHIFTS.map((shift) => shift.key) as [
  string,
  string,
  string,
  string,
];

const PEOPLE: readonly { id: string; roles: Role[]; shedIds: string[] }[] = [
  { id: 'ann', roles: ['weaver'], shedIds: [SHED] },
  { id: 'bet', roles: ['weaver'], shedIds: [SHED] },
  { id: 'tom', roles: ['tackler'], shedIds: [SHED] },
  { id: 'fay', roles: ['foreman'], shedIds: [SHED] },
  { id: 'max', roles: ['manager'], shedIds: [] },
  { id: 'oz', roles: ['weaver'], shedIds: [OTHER_SHED] },
];

export function grantOf(personId: string, deviceId: string): string {
  return `${personId}.${deviceId}`;
}

/** Two sheds, three looms at 200 ppm with five-digit clocks in hundreds, six people, two tablets, four shifts. */
export async function plantSmallMill(tx: EntityManager): Promise<void> {
  await tx.upsert(MillRow, { id: 1, name: 'Low Mill', timeZone: 'Europe/London', units: 'metric' }, ['id']);
  await tx.insert(ShedRow, [
    { id: SHED, name: 'Long Shed' },
    { id: OTHER_SHED, name: 'Top Shed' },
  ]);
  const looms = [...LOOMS.map((id) => ({ id, shedId: SHED })), { id: 'loom-9', shedId: OTHER_SHED }];
  await tx.insert(
    LoomRow,
    looms.map(({ id, shedId }, at) => ({
      id,
      shedId,
      number: at + 1,
      row: at < 2 ? 1 : 2,
      position: at + 1,
      alley: 'A',
      from: BEGINNING,
      until: null,
    })),
  );
  await tx.insert(
    LoomVersionRow,
    looms.map(({ id }) => ({
      id: `${id}.1`,
      loomId: id,
      effectiveAt: BEGINNING,
      ppm: 200,
      reedSpaceCm: 120,
      clock: { kind: 'continuous' as const, unit: 100, digits: 5 },
      shuttles: 1,
      battery: false,
    })),
  );
  await tx.insert(ClothRow, [{ id: 'drill', name: 'Drill' }]);
  await tx.insert(ClothVersionRow, [
    {
      id: 'drill.1',
      clothId: 'drill',
      effectiveAt: BEGINNING,
      ends: 2_400,
      picksPerCmOnLoom: 20,
      picksPerCmLoomState: 21,
      reedWidthCm: 110,
      crimp: 0.08,
      abreast: 1,
      wefts: [{ name: '30 tex', tex: 30, share: 1, waste: 0.04, pernMassG: 25 }],
    },
  ]);
  await tx.insert(WarpRow, [{ id: 'warp-1', name: 'W1', clothId: 'drill', lengthM: 900, thrumM: 1 }]);
  await tx.insert(CauseVersionRow, shippedCauses(BEGINNING));
  await tx.insert(
    PersonRow,
    PEOPLE.map(({ id }, at) => ({
      id,
      name: `${id} Example`,
      shortName: id,
      worksNumber: `${100 + at}`,
      email: null,
      passwordHash: null,
      pinHash: null,
      usualSet: [],
    })),
  );
  await tx.insert(
    PersonRightsRow,
    PEOPLE.map(({ id, roles, shedIds }) => ({
      personId: id,
      effectiveAt: BEGINNING,
      roles,
      shedIds,
      disabled: false,
    })),
  );
  await tx.insert(
    DeviceRow,
    [TABLET, OTHER_TABLET].map((id, at) => ({
      id,
      kind: 'tablet' as const,
      name: `Tablet ${at + 1}`,
      shedId: SHED,
      secretHash: null,
      registeredBy: 'fay',
      registeredAt: BEGINNING,
      revokedAt: null,
      lastSeenAt: null,
      clockOffset: null,
      appVersion: null,
    })),
  );
  await tx.insert(
    GrantRow,
    PEOPLE.flatMap(({ id }) =>
      [TABLET, OTHER_TABLET].map((deviceId) => ({
        id: grantOf(id, deviceId),
        personId: id,
        deviceId,
        issuedAt: BEGINNING,
      })),
    ),
  );
  await tx.insert(
    ShiftRow,
    SHIFTS.map(({ key, startsAt, endsAt }) => ({
      key,
      shedId: SHED,
      date: key.split(':')[1] ?? '',
      patternId: key.split(':')[2] ?? '',
      name: key.split(':')[2] ?? '',
      startsAt,
      endsAt,
      mealStartsAt: null,
      mealEndsAt: null,
      mealLooms: null,
      state: 'open' as const,
    })),
  );
}

let seq = 0;

type Common =
  'id' | 'schema' | 'kind' | 'shedId' | 'by' | 'grantId' | 'deviceId' | 'deviceSeq' | 'recordedAt' | 'source';
type Said<K extends EntryKind> = Omit<EntryOf<K>, Common> & { by?: string; deviceId?: string; id?: string };

/** An entry by somebody on a tablet, at the device's own clock. */
export function entry<K extends EntryKind>(kind: K, said: Said<K>): Entry & { kind: K } {
  const { by = 'ann', deviceId = TABLET, ...rest } = said;
  seq += 1;
  return {
    id: uuid(),
    schema: 1,
    kind,
    shedId: SHED,
    by,
    grantId: grantOf(by, deviceId),
    deviceId,
    deviceSeq: seq,
    recordedAt: rest.at,
    source: 'tap',
    ...rest,
  } as unknown as Entry & { kind: K };
}
