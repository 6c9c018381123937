import { LIMITS } from '@shared/contract/limits';
import type { SyncStatus } from './book-events';

/** What the leading tab knows of its live feed. Moments by the device's clock; null: never. */
export interface FeedState {
  readonly open: boolean;
  /** When the stream last said anything, be it a comment. */
  readonly heardAt: number | null;
  /** When it last said that something changed. */
  readonly newsAt: number | null;
}

export const NO_FEED: FeedState = { open: false, heardAt: null, newsAt: null };

/** A stream that says nothing for so long is dead, whatever it calls itself. */
const DEAD = LIMITS.feedComment * 3 + 5_000;
/** So soon after an exchange what it brought is now's, feed or no feed: a stream that opens again changes no words. */
const JUST_NOW = 15_000;

/** Whether what this device shows of others is so now, or until when it was (device's clock; null: never). */
export interface LiveState {
  readonly live: boolean;
  readonly knownUntil: number | null;
}

/**
 * While the stream is open and the exchange goes well, nothing can have happened that is not here. Once either is
 * broken, what is shown holds until the last moment at which that was so.
 *
 * @param status its `lastReachedAt` by the device's clock, as the feed's moments and `now`
 */
export function liveStateOf(feed: FeedState, status: SyncStatus, now: number): LiveState {
  const reached = status.lastReachedAt;
  // News that were announced and not fetched: what came before them is all that is known.
  const fetched = feed.newsAt === null || (reached !== null && reached >= feed.newsAt);
  const heard = fetched ? feed.heardAt : null;
  const knownUntil = reached === null ? null : Math.max(reached, heard ?? reached);
  const goesWell = status.reach === 'reached' || status.reach === 'unknown';
  const open = feed.open && feed.heardAt !== null && now - feed.heardAt < DEAD;
  const fresh = reached !== null && now - reached < JUST_NOW;
  return { live: goesWell && reached !== null && (open || fresh), knownUntil };
}
