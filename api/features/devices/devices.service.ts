import type { EntityManager } from 'typeorm';
import { v7 as uuid } from 'uuid';
import type { DeviceRow as DeviceOnWire, Session } from '../../../shared/contract/session.js';
import { DeviceRow, GrantRow, SessionRow, ShedRow } from '../../database/entities/index.js';
import type { Deps } from '../../deps.js';
import { ApiError, wrongField } from '../../middleware/api-error.js';
import { maySeeShed, type Principal } from '../../middleware/principal.js';
import type { CookieValue } from '../sessions/cookies.js';
import { recordChange } from '../change-record/record-change.js';
import { hashOfSecret, newSecret } from '../sessions/secrets.js';
import { sessionAnswer } from '../sessions/session-answer.js';
import { addRefreshToken, endSessions } from '../sessions/session-opening.js';
import { toDevice } from './devices.mapper.js';

export interface Registered {
  readonly answer: Session;
  readonly device: CookieValue;
  readonly person: { readonly value: CookieValue; readonly expiresAt: number };
}

/**
 * Makes the asking browser a registered tablet of a shed. Whoever registers it stays signed in, now on the tablet:
 * a browser is one device, never two at once.
 */
export async function registerTablet(
  deps: Deps,
  principal: Principal,
  asked: { name: string; shedId: string },
): Promise<Registered> {
  const { person } = principal;
  if (!person) throw new ApiError('not-signed-in');
  return deps.writer.write(async (tx) => {
    const now = deps.now();
    await requireShed(tx, principal, asked.shedId);
    const device = await insertTablet(tx, { ...asked, by: person.id }, now);
    await recordTablet(deps, tx, person.id, { ...asked, action: 'added' });
    const session = await moveSession(tx, person.sessionId, device.id);
    await tx
      .getRepository(GrantRow)
      .insert({ id: uuid(), personId: person.id, deviceId: device.id, issuedAt: now });
    const value = await addRefreshToken(tx, session.id, null, now);
    const answer = await sessionAnswer(deps, tx, { session, refreshId: value.id });
    return { answer, device, person: { value, expiresAt: session.expiresAt } };
  });
}

/** Throws `bad-request` where there is no such shed, `other-shed` where it is another's. */
export async function requireShed(tx: EntityManager, principal: Principal, shedId: string): Promise<void> {
  if (!(await tx.getRepository(ShedRow).existsBy({ id: shedId })))
    throw wrongField('shedId', 'There is no such shed.');
  if (!maySeeShed(principal, shedId)) throw new ApiError('other-shed');
}

/** A new tablet; its cookie's secret is kept as a hash alone. */
export async function insertTablet(
  tx: EntityManager,
  { name, shedId, by }: { name: string; shedId: string; by: string },
  now: number,
): Promise<CookieValue> {
  const device: CookieValue = { id: uuid(), secret: newSecret() };
  await tx.getRepository(DeviceRow).insert({
    id: device.id,
    kind: 'tablet',
    name,
    shedId,
    secretHash: hashOfSecret(device.secret),
    registeredBy: by,
    registeredAt: now,
    revokedAt: null,
    lastSeenAt: now,
    clockOffset: null,
    appVersion: null,
  });
  return device;
}

/** Into the record of changes. `by`: the person's id. */
export async function recordTablet(
  deps: Pick<Deps, 'now'>,
  tx: EntityManager,
  by: string | null,
  tablet: { name: string; shedId: string | null; action: 'added' | 'ended' },
): Promise<void> {
  await recordChange(tx, {
    by,
    at: deps.now(),
    what: 'tablet',
    name: tablet.name,
    action: tablet.action,
    effectiveAt: deps.now(),
    ...(tablet.action === 'added' ? { after: { name: tablet.name, shedId: tablet.shedId } } : {}),
  });
}

async function moveSession(tx: EntityManager, id: string, deviceId: string): Promise<SessionRow> {
  const sessions = tx.getRepository(SessionRow);
  await sessions.update({ id }, { deviceId });
  return sessions.findOneByOrFail({ id });
}

/** Tablets and browsers of the sheds that the asker may see, newest first. */
export async function listDevices(deps: Deps, principal: Principal): Promise<DeviceOnWire[]> {
  const devices = await deps.reads
    .getRepository(DeviceRow)
    .find({ order: { registeredAt: 'DESC', id: 'DESC' } });
  const sequences: { deviceId: string; lastSeq: number; stored: number }[] = await deps.reads.query(
    `SELECT "deviceId", max("deviceSeq") AS "lastSeq", count(DISTINCT "deviceSeq") AS "stored"
     FROM "entry" GROUP BY "deviceId"`,
  );
  const byDevice = new Map(sequences.map((each) => [each.deviceId, each]));
  return devices
    .filter(({ shedId }) => shedId === null || maySeeShed(principal, shedId))
    .map((row) => toDevice(row, byDevice.get(row.id)));
}

/** Withdraws a tablet: from now on it may only hand in what it holds, and what it hands in is held. */
export async function revokeDevice(deps: Deps, principal: Principal, id: string): Promise<DeviceOnWire> {
  const row = await deps.writer.write(async (tx) => {
    const devices = tx.getRepository(DeviceRow);
    const device = await devices.findOneBy({ id });
    if (!device) throw new ApiError('not-found');
    if (device.shedId !== null && !maySeeShed(principal, device.shedId)) throw new ApiError('other-shed');
    if (device.revokedAt === null) {
      await devices.update({ id }, { revokedAt: deps.now() });
      await endSessions(tx, { deviceId: id }, 'device-revoked', deps.now());
      await recordTablet(deps, tx, principal.person?.id ?? null, { ...device, action: 'ended' });
    }
    return devices.findOneByOrFail({ id });
  });
  deps.feed.end({ deviceId: id });
  const list = await listDevices(deps, principal);
  return list.find((each) => each.id === id) ?? toDevice(row, undefined);
}

/** Gives a tablet or an office browser another name. */
export async function renameDevice(
  deps: Deps,
  principal: Principal,
  id: string,
  name: string,
): Promise<DeviceOnWire> {
  const row = await deps.writer.write(async (tx) => {
    const devices = tx.getRepository(DeviceRow);
    const device = await devices.findOneBy({ id });
    if (!device) throw new ApiError('not-found');
    if (device.shedId !== null && !maySeeShed(principal, device.shedId)) throw new ApiError('other-shed');
    if (device.name !== name) {
      await devices.update({ id }, { name });
      await recordChange(tx, {
        by: principal.person?.id ?? null,
        at: deps.now(),
        what: device.kind === 'tablet' ? 'tablet' : 'browser',
        name,
        action: 'changed',
        effectiveAt: deps.now(),
        before: { name: device.name },
        after: { name },
      });
    }
    return { ...device, name };
  });
  const list = await listDevices(deps, principal);
  return list.find((each) => each.id === id) ?? toDevice(row, undefined);
}
