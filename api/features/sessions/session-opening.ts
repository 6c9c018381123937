import { IsNull, LessThanOrEqual, type EntityManager } from 'typeorm';
import { v7 as uuid } from 'uuid';
import { LIMITS } from '../../../shared/contract/limits.js';
import { DeviceRow, GrantRow, RefreshTokenRow, SessionRow } from '../../database/entities/index.js';
import type { Deps } from '../../deps.js';
import { ApiError, wrongField } from '../../middleware/api-error.js';
import type { CookieValue } from './cookies.js';
import { hashOfSecret, newSecret } from './secrets.js';

/** A session just opened or refreshed, with the refresh token for the person cookie. */
export interface OpenedSession {
  readonly session: SessionRow;
  readonly refresh: CookieValue;
}

/** Opens a session and issues the grant that entries of this person on this device carry. */
export async function openSession(
  tx: EntityManager,
  who: { personId: string; deviceId: string; kind: SessionRow['kind'] },
  now: number,
): Promise<OpenedSession> {
  await endExpired(tx, now);
  const lasts = who.kind === 'floor' ? LIMITS.floorSession : LIMITS.officeSession;
  const session: SessionRow = {
    id: uuid(),
    ...who,
    startedAt: now,
    expiresAt: now + lasts,
    endedAt: null,
    endedWhy: null,
  };
  await tx.getRepository(SessionRow).insert(session);
  const { personId, deviceId } = who;
  await tx.getRepository(GrantRow).insert({ id: uuid(), personId, deviceId, issuedAt: now });
  return { session, refresh: await addRefreshToken(tx, session.id, null, now) };
}

/** A new refresh token after its parent (null: the session's first). */
export async function addRefreshToken(
  tx: EntityManager,
  sessionId: string,
  parentId: string | null,
  now: number,
): Promise<CookieValue> {
  const value = { id: uuid(), secret: newSecret() };
  await tx.getRepository(RefreshTokenRow).insert({
    id: value.id,
    sessionId,
    secretHash: hashOfSecret(value.secret),
    parentId,
    issuedAt: now,
    usedAt: null,
    retiredAt: null,
  });
  return value;
}

/** Ends the sessions that match; answers their ids, whose streams are to be ended after the commit. */
export async function endSessions(
  tx: EntityManager,
  of: { id: string } | { personId: string } | { deviceId: string },
  why: NonNullable<SessionRow['endedWhy']>,
  now: number,
): Promise<string[]> {
  const sessions = tx.getRepository(SessionRow);
  const alive = await sessions.findBy({ ...of, endedAt: IsNull() });
  for (const { id } of alive) {
    await sessions.update({ id }, { endedAt: now, endedWhy: why });
    await forgetTokens(tx, id);
  }
  return alive.map(({ id }) => id);
}

/** A session whose time ran out has ended then; nobody signs out of it. */
async function endExpired(tx: EntityManager, now: number): Promise<void> {
  const sessions = tx.getRepository(SessionRow);
  const expired = await sessions.findBy({ expiresAt: LessThanOrEqual(now), endedAt: IsNull() });
  for (const { id, expiresAt } of expired) {
    await sessions.update({ id }, { endedAt: expiresAt, endedWhy: 'expired' });
    await forgetTokens(tx, id);
  }
}

/** A token is made every quarter of an hour on each device; those of an ended session are good for nothing. */
async function forgetTokens(tx: EntityManager, sessionId: string): Promise<void> {
  await tx.getRepository(RefreshTokenRow).delete({ sessionId });
}

/** To be called after the commit. */
export function endStreams(deps: Pick<Deps, 'feed'>, sessionIds: readonly string[]): void {
  for (const sessionId of sessionIds) deps.feed.end({ sessionId });
}

/** The office browser of this id, made at its first sign-in. */
export async function officeBrowser(tx: EntityManager, id: string, now: number): Promise<DeviceRow> {
  const devices = tx.getRepository(DeviceRow);
  const known = await devices.findOneBy({ id });
  if (known && known.kind !== 'browser')
    throw wrongField('browserId', 'This is a tablet’s number, not a browser’s.');
  if (known && known.revokedAt !== null) throw new ApiError('device-revoked');
  if (known) {
    await devices.update({ id }, { lastSeenAt: now });
    return known;
  }
  const made: DeviceRow = {
    id,
    kind: 'browser',
    name: 'Office browser',
    shedId: null,
    secretHash: null,
    registeredBy: null,
    registeredAt: now,
    revokedAt: null,
    lastSeenAt: now,
    clockOffset: null,
    appVersion: null,
    waiting: null,
    persisted: null,
  };
  await tx.getRepository(DeviceRow).insert(made);
  return made;
}
