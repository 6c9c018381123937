import { DestroyRef, Injectable, computed, inject, signal } from '@angular/core';
import { ClockWatch, type ClockMeasure } from './clock-watch';

/** How often screens that show "now" move on. */
const TICK = 10_000;

/** The device's clock, what is known of its error, and a slow tick for screens. */
@Injectable({ providedIn: 'root' })
export class Clock {
  private readonly watch = new ClockWatch({ now: () => Date.now(), monotonic: () => performance.now() });
  private readonly measured = signal<ClockMeasure | null>(null);
  private readonly ticked = signal(this.watch.correctedNow());

  /** Server time minus device time, ms, as last measured; 0 while never measured. */
  readonly offset = computed(() => this.measured()?.offset ?? 0);
  /** Corrected now, moved on every ten seconds and by every tap: for what screens show, not for entries. */
  readonly tick = this.ticked.asReadonly();

  constructor() {
    const timer = setInterval(() => this.moveOn(), TICK);
    inject(DestroyRef).onDestroy(() => clearInterval(timer));
  }

  /** The device's own clock, ms since 1970: what entries carry. */
  now(): number {
    return this.watch.now();
  }

  /** The device's clock set right by the last measure of its offset. */
  correctedNow(): number {
    return this.watch.correctedNow();
  }

  get measure(): ClockMeasure | null {
    return this.watch.measure;
  }

  restore(measure: ClockMeasure): void {
    this.watch.restore(measure);
    this.measured.set(this.watch.measure);
    this.moveOn();
  }

  exchanged(sentAt: number, answeredAt: number, serverNow: number): ClockMeasure {
    const measure = this.watch.exchanged(sentAt, answeredAt, serverNow);
    this.measured.set(measure);
    this.moveOn();
    return measure;
  }

  steppedSince(at: number): boolean {
    return this.watch.steppedSince(at);
  }

  moveOn(): void {
    this.ticked.set(this.watch.correctedNow());
  }
}
