import type { Request } from 'express';
import {
  DEVICE_PERMISSIONS,
  permissionsOf,
  type Permission,
  type Role,
} from '../../shared/contract/roles.js';
import type { ErrorCode } from '../../shared/contract/errors.js';
import type { Deps } from '../deps.js';
import type { AccessClaims } from '../features/sessions/access-tokens.js';
import { ApiError } from './api-error.js';
import type { Principal } from './principal.js';

/** Who asks, and what is said where that is not enough. */
export interface Authentication {
  readonly principal: Principal;
  readonly lacking: ErrorCode;
}

const PUBLIC: ReadonlySet<Permission> = new Set(['public']);
const NOBODY: Principal = { person: null, device: null, permissions: PUBLIC };

/**
 * Reads the bearer's person, session and device from the database, at each request: disabling, changed roles and
 * revoked tablets hold at once, however long the token would last.
 */
export async function authenticate(
  deps: Pick<Deps, 'reads' | 'writer' | 'tokens' | 'now' | 'log'>,
  request: Request,
): Promise<Authentication> {
  const header = request.get('authorization');
  if (header === undefined) return { principal: NOBODY, lacking: 'not-signed-in' };
  const token = /^Bearer ([\w.-]+)$/i.exec(header)?.[1];
  const read = token === undefined ? ({ problem: 'bad-token' } as const) : deps.tokens.read(token);
  if ('problem' in read)
    return {
      principal: NOBODY,
      lacking: read.problem === 'expired' ? 'not-signed-in' : 'bad-token',
    };
  return identify(deps, read.claims);
}

/** Throws the code that says why the permission is lacking. */
export function requirePermission({ principal, lacking }: Authentication, permission: Permission): void {
  if (!principal.permissions.has(permission)) throw new ApiError(lacking);
}

async function identify(
  deps: Pick<Deps, 'reads' | 'writer' | 'now' | 'log'>,
  claims: AccessClaims,
): Promise<Authentication> {
  const device = await readDevice(deps, claims.deviceId);
  if (!device) return { principal: NOBODY, lacking: 'bad-token' };
  const ofDevice =
    device.kind === 'tablet' ? DEVICE_PERMISSIONS[device.revoked ? 'revoked' : 'active'] : [...PUBLIC];
  const alone: Principal = { person: null, device, permissions: new Set(ofDevice) };
  if (device.revoked) return { principal: alone, lacking: 'device-revoked' };
  if (claims.personId === null) return { principal: alone, lacking: 'not-signed-in' };
  const person = await readPerson(deps, claims);
  if (!person) return { principal: alone, lacking: 'session-ended' };
  retirePredecessor(deps, claims.refreshId, person.predecessor);
  return {
    principal: {
      person: person.person,
      device,
      permissions: new Set([...ofDevice, ...permissionsOf(person.person.roles)]),
    },
    lacking: 'not-permitted',
  };
}

interface DeviceRecord {
  kind: 'tablet' | 'browser';
  shedId: string | null;
  revokedAt: number | null;
}

async function readDevice(deps: Pick<Deps, 'reads'>, id: string): Promise<Principal['device']> {
  const [row]: DeviceRecord[] = await deps.reads.query(
    'SELECT "kind", "shedId", "revokedAt" FROM "device" WHERE "id" = ?',
    [id],
  );
  return row ? { id, kind: row.kind, shedId: row.shedId, revoked: row.revokedAt !== null } : null;
}

interface PersonRecord {
  roles: string;
  shedIds: string;
  /** Of the refresh token that the access token came with: its predecessor, if that is not retired yet. */
  predecessor: string | null;
}

/** The rights in force of the person whose session is alive, else null. One query: it runs at every request. */
const PERSON_SQL = `
  SELECT "r"."roles", "r"."shedIds",
    (SELECT "old"."id" FROM "refresh_token" "new" JOIN "refresh_token" "old" ON "old"."id" = "new"."parentId"
      WHERE "new"."id" = ? AND "new"."sessionId" = "s"."id" AND "old"."retiredAt" IS NULL) AS "predecessor"
  FROM "session" "s" JOIN "person_rights" "r" ON "r"."personId" = "s"."personId"
  WHERE "s"."id" = ? AND "s"."personId" = ? AND "s"."deviceId" = ? AND "s"."endedAt" IS NULL AND "s"."expiresAt" > ?
    AND "r"."disabled" = 0
    AND "r"."effectiveAt" = (SELECT max("effectiveAt") FROM "person_rights" WHERE "personId" = "s"."personId")`;

async function readPerson(deps: Pick<Deps, 'reads' | 'now'>, claims: AccessClaims) {
  const { personId, sessionId, deviceId, refreshId } = claims;
  if (personId === null || sessionId === null) return null;
  const [row]: PersonRecord[] = await deps.reads.query(PERSON_SQL, [
    refreshId,
    sessionId,
    personId,
    deviceId,
    deps.now(),
  ]);
  if (!row) return null;
  const roles = JSON.parse(row.roles) as Role[];
  const shedIds = JSON.parse(row.shedIds) as string[];
  return { person: { id: personId, sessionId, roles, shedIds }, predecessor: row.predecessor };
}

/**
 * The first use of an access token proves that the refresh that brought it arrived, so the token before it is done
 * with. Nobody waits for it: the writer is first in, first out, and refreshing goes through it too.
 */
function retirePredecessor(
  deps: Pick<Deps, 'writer' | 'now' | 'log'>,
  refreshId: string | null,
  predecessor: string | null,
): void {
  if (refreshId === null || predecessor === null) return;
  deps.writer
    .write((tx) =>
      tx.query('UPDATE "refresh_token" SET "retiredAt" = ? WHERE "id" = ? AND "retiredAt" IS NULL', [
        deps.now(),
        predecessor,
      ]),
    )
    .catch((error: unknown) => deps.log.warn({ err: error }, 'a refresh token could not be retired'));
}
