import { LIMITS } from '../../../shared/contract/limits.js';
import { EASY_PIN, isEasyPin } from '../../../shared/contract/person-rules.js';
import type { PersonRow } from '../../database/entities/index.js';
import type { Deps } from '../../deps.js';
import { ApiError, wrongField } from '../../middleware/api-error.js';

export type HashedSecrets = Partial<Pick<PersonRow, 'pinHash' | 'passwordHash'>>;

/** Throws `password-too-short`, `password-too-long`, and `bad-request` at a PIN that is guessed first. */
export async function hashed(
  deps: Pick<Deps, 'passwords'>,
  asked: { pin?: string | undefined; password?: string | undefined },
): Promise<HashedSecrets> {
  if (asked.password !== undefined) requireLength(asked.password);
  if (asked.pin !== undefined && isEasyPin(asked.pin)) throw wrongField('pin', EASY_PIN);
  return {
    ...(asked.pin === undefined ? {} : { pinHash: await deps.passwords.hash(asked.pin) }),
    ...(asked.password === undefined ? {} : { passwordHash: await deps.passwords.hash(asked.password) }),
  };
}

/** Throws `password-too-short`. */
export function requireLength(password: string): void {
  if (password.length < LIMITS.passwordLength) throw new ApiError('password-too-short');
}

/** What the record of changes says of new secrets: that there are some. */
export function secretsSet(secrets: HashedSecrets): Record<string, string> {
  return {
    ...(secrets.pinHash === undefined ? {} : { pin: 'set anew' }),
    ...(secrets.passwordHash === undefined ? {} : { password: 'set anew' }),
  };
}
