import { randomInt } from 'node:crypto';
import { LessThan, type EntityManager } from 'typeorm';
import { LIMITS } from '../../../shared/contract/limits.js';
import {
  CODE_LETTERS,
  plainCode,
  TABLET_CODE_LENGTH,
  type TabletCode,
} from '../../../shared/contract/one-time.js';
import type { Session } from '../../../shared/contract/session.js';
import { MailSettingsRow, TabletCodeRow } from '../../database/entities/index.js';
import type { Deps } from '../../deps.js';
import { ownAddress } from '../../mail/own-address.js';
import { ApiError } from '../../middleware/api-error.js';
import type { Principal } from '../../middleware/principal.js';
import { rememberAddress } from '../mail/remember-address.js';
import { deviceOfCookie, sessionOfToken, type Cookies } from '../sessions/cookie-owners.js';
import type { CookieValue } from '../sessions/cookies.js';
import { hashOfSecret } from '../sessions/secrets.js';
import { sessionAnswer } from '../sessions/session-answer.js';
import { endSessions, endStreams } from '../sessions/session-opening.js';
import { insertTablet, recordTablet, requireShed } from './devices.service.js';

/** Used and expired codes are told from wrong ones for so long, ms. */
const REMEMBERED = 86_400_000;

/** A code that makes another browser a tablet of this shed: once, and for a quarter of an hour. */
export async function newTabletCode(
  deps: Deps,
  principal: Principal,
  asked: { name: string; shedId: string },
  address: string,
): Promise<TabletCode> {
  const { person } = principal;
  if (!person) throw new ApiError('not-signed-in');
  const letters = Array.from(
    { length: TABLET_CODE_LENGTH },
    () => CODE_LETTERS[randomInt(CODE_LETTERS.length)],
  ).join('');
  const code = letters.replace(/(.{4})(?=.)/g, '$1-');
  const now = deps.now();
  const expiresAt = now + LIMITS.tabletCode;
  return deps.writer.write(async (tx) => {
    await requireShed(tx, principal, asked.shedId);
    await rememberAddress(tx, deps.settings, address);
    await tx.getRepository(TabletCodeRow).delete({ expiresAt: LessThan(now - REMEMBERED) });
    await tx.getRepository(TabletCodeRow).insert({
      codeHash: hashOfSecret(letters),
      name: asked.name,
      shedId: asked.shedId,
      by: person.id,
      madeAt: now,
      expiresAt,
      usedAt: null,
    });
    const mail = await tx.getRepository(MailSettingsRow).findOneBy({ id: 1 });
    return { code, expiresAt, url: `${ownAddress(deps.settings, mail)}/tablet/code#${code}` };
  });
}

export interface RegisteredByCode {
  readonly answer: Session;
  readonly device: CookieValue;
}

/**
 * Makes the asking browser a tablet by a code; nobody is signed in on it then. Throws `tablet-code-wrong`,
 * `tablet-code-used`, `tablet-code-expired`, `already-tablet`.
 */
export async function registerByCode(
  deps: Deps,
  typed: string,
  cookies: Cookies,
  address: string,
): Promise<RegisteredByCode> {
  await deps.tries.address.count(address);
  const { ended, ...registered } = await deps.writer.write(async (tx) => {
    const now = deps.now();
    const here = await deviceOfCookie(tx, cookies.device);
    if (here && here.revokedAt === null) throw new ApiError('already-tablet');
    const code = await requireCode(tx, plainCode(typed), now);
    await tx.getRepository(TabletCodeRow).update({ codeHash: code.codeHash }, { usedAt: now });
    const device = await insertTablet(tx, { name: code.name, shedId: code.shedId, by: code.by }, now);
    await recordTablet(deps, tx, code.by, { name: code.name, shedId: code.shedId, action: 'added' });
    const found = cookies.person && (await sessionOfToken(tx, cookies.person));
    const ended = found ? await endSessions(tx, { id: found.session.id }, 'replaced', now) : [];
    const answer = await sessionAnswer(deps, tx, { deviceId: device.id });
    return { answer, device, ended };
  });
  endStreams(deps, ended);
  return registered;
}

async function requireCode(tx: EntityManager, letters: string, now: number): Promise<TabletCodeRow> {
  const code = await tx.getRepository(TabletCodeRow).findOneBy({ codeHash: hashOfSecret(letters) });
  if (!code) throw new ApiError('tablet-code-wrong');
  if (code.usedAt !== null) throw new ApiError('tablet-code-used');
  if (code.expiresAt <= now) throw new ApiError('tablet-code-expired');
  return code;
}
