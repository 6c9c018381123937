import { IsNull, type EntityManager } from 'typeorm';
import type { Session } from '../../../shared/contract/session.js';
import { DeviceRow, RefreshTokenRow, type SessionRow } from '../../database/entities/index.js';
import type { Deps } from '../../deps.js';
import { deviceOfCookie, sessionOfToken, type Cookies } from './cookie-owners.js';
import type { CookieValue } from './cookies.js';
import { rightsInForce, sessionAnswer } from './session-answer.js';
import { addRefreshToken, endSessions, endStreams } from './session-opening.js';

export interface Refreshed {
  readonly answer: Session;
  /** The person's next refresh token; null: nobody is signed in, and the cookie goes. */
  readonly refresh: { readonly value: CookieValue; readonly expiresAt: number } | null;
  /** The tablet's cookie is renewed. */
  readonly tablet: boolean;
}

/**
 * A new access token for whoever the cookies name; "nobody" is an answer, not an error.
 *
 * A refresh token may be used again until its successor, or that successor's access token, has been used once: an
 * answer can be lost on its way and two pages can ask at the same time. After that its use is a theft, by whoever
 * does not have the newer one, and the session ends.
 */
export async function refreshSession(deps: Deps, cookies: Cookies): Promise<Refreshed> {
  if (!cookies.device && !cookies.person) return nobody(deps);
  const { ended, ...refreshed } = await deps.writer.write(async (tx) => {
    const tablet = await deviceOfCookie(tx, cookies.device);
    if (tablet) await tx.getRepository(DeviceRow).update({ id: tablet.id }, { lastSeenAt: deps.now() });
    const turned = cookies.person ? await turn(tx, deps, cookies.person, tablet) : { ended: [], next: null };
    const known = turned.next
      ? { session: turned.next.session, refreshId: turned.next.value.id }
      : tablet && { deviceId: tablet.id };
    return {
      ended: turned.ended,
      answer: await sessionAnswer(deps, tx, known),
      refresh: turned.next && { value: turned.next.value, expiresAt: turned.next.session.expiresAt },
      tablet: tablet !== null,
    };
  });
  endStreams(deps, ended);
  return refreshed;
}

async function nobody(deps: Deps): Promise<Refreshed> {
  return { answer: await sessionAnswer(deps, deps.reads, null), refresh: null, tablet: false };
}

interface Turned {
  readonly ended: string[];
  readonly next: { readonly session: SessionRow; readonly value: CookieValue } | null;
}

const NOT_TURNED: Turned = { ended: [], next: null };

async function turn(
  tx: EntityManager,
  deps: Deps,
  cookie: CookieValue,
  tablet: DeviceRow | null,
): Promise<Turned> {
  const found = await sessionOfToken(tx, cookie);
  if (!found) return NOT_TURNED;
  const { session, token } = found;
  const now = deps.now();
  if (session.endedAt !== null || session.expiresAt <= now) return NOT_TURNED;
  if (token.retiredAt !== null) {
    deps.log.warn({ sessionId: session.id }, 'a retired refresh token was used: the session is ended');
    return { ended: await endSessions(tx, { id: session.id }, 'theft', now), next: null };
  }
  if (!(await isOwnDevice(tx, session, tablet))) return NOT_TURNED;
  const rights = await rightsInForce(tx, session.personId);
  if (!rights || rights.disabled) return NOT_TURNED;
  const tokens = tx.getRepository(RefreshTokenRow);
  if (token.parentId !== null)
    await tokens.update({ id: token.parentId, retiredAt: IsNull() }, { retiredAt: now });
  await tokens.update({ id: token.id, usedAt: IsNull() }, { usedAt: now });
  return { ended: [], next: { session, value: await addRefreshToken(tx, session.id, token.id, now) } };
}

/** A session on a tablet goes on only there: its person cookie alone is worth nothing. */
async function isOwnDevice(
  tx: EntityManager,
  session: SessionRow,
  tablet: DeviceRow | null,
): Promise<boolean> {
  const device = await tx.getRepository(DeviceRow).findOneBy({ id: session.deviceId });
  if (!device || device.revokedAt !== null) return false;
  return device.kind === 'browser' || device.id === tablet?.id;
}
