import type { EntityManager } from 'typeorm';
import { DeviceRow, RefreshTokenRow, SessionRow } from '../../database/entities/index.js';
import type { CookieValue } from './cookies.js';
import { isSecretOf } from './secrets.js';

/** What the two cookies of a request said. */
export interface Cookies {
  readonly device: CookieValue | null;
  readonly person: CookieValue | null;
}

type Reader = Pick<EntityManager, 'getRepository'>;

/** The tablet whose cookie this is, revoked or not. */
export async function deviceOfCookie(reads: Reader, cookie: CookieValue | null): Promise<DeviceRow | null> {
  if (!cookie) return null;
  const device = await reads.getRepository(DeviceRow).findOneBy({ id: cookie.id, kind: 'tablet' });
  return device && isSecretOf(cookie.secret, device.secretHash) ? device : null;
}

/** The refresh token of a person cookie with its session; null where there is none or the secret is wrong. */
export async function sessionOfToken(
  reads: Reader,
  cookie: CookieValue,
): Promise<{ session: SessionRow; token: RefreshTokenRow } | null> {
  const token = await reads.getRepository(RefreshTokenRow).findOneBy({ id: cookie.id });
  if (!token || !isSecretOf(cookie.secret, token.secretHash)) return null;
  const session = await reads.getRepository(SessionRow).findOneBy({ id: token.sessionId });
  return session && { session, token };
}
