import { IsNull, type EntityManager } from 'typeorm';
import { LIMITS } from '../../../shared/contract/limits.js';
import type { OneTimeLink } from '../../../shared/contract/one-time.js';
import { MailSettingsRow, MillRow, OneTimeLinkRow, PersonRow } from '../../database/entities/index.js';
import type { Deps } from '../../deps.js';
import { inviteWords, resetWords } from '../../mail/letters.js';
import { ownAddress } from '../../mail/own-address.js';
import { ApiError } from '../../middleware/api-error.js';
import { recordChange } from '../change-record/record-change.js';
import { requireLength } from '../people/person-secrets.js';
import type { Cookies } from './cookie-owners.js';
import { hashOfSecret, newSecret } from './secrets.js';
import { rightsInForce } from './session-answer.js';
import { endSessions, endStreams, officeBrowser, openSession } from './session-opening.js';
import { open, type SignedIn } from './sessions.service.js';

type Reader = Pick<EntityManager, 'getRepository'>;

/**
 * Posts a letter with a link by which a person chooses a password; links sent before end with it. Answers the
 * letter's id. Throws `no-email`.
 */
export async function postLink(
  deps: Pick<Deps, 'now' | 'post' | 'settings'>,
  tx: EntityManager,
  person: PersonRow,
): Promise<string> {
  if (person.email === null) throw new ApiError('no-email');
  const purpose = person.passwordHash === null ? 'invite' : 'reset';
  const now = deps.now();
  const expiresAt = now + (purpose === 'invite' ? LIMITS.inviteLink : LIMITS.resetLink);
  const token = newSecret();
  await voidLinks(tx, person.id, now);
  await tx.getRepository(OneTimeLinkRow).insert({
    tokenHash: hashOfSecret(token),
    personId: person.id,
    purpose,
    madeAt: now,
    expiresAt,
    usedAt: null,
    voidedAt: null,
  });
  const mill = await tx.getRepository(MillRow).findOneBy({ id: 1 });
  const mail = await tx.getRepository(MailSettingsRow).findOneBy({ id: 1 });
  // After #: browsers keep it from servers and their logs.
  const link = `${ownAddress(deps.settings, mail)}/welcome#${token}`;
  const words = purpose === 'invite' ? inviteWords : resetWords;
  return deps.post.post(tx, {
    ...words(mill?.name ?? 'the mill', person.name, link),
    purpose,
    to: person.email,
    until: expiresAt,
    queued: true,
  });
}

/** Ends the links that a person was sent. */
export async function voidLinks(tx: EntityManager, personId: string, now: number): Promise<void> {
  await tx
    .getRepository(OneTimeLinkRow)
    .update({ personId, usedAt: IsNull(), voidedAt: IsNull() }, { voidedAt: now });
}

/** Posts a letter to whoever has this address and may sign in; says nothing of whether somebody has. */
export async function askForLink(deps: Deps, email: string, address: string): Promise<void> {
  await deps.tries.address.count(address);
  await deps.tries.letters.count(email);
  const person = await deps.reads.getRepository(PersonRow).findOneBy({ email });
  const rights = person && (await rightsInForce(deps.reads, person.id));
  const may = person !== null && rights !== null && !rights.disabled;
  // A stranger's question writes nothing but waits its turn too: the time taken should tell little.
  await deps.writer.write(async (tx) => {
    if (may) await postLink(deps, tx, person);
  });
}

/** Whose link this is. Throws why it does not work. */
export async function lookAtLink(deps: Deps, token: string, address: string): Promise<OneTimeLink> {
  await deps.tries.address.count(address);
  const { link, person } = await requireLink(deps.reads, token, deps.now());
  return { name: person.name, email: person.email, purpose: link.purpose };
}

/** Sets the password and signs in here; every other sign-in of the person ends. */
export async function redeemLink(
  deps: Deps,
  asked: { token: string; password: string; browserId: string },
  cookies: Cookies,
  address: string,
): Promise<SignedIn> {
  await deps.tries.address.count(address);
  requireLength(asked.password);
  const { person } = await requireLink(deps.reads, asked.token, deps.now());
  const passwordHash = await deps.passwords.hash(asked.password);
  let ended: readonly string[] = [];
  const signedIn = await open(deps, cookies, async (tx) => {
    const now = deps.now();
    // Asked again in the transaction: two pages with one link, and only the first has it.
    const { link } = await requireLink(tx, asked.token, now);
    await tx.getRepository(OneTimeLinkRow).update({ tokenHash: link.tokenHash }, { usedAt: now });
    await tx.getRepository(PersonRow).update({ id: person.id }, { passwordHash });
    ended = await endSessions(tx, { personId: person.id }, 'replaced', now);
    await recordChange(tx, {
      by: person.id,
      at: now,
      what: 'person',
      name: person.name,
      action: 'changed',
      effectiveAt: now,
      before: {},
      after: { password: link.purpose === 'invite' ? 'chosen by invitation' : 'chosen by a letter' },
    });
    const browser = await officeBrowser(tx, asked.browserId, now);
    return openSession(tx, { personId: person.id, deviceId: browser.id, kind: 'office' }, now);
  });
  endStreams(deps, ended);
  if (person.email !== null) await deps.tries.office.forget(person.email);
  return signedIn;
}

/** Throws `link-wrong`, `link-used`, `link-replaced`, `link-expired`. */
async function requireLink(
  reads: Reader & Parameters<typeof rightsInForce>[0],
  token: string,
  now: number,
): Promise<{ link: OneTimeLinkRow; person: PersonRow }> {
  const link = await reads.getRepository(OneTimeLinkRow).findOneBy({ tokenHash: hashOfSecret(token) });
  if (!link) throw new ApiError('link-wrong');
  if (link.usedAt !== null) throw new ApiError('link-used');
  const rights = await rightsInForce(reads, link.personId);
  if (!rights || rights.disabled) throw new ApiError('link-expired');
  if (link.voidedAt !== null) throw new ApiError('link-replaced');
  if (link.expiresAt <= now) throw new ApiError('link-expired');
  return { link, person: await reads.getRepository(PersonRow).findOneByOrFail({ id: link.personId }) };
}
