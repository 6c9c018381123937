import type { EntityManager } from 'typeorm';
import type * as z from 'zod/mini';
import type { floorSignInSchema, officeSignInSchema, Session } from '../../../shared/contract/session.js';
import { PersonRow, type DeviceRow } from '../../database/entities/index.js';
import type { Deps } from '../../deps.js';
import { ApiError } from '../../middleware/api-error.js';
import { deviceOfCookie, sessionOfToken, type Cookies } from './cookie-owners.js';
import type { CookieValue } from './cookies.js';
import { rightsInForce, sessionAnswer } from './session-answer.js';
import {
  endSessions,
  endStreams,
  officeBrowser,
  openSession,
  type OpenedSession,
} from './session-opening.js';

export interface SignedIn {
  readonly answer: Session;
  /** For the person cookie. */
  readonly refresh: CookieValue;
  readonly expiresAt: number;
}

/** E-mail and password. A registered tablet stays the tablet; any other browser becomes an office browser. */
export async function signInAtOffice(
  deps: Deps,
  asked: z.infer<typeof officeSignInSchema>,
  cookies: Cookies,
  address: string,
): Promise<SignedIn> {
  await deps.tries.address.count(address);
  await deps.tries.office.count(asked.email);
  const person = await deps.reads.getRepository(PersonRow).findOneBy({ email: asked.email });
  const right = await deps.passwords.compare(asked.password, person?.passwordHash ?? null);
  if (!person || !right) throw new ApiError('wrong-sign-in');
  await deps.tries.office.forget(asked.email);
  return open(deps, cookies, async (tx) => {
    await requireActive(tx, person.id);
    const tablet = await deviceOfCookie(tx, cookies.device);
    const device =
      tablet && tablet.revokedAt === null ? tablet : await officeBrowser(tx, asked.browserId, deps.now());
    return openSession(tx, { personId: person.id, deviceId: device.id, kind: 'office' }, deps.now());
  });
}

/** Works number and PIN, on a registered tablet alone. */
export async function signInOnFloor(
  deps: Deps,
  asked: z.infer<typeof floorSignInSchema>,
  cookies: Cookies,
): Promise<SignedIn> {
  const tablet = requireTablet(await deviceOfCookie(deps.reads, cookies.device));
  const key = `${tablet.id}:${asked.worksNumber}`;
  await deps.tries.tablet.count(tablet.id);
  await deps.tries.floor.count(key);
  const person = await deps.reads.getRepository(PersonRow).findOneBy({ worksNumber: asked.worksNumber });
  const right = await deps.passwords.compare(asked.pin, person?.pinHash ?? null);
  if (!person || !right) throw new ApiError('wrong-sign-in');
  await deps.tries.floor.forget(key);
  return open(deps, cookies, async (tx) => {
    const rights = await requireActive(tx, person.id);
    const now = requireTablet(await deviceOfCookie(tx, cookies.device));
    if (rights.shedIds.length > 0 && !rights.shedIds.includes(now.shedId ?? ''))
      throw new ApiError('other-shed');
    return openSession(tx, { personId: person.id, deviceId: now.id, kind: 'floor' }, deps.now());
  });
}

/** Signs the person out of this browser; the tablet stays registered. */
export async function endOwnSession(deps: Deps, cookies: Cookies): Promise<void> {
  const ended = await deps.writer.write((tx) => endSessionOfCookie(tx, cookies.person, 'signed-out', deps));
  endStreams(deps, ended);
}

/** Opens a session in one write; whoever was signed in here before is signed out by it. */
export async function open(
  deps: Deps,
  cookies: Cookies,
  work: (tx: EntityManager) => Promise<OpenedSession>,
): Promise<SignedIn> {
  const { ended, opened, answer } = await deps.writer.write(async (tx) => {
    const ended = await endSessionOfCookie(tx, cookies.person, 'replaced', deps);
    const opened = await work(tx);
    const answer = await sessionAnswer(deps, tx, { session: opened.session, refreshId: opened.refresh.id });
    return { ended, opened, answer };
  });
  endStreams(deps, ended);
  return { answer, refresh: opened.refresh, expiresAt: opened.session.expiresAt };
}

async function endSessionOfCookie(
  tx: EntityManager,
  cookie: CookieValue | null,
  why: 'signed-out' | 'replaced',
  deps: Pick<Deps, 'now'>,
): Promise<string[]> {
  const found = cookie && (await sessionOfToken(tx, cookie));
  return found ? endSessions(tx, { id: found.session.id }, why, deps.now()) : [];
}

function requireTablet(device: DeviceRow | null): DeviceRow {
  if (!device) throw new ApiError('device-unknown');
  if (device.revokedAt !== null) throw new ApiError('device-revoked');
  return device;
}

/** A disabled person is answered as if number or e-mail were wrong: who works here is nobody's business. */
async function requireActive(tx: EntityManager, personId: string) {
  const rights = await rightsInForce(tx, personId);
  if (!rights || rights.disabled) throw new ApiError('wrong-sign-in');
  return rights;
}
