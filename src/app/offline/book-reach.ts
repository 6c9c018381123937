import { DestroyRef, Injectable, computed, inject } from '@angular/core';
import { toObservable } from '@angular/core/rxjs-interop';
import { Subject, auditTime, distinctUntilChanged, filter, map, merge, skip } from 'rxjs';
import { Clock } from '../core/clock';
import { formatMoment } from '../core/dates';
import { OfflineBook } from './offline-book';
import { OfflineParts } from './offline-parts';

/** Pulls come in bursts; a report is asked for once after each. */
const BURST = 1_500;

/** For screens that need the server: when their reports may have changed, and when the book was last reached. */
@Injectable({ providedIn: 'root' })
export class BookReach {
  private readonly book = inject(OfflineBook);
  private readonly clock = inject(Clock);
  private readonly pulled = new Subject<void>();

  /** Speaks when something of the book changed, and when the server can be reached again. */
  readonly changed = merge(
    this.pulled.pipe(auditTime(BURST)),
    toObservable(computed(() => this.book.syncState().online)).pipe(
      distinctUntilChanged(),
      skip(1),
      filter((online) => online),
      map(() => undefined),
    ),
  );
  /** "10:12"; empty: never. Never later than now. */
  readonly lastReachedWords = computed(() => {
    const at = this.book.syncState().lastReachedAt;
    const now = this.clock.tick();
    return at === null ? '' : formatMoment(Math.min(at, now), now);
  });

  constructor() {
    const stop = inject(OfflineParts).listen((event) => {
      if (event.kind !== 'pulled') return;
      const { entries, shifts, reference } = event.pull;
      if (entries.length > 0 || shifts.length > 0 || reference !== null) this.pulled.next();
    });
    inject(DestroyRef).onDestroy(stop);
  }
}
