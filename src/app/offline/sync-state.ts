import { sentenceOf, type ErrorCode } from '@shared/contract/errors';
import type { SyncStatus } from './book-events';
import { NO_PHOTOS, type PhotosWaiting } from './photos-waiting';
import type { OutboxRecord } from './records';

/** What the header says: saved here → waiting → sent → in the book, or needs a look. */
export interface SyncState {
  readonly kind: 'in-book' | 'waiting' | 'sending' | 'offline' | 'needs-look';
  /** Saved here, not acknowledged (`later` among them). */
  readonly waiting: number;
  /** Held or refused. */
  readonly needsLook: number;
  /** Photos that wait behind the entries. */
  readonly photos: number;
  /** When the book was last reached, by the server's clock; null: never. */
  readonly lastReachedAt: number | null;
  readonly nextTryAt: number | null;
  /** Whether the last try reached the server. */
  readonly online: boolean;
  /** Why the server said no to the exchange as a whole, with its sentence. */
  readonly code: ErrorCode | null;
  readonly sentence: string | null;
}

/** Never "in the book" while something waits. What needs a look comes before what mends itself. */
export function syncStateOf(
  status: SyncStatus,
  records: Iterable<OutboxRecord>,
  photos: PhotosWaiting = NO_PHOTOS,
): SyncState {
  let waiting = 0;
  let needsLook = photos.refused.length;
  for (const { state } of records) {
    if (state === 'waiting' || state === 'later') waiting++;
    if (state === 'held' || state === 'refused') needsLook++;
  }
  return {
    kind: kindOf(status, waiting + photos.waiting, needsLook),
    waiting,
    needsLook,
    photos: photos.waiting,
    lastReachedAt: status.lastReachedAt,
    nextTryAt: status.nextTryAt,
    online: status.reach === 'reached' || status.reach === 'refused',
    code: status.code,
    sentence: status.code ? sentenceOf(status.code) : null,
  };
}

function kindOf(status: SyncStatus, waiting: number, needsLook: number): SyncState['kind'] {
  if (needsLook > 0) return 'needs-look';
  if (status.reach === 'offline') return 'offline';
  if (waiting === 0) return status.lastReachedAt === null ? 'waiting' : 'in-book';
  return status.phase === 'sending' ? 'sending' : 'waiting';
}
