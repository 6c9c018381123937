import type { DataSource, EntityManager } from 'typeorm';
import type { Session } from '../../../shared/contract/session.js';
import { permissionsOf } from '../../../shared/contract/roles.js';
import {
  DeviceRow,
  GrantRow,
  PersonRightsRow,
  PersonRow,
  type SessionRow,
} from '../../database/entities/index.js';
import type { Deps } from '../../deps.js';

type Reader = DataSource | EntityManager;

/** The rights in force: a person's latest row. */
export async function rightsInForce(reads: Reader, personId: string): Promise<PersonRightsRow | null> {
  return reads
    .getRepository(PersonRightsRow)
    .findOne({ where: { personId }, order: { effectiveAt: 'DESC' } });
}

/** Whether the mill still waits for its first manager. */
export async function needsFirstManager(reads: Reader): Promise<boolean> {
  const rows: unknown[] = await reads.query(
    `SELECT 1 FROM "person_rights" WHERE "roles" LIKE '%"manager"%' LIMIT 1`,
  );
  return rows.length === 0;
}

/** What sign-in and refresh answer: the person (if any), the device (if any) and one access token for both. */
export async function sessionAnswer(
  deps: Pick<Deps, 'tokens' | 'now'>,
  reads: Reader,
  known: { session: SessionRow; refreshId: string } | { deviceId: string } | null,
): Promise<Session> {
  const session = known && 'session' in known ? known.session : null;
  const refreshId = known && 'session' in known ? known.refreshId : null;
  const deviceId = session?.deviceId ?? (known && 'deviceId' in known ? known.deviceId : null);
  const device = deviceId === null ? null : await reads.getRepository(DeviceRow).findOneBy({ id: deviceId });
  const access = device
    ? deps.tokens.issue({
        personId: session?.personId ?? null,
        sessionId: session?.id ?? null,
        deviceId: device.id,
        refreshId,
      })
    : null;
  return {
    accessToken: access?.token ?? null,
    accessExpiresAt: access?.expiresAt ?? null,
    serverNow: deps.now(),
    person: session && (await signedInPerson(reads, session.personId)),
    grant: session && (await latestGrant(reads, session)),
    device: device && {
      id: device.id,
      kind: device.kind,
      name: device.name,
      shedId: device.shedId,
      revoked: device.revokedAt !== null,
    },
    needsFirstManager: await needsFirstManager(reads),
  };
}

async function signedInPerson(reads: Reader, id: string): Promise<Session['person']> {
  const person = await reads.getRepository(PersonRow).findOneByOrFail({ id });
  const rights = await rightsInForce(reads, id);
  const roles = rights?.roles ?? [];
  return {
    id,
    name: person.name,
    shortName: person.shortName,
    worksNumber: person.worksNumber,
    roles,
    permissions: [...permissionsOf(roles)],
    shedIds: rights?.shedIds ?? [],
  };
}

async function latestGrant(reads: Reader, session: SessionRow): Promise<Session['grant']> {
  const { personId, deviceId } = session;
  const grant = await reads
    .getRepository(GrantRow)
    .findOne({ where: { personId, deviceId }, order: { issuedAt: 'DESC' } });
  return (
    grant && { id: grant.id, personId: grant.personId, deviceId: grant.deviceId, issuedAt: grant.issuedAt }
  );
}
