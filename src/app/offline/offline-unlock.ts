import type { Grant, SignedInPerson } from '@shared/contract/session';
import { del, get, set } from 'idb-keyval';
import { result, type LocalDatabase } from './local-database';
import { canVerifyPins, makeVerifier, pinMatches, type PinVerifier } from './pin-verifier';
import { isReadable, RECORD_VERSION } from './records';

interface UnlockRecord {
  readonly v: number;
  readonly person: SignedInPerson;
  readonly grant: Grant;
  readonly verifier: PinVerifier;
}
interface TriesRecord {
  readonly v: number;
  readonly wrong: number;
  /** No try before this moment, by the device's clock. */
  readonly notBefore: number;
}

export type Unlocked =
  | { readonly is: 'unlocked'; readonly person: SignedInPerson; readonly grant: Grant }
  | { readonly is: 'unavailable' | 'unknown' | 'wrong' }
  /** Too many wrong PINs: not before `waitMs` have passed. */
  | { readonly is: 'wait'; readonly waitMs: number };

/** Wrong PINs that cost no waiting; each further one doubles it, from five seconds to a quarter of an hour. */
const FREE_TRIES = 3;
const FIRST_WAIT = 5_000;
const LONGEST_WAIT = 15 * 60_000;

/**
 * Unlocks a tablet without network for somebody who has signed in on it before. Kept a person: the grant of the last
 * sign-in and a verifier of the PIN, never the PIN. The count of wrong ones is durable before the answer is given, so
 * that a reload does not reset it.
 */
export class OfflineUnlock {
  constructor(
    private readonly database: LocalDatabase,
    private readonly now: () => number,
    private readonly iterations?: number,
  ) {}

  available(): boolean {
    return canVerifyPins();
  }

  /** After a sign-in that the server granted. Forgets earlier wrong tries. */
  async remember(person: SignedInPerson, grant: Grant, pin: string): Promise<void> {
    if (!canVerifyPins() || person.worksNumber === null) return;
    const verifier = await makeVerifier(pin, this.iterations);
    const record: UnlockRecord = { v: RECORD_VERSION, person, grant, verifier };
    await set(pinKey(person.worksNumber), record, this.database.store('facts'));
    await del(triesKey(person.worksNumber), this.database.store('facts'));
  }

  /** Who has signed in on this device before, by name: they may be offered instead of typing a number. */
  async known(): Promise<readonly SignedInPerson[]> {
    const range = IDBKeyRange.bound(pinKey(''), `${pinKey('')}\uffff`);
    const raw = await this.database.transact(['facts'], 'readonly', (transaction) =>
      result<unknown[]>(transaction.objectStore('facts').getAll(range)),
    );
    return raw
      .filter(isReadable)
      .map((record) => (record as UnlockRecord).person)
      .sort((a, b) => a.shortName.localeCompare(b.shortName, 'en-GB'));
  }

  /** The server said that this number and PIN do not go together. */
  async forget(worksNumber: string): Promise<void> {
    await del(pinKey(worksNumber), this.database.store('facts'));
  }

  async unlock(worksNumber: string, pin: string): Promise<Unlocked> {
    if (!canVerifyPins()) return { is: 'unavailable' };
    const facts = this.database.store('facts');
    const known = await get<unknown>(pinKey(worksNumber), facts);
    if (!isReadable(known)) return { is: 'unknown' };
    const record = known as UnlockRecord;
    // Counted as wrong first, taken back when it was right: killing the application in between gains no try.
    const waitMs = await this.countTry(worksNumber);
    if (waitMs > 0) return { is: 'wait', waitMs };
    if (!(await pinMatches(pin, record.verifier))) return { is: 'wrong' };
    await del(triesKey(worksNumber), facts);
    return { is: 'unlocked', person: record.person, grant: record.grant };
  }

  /** How long to wait yet; 0: this try is let through and counted. */
  private countTry(worksNumber: string): Promise<number> {
    return this.database.transact(['facts'], 'readwrite', async (transaction) => {
      const facts = transaction.objectStore('facts');
      const raw: unknown = await result<unknown>(facts.get(triesKey(worksNumber)));
      const tries = isReadable(raw) ? (raw as TriesRecord) : null;
      const now = this.now();
      // A clock that was set back must not lock somebody out for days.
      const waitMs = Math.min((tries?.notBefore ?? 0) - now, LONGEST_WAIT);
      if (waitMs > 0) return waitMs;
      const wrong = (tries?.wrong ?? 0) + 1;
      const pause = wrong < FREE_TRIES ? 0 : Math.min(FIRST_WAIT * 2 ** (wrong - FREE_TRIES), LONGEST_WAIT);
      const next: TriesRecord = { v: RECORD_VERSION, wrong, notBefore: now + pause };
      await result(facts.put(next, triesKey(worksNumber)));
      return 0;
    });
  }
}

const pinKey = (worksNumber: string): string => `pin:${worksNumber}`;
const triesKey = (worksNumber: string): string => `pin-tries:${worksNumber}`;
