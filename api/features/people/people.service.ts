import { In, type EntityManager } from 'typeorm';
import { v7 as uuid } from 'uuid';
import type * as z from 'zod/mini';
import { LIMITS } from '../../../shared/contract/limits.js';
import type {
  changePersonSchema,
  newPersonSchema,
  PersonRow as PersonOnWire,
} from '../../../shared/contract/session.js';
import { ChangeRow, PersonRightsRow, PersonRow, ShedRow } from '../../database/entities/index.js';
import type { Deps } from '../../deps.js';
import { ApiError, wrongField } from '../../middleware/api-error.js';
import type { Principal } from '../../middleware/principal.js';
import { newMark } from '../book/change-log.js';
import { rightsInForce } from '../sessions/session-answer.js';
import { endSessions, endStreams } from '../sessions/session-opening.js';
import { toPerson } from './people.mapper.js';

type NewPerson = z.infer<typeof newPersonSchema>;
type ChangePerson = z.infer<typeof changePersonSchema>;

export async function listPeople(deps: Pick<Deps, 'reads'>): Promise<PersonOnWire[]> {
  const people = await deps.reads.getRepository(PersonRow).find({ order: { name: 'ASC', id: 'ASC' } });
  const rights = await deps.reads.getRepository(PersonRightsRow).find({ order: { effectiveAt: 'ASC' } });
  return people.map((row) =>
    toPerson(
      row,
      rights.filter(({ personId }) => personId === row.id),
    ),
  );
}

export async function addPerson(deps: Deps, principal: Principal, asked: NewPerson): Promise<PersonOnWire> {
  requireOwnSheds(principal, asked.shedIds);
  const secrets = await hashed(deps, asked);
  return write(deps, async (tx) => {
    await requireFree(tx, asked);
    await requireSheds(tx, asked.shedIds);
    const id = uuid();
    await tx.getRepository(PersonRow).insert({
      id,
      name: asked.name,
      shortName: asked.shortName,
      worksNumber: asked.worksNumber,
      email: asked.email,
      passwordHash: secrets.passwordHash ?? null,
      pinHash: secrets.pinHash ?? null,
      usualSet: [],
    });
    await tx.getRepository(PersonRightsRow).insert({
      personId: id,
      effectiveAt: deps.now(),
      roles: asked.roles,
      shedIds: asked.shedIds,
      disabled: false,
    });
    return { id, ended: [] };
  });
}

/**
 * Changes rights from now on; what was logged before is judged by the rights of its time. Disabling ends the
 * person's sessions and streams at once, and so does a new PIN or password, except where the person set it.
 */
export async function changePerson(
  deps: Deps,
  principal: Principal,
  id: string,
  asked: ChangePerson,
): Promise<PersonOnWire> {
  const secrets = await hashed(deps, asked);
  return write(deps, async (tx) => {
    const people = tx.getRepository(PersonRow);
    if (!(await people.existsBy({ id }))) throw new ApiError('not-found');
    const before = await rightsInForce(tx, id);
    requireOwnSheds(principal, before?.shedIds ?? []);
    if (asked.shedIds) {
      requireOwnSheds(principal, asked.shedIds);
      await requireSheds(tx, asked.shedIds);
    }
    if (secrets.pinHash ?? secrets.passwordHash) await people.update({ id }, secrets);
    const after = {
      roles: asked.roles ?? before?.roles ?? [],
      shedIds: asked.shedIds ?? before?.shedIds ?? [],
      disabled: asked.disabled ?? before?.disabled ?? false,
    };
    await addRights(tx, id, after, before, deps.now());
    await requireManager(tx);
    const ends = after.disabled || (secrets.pinHash ?? secrets.passwordHash) !== undefined;
    const own = principal.person?.id === id && !after.disabled;
    const ended = ends && !own ? await endSessions(tx, { personId: id }, 'disabled', deps.now()) : [];
    return { id, ended };
  });
}

async function addRights(
  tx: EntityManager,
  personId: string,
  after: Pick<PersonRightsRow, 'roles' | 'shedIds' | 'disabled'>,
  before: PersonRightsRow | null,
  now: number,
): Promise<void> {
  if (before && JSON.stringify(after) === JSON.stringify(pick(before))) return;
  // Two changes within one millisecond, or a clock set back: the newer one follows the older in any case.
  const effectiveAt = Math.max(now, (before?.effectiveAt ?? 0) + 1);
  await tx.getRepository(PersonRightsRow).insert({ personId, effectiveAt, ...after });
}

function pick({ roles, shedIds, disabled }: PersonRightsRow) {
  return { roles, shedIds, disabled };
}

/** Writes, numbers the change for the tablets' lists of people, and tells who listens. */
async function write(
  deps: Deps,
  work: (tx: EntityManager) => Promise<{ id: string; ended: string[] }>,
): Promise<PersonOnWire> {
  const { id, ended, seq, row, history } = await deps.writer.write(async (tx) => {
    const done = await work(tx);
    const change = await tx
      .getRepository(ChangeRow)
      .insert({ shedId: null, kind: 'people', ref: '', mark: newMark() });
    return {
      ...done,
      seq: Number(change.identifiers[0]?.['seq']),
      row: await tx.getRepository(PersonRow).findOneByOrFail({ id: done.id }),
      history: await tx
        .getRepository(PersonRightsRow)
        .find({ where: { personId: done.id }, order: { effectiveAt: 'ASC' } }),
    };
  });
  endStreams(deps, ended);
  deps.feed.announce(null, seq);
  deps.log.info({ personId: id }, 'a person was changed');
  return toPerson(row, history);
}

async function hashed(
  deps: Pick<Deps, 'passwords'>,
  asked: { pin?: string | undefined; password?: string | undefined },
): Promise<Partial<Pick<PersonRow, 'pinHash' | 'passwordHash'>>> {
  if (asked.password !== undefined) requireLength(asked.password);
  return {
    ...(asked.pin === undefined ? {} : { pinHash: await deps.passwords.hash(asked.pin) }),
    ...(asked.password === undefined ? {} : { passwordHash: await deps.passwords.hash(asked.password) }),
  };
}

/** Throws `password-too-short`. */
export function requireLength(password: string): void {
  if (password.length < LIMITS.passwordLength) throw new ApiError('password-too-short');
}

async function requireFree(tx: EntityManager, asked: NewPerson): Promise<void> {
  const people = tx.getRepository(PersonRow);
  if (asked.worksNumber !== null && (await people.existsBy({ worksNumber: asked.worksNumber })))
    throw wrongField('worksNumber', 'Somebody else has this works number.');
  if (asked.email !== null && (await people.existsBy({ email: asked.email })))
    throw wrongField('email', 'Somebody else has this e-mail address.');
}

/** Who manages some sheds has no say over people of others, nor over those (or himself) who may see all: []. */
function requireOwnSheds({ person }: Principal, shedIds: readonly string[]): void {
  const own = person?.shedIds ?? [];
  if (own.length === 0) return;
  if (shedIds.length === 0 || !shedIds.every((id) => own.includes(id))) throw new ApiError('other-shed');
}

async function requireSheds(tx: EntityManager, shedIds: readonly string[]): Promise<void> {
  const known = await tx.getRepository(ShedRow).countBy({ id: In([...shedIds]) });
  if (known !== new Set(shedIds).size) throw wrongField('shedIds', 'There is no such shed.');
}

/** Somebody must be left who can let people in. */
async function requireManager(tx: EntityManager): Promise<void> {
  const rows: unknown[] = await tx.query(
    `SELECT 1 FROM "person_rights" "r" WHERE "disabled" = 0 AND "roles" LIKE '%"manager"%' AND "effectiveAt" =
      (SELECT max("effectiveAt") FROM "person_rights" WHERE "personId" = "r"."personId") LIMIT 1`,
  );
  if (rows.length === 0) throw new ApiError('last-manager');
}
