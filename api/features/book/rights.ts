import type { EntityManager } from 'typeorm';
import type { Role } from '../../../shared/contract/roles.js';
import { KIND_ROLES, type EntryKind } from '../../../shared/entries/entry.js';
import type { PersonRightsRow } from '../../database/entities/index.js';
import { list, push } from './bulk.js';

/** What a person might do from a moment on. */
export interface Rights {
  readonly effectiveAt: number;
  readonly roles: readonly Role[];
  readonly shedIds: readonly string[];
  readonly disabled: boolean;
}

/** Rights of people, oldest first. */
export async function readRights(
  tx: EntityManager,
  personIds: Iterable<string>,
): Promise<ReadonlyMap<string, readonly Rights[]>> {
  type Row = Omit<PersonRightsRow, 'roles' | 'shedIds' | 'disabled'> & {
    roles: string;
    shedIds: string;
    disabled: number;
  };
  const rows = await tx.query<Row[]>(
    `SELECT * FROM "person_rights" WHERE "personId" IN (SELECT value FROM json_each(?)) ORDER BY "effectiveAt"`,
    [list(new Set(personIds))],
  );
  const byPerson = new Map<string, Rights[]>();
  for (const row of rows)
    push(byPerson, row.personId, {
      effectiveAt: row.effectiveAt,
      roles: JSON.parse(row.roles) as Role[],
      shedIds: JSON.parse(row.shedIds) as string[],
      disabled: row.disabled !== 0,
    });
  return byPerson;
}

export type Judgement = 'allowed' | 'lost' | 'never' | 'other-shed';

/**
 * Whether a person might log a kind in a shed at a moment. Rights had before and lost since are `lost`: such an entry
 * waits for the foreman, since a tablet that was offline could not know.
 */
export function judge(rights: readonly Rights[], kind: EntryKind, shedId: string, moment: number): Judgement {
  const roleFits = (one: Rights) =>
    !one.disabled && one.roles.some((role) => KIND_ROLES[kind].includes(role));
  const shedFits = (one: Rights) => one.shedIds.length === 0 || one.shedIds.includes(shedId);
  const until = rights.filter((one) => one.effectiveAt <= moment);
  // A moment before the person's first rights is judged by those: a wrong time is another check's matter.
  const past = until.length > 0 ? until : rights.slice(0, 1);
  const current = past.at(-1);
  if (!current) return 'never';
  if (roleFits(current)) return shedFits(current) ? 'allowed' : 'other-shed';
  return past.some((one) => roleFits(one) && shedFits(one)) ? 'lost' : 'never';
}
