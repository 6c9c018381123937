import type { PullResponse, PushRequest, PushResponse } from '@shared/contract/sync';
import type { Answer } from '../core/answer';
import type { ClockMeasure } from '../core/clock-watch';
import type { BookStore } from './book-store';
import type { Outbox } from './outbox';

/** What the sync loop needs of the world: a browser's real parts, or a simulated tablet's. */
export interface SyncPorts {
  readonly api: SyncApi;
  readonly outbox: Outbox;
  readonly book: BookStore;
  readonly clock: SyncClock;
  readonly timers: Timers;
  /** In [0, 1). */
  readonly random: () => number;
  /** Whether this tab is the one that talks to the server; correctness does not depend on the answer. */
  readonly leads: () => boolean;
  readonly appVersion?: string;
  /** Whether the browser keeps this storage; undefined: it does not say. */
  readonly persisted?: () => Promise<boolean | undefined>;
}

export interface SyncApi {
  push(request: PushRequest): Promise<Answer<PushResponse>>;
  /** `null`: everything. `seen`: the last push's mark. */
  pull(after: string | null, seen: string | null): Promise<Answer<PullResponse>>;
}

export interface SyncClock {
  /** Device's clock. */
  now(): number;
  exchanged(sentAt: number, answeredAt: number, serverNow: number): ClockMeasure;
}

export interface Timers {
  /** Resolves after `ms`, or as soon as the signal is aborted; never rejects. */
  wait(ms: number, signal: AbortSignal): Promise<void>;
}

/** A browser's (or node's) timers. */
export const REAL_TIMERS: Timers = {
  wait: (ms, signal) =>
    new Promise((resolve) => {
      if (signal.aborted) return resolve();
      const done = (): void => {
        clearTimeout(timer);
        signal.removeEventListener('abort', done);
        resolve();
      };
      const timer = setTimeout(done, ms);
      signal.addEventListener('abort', done);
    }),
};
