import { randomInt } from 'node:crypto';
import { IANAZone } from 'luxon';
import { v7 as uuid } from 'uuid';
import type * as z from 'zod/mini';
import type { firstManagerSchema } from '../../../shared/contract/session.js';
import { shippedCauses } from '../../../shared/entries/causes.js';
import {
  CauseVersionRow,
  ChangeRow,
  MetaRow,
  MillRow,
  PersonRightsRow,
  PersonRow,
} from '../../database/entities/index.js';
import type { Deps } from '../../deps.js';
import { ApiError, wrongField } from '../../middleware/api-error.js';
import { newMark } from '../book/change-log.js';
import { requireLength } from '../people/person-secrets.js';
import type { Cookies } from '../sessions/cookie-owners.js';
import { hashOfSecret, isSecretOf } from '../sessions/secrets.js';
import { needsFirstManager } from '../sessions/session-answer.js';
import { officeBrowser, openSession } from '../sessions/session-opening.js';
import { open, type SignedIn } from '../sessions/sessions.service.js';

const CODE_KEY = 'first-run-code';

/** No letters or digits that are taken for one another. */
const CODE_LETTERS = 'ABCDEFGHJKMNPQRSTUVWXYZ23456789';

/** Causes hold from the beginning of what the book takes at all (2000), so that old paper cards find them. */
const ALWAYS = 946_684_800_000;

/**
 * While the mill has no manager: makes a one-time code that the server prints, keeps its hash alone, and drops the
 * one before. Null once there is a manager.
 */
export async function newFirstRunCode(deps: Pick<Deps, 'writer'>): Promise<string | null> {
  return deps.writer.write(async (tx) => {
    const meta = tx.getRepository(MetaRow);
    await meta.delete({ key: CODE_KEY });
    if (!(await needsFirstManager(tx))) return null;
    const letters = Array.from({ length: 12 }, () => CODE_LETTERS[randomInt(CODE_LETTERS.length)]).join('');
    await tx.getRepository(MetaRow).insert({ key: CODE_KEY, value: hashOfSecret(letters) });
    return letters.replace(/(.{4})(?=.)/g, '$1-');
  });
}

/** The mill, its causes and its first manager, who is signed in by it. */
export async function setUpMill(
  deps: Deps,
  asked: z.infer<typeof firstManagerSchema>,
  cookies: Cookies,
  address: string,
): Promise<SignedIn> {
  await deps.tries.address.count(address);
  requireLength(asked.password);
  if (!IANAZone.isValidZone(asked.timeZone))
    throw wrongField('timeZone', 'There is no such time zone. Its name is like Europe/London.');
  const passwordHash = await deps.passwords.hash(asked.password);
  const signedIn = await open(deps, cookies, async (tx) => {
    if (!(await needsFirstManager(tx))) throw new ApiError('already-set-up');
    const meta = tx.getRepository(MetaRow);
    const code = await meta.findOneBy({ key: CODE_KEY });
    const given = asked.code.toUpperCase().replace(/[^A-Z0-9]/g, '');
    if (!isSecretOf(given, code?.value ?? null)) throw new ApiError('bad-code');
    await meta.delete({ key: CODE_KEY });
    const now = deps.now();
    await tx
      .getRepository(MillRow)
      .insert({ id: 1, name: asked.millName, timeZone: asked.timeZone, units: asked.units ?? 'metric' });
    await tx.getRepository(CauseVersionRow).insert(shippedCauses(ALWAYS));
    const personId = uuid();
    await tx.getRepository(PersonRow).insert({
      id: personId,
      name: asked.name,
      shortName: asked.name,
      worksNumber: null,
      email: asked.email,
      passwordHash,
      pinHash: null,
      usualSet: [],
    });
    await tx
      .getRepository(PersonRightsRow)
      .insert({ personId, effectiveAt: now, roles: ['manager'], shedIds: [], disabled: false });
    await tx.getRepository(ChangeRow).insert({ shedId: null, kind: 'reference', ref: '', mark: newMark() });
    await tx.getRepository(ChangeRow).insert({ shedId: null, kind: 'people', ref: '', mark: newMark() });
    const browser = await officeBrowser(tx, asked.browserId, now);
    return openSession(tx, { personId, deviceId: browser.id, kind: 'office' }, now);
  });
  deps.log.info('the mill has its first manager');
  return signedIn;
}
