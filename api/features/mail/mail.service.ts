import { existsSync, readFileSync } from 'node:fs';
import { IsNull, Not } from 'typeorm';
import type * as z from 'zod/mini';
import { mailTroubles } from '../../../shared/contract/mail-rules.js';
import type {
  Letter,
  LetterText,
  MailForm,
  MailSettings,
  testLetterSchema,
} from '../../../shared/contract/set-up.js';
import { LetterRow, MailSettingsRow, MillRow, PersonRow } from '../../database/entities/index.js';
import type { Deps } from '../../deps.js';
import { testWords } from '../../mail/letters.js';
import { ownAddress } from '../../mail/own-address.js';
import { letterFile } from '../../mail/post-office.js';
import { ApiError } from '../../middleware/api-error.js';
import type { Principal } from '../../middleware/principal.js';
import { differingFields, recordChange } from '../change-record/record-change.js';
import { requireAllSheds } from '../people/own-sheds.js';
import { NO_MAIL, rememberAddress } from './remember-address.js';

/** How long an answer waits for the mail server, ms; the letter goes on after it. */
const ANSWER_WITHIN = 8_000;
const LETTERS_SHOWN = 100;

export async function mailSettings(deps: Deps, principal: Principal): Promise<MailSettings> {
  requireAllSheds(principal);
  return toSettings(deps, await deps.reads.getRepository(MailSettingsRow).findOneBy({ id: 1 }));
}

/** Takes new settings, and tries at once what waits. The password stays where none is sent; empty, it goes. */
export async function changeMail(
  deps: Deps,
  principal: Principal,
  asked: MailForm,
  address: string,
): Promise<MailSettings> {
  requireAllSheds(principal);
  const row = await deps.writer.write(async (tx) => {
    await rememberAddress(tx, deps.settings, address);
    const known = await tx.getRepository(MailSettingsRow).findOneBy({ id: 1 });
    const before = known ?? { ...NO_MAIL, baseUrl: null };
    const after: MailSettingsRow = {
      ...before,
      host: asked.host === '' ? null : asked.host,
      port: asked.port,
      security: asked.security,
      user: asked.user,
      password: passwordAfter(asked, before),
      from: asked.from.toLowerCase(),
    };
    const troubles = mailTroubles(asked, after.password !== null);
    const fields = Object.entries(troubles).map(([path, message]) => ({ path, message }));
    if (fields.length > 0) throw new ApiError('bad-request', { fields });
    if (known) await tx.getRepository(MailSettingsRow).update({ id: 1 }, after);
    else await tx.getRepository(MailSettingsRow).insert(after);
    await tx.getRepository(LetterRow).update({ dueAt: Not(IsNull()) }, { dueAt: deps.now() });
    const differ = differingFields(told(before), told(after));
    if (asked.password !== undefined && asked.password !== before.password)
      differ.after['password'] = after.password === null ? 'taken away' : 'set anew';
    if (Object.keys(differ.after).length > 0)
      await recordChange(tx, {
        by: principal.person?.id ?? null,
        at: deps.now(),
        what: 'mail',
        name: 'Mail',
        action: known ? 'changed' : 'added',
        ...differ,
      });
    return after;
  });
  return toSettings(deps, row);
}

/** A letter to try the settings with: carried at once, once. */
export async function sendTestLetter(
  deps: Deps,
  principal: Principal,
  { to }: z.infer<typeof testLetterSchema>,
): Promise<Letter> {
  requireAllSheds(principal);
  const mill = await deps.reads.getRepository(MillRow).findOneBy({ id: 1 });
  const by = await deps.reads.getRepository(PersonRow).findOneBy({ id: principal.person?.id ?? '' });
  const words = testWords(mill?.name ?? 'the mill', by?.name ?? 'A manager');
  const id = await deps.writer.write((tx) =>
    deps.post.post(tx, { ...words, purpose: 'test', to, until: null, queued: false }),
  );
  return letterNow(deps, id);
}

/**
 * Tries a failed letter again, from its first wait on; a test letter once. Throws `not-found` where there is no such
 * letter or it has not failed.
 */
export async function sendAgain(deps: Deps, principal: Principal, id: string): Promise<Letter> {
  requireAllSheds(principal);
  await deps.writer.write(async (tx) => {
    const letters = tx.getRepository(LetterRow);
    const row = await letters.findOneBy({ id, state: 'failed' });
    if (!row || row.text === null) throw new ApiError('not-found');
    const dueAt = row.purpose === 'test' ? null : deps.now();
    await letters.update({ id }, { state: 'waiting', tries: 0, dueAt, trouble: null });
  });
  return letterNow(deps, id);
}

/** Newest first. */
export async function listLetters(deps: Deps, principal: Principal): Promise<Letter[]> {
  requireAllSheds(principal);
  const rows = await deps.reads
    .getRepository(LetterRow)
    .find({ order: { at: 'DESC', id: 'DESC' }, take: LETTERS_SHOWN });
  return rows.map(toLetter);
}

/** What a letter says that did not go out, for a manager to hand over. Throws `not-found` once it was sent. */
export async function readLetter(deps: Deps, principal: Principal, id: string): Promise<LetterText> {
  requireAllSheds(principal);
  const row = await deps.reads.getRepository(LetterRow).findOneBy({ id });
  if (!row || row.text === null) throw new ApiError('not-found');
  return { ...toLetter(row), text: row.text };
}

/** A kept letter as it lies in the data folder (message/rfc822). */
export async function readLetterFile(deps: Deps, principal: Principal, id: string): Promise<Buffer> {
  requireAllSheds(principal);
  const row = await deps.reads.getRepository(LetterRow).findOneBy({ id, state: 'kept' });
  const file = letterFile(deps.settings.dataDir, row?.id ?? 'none');
  if (!row || !existsSync(file)) throw new ApiError('not-found');
  return readFileSync(file);
}

/** Lets a letter go now, and says what became of it; a slow mail server's answer shows later in the list. */
export async function letterNow(deps: Deps, id: string): Promise<Letter> {
  let patience: NodeJS.Timeout | undefined;
  const delivered = deps.post.deliver(id).catch((error: unknown) => {
    deps.log.error(error, 'a letter could not be looked after');
    return null;
  });
  await Promise.race([delivered, new Promise((resolve) => (patience = setTimeout(resolve, ANSWER_WITHIN)))]);
  clearTimeout(patience);
  return toLetter(await deps.reads.getRepository(LetterRow).findOneByOrFail({ id }));
}

function passwordAfter(asked: MailForm, before: Pick<MailSettingsRow, 'password'>): string | null {
  if (asked.password === undefined) return before.password;
  return asked.password === '' ? null : asked.password;
}

/** What the record of changes says of them: all but the password. */
function told({ host, port, security, user, from }: MailSettingsRow) {
  return { host, port, security, user, from };
}

function toSettings(deps: Pick<Deps, 'settings'>, row: MailSettingsRow | null): MailSettings {
  const { host, port, security, user, password, from } = row ?? NO_MAIL;
  return {
    host,
    port,
    security,
    user,
    hasPassword: password !== null,
    from,
    baseUrl: ownAddress(deps.settings, row),
  };
}

function toLetter({ id, to, subject, at, state, trouble }: LetterRow): Letter {
  return { id, to, subject, at, state, trouble };
}
