import { In, IsNull, MoreThan, type DataSource, type EntityManager } from 'typeorm';
import { v7 as uuid } from 'uuid';
import type * as z from 'zod/mini';
import { personTroubles } from '../../../shared/contract/person-rules.js';
import type {
  changePersonSchema,
  newPersonSchema,
  PersonRow as PersonOnWire,
} from '../../../shared/contract/session.js';
import {
  ChangeRow,
  LoomRow,
  OneTimeLinkRow,
  PersonRightsRow,
  PersonRow,
} from '../../database/entities/index.js';
import type { Deps } from '../../deps.js';
import { ApiError, wrongField } from '../../middleware/api-error.js';
import type { Principal } from '../../middleware/principal.js';
import { newMark } from '../book/change-log.js';
import { differingFields, recordChange } from '../change-record/record-change.js';
import { voidLinks } from '../sessions/one-time-links.js';
import { rightsInForce } from '../sessions/session-answer.js';
import { endSessions, endStreams } from '../sessions/session-opening.js';
import { requireOwnSheds, requireSheds } from './own-sheds.js';
import { toPerson } from './people.mapper.js';
import { hashed, secretsSet, type HashedSecrets } from './person-secrets.js';

type NewPerson = z.infer<typeof newPersonSchema>;
type ChangePerson = z.infer<typeof changePersonSchema>;
type Rights = Pick<PersonRightsRow, 'roles' | 'shedIds' | 'disabled'>;
type Facts = Pick<PersonRow, 'name' | 'shortName' | 'worksNumber' | 'email' | 'usualSet'>;

export async function listPeople(deps: Pick<Deps, 'reads' | 'now'>): Promise<PersonOnWire[]> {
  const people = await deps.reads.getRepository(PersonRow).find({ order: { name: 'ASC', id: 'ASC' } });
  const rights = await deps.reads.getRepository(PersonRightsRow).find({ order: { effectiveAt: 'ASC' } });
  const history = new Map<string, PersonRightsRow[]>();
  for (const row of rights) {
    const known = history.get(row.personId);
    if (known) known.push(row);
    else history.set(row.personId, [row]);
  }
  const links = await linksInForce(deps.reads, deps.now());
  return people.map((row) => toPerson(row, history.get(row.id) ?? [], links.get(row.id) ?? null));
}

export async function addPerson(deps: Deps, principal: Principal, asked: NewPerson): Promise<PersonOnWire> {
  requireOwnSheds(principal, asked.shedIds);
  const secrets = await hashed(deps, asked);
  return writePerson(deps, async (tx) => {
    const id = uuid();
    const { name, shortName, worksNumber, email, usualSet = [] } = asked;
    const facts: Facts = { name, shortName, worksNumber, email, usualSet };
    const rights: Rights = { roles: asked.roles, shedIds: asked.shedIds, disabled: false };
    await requireSound(tx, facts, rights, null);
    await requireLooms(tx, usualSet);
    await requireSheds(tx, asked.shedIds);
    await tx.getRepository(PersonRow).insert({
      id,
      ...facts,
      passwordHash: secrets.passwordHash ?? null,
      pinHash: secrets.pinHash ?? null,
    });
    await tx.getRepository(PersonRightsRow).insert({ personId: id, effectiveAt: deps.now(), ...rights });
    await recordChange(tx, {
      by: principal.person?.id ?? null,
      at: deps.now(),
      what: 'person',
      name,
      action: 'added',
      effectiveAt: deps.now(),
      after: { ...facts, ...rights, ...secretsSet(secrets) },
    });
    return { id, ended: [] };
  });
}

/**
 * Changes facts at once and rights from now on; what was logged before is judged by the rights of its time.
 * Disabling ends the person's sessions and streams at once, and so does a new PIN or password, except where the
 * person set it.
 */
export async function changePerson(
  deps: Deps,
  principal: Principal,
  id: string,
  asked: ChangePerson,
): Promise<PersonOnWire> {
  const secrets = await hashed(deps, asked);
  return writePerson(deps, async (tx) => {
    const people = tx.getRepository(PersonRow);
    const person = await people.findOneBy({ id });
    if (!person) throw new ApiError('not-found');
    const before = await rightsInForce(tx, id);
    requireOwnSheds(principal, before?.shedIds ?? []);
    if (asked.shedIds) {
      requireOwnSheds(principal, asked.shedIds);
      await requireSheds(tx, asked.shedIds);
    }
    const wasRights = rightsOf(before);
    const rights: Rights = {
      roles: asked.roles ?? wasRights.roles,
      shedIds: asked.shedIds ?? wasRights.shedIds,
      disabled: asked.disabled ?? wasRights.disabled,
    };
    const wasFacts = factsOf(person);
    const facts: Facts = {
      name: asked.name ?? wasFacts.name,
      shortName: asked.shortName ?? wasFacts.shortName,
      worksNumber: asked.worksNumber === undefined ? wasFacts.worksNumber : asked.worksNumber,
      email: asked.email === undefined ? wasFacts.email : asked.email,
      usualSet: asked.usualSet ?? wasFacts.usualSet,
    };
    if (!rights.disabled) await requireSound(tx, facts, rights, id);
    if (asked.usualSet) await requireLooms(tx, asked.usualSet);
    await people.update({ id }, { ...facts, ...secrets });
    await addRights(tx, id, rights, before, deps.now());
    await requireManager(tx);
    if (rights.disabled || facts.email !== wasFacts.email) await voidLinks(tx, id, deps.now());
    await recordPerson(deps, tx, principal, {
      name: facts.name,
      before: { ...wasFacts, ...wasRights },
      after: { ...facts, ...rights, ...secretsSet(secrets) },
    });
    const ends = rights.disabled || hasSecret(secrets);
    const own = principal.person?.id === id && !rights.disabled;
    const ended = ends && !own ? await endSessions(tx, { personId: id }, 'disabled', deps.now()) : [];
    return { id, ended };
  });
}

async function recordPerson(
  deps: Pick<Deps, 'now'>,
  tx: EntityManager,
  principal: Principal,
  { name, before, after }: { name: string; before: Facts & Rights; after: Facts & Rights },
): Promise<void> {
  const differ = differingFields(before, after);
  if (Object.keys(differ.after).length === 0) return;
  await recordChange(tx, {
    by: principal.person?.id ?? null,
    at: deps.now(),
    what: 'person',
    name,
    action: after.disabled && !before.disabled ? 'ended' : 'changed',
    effectiveAt: deps.now(),
    ...differ,
  });
}

function hasSecret({ pinHash, passwordHash }: HashedSecrets): boolean {
  return (pinHash ?? passwordHash) !== undefined;
}

async function addRights(
  tx: EntityManager,
  personId: string,
  after: Rights,
  before: PersonRightsRow | null,
  now: number,
): Promise<void> {
  if (before && JSON.stringify(after) === JSON.stringify(rightsOf(before))) return;
  // Two changes within one millisecond, or a clock set back: the newer one follows the older in any case.
  const effectiveAt = Math.max(now, (before?.effectiveAt ?? 0) + 1);
  await tx.getRepository(PersonRightsRow).insert({ personId, effectiveAt, ...after });
}

function rightsOf(row: PersonRightsRow | null): Rights {
  return { roles: row?.roles ?? [], shedIds: row?.shedIds ?? [], disabled: row?.disabled ?? false };
}

function factsOf({ name, shortName, worksNumber, email, usualSet }: PersonRow): Facts {
  return { name, shortName, worksNumber, email, usualSet };
}

/** Writes, numbers the change for the tablets' lists of people, and tells who listens. */
export async function writePerson(
  deps: Deps,
  work: (tx: EntityManager) => Promise<{ id: string; ended: string[] }>,
): Promise<PersonOnWire> {
  const { id, ended, seq, person } = await deps.writer.write(async (tx) => {
    const done = await work(tx);
    const change = await tx
      .getRepository(ChangeRow)
      .insert({ shedId: null, kind: 'people', ref: '', mark: newMark() });
    const row = await tx.getRepository(PersonRow).findOneByOrFail({ id: done.id });
    const history = await tx
      .getRepository(PersonRightsRow)
      .find({ where: { personId: done.id }, order: { effectiveAt: 'ASC' } });
    const links = await linksInForce(tx, deps.now());
    return {
      ...done,
      seq: Number(change.identifiers[0]?.['seq']),
      person: toPerson(row, history, links.get(done.id) ?? null),
    };
  });
  endStreams(deps, ended);
  deps.feed.announce(null, seq);
  deps.log.info({ personId: id }, 'a person was changed');
  return person;
}

/** Until when the link works that a person was sent last. */
async function linksInForce(reads: DataSource | EntityManager, now: number): Promise<Map<string, number>> {
  const links = await reads
    .getRepository(OneTimeLinkRow)
    .findBy({ usedAt: IsNull(), voidedAt: IsNull(), expiresAt: MoreThan(now) });
  return new Map(links.map(({ personId, expiresAt }) => [personId, expiresAt]));
}

/** Throws `bad-request` that marks every field that is wrong. */
async function requireSound(
  tx: EntityManager,
  facts: Facts,
  rights: Rights,
  id: string | null,
): Promise<void> {
  const others = await tx
    .getRepository(PersonRow)
    .find({ select: { id: true, name: true, shortName: true, worksNumber: true, email: true } });
  const troubles = personTroubles({ ...facts, roles: rights.roles }, others, id);
  const fields = Object.entries(troubles).map(([path, message]) => ({ path, message }));
  if (fields.length > 0) throw new ApiError('bad-request', { fields });
}

async function requireLooms(tx: EntityManager, usualSet: readonly string[]): Promise<void> {
  if (new Set(usualSet).size !== usualSet.length)
    throw wrongField('usualSet', 'A loom stands in this set twice.');
  const known = await tx.getRepository(LoomRow).countBy({ id: In([...usualSet]) });
  if (known !== usualSet.length) throw wrongField('usualSet', 'There is no such loom.');
}

/** Somebody must be left who can let people in. */
async function requireManager(tx: EntityManager): Promise<void> {
  const rows: unknown[] = await tx.query(
    `SELECT 1 FROM "person_rights" "r" WHERE "disabled" = 0 AND "roles" LIKE '%"manager"%' AND "effectiveAt" =
      (SELECT max("effectiveAt") FROM "person_rights" WHERE "personId" = "r"."personId") LIMIT 1`,
  );
  if (rows.length === 0) throw new ApiError('last-manager');
}
