import { DestroyRef, Injectable, computed, effect, inject, signal, untracked } from '@angular/core';
import { Clock } from '../../core/clock';
import { SessionStore } from '../../core/session-store';
import { BookSignals } from '../../offline/book-signals';

const MINUTE = 60_000;
/** Where the mill says nothing. */
const LOCK_AFTER = 5;
/** Kept beside the session, so that loading the page again opens nothing. */
const KEY = 'shedbeat.locked.1';
const SIGNS_OF_LIFE = ['pointerdown', 'keydown', 'wheel', 'touchmove'] as const;

/**
 * Locks a shared tablet that nobody touches. Whoever was there stays signed in beneath, and the page stands as it was
 * left: the same person's PIN opens it with all that was half typed. It keeps the screen, not the data (see
 * `OfflineUnlock`).
 */
@Injectable({ providedIn: 'root' })
export class ScreenLock {
  private readonly clock = inject(Clock);
  private readonly session = inject(SessionStore);
  private readonly signals = inject(BookSignals);
  private touchedAt = this.clock.now();
  private readonly lockedNow = signal(wasLocked());

  /** Minutes after which an untouched tablet locks: the mill's setting. */
  readonly minutes = computed(() => this.signals.reference().mill.lockAfterMinutes ?? LOCK_AFTER);
  /** There is somebody to lock away, on a tablet that others use too. */
  private readonly locks = computed(() => this.session.isTablet() && this.session.somebody());
  readonly locked = computed(() => this.lockedNow() && this.locks());

  constructor() {
    const touched = (): void => {
      // What comes after a long sleep is looked at before it counts as life.
      this.check();
      this.touchedAt = this.clock.now();
    };
    const shown = (): void => {
      if (document.visibilityState === 'visible') this.check();
    };
    const options = { passive: true, capture: true };
    for (const sign of SIGNS_OF_LIFE) document.addEventListener(sign, touched, options);
    document.addEventListener('visibilitychange', shown);
    inject(DestroyRef).onDestroy(() => {
      for (const sign of SIGNS_OF_LIFE) document.removeEventListener(sign, touched, options);
      document.removeEventListener('visibilitychange', shown);
    });
    effect(() => {
      this.clock.tick();
      untracked(() => this.check());
    });
    effect(() => {
      // Nobody is there any more: the door stands before the next one anyway.
      if (this.session.state() === 'nobody') this.open();
    });
  }

  /** By a PIN that was right. */
  open(): void {
    this.touchedAt = this.clock.now();
    this.lockedNow.set(false);
    remember(false);
  }

  private check(): void {
    if (this.lockedNow() || !this.locks()) return;
    if (this.clock.now() - this.touchedAt < this.minutes() * MINUTE) return;
    this.lockedNow.set(true);
    remember(true);
  }
}

function wasLocked(): boolean {
  try {
    return localStorage.getItem(KEY) !== null;
  } catch {
    return false;
  }
}

function remember(locked: boolean): void {
  try {
    if (locked) localStorage.setItem(KEY, 'yes');
    else localStorage.removeItem(KEY);
  } catch {
    // A browser without storage locks again after its time.
  }
}
