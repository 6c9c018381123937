import { formatCount } from '@shared/figures/format';
import type { SyncState } from '../offline/sync-state';
import { dateOf, formatDate, formatMoment, formatTime } from '../core/dates';

export interface SyncWords {
  /** What matters most: "7 waiting". */
  readonly first: string;
  /** The same where there is little room: "3 waiting" for 2 entries and a photo. Empty: no shorter. */
  readonly brief: string;
  /** The rest: "book last reached 09:41". */
  readonly rest: string;
  /** The rest where there is little room: "14:02", "11 May". Empty: it has to go without. */
  readonly short: string;
  readonly tone: 'calm' | 'look' | 'now';
}

/**
 * The header's words: saved here → waiting → sent → in the book, or needs a look. Never "sent" when it is only saved,
 * never "in the book" when something waits.
 *
 * @param now corrected, ms since 1970: a moment kept by a clock that was put forward is not shown as later
 */
export function syncWords(state: SyncState, now: number): SyncWords {
  const words = wordsOf(state, now);
  const both = words.first === waitingWords(state) && state.waiting > 0 && state.photos > 0;
  return { ...words, brief: both ? `${formatCount(state.waiting + state.photos)} waiting` : '' };
}

function wordsOf(known: SyncState, now: number): Omit<SyncWords, 'brief'> {
  const { lastReachedAt: at } = known;
  const state = { ...known, lastReachedAt: at === null ? null : Math.min(at, now) };
  const waits = waitingWords(state);
  const reached =
    state.lastReachedAt === null
      ? 'book not reached yet'
      : `book last reached ${formatMoment(state.lastReachedAt, now)}`;
  switch (state.kind) {
    case 'in-book':
      return {
        first: 'In the book',
        rest: state.lastReachedAt === null ? '' : formatMoment(state.lastReachedAt, now),
        short: '',
        tone: 'calm',
      };
    case 'sending':
      return {
        first: `Sending ${state.waiting > 0 ? formatCount(state.waiting) : photoWords(state.photos)}`,
        rest: '',
        short: '',
        tone: 'calm',
      };
    case 'waiting':
      return waits === ''
        ? { first: 'Book not reached yet', rest: '', short: '', tone: 'calm' }
        : {
            first: waits,
            rest: reached,
            short: shortly(state.lastReachedAt, now),
            tone: 'look',
          };
    case 'offline':
      return waits === ''
        ? { first: 'Book out of reach', rest: sinceWords(state.lastReachedAt, now), short: '', tone: 'look' }
        : {
            first: waits,
            rest: reached,
            short: shortly(state.lastReachedAt, now),
            tone: 'look',
          };
    case 'needs-look':
      return {
        first: state.needsLook === 1 ? '1 needs a look' : `${formatCount(state.needsLook)} need a look`,
        rest: waits || (state.online ? '' : reached),
        short: waits || state.online ? '' : shortly(state.lastReachedAt, now),
        tone: 'now',
      };
  }
}

/** "7 waiting", "2 photos waiting", "7 and 2 photos waiting"; empty: nothing waits. */
function waitingWords({ waiting, photos }: SyncState): string {
  const parts = [waiting > 0 ? formatCount(waiting) : '', photos > 0 ? photoWords(photos) : ''].filter(
    Boolean,
  );
  return parts.length === 0 ? '' : `${parts.join(' and ')} waiting`;
}

export function photoWords(photos: number): string {
  return photos === 1 ? '1 photo' : `${formatCount(photos)} photos`;
}

function shortly(at: number | null, now: number): string {
  if (at === null) return '';
  return dateOf(at) === dateOf(now) ? formatTime(at) : formatDate(dateOf(at));
}

function sinceWords(at: number | null, now: number): string {
  return at === null ? 'not reached yet' : `since ${formatMoment(at, now)}`;
}
