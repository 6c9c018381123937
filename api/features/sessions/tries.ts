import { MemoryStore } from 'express-rate-limit';
import { ApiError } from '../../middleware/api-error.js';

/** Counts wrong tries by a key (tablet and works number, e-mail, address) and refuses more than the limit. */
export class Tries {
  private readonly store = new MemoryStore();

  constructor(
    private readonly limit: number,
    windowMs: number,
  ) {
    // The store reads nothing but the window from what the middleware would hand it.
    this.store.init({ windowMs } as Parameters<MemoryStore['init']>[0]);
  }

  /** To be called before a try; throws `too-many-tries`. */
  async count(key: string): Promise<void> {
    const { totalHits, resetTime } = await this.store.increment(key);
    if (totalHits <= this.limit) return;
    const wait = resetTime ? Math.ceil((resetTime.getTime() - Date.now()) / 1000) : 60;
    throw new ApiError('too-many-tries', { retryAfter: Math.max(1, wait) });
  }

  /** After a right one. */
  async forget(key: string): Promise<void> {
    await this.store.resetKey(key);
  }

  close(): void {
    this.store.shutdown();
  }
}

/** What is counted: generous to clammy fingers, hopeless for guessing a PIN of six digits. */
export interface SignInTries {
  /** A works number on a tablet. */
  readonly floor: Tries;
  /** All numbers on one tablet. */
  readonly tablet: Tries;
  /** An e-mail address. */
  readonly office: Tries;
  /** Letters that an e-mail address was asked to be sent. */
  readonly letters: Tries;
  /** Everything from one network address: sign-ins of an office, one-time codes and links. */
  readonly address: Tries;
  close(): void;
}

const MINUTE = 60_000;

export function createSignInTries(): SignInTries {
  const tries = {
    floor: new Tries(8, 5 * MINUTE),
    tablet: new Tries(60, 5 * MINUTE),
    office: new Tries(10, 15 * MINUTE),
    letters: new Tries(3, 60 * MINUTE),
    address: new Tries(100, 15 * MINUTE),
  };
  return { ...tries, close: () => Object.values(tries).forEach((each) => each.close()) };
}
