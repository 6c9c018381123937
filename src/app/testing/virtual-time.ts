import type { ClockMeasure } from '../core/clock-watch';
import type { SyncClock, Timers } from '../offline/sync-ports';

interface Waiting {
  readonly at: number;
  readonly wake: () => void;
}

/** A clock and timers that move only when a spec says so. */
export class VirtualTime implements SyncClock, Timers {
  private waiting: Waiting[] = [];
  /** How long each wait was asked to last, in order. */
  readonly waits: number[] = [];
  offset = 0;

  constructor(private moment: number) {}

  now(): number {
    return this.moment;
  }

  exchanged(sentAt: number, answeredAt: number, serverNow: number): ClockMeasure {
    this.offset = serverNow - (sentAt + answeredAt) / 2;
    return { offset: this.offset, measuredAt: answeredAt };
  }

  wait(ms: number, signal: AbortSignal): Promise<void> {
    this.waits.push(ms);
    return new Promise((resolve) => {
      if (signal.aborted) return resolve();
      const one: Waiting = { at: this.moment + ms, wake: resolve };
      this.waiting.push(one);
      signal.addEventListener('abort', () => {
        this.waiting = this.waiting.filter((other) => other !== one);
        resolve();
      });
    });
  }

  /** Whether somebody waits. */
  get asleep(): boolean {
    return this.waiting.length > 0;
  }

  /** Moves on; whoever's time has come wakes. */
  advance(ms: number): void {
    this.moment += ms;
    const due = this.waiting.filter((one) => one.at <= this.moment);
    this.waiting = this.waiting.filter((one) => one.at > this.moment);
    for (const one of due) one.wake();
  }
}
