import type { Letter } from '../../../shared/contract/set-up.js';
import { PersonRow } from '../../database/entities/index.js';
import type { Deps } from '../../deps.js';
import { ApiError } from '../../middleware/api-error.js';
import type { Principal } from '../../middleware/principal.js';
import { recordChange } from '../change-record/record-change.js';
import { letterNow } from '../mail/mail.service.js';
import { rememberAddress } from '../mail/remember-address.js';
import { postLink } from '../sessions/one-time-links.js';
import { rightsInForce } from '../sessions/session-answer.js';
import { requireOwnSheds } from './own-sheds.js';

/**
 * Sends a person the letter with a link for a password: an invitation, or a reset where there is a password already.
 * Answers what became of the letter. `address`: under which the manager works here.
 */
export async function invite(deps: Deps, principal: Principal, id: string, address: string): Promise<Letter> {
  const letterId = await deps.writer.write(async (tx) => {
    const person = await tx.getRepository(PersonRow).findOneBy({ id });
    if (!person) throw new ApiError('not-found');
    const rights = await rightsInForce(tx, id);
    requireOwnSheds(principal, rights?.shedIds ?? []);
    if (!rights || rights.disabled) throw new ApiError('not-found');
    await rememberAddress(tx, deps.settings, address);
    const letterId = await postLink(deps, tx, person);
    await recordChange(tx, {
      by: principal.person?.id ?? null,
      at: deps.now(),
      what: 'person',
      name: person.name,
      action: 'command',
      after: { letter: person.passwordHash === null ? 'invitation' : 'new password', to: person.email },
    });
    return letterId;
  });
  return letterNow(deps, letterId);
}
