import { DestroyRef, Injectable, computed, inject, signal } from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { Clock } from '../core/clock';
import { NOT_YET } from './book-events';
import { liveStateOf, type LiveState } from './live-state';
import { OfflineParts } from './offline-parts';

/** For screens that show the shed as it stands: whether news arrive as they happen, and until when they did. */
@Injectable({ providedIn: 'root' })
export class LiveReach {
  private readonly parts = inject(OfflineParts);
  private readonly clock = inject(Clock);
  private readonly more = signal(false);
  private readonly status = toSignal(this.parts.loop.status$, { initialValue: NOT_YET });

  private readonly state = computed<LiveState>(
    () => {
      // The tick and the exchange's moment are the server's; those of the feed are the device's own.
      const offset = this.clock.offset();
      const now = this.clock.tick() - offset;
      const status = this.status();
      const reached = status.lastReachedAt;
      const lastReachedAt = reached === null ? null : reached - offset;
      return liveStateOf(this.parts.feedState(), { ...status, lastReachedAt }, now);
    },
    { equal: (a, b) => a.live === b.live && a.knownUntil === b.knownUntil },
  );
  /** A part of the book is here and the rest is on its way: what is counted from it is not so yet. */
  readonly catchingUp = this.more.asReadonly();
  readonly live = computed(() => this.state().live && !this.more());
  /** Corrected, ms since 1970; null: this device never reached the book. */
  readonly knownUntil = computed(() => {
    const { knownUntil } = this.state();
    return knownUntil === null ? null : knownUntil + this.clock.offset();
  });

  constructor() {
    const stop = this.parts.listen((event) => {
      if (event.kind === 'pulled') this.more.set(event.pull.more);
    });
    inject(DestroyRef).onDestroy(stop);
  }
}
