import { randomInt } from 'node:crypto';
import { In } from 'typeorm';
import { LIMITS } from '../../../shared/contract/limits.js';
import type { PinSlip } from '../../../shared/contract/one-time.js';
import { isEasyPin } from '../../../shared/contract/person-rules.js';
import { PersonRow } from '../../database/entities/index.js';
import type { Deps } from '../../deps.js';
import { ApiError } from '../../middleware/api-error.js';
import type { Principal } from '../../middleware/principal.js';
import { recordChange } from '../change-record/record-change.js';
import { rightsInForce } from '../sessions/session-answer.js';
import { endSessions, endStreams } from '../sessions/session-opening.js';
import { requireOwnSheds } from './own-sheds.js';

/**
 * New random PINs, all or none; they are said in this one answer and kept as hashes alone. Sign-ins on tablets with
 * the old ones end. Throws `not-found`, `other-shed`, `no-works-number`.
 */
export async function makePinSlips(
  deps: Deps,
  principal: Principal,
  ids: readonly string[],
): Promise<PinSlip[]> {
  const wanted = [...new Set(ids)];
  const pins = new Map<string, { pin: string; pinHash: string }>();
  for (const id of wanted) {
    const pin = newPin();
    pins.set(id, { pin, pinHash: await deps.passwords.hash(pin) });
  }
  const { slips, ended } = await deps.writer.write(async (tx) => {
    const people = await tx.getRepository(PersonRow).findBy({ id: In(wanted) });
    const slips: PinSlip[] = [];
    const ended: string[] = [];
    for (const id of wanted) {
      const person = people.find((each) => each.id === id);
      const rights = await rightsInForce(tx, id);
      const made = pins.get(id);
      if (!person || !made || !rights || rights.disabled) throw new ApiError('not-found');
      requireOwnSheds(principal, rights.shedIds);
      if (person.worksNumber === null) throw new ApiError('no-works-number');
      await tx.getRepository(PersonRow).update({ id }, { pinHash: made.pinHash });
      // Whoever prints the slips goes on with it.
      if (principal.person?.id !== id)
        ended.push(...(await endSessions(tx, { personId: id }, 'disabled', deps.now())));
      await recordChange(tx, {
        by: principal.person?.id ?? null,
        at: deps.now(),
        what: 'person',
        name: person.name,
        action: 'changed',
        effectiveAt: deps.now(),
        before: {},
        after: { pin: 'new, on a slip' },
      });
      slips.push({ personId: id, name: person.name, worksNumber: person.worksNumber, pin: made.pin });
    }
    return { slips, ended };
  });
  endStreams(deps, ended);
  return slips;
}

/** Six digits by chance, but none that is guessed first: one digit six times, or digits in a row. */
export function newPin(): string {
  for (;;) {
    const pin = String(randomInt(10 ** LIMITS.pinDigits)).padStart(LIMITS.pinDigits, '0');
    if (!isEasyPin(pin)) return pin;
  }
}
