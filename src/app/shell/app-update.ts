import { DOCUMENT, Injectable, inject, signal } from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { SwUpdate } from '@angular/service-worker';
import { debounceTime, filter, first, fromEvent, interval, map, merge, startWith, switchMap } from 'rxjs';

/** How often a page that stays open asks whether there is a newer application. */
const ASK_EVERY = 30 * 60_000;
/** Nobody touched anything for so long: a moment in which an offer disturbs no tap. */
const QUIET = 5_000;
/** "Later" means: not within the next hours of this shift. */
const LATER = 4 * 3_600_000;

/**
 * A newer application, fetched by the service worker: offered when nobody is in the middle of a tap, never forced.
 * After the person says so the new version is activated and the page loaded again; what was logged lies on the device.
 */
@Injectable({ providedIn: 'root' })
export class AppUpdate {
  private readonly worker = inject(SwUpdate);
  private readonly document = inject(DOCUMENT);
  private readonly offeredNow = signal(false);
  private readonly brokenNow = signal(false);
  private timer: ReturnType<typeof setTimeout> | undefined;

  readonly offered = this.offeredNow.asReadonly();
  /** The browser lost part of this version and the server has it no more. */
  readonly broken = this.brokenNow.asReadonly();

  constructor() {
    if (!this.worker.isEnabled) return;
    const touched = merge(fromEvent(this.document, 'pointerdown'), fromEvent(this.document, 'keydown'));
    const quiet = touched.pipe(startWith(null), debounceTime(QUIET), first());
    this.worker.versionUpdates
      .pipe(
        filter((event) => event.type === 'VERSION_READY'),
        switchMap(() => quiet),
        takeUntilDestroyed(),
      )
      .subscribe(() => this.offeredNow.set(true));
    this.worker.unrecoverable.pipe(takeUntilDestroyed()).subscribe(() => this.brokenNow.set(true));
    const seen = fromEvent(this.document, 'visibilitychange').pipe(
      filter(() => this.document.visibilityState === 'visible'),
    );
    merge(seen, interval(ASK_EVERY))
      .pipe(
        map(() => this.ask()),
        takeUntilDestroyed(),
      )
      .subscribe();
  }

  /** The person asked for it. */
  async update(): Promise<void> {
    try {
      await this.worker.activateUpdate();
    } finally {
      this.reload();
    }
  }

  later(): void {
    this.offeredNow.set(false);
    clearTimeout(this.timer);
    this.timer = setTimeout(() => this.offeredNow.set(true), LATER);
  }

  reload(): void {
    this.document.location.reload();
  }

  /** Without network there is no answer, and none is needed. */
  private ask(): void {
    this.worker.checkForUpdate().catch(() => false);
  }
}
