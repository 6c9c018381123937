import type { EntityManager } from 'typeorm';
import type { Warp } from '../../shared/contract/reference.js';
import {
  AlleyRow,
  CalendarDayRow,
  CauseVersionRow,
  ClothRow,
  ClothVersionRow,
  DeviceRow,
  GrantRow,
  JobRow,
  LoomRow,
  LoomVersionRow,
  MillRow,
  PartRow,
  PersonRightsRow,
  PersonRow,
  ShedRow,
  ShiftPatternRow,
  TargetRow,
  WarpRow,
} from '../database/entities/index.js';
import { demoAlleys, demoTargets } from './alleys-and-targets.js';
import { demoCalendar, demoPatterns } from './calendar.js';
import { DEMO_DEVICES, demoGrantId } from './daybook.js';
import { DEMO_SHED, demoLoomId, type DemoMill } from './mill.js';
import { DEMO_JOBS, DEMO_PARTS } from './parts-and-jobs.js';
import type { DemoPerson } from './people.js';

/** The mill as its manager would have set it up: what it has, who works there, when. No entry, no line. */
export async function plantMill(
  tx: EntityManager,
  mill: DemoMill,
  times: { begins: number; now: number },
): Promise<void> {
  await tx.insert(MillRow, { id: 1, ...mill.mill });
  await tx.insert(ShedRow, [...mill.sheds]);
  await tx.insert(LoomRow, [...mill.looms]);
  await tx.insert(LoomVersionRow, [...mill.loomVersions]);
  await tx.insert(ClothRow, [...mill.cloths]);
  await tx.insert(ClothVersionRow, [...mill.clothVersions]);
  await tx.insert(CauseVersionRow, [...mill.causeVersions]);
  await tx.insert(PartRow, [...DEMO_PARTS]);
  await tx.insert(JobRow, [...DEMO_JOBS]);
  await tx.insert(AlleyRow, demoAlleys());
  await tx.insert(TargetRow, demoTargets(times.begins));
  await tx.insert(ShiftPatternRow, demoPatterns());
  await tx.insert(CalendarDayRow, demoCalendar(times.now));
}

export async function plantWarps(tx: EntityManager, warps: readonly Warp[]): Promise<void> {
  for (let i = 0; i < warps.length; i += 100) await tx.insert(WarpRow, warps.slice(i, i + 100));
}

/** The people with their rights, the tablets and the office, and who may log on which. */
export async function plantPeople(
  tx: EntityManager,
  people: readonly DemoPerson[],
  secrets: { pinHash: string; passwordHash: string },
  begins: number,
): Promise<void> {
  for (const person of people) {
    await tx.insert(PersonRow, {
      id: person.id,
      name: person.name,
      shortName: person.shortName,
      worksNumber: person.worksNumber,
      email: person.email,
      passwordHash: person.email === null ? null : secrets.passwordHash,
      pinHash: person.worksNumber === null ? null : secrets.pinHash,
      usualSet: person.usualSet.map(demoLoomId),
    });
    await tx.insert(PersonRightsRow, {
      personId: person.id,
      effectiveAt: begins,
      roles: [person.role],
      shedIds: person.role === 'manager' ? [] : [DEMO_SHED],
      disabled: false,
    });
  }
  await tx.insert(
    DeviceRow,
    DEMO_DEVICES.map(({ id, kind, name }) => ({
      id,
      kind,
      name,
      shedId: kind === 'tablet' ? DEMO_SHED : null,
      // Nobody holds their cookies: a browser becomes a tablet by being registered as one.
      secretHash: null,
      registeredBy: 'demo-harriet',
      registeredAt: begins,
      revokedAt: null,
      lastSeenAt: null,
      clockOffset: null,
      appVersion: null,
    })),
  );
  await tx.insert(
    GrantRow,
    people.flatMap(({ id: personId }) =>
      DEMO_DEVICES.map(({ id: deviceId }) => ({
        id: demoGrantId(personId, deviceId),
        personId,
        deviceId,
        issuedAt: begins,
      })),
    ),
  );
}
