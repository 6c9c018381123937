import type { EntityManager } from 'typeorm';
import { shippedCauses } from '../../shared/entries/causes.js';
import type { Role } from '../../shared/contract/roles.js';
import {
  CauseVersionRow,
  ClothRow,
  ClothVersionRow,
  DeviceRow,
  LoomRow,
  LoomVersionRow,
  MillRow,
  PersonRightsRow,
  PersonRow,
  ShedRow,
  ShiftPatternRow,
  ShiftRow,
} from '../database/entities/index.js';
import { hashOfSecret } from '../features/sessions/secrets.js';

/** Everything of the test mill exists since 1 January 2026. */
export const MILL_SINCE = Date.UTC(2026, 0, 1);
/** Where the test clock starts: Tuesday 10 March 2026, 09:30 in London, in the early shift. */
export const TEST_NOW = Date.UTC(2026, 2, 10, 9, 30);
/** Shifts exist on these dates, in each shed. London is on UTC then. */
export const TEST_DATES = ['2026-03-08', '2026-03-09', '2026-03-10', '2026-03-11', '2026-03-12'];

export const TEST_PIN = '246810';
export const TEST_PASSWORD = 'a long password';

/** Two sheds; looms n1 … n4 (numbers 1 … 4, two rows) in the north shed, s1 and s2 in the south shed. */
export const TEST_SHEDS = ['north', 'south'] as const;
export type TestShed = (typeof TEST_SHEDS)[number];

/** `<shed>:<date>:<pattern>`; patterns are early 06–14, late 14–22 and night 22–06. */
export function testShiftKey(
  date = '2026-03-10',
  pattern: 'early' | 'late' | 'night' = 'early',
  shed: TestShed = 'north',
): string {
  return `${shed}:${date}:${shed}-${pattern}`;
}

interface TestPerson {
  readonly id: string;
  readonly worksNumber: string;
  readonly roles: readonly Role[];
  readonly shedIds: readonly TestShed[];
}

/** People by what they are for. All have TEST_PIN and TEST_PASSWORD; the e-mail is `<id>@mill.example`. */
export const TEST_PEOPLE = {
  weaver: { id: 'wanda', worksNumber: '101', roles: ['weaver'], shedIds: ['north'] },
  otherWeaver: { id: 'wilf', worksNumber: '102', roles: ['weaver'], shedIds: ['north'] },
  southWeaver: { id: 'winnie', worksNumber: '103', roles: ['weaver'], shedIds: ['south'] },
  tackler: { id: 'tom', worksNumber: '201', roles: ['tackler'], shedIds: ['north'] },
  foreman: { id: 'fred', worksNumber: '301', roles: ['foreman'], shedIds: ['north'] },
  southForeman: { id: 'fay', worksNumber: '302', roles: ['foreman'], shedIds: ['south'] },
  manager: { id: 'maud', worksNumber: '401', roles: ['manager'], shedIds: [] },
} as const satisfies Record<string, TestPerson>;
export type TestPersonKey = keyof typeof TEST_PEOPLE;

/** A tablet's cookie secret is known in tests. */
export const TEST_TABLETS = {
  north: { id: 'tablet-north', secret: 'n'.repeat(43) },
  south: { id: 'tablet-south', secret: 's'.repeat(43) },
} as const satisfies Record<TestShed, { id: string; secret: string }>;

const CLOCK = { kind: 'continuous', unit: 100, digits: 5 } as const;

/** Writes the test mill into an empty book. */
export async function insertTestMill(
  tx: EntityManager,
  hashes: { pinHash: string; passwordHash: string },
): Promise<void> {
  await tx
    .getRepository(MillRow)
    .insert({ id: 1, name: 'Test mill', timeZone: 'Europe/London', units: 'metric' });
  await tx.getRepository(ShedRow).insert(TEST_SHEDS.map((id) => ({ id, name: `The ${id} shed` })));
  await insertLooms(tx);
  await insertCloths(tx);
  await tx.getRepository(CauseVersionRow).insert(shippedCauses(MILL_SINCE));
  await insertShifts(tx);
  await insertPeople(tx, hashes);
  await insertTablets(tx);
}

async function insertLooms(tx: EntityManager): Promise<void> {
  const places = [
    ...[1, 2, 3, 4].map((number) => ({ shedId: 'north', id: `n${number}`, number })),
    ...[1, 2].map((number) => ({ shedId: 'south', id: `s${number}`, number })),
  ];
  await tx.getRepository(LoomRow).insert(
    places.map((place) => ({
      ...place,
      row: place.number <= 2 ? 1 : 2,
      position: place.number <= 2 ? place.number : place.number - 2,
      alley: 'A',
      from: MILL_SINCE,
      until: null,
    })),
  );
  await tx.getRepository(LoomVersionRow).insert(
    places.map(({ id }) => ({
      id: `${id}.1`,
      loomId: id,
      effectiveAt: MILL_SINCE,
      ppm: 200,
      reedSpaceCm: 190,
      clock: CLOCK,
      shuttles: 1,
      battery: false,
    })),
  );
}

async function insertCloths(tx: EntityManager): Promise<void> {
  await tx.getRepository(ClothRow).insert({ id: 'calico', name: 'Calico' });
  await tx.getRepository(ClothVersionRow).insert({
    id: 'calico.1',
    clothId: 'calico',
    effectiveAt: MILL_SINCE,
    ends: 4_000,
    picksPerCmOnLoom: 24,
    picksPerCmLoomState: 25,
    reedWidthCm: 170,
    crimp: 0.06,
    abreast: 1,
    wefts: [{ name: 'Grey cotton', tex: 20, share: 1, waste: 0.03, pernMassG: 30 }],
  });
}

const PATTERNS = [
  { name: 'early', from: 6, hours: 8 },
  { name: 'late', from: 14, hours: 8 },
  { name: 'night', from: 22, hours: 8 },
] as const;

async function insertShifts(tx: EntityManager): Promise<void> {
  const hour = (from: number) => `${String(from % 24).padStart(2, '0')}:00`;
  for (const shedId of TEST_SHEDS)
    for (const { name, from, hours } of PATTERNS) {
      await tx.getRepository(ShiftPatternRow).insert({
        id: `${shedId}-${name}`,
        shedId,
        name,
        startsLocal: hour(from),
        endsLocal: hour(from + hours),
        weekdays: [1, 2, 3, 4, 5, 6, 7],
        meal: null,
      });
      await tx.getRepository(ShiftRow).insert(
        TEST_DATES.map((date) => {
          const startsAt = Date.parse(`${date}T00:00Z`) + from * 3_600_000;
          return {
            key: testShiftKey(date, name, shedId),
            shedId,
            date,
            patternId: `${shedId}-${name}`,
            name,
            startsAt,
            endsAt: startsAt + hours * 3_600_000,
            mealStartsAt: null,
            mealEndsAt: null,
            mealLooms: null,
            state: 'open' as const,
          };
        }),
      );
    }
}

async function insertPeople(
  tx: EntityManager,
  hashes: { pinHash: string; passwordHash: string },
): Promise<void> {
  for (const { id, worksNumber, roles, shedIds } of Object.values<TestPerson>(TEST_PEOPLE)) {
    await tx.getRepository(PersonRow).insert({
      id,
      name: `${id.charAt(0).toUpperCase()}${id.slice(1)} Test`,
      shortName: id,
      worksNumber,
      email: `${id}@mill.example`,
      ...hashes,
      usualSet: [],
    });
    await tx.getRepository(PersonRightsRow).insert({
      personId: id,
      effectiveAt: MILL_SINCE,
      roles: [...roles],
      shedIds: [...shedIds],
      disabled: false,
    });
  }
}

async function insertTablets(tx: EntityManager): Promise<void> {
  for (const shedId of TEST_SHEDS)
    await tx.getRepository(DeviceRow).insert({
      id: TEST_TABLETS[shedId].id,
      kind: 'tablet',
      name: `Tablet ${shedId}`,
      shedId,
      secretHash: hashOfSecret(TEST_TABLETS[shedId].secret),
      registeredBy: TEST_PEOPLE.manager.id,
      registeredAt: MILL_SINCE,
      revokedAt: null,
      lastSeenAt: null,
      clockOffset: null,
      appVersion: null,
    });
}
