import { Injectable, computed, effect, inject, signal } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import type { SignedInPerson } from '@shared/contract/session';
import { DONE, NO_NETWORK_SENTENCE, type Outcome } from '../core/answer';
import { Clock } from '../core/clock';
import { SessionStore } from '../core/session-store';
import { NOT_YET } from './book-events';
import { OfflineParts } from './offline-parts';
import { OfflineUnlock, type Unlocked } from './offline-unlock';

/**
 * Signing in on a tablet, with or without network: asks the server, and where it cannot be reached lets in whoever
 * has signed in on this tablet before. As soon as the server is reached it checks the PIN; till then one may log and
 * pull, nothing else. The PIN is held in memory for that, and nowhere else.
 */
@Injectable({ providedIn: 'root' })
export class FloorSignIn {
  private readonly session = inject(SessionStore);
  private readonly parts = inject(OfflineParts);
  private readonly clock = inject(Clock);
  private readonly unlocking = new OfflineUnlock(this.parts.database, () => this.clock.now());
  private readonly status = toSignal(this.parts.loop.status$, { initialValue: NOT_YET });
  private unchecked: { readonly worksNumber: string; readonly pin: string } | null = null;
  private checking = false;
  private readonly refusedNow = signal<string | null>(null);

  /** False on plain http: the browser then has no means to check a PIN, and the sign-in page says so. */
  readonly unlocksOffline = this.unlocking.available();
  /** Why the server locked the screen again after an offline unlock; null: it did not. */
  readonly refused = this.refusedNow.asReadonly();
  private readonly reachedAt = computed(() => this.status().lastReachedAt);

  constructor() {
    effect(() => {
      // Each time that the server is reached.
      if (this.reachedAt() !== null) void this.check();
    });
  }

  async signIn(worksNumber: string, pin: string): Promise<Outcome> {
    this.refusedNow.set(null);
    this.unchecked = null;
    const online = await this.session.signInFloor(worksNumber, pin);
    if (online.ok) {
      await this.keep(pin);
      return DONE;
    }
    if (online.code === 'wrong-sign-in') {
      await this.forget(worksNumber);
      return { ...online, sentence: WRONG_PIN };
    }
    // What the server says about this tablet or this person holds; only silence and overload open the other door.
    if (!(online.code === 'offline' || TROUBLE.has(online.code))) return online;
    return this.unlock(worksNumber, pin);
  }

  /** Who has signed in on this tablet before. */
  async known(): Promise<readonly SignedInPerson[]> {
    try {
      return await this.unlocking.known();
    } catch {
      return [];
    }
  }

  private async unlock(worksNumber: string, pin: string): Promise<Outcome> {
    let unlocked: Unlocked;
    try {
      unlocked = await this.unlocking.unlock(worksNumber, pin);
    } catch {
      unlocked = { is: 'unavailable' };
    }
    if (unlocked.is !== 'unlocked') return refusal(unlocked);
    this.unchecked = { worksNumber, pin };
    this.session.unlockOffline(unlocked.person, unlocked.grant);
    return DONE;
  }

  /** The PIN of an offline unlock, as soon as the server can be asked. */
  private async check(): Promise<void> {
    const { unchecked } = this;
    if (!unchecked || this.checking) return;
    if (this.session.state() !== 'unlocked-offline') {
      this.unchecked = null;
      return;
    }
    this.checking = true;
    const outcome = await this.session.signInFloor(unchecked.worksNumber, unchecked.pin);
    this.checking = false;
    if (this.unchecked !== unchecked) return;
    if (outcome.ok) {
      this.unchecked = null;
      await this.keep(unchecked.pin);
    } else if (!(outcome.code === 'offline' || TROUBLE.has(outcome.code))) {
      this.unchecked = null;
      const wrong = outcome.code === 'wrong-sign-in';
      if (wrong) await this.forget(unchecked.worksNumber);
      this.refusedNow.set(wrong ? WRONG_PIN : outcome.sentence);
      this.session.leave();
    }
  }

  private async keep(pin: string): Promise<void> {
    const person = this.session.person();
    const grant = this.session.grant();
    try {
      if (person && grant) await this.unlocking.remember(person, grant, pin);
    } catch {
      // Signed in all the same; without network this person cannot unlock here.
    }
  }

  private async forget(worksNumber: string): Promise<void> {
    try {
      await this.unlocking.forget(worksNumber);
    } catch {
      // The next sign-in with network says the same again.
    }
  }
}

/** The server's sentence speaks of e-mail and password too, which nobody has on the floor. */
const WRONG_PIN = 'Number and PIN do not go together. Try again.';

const TROUBLE: ReadonlySet<string> = new Set(['busy', 'disk-full', 'closing-down', 'internal']);

function refusal(unlocked: Exclude<Unlocked, { is: 'unlocked' }>): Outcome {
  switch (unlocked.is) {
    case 'unavailable':
      return {
        ok: false,
        code: 'unlock-unavailable',
        sentence: `${NO_NETWORK_SENTENCE} Signing in without network works only where this address begins with https.`,
      };
    case 'unknown':
      return {
        ok: false,
        code: 'unlock-unknown',
        sentence:
          'The book cannot be reached, and this number has not signed in on this tablet before. Use the tablet that you used last, or fetch the foreman.',
      };
    case 'wrong':
      return { ok: false, code: 'unlock-wrong', sentence: WRONG_PIN };
    case 'wait': {
      const seconds = Math.ceil(unlocked.waitMs / 1_000);
      return {
        ok: false,
        code: 'unlock-wait',
        sentence: `Too many wrong PINs. Wait ${seconds} s, then try again; what was logged is safe.`,
      };
    }
  }
}
