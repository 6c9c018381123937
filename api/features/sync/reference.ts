import type { EntityManager } from 'typeorm';
import type { Alley, PersonCard, Reference } from '../../../shared/contract/reference.js';
import { permissionsOf } from '../../../shared/contract/roles.js';
import {
  AlleyRow,
  type CauseVersionRow,
  ClothRow,
  ClothVersionRow,
  JobRow,
  LoomRow,
  LoomVersionRow,
  MillRow,
  PartRow,
  PersonRightsRow,
  PersonRow,
  ShedRow,
  TargetRow,
  WarpRow,
} from '../../database/entities/index.js';
import type { Scope } from './scope.js';

/** The mill as devices know it; null: it is not set up yet. */
export async function readReference(from: EntityManager): Promise<Reference | null> {
  const mill = await from.findOneBy(MillRow, { id: 1 });
  if (!mill) return null;
  const plain = <T extends object>(rows: T[]): T[] => rows.map((row) => ({ ...row }));
  const looms = plain(await from.find(LoomRow, { order: { number: 'ASC', id: 'ASC' } }));
  return {
    mill: {
      name: mill.name,
      timeZone: mill.timeZone,
      units: mill.units,
      figuresByPerson: mill.figuresByPerson,
      lockAfterMinutes: mill.lockAfterMinutes,
    },
    sheds: plain(await from.find(ShedRow, { order: { id: 'ASC' } })),
    looms,
    loomVersions: plain(await from.find(LoomVersionRow, { order: { effectiveAt: 'ASC', id: 'ASC' } })),
    cloths: plain(await from.find(ClothRow, { order: { name: 'ASC', id: 'ASC' } })),
    clothVersions: plain(await from.find(ClothVersionRow, { order: { effectiveAt: 'ASC', id: 'ASC' } })),
    warps: plain(await from.find(WarpRow, { order: { id: 'ASC' } })),
    causeVersions: await causeVersionsInOrder(from),
    alleys: withUnsaid(plain(await from.find(AlleyRow, { order: { shedId: 'ASC', name: 'ASC' } })), looms),
    targets: plain(await from.find(TargetRow, { order: { effectiveAt: 'ASC', id: 'ASC' } })),
    parts: plain(await from.find(PartRow, { order: { name: 'ASC', id: 'ASC' } })),
    jobs: plain(await from.find(JobRow, { order: { name: 'ASC', id: 'ASC' } })),
  };
}

/** Alleys that looms name and nobody has said anything of have no tacklers. */
function withUnsaid(said: readonly Alley[], looms: Reference['looms']): Alley[] {
  const alleys = new Map(said.map((one) => [`${one.shedId} ${one.name}`, one]));
  for (const { shedId, alley } of looms)
    if (!alleys.has(`${shedId} ${alley}`))
      alleys.set(`${shedId} ${alley}`, { shedId, name: alley, tacklerIds: [] });
  return [...alleys.entries()].sort(([a], [b]) => (a < b ? -1 : 1)).map(([, alley]) => alley);
}

/** The mill's order of causes is the order in which they were made. */
async function causeVersionsInOrder(from: EntityManager): Promise<Reference['causeVersions']> {
  const rows = await from.query<CauseVersionRow[]>(`SELECT * FROM "cause_version" ORDER BY rowid`);
  return rows.map((row) => ({ ...row }));
}

/** People of the shed who may sign in now, as tablets see them. */
export async function readPeople(from: EntityManager, { shedId }: Scope): Promise<PersonCard[]> {
  const latest = new Map<string, PersonRightsRow>();
  for (const rights of await from.find(PersonRightsRow, { order: { effectiveAt: 'ASC' } }))
    latest.set(rights.personId, rights);
  const people = await from.find(PersonRow, { order: { shortName: 'ASC', id: 'ASC' } });
  return people.flatMap((person) => {
    const rights = latest.get(person.id);
    if (!rights || rights.disabled || !permissionsOf(rights.roles).has('self')) return [];
    if (shedId !== null && rights.shedIds.length > 0 && !rights.shedIds.includes(shedId)) return [];
    const { id, worksNumber, name, shortName, usualSet } = person;
    return [{ id, worksNumber, name, shortName, roles: rights.roles, usualSet }];
  });
}
