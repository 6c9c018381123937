import type { PullResponse } from '@shared/contract/sync';
import type { ErrorCode } from '@shared/contract/errors';
import type { OutboxRecord } from './records';

/** How the exchange with the server stands. */
export interface SyncStatus {
  readonly phase: 'resting' | 'sending' | 'fetching' | 'backing-off';
  readonly reach: 'unknown' | 'reached' | 'offline' | 'refused';
  /** Why the server said no, or cannot be used. */
  readonly code: ErrorCode | null;
  /** By the server's clock, so that no tab whose clock was set tells another one what is not so. */
  readonly lastReachedAt: number | null;
  /** By the device's clock. */
  readonly nextTryAt: number | null;
}

export const NOT_YET: SyncStatus = {
  phase: 'resting',
  reach: 'unknown',
  code: null,
  lastReachedAt: null,
  nextTryAt: null,
};

/**
 * What happened to the device's storage, told after it is durable: to this tab's view and, over a broadcast channel,
 * to the other tabs'. Each carries what is so now, so that hearing it twice does no harm.
 */
export type BookEvent =
  | {
      readonly kind: 'outbox';
      readonly records: readonly OutboxRecord[];
      readonly dismissed: readonly string[];
    }
  | { readonly kind: 'pulled'; readonly pull: PullResponse }
  | { readonly kind: 'status'; readonly status: SyncStatus };
