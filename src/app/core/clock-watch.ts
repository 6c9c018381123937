/** The two clocks of a device. */
export interface ClockSource {
  /** Wall clock, ms since 1970: may be wrong, may be set by somebody. */
  now(): number;
  /** Monotonic, ms since some start: never set, but it may stand still while the device sleeps. */
  monotonic(): number;
}

export interface ClockMeasure {
  /** Server time minus device time, ms. */
  readonly offset: number;
  /** When it was measured, by the device's clock. */
  readonly measuredAt: number;
}

/** A difference below this is drift and scheduling, not a step. */
const TOLERANCE = 2_000;

/**
 * Knows how far the wall clock is off and whether it was set meanwhile. Wall time running ahead of monotonic time
 * is sleep or a step: the next measure of the offset tells which. Wall time falling behind is always a step.
 */
export class ClockWatch {
  private base: number;
  private doubt: number | null = null;
  private readonly steps: number[] = [];
  private measured: ClockMeasure | null = null;

  constructor(private readonly source: ClockSource) {
    this.base = source.now() - source.monotonic();
  }

  /** The device's wall clock. */
  now(): number {
    this.look();
    return this.source.now();
  }

  get measure(): ClockMeasure | null {
    return this.measured;
  }

  get offset(): number {
    return this.measured?.offset ?? 0;
  }

  correctedNow(): number {
    return this.source.now() + this.offset;
  }

  /** Takes over a measure kept from an earlier run of the application. */
  restore(measure: ClockMeasure): void {
    this.measured ??= measure;
  }

  /** An exchange with the server: sent and answered by the device's clock, and the server's time between. */
  exchanged(sentAt: number, answeredAt: number, serverNow: number): ClockMeasure {
    this.look();
    const offset = Math.round(serverNow - (sentAt + answeredAt) / 2);
    const slack = TOLERANCE + Math.max(0, answeredAt - sentAt);
    if (this.doubt !== null) {
      // Sleep leaves the offset as it was; a step moves it.
      if (this.measured && Math.abs(offset - this.measured.offset) > slack) this.steps.push(this.doubt);
      this.doubt = null;
    }
    this.measured = { offset, measuredAt: answeredAt };
    return this.measured;
  }

  /** Whether the clock is known to have been set since a moment (by the device's clock). */
  steppedSince(at: number): boolean {
    this.look();
    return this.steps.some((step) => step >= at - TOLERANCE);
  }

  private look(): void {
    const now = this.source.now();
    const base = now - this.source.monotonic();
    const moved = base - this.base;
    if (Math.abs(moved) <= TOLERANCE) return;
    this.base = base;
    if (moved < 0) this.steps.push(now);
    else this.doubt = now;
  }
}
